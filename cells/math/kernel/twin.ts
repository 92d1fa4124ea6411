// The kernel's functions in plain TypeScript: where WebAssembly can't be had, and for tests to hold the other against.
//
// Matrix elements are pairs of doubles, one for each of two frequencies; addresses are bytes, as in assembly/index.ts.

import type { KernelFunctions } from "./functions.ts";

/** @param memory the arena, asked for anew at every call: it may have grown */
export function twinFunctions(memory: () => Float64Array): KernelFunctions {
  return {
    combine(out, stride, matrix, matrixColumns, rows, columns, nodes, weights, lower, add) {
      const m = memory();
      for (let p = 0; p < rows; p++) {
        const end = lower ? p + 1 : columns;
        for (let q = 0; q < end; q++) {
          const to = out / 8 + 2 * (p * stride + q);
          const from = matrix / 8 + (p * matrixColumns + q) * nodes;
          for (let lane = 0; lane < 2; lane++) {
            let sum = 0;
            for (let n = 0; n < nodes; n++) sum += m[from + n]! * m[weights / 8 + 2 * n + lane]!;
            m[to + lane] = add ? m[to + lane]! + sum : sum;
          }
        }
      }
    },

    gram(out, stride, a, aStride, aColumns, b, bStride, bColumns, rows, w, pairs, lower) {
      const m = memory();
      const width = 2 * pairs;
      for (let n = 0; n < rows; n++) {
        for (let p = 0; p < aColumns; p++) {
          const value = m[a / 8 + n * aStride + p]!;
          if (value === 0) continue;
          const end = lower ? p + 1 : bColumns;
          for (let q = 0; q < end; q++) {
            const factor = value * m[b / 8 + n * bStride + q]!;
            if (factor === 0) continue;
            const to = out / 8 + width * (p * stride + q);
            for (let i = 0; i < width; i++) m[to + i]! += factor * m[w / 8 + width * n + i]!;
          }
        }
      }
    },

    denseGram(out, stride, a, aStride, columns, rows, w) {
      const m = memory();
      for (let n = 0; n < rows; n++) {
        for (let p = 0; p < columns; p++) {
          for (let q = 0; q <= p; q++) {
            const factor = m[a / 8 + n * aStride + p]! * m[a / 8 + n * aStride + q]!;
            const to = out / 8 + 2 * (p * stride + q);
            for (let lane = 0; lane < 2; lane++) m[to + lane]! += factor * m[w / 8 + 2 * n + lane]!;
          }
        }
      }
    },

    scaled(out, stride, m, mStride, rows, columns, w, transposed) {
      const a = memory();
      for (let p = 0; p < rows; p++) {
        for (let q = 0; q < columns; q++) {
          const value = a[m / 8 + (transposed ? q * mStride + p : p * mStride + q)]!;
          const weight = w / 8 + 2 * (transposed ? q : p);
          const to = out / 8 + 2 * (p * stride + q);
          a[to] = value * a[weight]!;
          a[to + 1] = value * a[weight + 1]!;
        }
      }
    },

    addLower(out, stride, from, fromStride, rows) {
      const m = memory();
      for (let p = 0; p < rows; p++) {
        for (let i = 0; i < 2 * (p + 1); i++) m[out / 8 + 2 * p * stride + i]! += m[from / 8 + 2 * p * fromStride + i]!;
      }
    },

    eliminate(s, sStride, x, t, scratch, P, Q) {
      const m = memory();
      for (let lane = 0; lane < 2; lane++) {
        const S = (i: number, j: number): number => s / 8 + 2 * (i * sStride + j) + lane;
        const X = (i: number, q: number): number => x / 8 + 2 * (i * Q + q) + lane;
        const Z = (i: number, q: number): number => scratch / 8 + 2 * (i * Q + q) + lane;
        const T = (p: number, q: number): number => t / 8 + 2 * (p * Q + q) + lane;
        for (let i = 0; i < P; i++) {
          for (let j = 0; j < i; j++) {
            for (let k = 0; k < j; k++) m[S(i, j)]! -= m[S(i, k)]! * m[S(j, k)]!;
          }
          for (let k = 0; k < i; k++) {
            const raw = m[S(i, k)]!;
            m[S(i, k)]! *= m[S(k, k)]!;
            m[S(i, i)]! -= raw * m[S(i, k)]!;
          }
          m[S(i, i)] = 1 / m[S(i, i)]!;
          for (let q = 0; q < Q; q++) {
            for (let k = 0; k < i; k++) m[X(i, q)]! -= m[S(i, k)]! * m[X(k, q)]!;
            m[Z(i, q)] = m[X(i, q)]! * m[S(i, i)]!;
          }
        }
        for (let p = 0; p < Q; p++) {
          for (let q = 0; q <= p; q++) for (let k = 0; k < P; k++) m[T(p, q)]! -= m[Z(k, p)]! * m[X(k, q)]!;
        }
      }
    },

    solveUpper(s, sStride, x, P, Q) {
      const m = memory();
      for (let lane = 0; lane < 2; lane++) {
        const S = (i: number, j: number): number => s / 8 + 2 * (i * sStride + j) + lane;
        const X = (i: number, q: number): number => x / 8 + 2 * (i * Q + q) + lane;
        for (let k = P - 1; k >= 0; k--) {
          for (let q = 0; q < Q; q++) {
            m[X(k, q)]! *= m[S(k, k)]!;
            for (let i = k + 1; i < P; i++) m[X(k, q)]! -= m[S(i, k)]! * m[X(i, q)]!;
          }
        }
      }
    },
  };
}
