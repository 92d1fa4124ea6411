// Small real symmetric systems, one for each frequency, solved side by side: the frequency ("lane") is the innermost index,
// so that a matrix element of all lanes is contiguous: A[(row·columns + column)·lanes + lane]. Symmetric ones: lower half.

/** out[p, q] += Σ_n a[n, p]·b[n, q]·w[n]: a and b are without frequency, w [n × lanes]. */
export function addGram(
  out: Float64Array,
  a: { rows: number; columns: number; values: Float64Array },
  b: { rows: number; columns: number; values: Float64Array },
  w: Float64Array,
  lanes: number,
  lower = false,
  outColumns = b.columns,
  sign = 1,
): void {
  const P = a.columns;
  const Q = b.columns;
  for (let n = 0; n < a.rows; n++) {
    const wn = n * lanes;
    for (let p = 0; p < P; p++) {
      const ap = sign * a.values[n * P + p]!;
      if (ap === 0) continue;
      const last = lower ? p + 1 : Q;
      for (let q = 0; q < last; q++) {
        const f = ap * b.values[n * Q + q]!;
        if (f === 0) continue;
        const o = (p * outColumns + q) * lanes;
        for (let l = 0; l < lanes; l++) out[o + l]! += f * w[wn + l]!;
      }
    }
  }
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
