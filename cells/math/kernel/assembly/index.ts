// Compiled to WebAssembly by build/kernel.mjs; the plain TypeScript of the same functions is ../twin.ts.
//
// Small real systems of two frequencies side by side: every matrix element is a pair of doubles, one v128, at
// (row·columns + column)·16 bytes. Symmetric matrices: lower half. Matrices without frequency are plain doubles.
// Addresses are bytes. Nothing is checked.

// @ts-nocheck: AssemblyScript's types are not TypeScript's.

function at(base: usize, index: i32): usize {
  return base + ((<usize>index) << 4);
}

/**
 * out[p, q] = Σ_m matrix[p, q, m]·weight[m], or += where `add`; of the lower half (q ≤ p) where `lower`. The matrix's rows are
 * `matrixColumns` long, of which `columns` are taken.
 */
export function combine(
  out: usize,
  stride: i32,
  matrix: usize,
  matrixColumns: i32,
  rows: i32,
  columns: i32,
  nodes: i32,
  weights: usize,
  lower: i32,
  add: i32,
): void {
  for (let p = 0; p < rows; p++) {
    const end = lower ? p + 1 : columns;
    let from = matrix + ((<usize>(p * matrixColumns * nodes)) << 3);
    let to = at(out, p * stride);
    for (let q = 0; q < end; q++) {
      let sum = f64x2.mul(v128.load64_splat(from), v128.load(weights));
      for (let m = 1; m < nodes; m++) {
        sum = f64x2.add(sum, f64x2.mul(v128.load64_splat(from + ((<usize>m) << 3)), v128.load(at(weights, m))));
      }
      if (add) sum = f64x2.add(sum, v128.load(to));
      v128.store(to, sum);
      from += (<usize>nodes) << 3;
      to += 16;
    }
  }
}

/** Where the places of the nonzero elements of two rows are listed: the first kilobyte, up to 128 each. */
const LIST_A: usize = 0;
const LIST_B: usize = 512;

function nonzeros(row: usize, columns: i32, list: usize): i32 {
  let count = 0;
  for (let q = 0; q < columns; q++) {
    if (load<f64>(row + ((<usize>q) << 3)) === 0) continue;
    store<i32>(list + ((<usize>count) << 2), q);
    count++;
  }
  return count;
}

/**
 * out[p, q] += Σ_n a[n, p]·b[n, q]·w[n]; of the lower half where `lower`. Zeros are passed over. Every element of out and w is
 * `pairs` pairs. Rows of a and b are aStride and bStride long.
 */
export function gram(
  out: usize,
  stride: i32,
  a: usize,
  aStride: i32,
  aColumns: i32,
  b: usize,
  bStride: i32,
  bColumns: i32,
  rows: i32,
  w: usize,
  pairs: i32,
  lower: i32,
): void {
  const step = (<usize>pairs) << 4;
  for (let n = 0; n < rows; n++) {
    const aRow = a + ((<usize>(n * aStride)) << 3);
    const bRow = b + ((<usize>(n * bStride)) << 3);
    const bCount = nonzeros(bRow, bColumns, LIST_B);
    const same = aRow === bRow && aColumns === bColumns;
    const listA = same ? LIST_B : LIST_A;
    const aCount = same ? bCount : nonzeros(aRow, aColumns, LIST_A);
    if (!lower && pairs === 1 && bCount < aCount) {
      // The longer list inside.
      const weight = v128.load(at(w, n));
      for (let j = 0; j < bCount; j++) {
        const q = load<i32>(LIST_B + ((<usize>j) << 2));
        const factor = f64x2.mul(v128.load64_splat(bRow + ((<usize>q) << 3)), weight);
        for (let i = 0; i < aCount; i++) {
          const p = load<i32>(LIST_A + ((<usize>i) << 2));
          const to = at(out, p * stride + q);
          v128.store(to, f64x2.add(v128.load(to), f64x2.mul(factor, v128.load64_splat(aRow + ((<usize>p) << 3)))));
        }
      }
      continue;
    }
    for (let i = 0; i < aCount; i++) {
      const p = load<i32>(listA + ((<usize>i) << 2));
      const value = v128.load64_splat(aRow + ((<usize>p) << 3));
      // Of one and the same row, the lower half is what the list holds up to here.
      const end = lower && same ? i + 1 : bCount;
      for (let pair = 0; pair < pairs; pair++) {
        const factor = f64x2.mul(value, v128.load(at(w, n * pairs + pair)));
        const row = at(out, p * stride * pairs + pair);
        for (let j = 0; j < end; j++) {
          const q = load<i32>(LIST_B + ((<usize>j) << 2));
          if (lower && q > p) break;
          const to = row + <usize>q * step;
          v128.store(to, f64x2.add(v128.load(to), f64x2.mul(factor, v128.load64_splat(bRow + ((<usize>q) << 3)))));
        }
      }
    }
  }
}

/** out[p, q] = m[p, q]·w[p], or m[q, p]·w[q] where `transposed`: `gram` with a unit matrix on one side, set, not added. */
export function scaled(
  out: usize,
  stride: i32,
  m: usize,
  mStride: i32,
  rows: i32,
  columns: i32,
  w: usize,
  transposed: i32,
): void {
  for (let p = 0; p < rows; p++) {
    let to = at(out, p * stride);
    if (transposed) {
      let from = m + ((<usize>p) << 3);
      let weight = w;
      for (let q = 0; q < columns; q++) {
        v128.store(to, f64x2.mul(v128.load(weight), v128.load64_splat(from)));
        to += 16;
        weight += 16;
        from += (<usize>mStride) << 3;
      }
    } else {
      const weight = v128.load(at(w, p));
      let from = m + ((<usize>(p * mStride)) << 3);
      for (let q = 0; q < columns; q++) {
        v128.store(to, f64x2.mul(weight, v128.load64_splat(from)));
        to += 16;
        from += 8;
      }
    }
  }
}

/** out[p, q] += from[p, q], lower half: one that both ends of a guide see alike. */
export function addLower(out: usize, stride: i32, from: usize, fromStride: i32, rows: i32): void {
  for (let p = 0; p < rows; p++) {
    let to = at(out, p * stride);
    let source = at(from, p * fromStride);
    for (let q = 0; q <= p; q++) {
      v128.store(to, f64x2.add(v128.load(to), v128.load(source)));
      to += 16;
      source += 16;
    }
  }
}

/** The lower half of `gram` with b = a, without passing over zeros: blocks of four by two. scratch [rows × columns]. */
export function denseGram(
  out: usize,
  stride: i32,
  a: usize,
  aStride: i32,
  columns: i32,
  rows: i32,
  w: usize,
  scratch: usize,
): void {
  for (let n = 0; n < rows; n++) {
    const weight = v128.load(at(w, n));
    let from = a + ((<usize>(n * aStride)) << 3);
    let to = at(scratch, n * columns);
    for (let p = 0; p < columns; p++) {
      v128.store(to, f64x2.mul(weight, v128.load64_splat(from)));
      from += 8;
      to += 16;
    }
  }
  const zStep = (<usize>columns) << 4;
  const aStep = (<usize>aStride) << 3;
  let p = 0;
  for (; p + 3 < columns; p += 4) {
    for (let q = 0; q < p + 4; q += 2) {
      let z = at(scratch, p);
      let y = a + ((<usize>q) << 3);
      let a0 = f64x2.splat(0);
      let a1 = f64x2.splat(0);
      let b0 = f64x2.splat(0);
      let b1 = f64x2.splat(0);
      let c0 = f64x2.splat(0);
      let c1 = f64x2.splat(0);
      let d0 = f64x2.splat(0);
      let d1 = f64x2.splat(0);
      for (let n = 0; n < rows; n++) {
        const y0 = v128.load64_splat(y);
        const y1 = v128.load64_splat(y, 8);
        const za = v128.load(z);
        const zb = v128.load(z, 16);
        const zc = v128.load(z, 32);
        const zd = v128.load(z, 48);
        a0 = f64x2.add(a0, f64x2.mul(za, y0));
        a1 = f64x2.add(a1, f64x2.mul(za, y1));
        b0 = f64x2.add(b0, f64x2.mul(zb, y0));
        b1 = f64x2.add(b1, f64x2.mul(zb, y1));
        c0 = f64x2.add(c0, f64x2.mul(zc, y0));
        c1 = f64x2.add(c1, f64x2.mul(zc, y1));
        d0 = f64x2.add(d0, f64x2.mul(zd, y0));
        d1 = f64x2.add(d1, f64x2.mul(zd, y1));
        z += zStep;
        y += aStep;
      }
      give(out, p * stride + q, a0, a1);
      give(out, (p + 1) * stride + q, b0, b1);
      give(out, (p + 2) * stride + q, c0, c1);
      give(out, (p + 3) * stride + q, d0, d1);
    }
  }
  for (; p < columns; p++) {
    for (let q = 0; q <= p; q++) {
      let sum = v128.load(at(out, p * stride + q));
      for (let n = 0; n < rows; n++) {
        const y = v128.load64_splat(a + ((<usize>(n * aStride + q)) << 3));
        sum = f64x2.add(sum, f64x2.mul(v128.load(at(scratch, n * columns + p)), y));
      }
      v128.store(at(out, p * stride + q), sum);
    }
  }
}

function give(out: usize, index: i32, first: v128, second: v128): void {
  const to = at(out, index);
  v128.store(to, f64x2.add(v128.load(to), first));
  v128.store(to, f64x2.add(v128.load(to, 16), second), 16);
}

/**
 * s ← its LDLᵀ in place, without pivoting: unit L below the diagonal, 1/D on it. x ← L⁻¹x, t ← t − xᵀD⁻¹x.
 * s [P × P, rows `sStride` apart], x and scratch [P × Q], t [Q × Q]. What t holds above its diagonal is spoilt.
 */
export function eliminate(s: usize, sStride: i32, x: usize, t: usize, scratch: usize, P: i32, Q: i32): void {
  factor(s, sStride, P);
  forward(s, sStride, x, P, Q);
  for (let k = 0; k < P; k++) {
    const inverse = v128.load(at(s, k * sStride + k));
    let from = at(x, k * Q);
    let to = at(scratch, k * Q);
    for (let q = 0; q < Q; q++) {
      v128.store(to, f64x2.mul(v128.load(from), inverse));
      from += 16;
      to += 16;
    }
  }
  update(x, scratch, t, P, Q);
}

/** Rows in turn, four elements of a row at a time: four sums that don't wait for each other. */
function factor(s: usize, stride: i32, P: i32): void {
  for (let i = 0; i < P; i++) {
    const row = at(s, i * stride);
    let j = 0;
    for (; j + 3 < i; j += 4) {
      const r0 = at(s, j * stride);
      const r1 = at(s, (j + 1) * stride);
      const r2 = at(s, (j + 2) * stride);
      const r3 = at(s, (j + 3) * stride);
      const to = at(row, j);
      let e0 = v128.load(to);
      let e1 = v128.load(to, 16);
      let e2 = v128.load(to, 32);
      let e3 = v128.load(to, 48);
      for (let k = 0; k < j; k++) {
        const raw = v128.load(at(row, k));
        e0 = f64x2.sub(e0, f64x2.mul(raw, v128.load(at(r0, k))));
        e1 = f64x2.sub(e1, f64x2.mul(raw, v128.load(at(r1, k))));
        e2 = f64x2.sub(e2, f64x2.mul(raw, v128.load(at(r2, k))));
        e3 = f64x2.sub(e3, f64x2.mul(raw, v128.load(at(r3, k))));
      }
      e1 = f64x2.sub(e1, f64x2.mul(e0, v128.load(at(r1, j))));
      e2 = f64x2.sub(e2, f64x2.mul(e0, v128.load(at(r2, j))));
      e3 = f64x2.sub(e3, f64x2.mul(e0, v128.load(at(r3, j))));
      e2 = f64x2.sub(e2, f64x2.mul(e1, v128.load(at(r2, j + 1))));
      e3 = f64x2.sub(e3, f64x2.mul(e1, v128.load(at(r3, j + 1))));
      e3 = f64x2.sub(e3, f64x2.mul(e2, v128.load(at(r3, j + 2))));
      v128.store(to, e0);
      v128.store(to, e1, 16);
      v128.store(to, e2, 32);
      v128.store(to, e3, 48);
    }
    for (; j < i; j++) {
      const other = at(s, j * stride);
      let sum = v128.load(at(row, j));
      for (let k = 0; k < j; k++) sum = f64x2.sub(sum, f64x2.mul(v128.load(at(row, k)), v128.load(at(other, k))));
      v128.store(at(row, j), sum);
    }
    let pivot = v128.load(at(row, i));
    for (let k = 0; k < i; k++) {
      const raw = v128.load(at(row, k));
      const scaled = f64x2.mul(raw, v128.load(at(s, k * stride + k)));
      v128.store(at(row, k), scaled);
      pivot = f64x2.sub(pivot, f64x2.mul(raw, scaled));
    }
    v128.store(at(row, i), f64x2.div(f64x2.splat(1), pivot));
  }
}

/** Two rows at a time, four columns at a time. */
function forward(s: usize, stride: i32, x: usize, P: i32, Q: i32): void {
  let i = 0;
  for (; i + 1 < P; i += 2) {
    const rowA = at(s, i * stride);
    const rowB = at(s, (i + 1) * stride);
    const link = v128.load(at(rowB, i));
    let q = 0;
    for (; q + 3 < Q; q += 4) {
      const toA = at(x, i * Q + q);
      const toB = at(x, (i + 1) * Q + q);
      let a0 = v128.load(toA);
      let a1 = v128.load(toA, 16);
      let a2 = v128.load(toA, 32);
      let a3 = v128.load(toA, 48);
      let b0 = v128.load(toB);
      let b1 = v128.load(toB, 16);
      let b2 = v128.load(toB, 32);
      let b3 = v128.load(toB, 48);
      let from = at(x, q);
      for (let k = 0; k < i; k++) {
        const fa = v128.load(at(rowA, k));
        const fb = v128.load(at(rowB, k));
        const y0 = v128.load(from);
        const y1 = v128.load(from, 16);
        const y2 = v128.load(from, 32);
        const y3 = v128.load(from, 48);
        a0 = f64x2.sub(a0, f64x2.mul(fa, y0));
        a1 = f64x2.sub(a1, f64x2.mul(fa, y1));
        a2 = f64x2.sub(a2, f64x2.mul(fa, y2));
        a3 = f64x2.sub(a3, f64x2.mul(fa, y3));
        b0 = f64x2.sub(b0, f64x2.mul(fb, y0));
        b1 = f64x2.sub(b1, f64x2.mul(fb, y1));
        b2 = f64x2.sub(b2, f64x2.mul(fb, y2));
        b3 = f64x2.sub(b3, f64x2.mul(fb, y3));
        from += (<usize>Q) << 4;
      }
      v128.store(toA, a0);
      v128.store(toA, a1, 16);
      v128.store(toA, a2, 32);
      v128.store(toA, a3, 48);
      v128.store(toB, f64x2.sub(b0, f64x2.mul(link, a0)));
      v128.store(toB, f64x2.sub(b1, f64x2.mul(link, a1)), 16);
      v128.store(toB, f64x2.sub(b2, f64x2.mul(link, a2)), 32);
      v128.store(toB, f64x2.sub(b3, f64x2.mul(link, a3)), 48);
    }
    for (; q < Q; q++) {
      forwardOne(rowA, x, i, q, Q);
      forwardOne(rowB, x, i + 1, q, Q);
    }
  }
  if (i < P) for (let q = 0; q < Q; q++) forwardOne(at(s, i * stride), x, i, q, Q);
}

function forwardOne(row: usize, x: usize, i: i32, q: i32, Q: i32): void {
  let sum = v128.load(at(x, i * Q + q));
  for (let k = 0; k < i; k++) sum = f64x2.sub(sum, f64x2.mul(v128.load(at(row, k)), v128.load(at(x, k * Q + q))));
  v128.store(at(x, i * Q + q), sum);
}

/** t[p, q] −= Σ_k z[k, p]·x[k, q], blocks of four by two; the block on the diagonal goes above it. */
function update(x: usize, z: usize, t: usize, P: i32, Q: i32): void {
  const step = (<usize>Q) << 4;
  let p = 0;
  for (; p + 3 < Q; p += 4) {
    const end = p + 4;
    for (let q = 0; q < end; q += 2) {
      let zp = at(z, p);
      let xq = at(x, q);
      let a0 = f64x2.splat(0);
      let a1 = f64x2.splat(0);
      let b0 = f64x2.splat(0);
      let b1 = f64x2.splat(0);
      let c0 = f64x2.splat(0);
      let c1 = f64x2.splat(0);
      let d0 = f64x2.splat(0);
      let d1 = f64x2.splat(0);
      for (let k = 0; k < P; k++) {
        const x0 = v128.load(xq);
        const x1 = v128.load(xq, 16);
        const za = v128.load(zp);
        const zb = v128.load(zp, 16);
        const zc = v128.load(zp, 32);
        const zd = v128.load(zp, 48);
        a0 = f64x2.add(a0, f64x2.mul(za, x0));
        a1 = f64x2.add(a1, f64x2.mul(za, x1));
        b0 = f64x2.add(b0, f64x2.mul(zb, x0));
        b1 = f64x2.add(b1, f64x2.mul(zb, x1));
        c0 = f64x2.add(c0, f64x2.mul(zc, x0));
        c1 = f64x2.add(c1, f64x2.mul(zc, x1));
        d0 = f64x2.add(d0, f64x2.mul(zd, x0));
        d1 = f64x2.add(d1, f64x2.mul(zd, x1));
        zp += step;
        xq += step;
      }
      take(t, p * Q + q, a0, a1);
      take(t, (p + 1) * Q + q, b0, b1);
      take(t, (p + 2) * Q + q, c0, c1);
      take(t, (p + 3) * Q + q, d0, d1);
    }
  }
  for (; p < Q; p++) {
    for (let q = 0; q <= p; q++) {
      let sum = v128.load(at(t, p * Q + q));
      for (let k = 0; k < P; k++) {
        sum = f64x2.sub(sum, f64x2.mul(v128.load(at(z, k * Q + p)), v128.load(at(x, k * Q + q))));
      }
      v128.store(at(t, p * Q + q), sum);
    }
  }
}

function take(t: usize, index: i32, first: v128, second: v128): void {
  const to = at(t, index);
  v128.store(to, f64x2.sub(v128.load(to), first));
  v128.store(to, f64x2.sub(v128.load(to, 16), second), 16);
}

/** x ← L⁻ᵀD⁻¹x with s as `eliminate` leaves it: completes x to S⁻¹x. */
export function solveUpper(s: usize, stride: i32, x: usize, P: i32, Q: i32): void {
  for (let k = P - 1; k >= 0; k--) {
    const inverse = v128.load(at(s, k * stride + k));
    for (let q = 0; q < Q; q++) {
      let sum = f64x2.mul(v128.load(at(x, k * Q + q)), inverse);
      for (let i = k + 1; i < P; i++) {
        sum = f64x2.sub(sum, f64x2.mul(v128.load(at(s, i * stride + k)), v128.load(at(x, i * Q + q))));
      }
      v128.store(at(x, k * Q + q), sum);
    }
  }
}
