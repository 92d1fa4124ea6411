// A mode on a piece of uniform guide: its admittances, in a real form that crosses cutoff smoothly.
//
// Every admittance is written times jη0, so that a lossless line's are real: TE γ/k, TM −k/γ for the matched line below
// cutoff; above it, where γ = jβ, the matched line is j·ŷ with ŷ = β/k or k/β.

/** γ² is kept this far from zero, as a share of k²: an offset of 1e-12 in (f/fc)² at a cutoff. */
export const cutoffFloor = 1e-12;

/** γ² of a mode, 1/m², away from zero. */
export function guardedGammaSquared(cutoffNumber: number, k: number): number {
  const squared = (cutoffNumber - k) * (cutoffNumber + k);
  const floor = cutoffFloor * k * k;
  if (Math.abs(squared) >= floor) return squared;
  return squared < 0 ? -floor : floor;
}

/**
 * jη0·Y of a matched mode: re below cutoff, im (ŷ) above it; never both.
 */
export function matchedAdmittance(te: boolean, gammaSquared: number, k: number): { re: number; im: number } {
  const size = Math.sqrt(Math.abs(gammaSquared)) / k;
  if (gammaSquared < 0) return { re: 0, im: te ? size : 1 / size };
  return { re: te ? size : -1 / size, im: 0 };
}

/** Where line admittances are written: `self` from index `selfAt` on, `transfer` from `transferAt` on. */
export interface LineTarget {
  self: Float64Array;
  transfer: Float64Array;
  selfAt: number;
  transferAt: number;
}

/** jη0 times the two admittances of a line: self = Y·coth γL, transfer = Y/sinh γL. Written at place `at` of the target. */
export function writeLine(
  te: boolean,
  gammaSquared: number,
  k: number,
  length: number,
  target: LineTarget,
  at: number,
): void {
  const size = Math.sqrt(Math.abs(gammaSquared));
  const turn = size * length;
  let cothLike: number; // γ·coth γL
  let cschLike: number; // γ/sinh γL
  if (gammaSquared < 0) {
    const sine = Math.sin(turn);
    cothLike = (size * Math.cos(turn)) / sine;
    cschLike = size / sine;
  } else if (turn > longLine) {
    cothLike = size;
    cschLike = 0;
  } else {
    const e = Math.exp(-turn);
    const square = e * e;
    // 1 − e^{−2x} without cancellation for short lines
    const difference = turn < 0.3 ? -Math.expm1(-2 * turn) : 1 - square;
    cothLike = (size * (1 + square)) / difference;
    cschLike = (2 * size * e) / difference;
  }
  const factor = te ? 1 / k : -k / gammaSquared;
  target.self[target.selfAt + at] = factor * cothLike;
  target.transfer[target.transferAt + at] = factor * cschLike;
}

/** γL beyond which nothing reaches the other end: e^{−37} is below rounding. */
const longLine = 37;
