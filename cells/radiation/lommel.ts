// The two integrals from which every closed-form aperture pattern here is built.

import { besselJ0, besselJ1, besselJ2 } from "../math/bessel.ts";
import { gaussLegendre } from "../math/quadrature.ts";

/** J0, J1, J2 at one argument: computed once per angle or per mode and shared by all pairs. */
export interface BesselTriple {
  x: number;
  j0: number;
  j1: number;
  j2: number;
}

export function besselTriple(x: number): BesselTriple {
  return { x, j0: besselJ0(x), j1: besselJ1(x), j2: besselJ2(x) };
}

/** Below this distance of the arguments the closed form loses more than three digits; quadrature takes over. */
const nearDistance = 1e-3;

/**
 * ∫₀¹ J0(p r) J0(q r) r dr and ∫₀¹ J2(p r) J2(q r) r dr (Lommel):
 *
 *   [p J1(p) J0(q) − q J0(p) J1(q)] / (p² − q²),   [q J2(p) J1(q) − p J1(p) J2(q)] / (p² − q²)
 *
 * @param p,q arguments ≥ 0
 * @accuracy 1e-13 absolute
 * @source   Watson, Theory of Bessel Functions, 1944, section 5.11 (8); Abramowitz & Stegun 1964, 11.3.29
 */
export function lommelIntegrals(p: BesselTriple, q: BesselTriple): { order0: number; order2: number } {
  if (Math.abs(p.x - q.x) < nearDistance) return nearIntegrals(p.x, q.x);
  const scale = 1 / ((p.x - q.x) * (p.x + q.x));
  return {
    order0: (p.x * p.j1 * q.j0 - q.x * p.j0 * q.j1) * scale,
    order2: (q.x * p.j2 * q.j1 - p.x * p.j1 * q.j2) * scale,
  };
}

/** The same by Gauss–Legendre: the product of two Bessel functions turns through (p + q)/π half-waves. */
function nearIntegrals(p: number, q: number): { order0: number; order2: number } {
  const rule = gaussLegendre(Math.ceil((p + q) / 4) + 14);
  let order0 = 0;
  let order2 = 0;
  rule.nodes.forEach((node, i) => {
    const r = (1 + node) / 2;
    const w = (rule.weights[i]! * r) / 2;
    order0 += w * besselJ0(p * r) * besselJ0(q * r);
    order2 += w * besselJ2(p * r) * besselJ2(q * r);
  });
  return { order0, order2 };
}
