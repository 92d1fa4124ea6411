// From the transforms of an aperture's field to a far-field pattern, with as few Bessel functions as the physics asks.

import { requireNumber, requirePositive } from "../check.ts";
import { speedOfLight, vacuumImpedance } from "../constants.ts";
import { complexVector } from "../math/complex.ts";
import { thetaGrid } from "../pattern/theta-grid.ts";

/**
 * Transforms of an aperture field at one value u = k·radius·sin θ, as eight reals (V·m): with E_x = ½[S + D cos 2φ],
 * E_y = ½ D sin 2φ,
 *
 *   sum = π ∫ S(ρ) J0(kρ sin θ) ρ dρ,   difference = π ∫ D(ρ) J2(kρ sin θ) ρ dρ
 *
 * and the same of η0·H × ẑ (equal to E in a plane wave along z).
 */
export interface ApertureTransform {
  electricSum: { re: number; im: number };
  electricDifference: { re: number; im: number };
  magneticSum: { re: number; im: number };
  magneticDifference: { re: number; im: number };
}

export interface ApertureSetting {
  /** Hz */
  frequency: number;
  /** m */
  radius: number;
  thetaCount: number;
}

/**
 * How many cosines in 2θ the transforms hold to 1e-13: J0(u) and J2(u) with u = ka sin θ are series in cos 2jθ whose
 * coefficients are products of two Bessel functions of ka/2 and orders about j (A&S 9.1.44 ff., Neumann's product).
 */
export function transformBandlimit(ka: number): number {
  return Math.ceil(ka / 2 + 4.5 * Math.cbrt(ka / 2) + 5);
}

/**
 * Far field of an aperture from its transforms: equivalent currents J = ẑ × H and M = −ẑ × E on the aperture in free
 * space, none outside it.
 *
 *   ePlane = jk/(4π√(2η0)) · [(S_E − D_E) + cos θ·(S_H − D_H)]
 *   hPlane = jk/(4π√(2η0)) · [cos θ·(S_E + D_E) + (S_H + D_H)]
 *
 * θ runs to π: the same integrals hold behind the aperture plane, the obliquity carries them; currents on the rim and on
 * the outer wall are left out, so that levels more than about 20 dB down, and all beyond 90°, are estimates.
 *
 * The transforms are even, band-limited functions of sin θ, hence short cosine series in 2θ. They are evaluated at just
 * enough angles in 0…π/2 to fix that series, which is then summed (Clenshaw) on the wanted grid: no Bessel function is
 * called per angle of the grid.
 *
 * @param transformAt called with u in [0, ka], ascending
 * @returns √(W/sr), [thetaCount] each
 * @accuracy the series itself 1e-13 of boresight (test/cells/radiation/aperture-transform)
 * @source Silver, Microwave Antenna Theory and Design, 1949, section 5.14; Balanis, Antenna Theory, eq. 12-10 to 12-12
 */
export function farField(setting: ApertureSetting, transformAt: (u: number) => ApertureTransform) {
  const k = (2 * Math.PI * requirePositive("farField: frequency", setting.frequency, "Hz")) / speedOfLight;
  const ka = k * requirePositive("farField: radius", setting.radius, "m");
  requireNumber("farField: k·radius", ka, { max: 2000 });
  const theta = thetaGrid(setting.thetaCount);
  const series = cosineSeries(ka, transformAt);
  const count = theta.length;
  const ePlane = complexVector(count);
  const hPlane = complexVector(count);
  const scale = k / (4 * Math.PI * Math.sqrt(2 * vacuumImpedance));
  const at = new Float64Array(8);
  for (let i = 0; 2 * i <= count - 1; i++) {
    sumSeries(series, Math.cos(2 * theta[i]!), at);
    const mirrored = count - 1 - i;
    // The mirrored angle π − θ shares sin θ; cos θ changes sign (once, when it is 90° itself).
    for (const j of mirrored === i ? [i] : [i, mirrored]) {
      const c = j === i ? Math.cos(theta[i]!) : -Math.cos(theta[i]!);
      // at: S_E re, im, D_E re, im, S_H re, im, D_H re, im; times j.
      ePlane.re[j] = -scale * (at[1]! - at[3]! + c * (at[5]! - at[7]!));
      ePlane.im[j] = scale * (at[0]! - at[2]! + c * (at[4]! - at[6]!));
      hPlane.re[j] = -scale * (c * (at[1]! + at[3]!) + at[5]! + at[7]!);
      hPlane.im[j] = scale * (c * (at[0]! + at[2]!) + at[4]! + at[6]!);
    }
  }
  return { theta, ePlane, hPlane };
}

/** Cosine coefficients of the eight reals, [bandlimit + 1] rows of 8, from samples at θ_i = iπ/(2·bandlimit). */
function cosineSeries(ka: number, transformAt: (u: number) => ApertureTransform): Float64Array {
  const limit = transformBandlimit(ka);
  const samples = new Float64Array(8 * (limit + 1));
  for (let i = 0; i <= limit; i++) {
    const t = transformAt(i === limit ? ka : ka * Math.sin((Math.PI * i) / (2 * limit)));
    // The two ends count half in the discrete cosine transform.
    const share = i === 0 || i === limit ? 0.5 : 1;
    const row = 8 * i;
    samples[row] = share * t.electricSum.re;
    samples[row + 1] = share * t.electricSum.im;
    samples[row + 2] = share * t.electricDifference.re;
    samples[row + 3] = share * t.electricDifference.im;
    samples[row + 4] = share * t.magneticSum.re;
    samples[row + 5] = share * t.magneticSum.im;
    samples[row + 6] = share * t.magneticDifference.re;
    samples[row + 7] = share * t.magneticDifference.im;
  }
  const cosines = Float64Array.from({ length: 2 * limit }, (_, i) => Math.cos((Math.PI * i) / limit));
  const coefficients = new Float64Array(8 * (limit + 1));
  for (let j = 0; j <= limit; j++) {
    const weight = (j === 0 || j === limit ? 1 : 2) / limit;
    for (let i = 0; i <= limit; i++) {
      const c = weight * cosines[(i * j) % (2 * limit)]!;
      for (let p = 0; p < 8; p++) coefficients[8 * j + p]! += c * samples[8 * i + p]!;
    }
  }
  return coefficients;
}

/** Σ c_j cos(2jθ) for the eight rows at once, by Clenshaw's recurrence; result in `sums`. */
function sumSeries(coefficients: Float64Array, cosine: number, sums: Float64Array): void {
  const last = coefficients.length / 8 - 1;
  const twice = 2 * cosine;
  for (let p = 0; p < 8; p++) {
    let after = 0;
    let here = 0;
    for (let j = last; j >= 1; j--) {
      const next = coefficients[8 * j + p]! + twice * here - after;
      after = here;
      here = next;
    }
    sums[p] = coefficients[p]! + cosine * here - after;
  }
}
