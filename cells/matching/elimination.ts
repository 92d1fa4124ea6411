// Small real symmetric systems, one for each frequency, solved side by side: the frequency ("lane") is the innermost index,
// so that a matrix element of all lanes is contiguous: A[(row·columns + column)·lanes + lane]. Symmetric ones: lower half.

import type { RealMatrix } from "./couplings.ts";

/** Where a block of a larger matrix of lanes is added to: its first element is the matrix's first; `columns` of the whole. */
export interface Target {
  out: Float64Array;
  columns: number;
}

/** out[p, q] += sign·Σ_{n < rows} a[n, p]·b[n, q]·w[n]: a and b are without frequency, w [rows × lanes]. */
export function addGram(
  { out, columns }: Target,
  a: RealMatrix,
  b: RealMatrix,
  w: Float64Array,
  rows: number,
  lanes: number,
  sign: 1 | -1,
): void {
  for (let n = 0; n < Math.min(rows, a.rows, b.rows); n++) {
    for (let p = 0; p < a.columns; p++) {
      const left = sign * a.values[n * a.columns + p]!;
      if (left === 0) continue;
      for (let q = 0; q < b.columns; q++) {
        const factor = left * b.values[n * b.columns + q]!;
        if (factor !== 0) addLane(out, (p * columns + q) * lanes, w, n * lanes, factor, lanes);
      }
    }
  }
}

/** The lower half of `addGram` with b = a. */
export function addGramLower(
  { out, columns }: Target,
  a: RealMatrix,
  w: Float64Array,
  rows: number,
  lanes: number,
): void {
  for (let n = 0; n < Math.min(rows, a.rows); n++) {
    for (let p = 0; p < a.columns; p++) {
      const left = a.values[n * a.columns + p]!;
      if (left === 0) continue;
      for (let q = 0; q <= p; q++) {
        const factor = left * a.values[n * a.columns + q]!;
        if (factor !== 0) addLane(out, (p * columns + q) * lanes, w, n * lanes, factor, lanes);
      }
    }
  }
}

/** out[p, q] += sign·matrix[p, q]·weight: the matrix is without frequency, weight [lanes]. */
export function addScaled(
  { out, columns }: Target,
  matrix: RealMatrix,
  weight: Float64Array,
  lower: boolean,
  sign: 1 | -1 = 1,
): void {
  const lanes = weight.length;
  for (let p = 0; p < matrix.rows; p++) {
    const end = lower ? p + 1 : matrix.columns;
    for (let q = 0; q < end; q++) {
      const factor = sign * matrix.values[p * matrix.columns + q]!;
      if (factor !== 0) addLane(out, (p * columns + q) * lanes, weight, 0, factor, lanes);
    }
  }
}

function addLane(out: Float64Array, to: number, w: Float64Array, from: number, factor: number, lanes: number): void {
  for (let l = 0; l < lanes; l++) out[to + l]! += factor * w[from + l]!;
}

/**
 * s ← its LDLᵀ (unit L below the diagonal, 1/D on it), x ← L⁻¹x, t ← t − xᵀD⁻¹x (lower half). No pivoting.
 * s is [P × P], x [P × Q], t [Q × Q].
 */
export function eliminate(
  s: Float64Array,
  x: Float64Array,
  t: Float64Array,
  P: number,
  Q: number,
  lanes: number,
): void {
  const scaled = new Float64Array(lanes);
  for (let k = 0; k < P; k++) {
    const d = (k * P + k) * lanes;
    for (let l = 0; l < lanes; l++) s[d + l] = 1 / s[d + l]!;
    for (let i = k + 1; i < P; i++) {
      const e = (i * P + k) * lanes;
      for (let l = 0; l < lanes; l++) scaled[l] = s[e + l]! * s[d + l]!;
      for (let j = k + 1; j <= i; j++) {
        const from = (j * P + k) * lanes;
        const to = (i * P + j) * lanes;
        if (j < i) {
          // column k of row j < i is already scaled to L: multiply back by D through the unscaled element e
          for (let l = 0; l < lanes; l++) s[to + l]! -= s[from + l]! * s[e + l]!;
        } else {
          for (let l = 0; l < lanes; l++) s[to + l]! -= scaled[l]! * s[e + l]!;
        }
      }
      for (let q = 0; q < Q; q++) {
        const from = (k * Q + q) * lanes;
        const to = (i * Q + q) * lanes;
        for (let l = 0; l < lanes; l++) x[to + l]! -= scaled[l]! * x[from + l]!;
      }
      for (let l = 0; l < lanes; l++) s[e + l] = scaled[l]!;
    }
  }
  for (let k = 0; k < P; k++) {
    const d = (k * P + k) * lanes;
    for (let p = 0; p < Q; p++) {
      const xp = (k * Q + p) * lanes;
      for (let l = 0; l < lanes; l++) scaled[l] = x[xp + l]! * s[d + l]!;
      for (let q = 0; q <= p; q++) {
        const xq = (k * Q + q) * lanes;
        const to = (p * Q + q) * lanes;
        for (let l = 0; l < lanes; l++) t[to + l]! -= scaled[l]! * x[xq + l]!;
      }
    }
  }
}

/** x ← L⁻ᵀD⁻¹x with s as `eliminate` leaves it: completes x to S⁻¹x. */
export function solveUpper(s: Float64Array, x: Float64Array, P: number, Q: number, lanes: number): void {
  for (let k = P - 1; k >= 0; k--) {
    const d = (k * P + k) * lanes;
    for (let q = 0; q < Q; q++) {
      const to = (k * Q + q) * lanes;
      for (let l = 0; l < lanes; l++) x[to + l]! *= s[d + l]!;
      for (let i = k + 1; i < P; i++) {
        const e = (i * P + k) * lanes;
        const from = (i * Q + q) * lanes;
        for (let l = 0; l < lanes; l++) x[to + l]! -= s[e + l]! * x[from + l]!;
      }
    }
  }
}
