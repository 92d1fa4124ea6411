# Writes hybrid-scipy.json: modes of a corrugated guide from the field components themselves: E_phi = 0 and E_z/H_phi of
# the shorted radial slot as a 2 x 2 determinant in the amplitudes of E_z and H_z, scanned in beta, without any reduction.
import datetime, json, sys
import numpy as np, scipy
from scipy.special import jv, jvp, yv, yvp, iv, ivp
from scipy.optimize import brentq

c = 299792458.0

def radial(K2, a):
    """J1(Ka) and d/drho J1(K rho) at rho = a; for K2 < 0 the same with I1 (a common factor j dropped)."""
    if K2 > 0:
        K = np.sqrt(K2)
        return jv(1, K * a), K * jvp(1, K * a)
    K = np.sqrt(-K2)
    return iv(1, K * a) * np.exp(-K * a), K * ivp(1, K * a) * np.exp(-K * a)

def determinant(beta, k, a, d, fill):
    K2 = k * k - beta * beta
    f, g = radial(K2, a)
    # E_z = A f cos, eta H_z = B f sin; e^{-j beta z}: (j/K2 factors dropped)
    # E_phi ~ A beta f / a + B k g        (times +j/K2 sin)
    # eta H_phi ~ -(B beta f / a + A k g) (times j/K2 cos)
    b = a + d
    ez = jv(1, k * a) * yv(1, k * b) - jv(1, k * b) * yv(1, k * a)
    ehphi = jvp(1, k * a) * yv(1, k * b) - jv(1, k * b) * yvp(1, k * a)   # eta H_phi = -j ehphi
    # mean E_z of the guide = fill * slot's: eta H_phi * (ez*fill) = -j ehphi * E_z
    # (-j/K2)(B beta f/a + A k g) ez fill = -j ehphi A f
    m = np.array([[beta * f / a, k * g], [k * g * ez * fill / K2 - ehphi * f, beta * f / a * ez * fill / K2]])
    return m[0, 0] * m[1, 1] - m[0, 1] * m[1, 0], -(beta * f / a) / (k * g)

def modes(freq, a, d, fill):
    k = 2 * np.pi * freq / c
    found = []
    # A factor f of the determinant and its pole at K2 = 0 give false roots: keep those that stay finite.
    grid = np.concatenate([np.linspace(1e-6, 0.9999999, 40001), np.linspace(1.0000001, 12, 40001)]) * k
    values = [determinant(b, k, a, d, fill)[0] for b in grid]
    for i in range(len(grid) - 1):
        if values[i] * values[i + 1] < 0 and not (grid[i] < k < grid[i + 1]):
            beta = brentq(lambda b: determinant(b, k, a, d, fill)[0], grid[i], grid[i + 1], xtol=1e-12, rtol=1e-14)
            f, g = radial(k * k - beta * beta, a)
            if abs(f) < 1e-6: continue
            found.append({"beta": beta, "Ka2": (k * k - beta * beta) * a * a, "hybridFactor": determinant(beta, k, a, d, fill)[1]})
    return sorted(found, key=lambda m: -m["beta"])

cases = [dict(frequency=f, innerRadius=a, depth=d, slotFill=s)
         for f, a, d, s in ((8e9, 0.03, 0.00796, 0.8), (10e9, 0.03, 0.00796, 0.8), (12e9, 0.03, 0.00796, 0.75), (10e9, 0.038, 0.0079, 0.75),
                            (10e9, 0.0127, 0.0128, 0.75), (15e9, 0.03, 0.0085, 0.5), (7e9, 0.02, 0.006, 1.0))]
json.dump({"tool": "SciPy", "version": scipy.__version__, "precision": "double",
           "command": "python3 hybrid-scipy.py > hybrid-scipy.json", "date": str(datetime.date.today()),
           "units": "Hz, m, rad/m; every m = 1 mode with beta between 0 and 12 k, highest beta first",
           "cases": [{**case, "modes": modes(case["frequency"], case["innerRadius"], case["depth"], case["slotFill"])} for case in cases]},
          sys.stdout, indent=1)
