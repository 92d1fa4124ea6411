// Large apertures without obliquity: the scalar integrals behind efficiency, beamwidth and phase-error tables.
//
// Here E and η0·H×ẑ are taken as equal, and only u = k·radius·sin θ counts: the limit of a wide aperture near its axis.
// For a feed of a few wavelengths use aperturePattern; these show what the aperture's taper and phase alone do.

import { requireNumber, requirePositive } from "../check.ts";
import { besselJ0, besselJ2 } from "../math/bessel.ts";
import { besselPrimeZero, besselZero } from "../math/bessel-zeros.ts";
import type { Complex } from "../math/complex.ts";
import { gaussLegendre } from "../math/quadrature.ts";
import { brentRoot } from "../math/roots.ts";
import { radialNodeCount } from "./aperture-field.ts";

/**
 * Real field over a circular aperture, r = ρ/radius: E_x = ½[sum(r) + difference(r)·cos 2φ], E_y = ½·difference(r)·sin 2φ.
 * The named ones have E_x = 1 on the axis.
 */
export interface ApertureTaper {
  sum: (r: number) => number;
  difference: (r: number) => number;
}

export const uniformTaper: ApertureTaper = { sum: () => 2, difference: () => 0 };

const bessel = (chi: number, sign: number): ApertureTaper => ({
  sum: (r) => 2 * besselJ0(chi * r),
  difference: (r) => 2 * sign * besselJ2(chi * r),
});

/** TE11 of a smooth guide. */
export const te11Taper: ApertureTaper = bessel(besselPrimeZero(1, 1), 1);
/** TM11 of a smooth guide. */
export const tm11Taper: ApertureTaper = bessel(besselZero(1, 1), -1);
/** Balanced HE11 far above cutoff: E_x = J0(j01·r), no cross-polar. */
export const he11Taper: ApertureTaper = bessel(besselZero(0, 1), 0);

/** Gaussian e^{−(r/waist)²}, cut off at the rim. @param waistRatio waist radius / aperture radius, > 0 */
export function gaussianTaper(waistRatio: number): ApertureTaper {
  requirePositive("gaussianTaper: waistRatio", waistRatio);
  return { sum: (r) => 2 * Math.exp(-((r / waistRatio) ** 2)), difference: () => 0 };
}

/** Weighted sum of tapers. */
export function mixedTaper(parts: { taper: ApertureTaper; weight: number }[]): ApertureTaper {
  return {
    sum: (r) => parts.reduce((total, { taper, weight }) => total + weight * taper.sum(r), 0),
    difference: (r) => parts.reduce((total, { taper, weight }) => total + weight * taper.difference(r), 0),
  };
}

/**
 * Ratio of TM11 to TE11 axis fields for which the sum has E_ρ = 0 at the rim: −J1(j′11)/(j′11·J0(j11)) = 0.784657.
 * Potter's mode parameter α is the axis-field ratio divided by this one; power in TM11 over power in TE11, at equal
 * impedances, is α²/(j′11² − 1).
 */
export const edgeNullRatio: number = -te11RimShare() / besselJ0(besselZero(1, 1));

function te11RimShare(): number {
  const chi = besselPrimeZero(1, 1);
  // J1(χ)/χ = (J0 + J2)/2
  return (besselJ0(chi) + besselJ2(chi)) / 2;
}

/**
 * TE11 + TM11 in phase with Potter's parameter α: E-plane factor 1 − α/(1 − (j11/u)²) on that of TE11.
 * @param alpha 0 is TE11 alone, 1 brings E_ρ to zero at the rim
 * @source Potter, A new horn antenna with suppressed sidelobes and equal beamwidths, Microwave J. 6(6), 71–78, 1963
 */
export function dualModeTaper(alpha: number): ApertureTaper {
  requireNumber("dualModeTaper: alpha", alpha);
  return mixedTaper([
    { taper: te11Taper, weight: 1 },
    { taper: tm11Taper, weight: alpha * edgeNullRatio },
  ]);
}

export interface ScalarDirection {
  /** k·radius·sin θ, ≥ 0 */
  u: number;
  /** s: quadratic phase error at the rim, wavelengths; default 0 */
  phaseError?: number;
}

/**
 * Scalar far field of an aperture, against a uniform one on its axis:
 *
 *   ePlane, hPlane = ∫₀¹ [sum(r) J0(ur) ∓ difference(r) J2(ur)] e^{−j2πs r²} r dr
 *
 * @throws {RangeError} u or phaseError negative or not finite
 * @accuracy 1e-12 for the named tapers
 * @source Silver, Microwave Antenna Theory and Design, 1949, section 6.8 and 10.9
 */
export function scalarApertureField(
  taper: ApertureTaper,
  direction: ScalarDirection,
): { ePlane: Complex; hPlane: Complex } {
  const u = requireNumber("scalarApertureField: u", direction.u, { min: 0 });
  const s = requireNumber("scalarApertureField: phaseError", direction.phaseError ?? 0, { min: 0 });
  const ePlane = { re: 0, im: 0 };
  const hPlane = { re: 0, im: 0 };
  overRadius(u + 4 * Math.PI * s, (r, weight) => {
    const sum = weight * taper.sum(r) * besselJ0(u * r);
    const difference = weight * taper.difference(r) * besselJ2(u * r);
    const angle = -2 * Math.PI * s * r * r;
    const c = Math.cos(angle);
    const d = Math.sin(angle);
    ePlane.re += (sum - difference) * c;
    ePlane.im += (sum - difference) * d;
    hPlane.re += (sum + difference) * c;
    hPlane.im += (sum + difference) * d;
  });
  return { ePlane, hPlane };
}

/**
 * Aperture efficiency of taper and quadratic phase, ratio: |∫E_x dS|² / (S·∫|E|² dS); directivity is (k·radius)² times it.
 * @param phaseError s, wavelengths at the rim: diameter²/(8·slant·λ) for a narrow flare
 * @throws {RangeError} phaseError negative or not finite
 */
export function scalarApertureEfficiency(taper: ApertureTaper, phaseError = 0): number {
  const { ePlane } = scalarApertureField(taper, { u: 0, phaseError });
  return (ePlane.re ** 2 + ePlane.im ** 2) / meanSquare(taper);
}

/**
 * Power coupling of an aperture field to a Gaussian beam with its waist in the aperture (the whole beam, which reaches
 * beyond the rim); equal curvature of both phase fronts assumed.
 * @param waistRatio waist radius w (field 1/e) / aperture radius, > 0
 * @returns ratio 0…1
 * @throws {RangeError} waistRatio not positive
 * @source Goldsmith, Quasioptical Systems, 1998, section 7.5–7.6
 */
export function gaussianCoupling(taper: ApertureTaper, waistRatio: number): number {
  requirePositive("gaussianCoupling: waistRatio", waistRatio);
  let overlap = 0;
  overRadius(4 / Math.min(1, waistRatio), (r, weight) => {
    overlap += weight * taper.sum(r) * Math.exp(-((r / waistRatio) ** 2));
  });
  return overlap ** 2 / (meanSquare(taper) * (waistRatio ** 2 / 2));
}

/** Power coupling of two aperture fields (squared normalized inner product), ratio 0…1. */
export function taperCoupling(p: ApertureTaper, q: ApertureTaper): number {
  let overlap = 0;
  overRadius(0, (r, weight) => {
    overlap += (weight * (p.sum(r) * q.sum(r) + p.difference(r) * q.difference(r))) / 2;
  });
  return overlap ** 2 / (meanSquare(p) * meanSquare(q));
}

/**
 * u at which a plane of the scalar pattern has first fallen by `levelDb`. The full width of a wide aperture is
 * 2·asin(u/(k·radius)).
 * @param levelDb dB below boresight, > 0
 * @throws {RangeError} levelDb not positive, or not reached for u ≤ 20
 */
export function scalarWidth(
  taper: ApertureTaper,
  at: { levelDb: number; plane: "E" | "H"; phaseError?: number },
): number {
  requirePositive("scalarWidth: levelDb", at.levelDb, "dB");
  const power = (u: number): number => {
    const field = scalarApertureField(taper, { u, phaseError: at.phaseError });
    const { re, im } = at.plane === "E" ? field.ePlane : field.hPlane;
    return re * re + im * im;
  };
  const target = power(0) * 10 ** (-at.levelDb / 10);
  for (let u = 0.1; u <= 20; u += 0.1) {
    if (power(u) < target) return brentRoot((x) => power(x) - target, u - 0.1, u);
  }
  throw new RangeError(`scalarWidth: the pattern must fall by ${at.levelDb} dB before u = 20; it doesn't`);
}

/** ∫|E|² dS / S = ½ ∫₀¹ (sum² + difference²) r dr */
function meanSquare(taper: ApertureTaper): number {
  let total = 0;
  overRadius(0, (r, weight) => {
    total += (weight * (taper.sum(r) ** 2 + taper.difference(r) ** 2)) / 2;
  });
  return total;
}

/** Σ over Gauss–Legendre points of r in 0…1 with weight r·dr; `turn` is what the integrand turns besides the taper. */
function overRadius(turn: number, visit: (r: number, weight: number) => void): void {
  // 20 rad allow for tapers as lively as TE15.
  const { nodes, weights } = gaussLegendre(radialNodeCount(turn + 20));
  for (let i = 0; i < nodes.length; i++) {
    const r = (1 + nodes[i]!) / 2;
    visit(r, (weights[i]! * r) / 2);
  }
}
