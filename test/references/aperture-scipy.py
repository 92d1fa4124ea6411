# Writes aperture-scipy.json: far fields of circular apertures by brute force. The aperture's E and H are laid out in x, y
# on a polar grid (Gauss-Legendre in rho, trapezoid in phi), J = z x H and M = -z x E are integrated with exp(j k r'.r^)
# for each direction, and the vector potentials' far fields taken. No Bessel-function identity of the pattern is used.
import datetime, json, sys
import numpy as np, scipy
from scipy.special import jv, jvp, jn_zeros, jnp_zeros
from scipy.optimize import brentq

c = 299792458.0
mu0 = 1.25663706212e-6
eta = mu0 * c

def grid(a, nr=96, nphi=64):
    x, w = np.polynomial.legendre.leggauss(nr)
    rho = a * (1 + x) / 2
    phi = 2 * np.pi * np.arange(nphi) / nphi
    R, P = np.meshgrid(rho, phi, indexing="ij")
    return R, P, (a / 2 * w * rho)[:, None] * np.full(nphi, 2 * np.pi / nphi)[None, :]

def guide_mode(family, n, a, f, amplitude):
    R, P, dS = grid(a)
    chi = (jnp_zeros if family == "TE" else jn_zeros)(1, n)[-1]
    x = chi * R / a
    one, two = jv(1, x) / x, jvp(1, x)
    er, ep = (one * np.cos(P), -two * np.sin(P)) if family == "TE" else (two * np.cos(P), -one * np.sin(P))
    norm = np.sqrt(np.sum((er**2 + ep**2) * dS))
    k = 2 * np.pi * f / c
    kc = chi / a
    gamma = 1j * np.sqrt(k * k - kc * kc) if k > kc else complex(np.sqrt(kc * kc - k * k))
    Z = 1j * 2 * np.pi * f * mu0 / gamma if family == "TE" else gamma / (1j * 2 * np.pi * f / (eta * c))
    er, ep = er / norm, ep / norm
    V, I = np.sqrt(2) * np.sqrt(Z) * amplitude, np.sqrt(2) / np.sqrt(Z) * amplitude
    return V * er, V * ep, -I * ep, I * er   # H = z x e

def hybrid_mode(a, f, factor):
    # E_z = J1(K rho) cos, eta H_z = factor J1 sin; transverse components from Maxwell's equations; K from E_phi(a) = 0
    k = 2 * np.pi * f / c
    cond = lambda x: np.sqrt(max(0, 1 - (x / (k * a))**2)) * jv(1, x) / x + factor * jvp(1, x)
    chi = brentq(cond, 1.8411838, min(3.8317059, k * a), xtol=1e-15)
    R, P, dS = grid(a)
    K, b = chi / a, np.sqrt(1 - (chi / (k * a))**2)
    x = K * R
    one, two = jv(1, x) / x, jvp(1, x)
    g = k / K
    er, ep = g * (b * two + factor * one) * np.cos(P), -g * (b * one + factor * two) * np.sin(P)
    hr, hp = g * (one + b * factor * two) * np.sin(P) / eta, g * (two + b * factor * one) * np.cos(P) / eta
    power = 0.5 * np.sum((er * hp - ep * hr) * dS)
    s = 1 / np.sqrt(power)
    return s * er, s * ep, s * hr, s * hp

def pattern(fields, a, f, slant, thetas_deg):
    er, ep, hr, hp = fields
    R, P, dS = grid(a)
    k = 2 * np.pi * f / c
    if np.isfinite(slant):
        L = np.sqrt(slant**2 - a**2)
        cap = np.exp(-1j * k * (np.sqrt(L**2 + R**2) - L))
        er, ep, hr, hp = er * cap, ep * cap, hr * cap, hp * cap
    ex, ey = er * np.cos(P) - ep * np.sin(P), er * np.sin(P) + ep * np.cos(P)
    hx, hy = hr * np.cos(P) - hp * np.sin(P), hr * np.sin(P) + hp * np.cos(P)
    jx, jy, mx, my = -hy, hx, ey, -ex           # z x H, -z x E
    out = []
    for t in np.radians(thetas_deg):
        row = []
        for phi in (0.0, np.pi / 2):
            kern = np.exp(1j * k * R * np.sin(t) * np.cos(P - phi)) * dS
            N = [np.sum(v * kern) for v in (jx, jy)]
            Lv = [np.sum(v * kern) for v in (mx, my)]
            th = lambda v: np.cos(t) * (v[0] * np.cos(phi) + v[1] * np.sin(phi))
            ph = lambda v: -v[0] * np.sin(phi) + v[1] * np.cos(phi)
            factor = 1j * k / (4 * np.pi)
            etheta = -factor * (ph(Lv) + eta * th(N))
            ephi = factor * (th(Lv) - eta * ph(N))
            row.append(etheta if phi == 0 else -ephi)
        out.append([v for z in row for v in (z.real / np.sqrt(2 * eta), z.imag / np.sqrt(2 * eta))])
    return out

thetas = [0, 7, 20, 33.5, 55, 80, 90, 110, 150, 180]
listed = json.load(open("aperture-mode-patterns.json"))["cases"]
cases = []
for index in (0, 2, 4):
    r = listed[index]
    total = sum(np.array(guide_mode(name[:2], int(name[3:]), r["radius"], r["frequency"], re + 1j * im))
                for name, re, im in r["amplitudes"])
    cases.append({"kind": "modes", "listed": index, "flareSlant": None,
                  "rows": pattern(total, r["radius"], r["frequency"], np.inf, thetas)})
    cases.append({"kind": "modes", "listed": index, "flareSlant": 0.15,
                  "rows": pattern(total, r["radius"], r["frequency"], 0.15, thetas)})
for f, a, factor, slant in ((10e9, 0.045, 1.0, np.inf), (9e9, 0.045, 0.8, 0.2), (12e9, 0.06, 1.3, 0.11)):
    cases.append({"kind": "hybrid", "frequency": f, "radius": a, "hybridFactor": factor,
                  "flareSlant": slant if np.isfinite(slant) else None,
                  "rows": pattern(hybrid_mode(a, f, factor), a, f, slant, thetas)})
json.dump({"tool": "SciPy", "version": scipy.__version__, "precision": "double; 96 x 64 points, doubling changes 1e-13",
           "command": "python3 aperture-scipy.py > aperture-scipy.json", "date": str(datetime.date.today()),
           "columns": "rows: theta -> ePlane re, im, hPlane re, im in sqrt(W/sr)", "thetaDeg": thetas, "cases": cases}, sys.stdout)
