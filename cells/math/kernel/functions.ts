// What the kernel does, in WebAssembly and in its TypeScript twin alike.

/**
 * Addresses are bytes in the arena. A matrix with frequency holds pairs of doubles, one for each of two frequencies, row-major;
 * one without holds doubles. Symmetric ones use their lower half. 0 and 1 stand for no and yes. Nothing is checked.
 */
export interface KernelFunctions {
  /**
   * out[p, q] = Σ_m matrix[p, q, m]·weight[m] (matrix without frequency), or += where `add`; its lower half where `lower`.
   * The matrix's rows are matrixColumns long, of which `columns` are taken
   */
  combine(
    out: number,
    stride: number,
    matrix: number,
    matrixColumns: number,
    rows: number,
    columns: number,
    nodes: number,
    weights: number,
    lower: 0 | 1,
    add: 0 | 1,
  ): void;
  /**
   * out[p, q] += Σ_n a[n, p]·b[n, q]·w[n] (a, b without frequency); its lower half where `lower`. Zeros are passed over.
   * Every element of out and w is `pairs` pairs; rows of a and b are aStride and bStride long. aColumns, bColumns ≤ 128
   */
  gram(
    out: number,
    stride: number,
    a: number,
    aStride: number,
    aColumns: number,
    b: number,
    bStride: number,
    bColumns: number,
    rows: number,
    w: number,
    pairs: number,
    lower: 0 | 1,
  ): void;
  /**
   * The lower half of `gram` with b = a and one pair, for matrices with few zeros. What stands above out's diagonal may be
   * spoilt. scratch [rows × columns]
   */
  denseGram(
    out: number,
    stride: number,
    a: number,
    aStride: number,
    columns: number,
    rows: number,
    w: number,
    scratch: number,
  ): void;
  /** out[p, q] = m[p, q]·w[p], or m[q, p]·w[q] where `transposed` (m without frequency) */
  scaled(
    out: number,
    stride: number,
    m: number,
    mStride: number,
    rows: number,
    columns: number,
    w: number,
    transposed: 0 | 1,
  ): void;
  /** out[p, q] += from[p, q], lower half */
  addLower(out: number, stride: number, from: number, fromStride: number, rows: number): void;
  /**
   * s [P × P] ← its LDLᵀ without pivoting: unit L below the diagonal, 1/D on it. x [P × Q] ← L⁻¹x; t [Q × Q] ← t − xᵀD⁻¹x.
   * What stands above the diagonal of t may be spoilt. scratch [P × Q].
   */
  eliminate(s: number, sStride: number, x: number, t: number, scratch: number, P: number, Q: number): void;
  /** x [P × Q] ← L⁻ᵀD⁻¹x with s as `eliminate` leaves it: completes x to S⁻¹x */
  solveUpper(s: number, sStride: number, x: number, P: number, Q: number): void;
}
