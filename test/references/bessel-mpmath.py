# Writes bessel-mpmath.json: Bessel functions, their zeros and ratios, by mpmath at 40 digits, rounded to 17.
import datetime, json, sys
import mpmath as mp

mp.mp.dps = 40
show = lambda x: mp.nstr(x, 17)
points = ["1e-8", "0.001", "0.3", "0.999", "1", "1.001", "1.8411837813406593", "2.5", "3.9", "4.1", "7.9", "8.1", "17.3", "40", "99.5", "200"]
out = {
    "tool": "mpmath", "version": mp.__version__, "precision": "40 digits, rounded to 17",
    "command": "python3 bessel-mpmath.py > bessel-mpmath.json", "date": str(datetime.date.today()),
    "functions": [{"x": x, **{f"J{n}": show(mp.besselj(n, mp.mpf(x))) for n in (0, 1, 2)},
                   "JPrime1": show(mp.besselj(1, mp.mpf(x), derivative=1)),
                   "Y0": show(mp.bessely(0, mp.mpf(x))), "Y1": show(mp.bessely(1, mp.mpf(x))),
                   "YPrime1": show(mp.bessely(1, mp.mpf(x), derivative=1))} for x in points],
    "orders": [{"n": n, "x": x, "J": show(mp.besselj(n, mp.mpf(x))), "JPrime": show(mp.besselj(n, mp.mpf(x), derivative=1))}
               for n in (3, 5, 10, 20, 40, 60) for x in ("0.5", "4.9", "10.1", "19.9", "39.5", "60.2", "150")],
    "ratios": [{"n": n, "x": x, "ratio": show(mp.besseli(n, mp.mpf(x)) / mp.besseli(n - 1, mp.mpf(x)))}
               for n in (1, 2) for x in ("1e-6", "0.02", "1", "7.5", "60", "2500")],
    "zeros": [{"kind": k, "n": n, "i": i, "zero": show(mp.besseljzero(n, i, derivative=d))}
              for k, d in (("J", 0), ("Jprime", 1)) for n in (1, 7, 15, 30) for i in (1, 2, 7, 20, 40)],
}
json.dump(out, sys.stdout, indent=1)
