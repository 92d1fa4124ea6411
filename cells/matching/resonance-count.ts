// How many resonances a horn has below a frequency, when its ports are closed by a reactance: found from the signs of pivots,
// so that none can hide between two samples however narrow it is.
//
// With V unknown and everything lossless, the number of resonances below a frequency is the number of negative eigenvalues of
// the admittance matrix (which falls with frequency, Foster) plus those of every guide with both ends shorted (Wittrick &
// Williams 1971). It can be had for any reactance at the ports. A resonance of width Γ moves by about Γ as the reactance goes
// round; one that all reactances place between the same two samples is narrower than their distance.

import type { Complex } from "../math/complex.ts";
import type { Chain } from "./chain.ts";
import { isTE, type ModeTable } from "./mode-table.ts";
import { pocketResonances } from "./pocket-basis.ts";

/** Reactances at the ports against the matched admittance: their reflections lie 90° apart. Infinity is a short. */
export const portReactances = [0, 1, Number.POSITIVE_INFINITY, -1] as const;

/** Resonances below wave number k of the inner guides with both ends shorted: βL = π, 2π, …, for TM also its cutoff. */
export function shortedResonances({ guides, apertures }: Chain, k: number, { chi }: ModeTable): number {
  let count = apertures.reduce((sum, { pocket }) => sum + (pocket ? pocketResonances(pocket, k) : 0), 0);
  for (let g = 1; g < guides.length - 1; g++) {
    const { radius, length, modeCount } = guides[g]!;
    for (let n = 0; n < modeCount && chi[n]! < k * radius; n++) {
      const cutoff = chi[n]! / radius;
      count += Math.floor((Math.sqrt((k - cutoff) * (k + cutoff)) * length) / Math.PI) + (isTE(n) ? 0 : 1);
    }
  }
  return count;
}

/**
 * Negative eigenvalues of the admittance matrix with each reactance of `portReactances` at the ports.
 * @param negativePivots of the elimination, in which every port holds the admittance `inside`
 * @param impedance      [n × n] of the ports with it
 * @param loads          jη0·Y of the matched ports
 */
export function negativeEigenvalues(
  negativePivots: number,
  impedance: Float64Array,
  loads: Complex[],
  inside: number,
): number[] {
  const n = loads.length;
  return portReactances.map((reactance) => {
    // A + WτWᵀ and A are linked by Haynsworth's inertia formula through −1/τ − Z.
    const matrix = impedance.map((value) => -value);
    let change = 0;
    for (let p = 0; p < n; p++) {
      const { re, im } = loads[p]!;
      // A mode below cutoff is closed by its own matched admittance, which is real.
      const wanted = im > 0 ? reactance * im : re;
      // Where nothing is to be added, next to nothing is.
      const inverse = 1 / (wanted - inside || 1e-12);
      matrix[p * n + p]! -= inverse;
      // A short is the limit from below of −1/τ = 0.
      if (-inverse < 0 || (inverse === 0 && wanted > 0)) change--;
    }
    return negativePivots + change + negativeCount(matrix, n);
  });
}

/** Negative eigenvalues of a symmetric matrix, which is overwritten: signs of the pivots, the largest taken first. */
function negativeCount(matrix: Float64Array, n: number): number {
  const left = Array.from({ length: n }, (_, i) => i);
  let count = 0;
  while (left.length > 0) {
    const at = left.reduce((best, i) => (Math.abs(matrix[i * n + i]!) > Math.abs(matrix[best * n + best]!) ? i : best));
    left.splice(left.indexOf(at), 1);
    const pivot = matrix[at * n + at]!;
    if (pivot < 0) count++;
    if (pivot === 0) continue;
    for (const i of left) {
      const factor = matrix[i * n + at]! / pivot;
      for (const j of left) matrix[i * n + j]! -= factor * matrix[at * n + j]!;
    }
  }
  return count;
}
