import { expect, test } from "vitest";
import { compileKernel } from "../../../../build/kernel-compiler.ts";
import { kernelBase64 } from "../../../../cells/math/kernel/binary.ts";
import {
  createKernel,
  type Kernel,
  typeScriptKernel,
  webAssemblyKernel,
} from "../../../../cells/math/kernel/kernel.ts";
import { assertClose, seededRandom } from "../../../assert-close.ts";

/** Both kernels with the same numbers at the same addresses. */
function twins(doubles: number, seed: number): { both: [Kernel, Kernel]; place: (values: Float64Array) => number } {
  const both: [Kernel, Kernel] = [webAssemblyKernel(), typeScriptKernel()];
  const random = seededRandom(seed);
  for (const kernel of both) kernel.alloc(doubles);
  for (const kernel of both) kernel.reset();
  const fill = Float64Array.from({ length: doubles }, () => random() - 0.5);
  for (const kernel of both) kernel.memory().set(fill, 1024 / 8);
  const place = (values: Float64Array): number => {
    const [address] = both.map((kernel) => {
      const at = kernel.alloc(values.length);
      kernel.memory().set(values, at / 8);
      return at;
    });
    return address!;
  };
  return { both, place };
}

function expectAlike([a, b]: [Kernel, Kernel], from: number, doubles: number, because: string, abs = 1e-12): void {
  for (let i = 0; i < doubles; i++) assertClose(a.memory()[from / 8 + i]!, b.memory()[from / 8 + i]!, { abs, because });
}

const randoms = (length: number, seed: number): Float64Array => {
  const random = seededRandom(seed);
  return Float64Array.from({ length }, () => random() - 0.5);
};

test("binary: what the AssemblyScript compiles to", async () => {
  expect(Buffer.from(await compileKernel()).toString("base64")).toBe(kernelBase64);
});

test("createKernel: WebAssembly where it can be had", () => {
  expect(createKernel().kind).toBe("WebAssembly");
});

test("kernel: combine and the grams, WebAssembly against TypeScript", () => {
  for (const [rows, columns, nodes, lower, add] of [
    [5, 7, 2, 0, 0],
    [6, 6, 4, 1, 1],
    [1, 3, 4, 0, 1],
    [11, 11, 4, 1, 0],
  ] as const) {
    const { both, place } = twins(9000, 7);
    const stride = columns + 3;
    const out = place(randoms(2 * rows * stride, 1));
    const matrix = place(randoms(rows * (columns + 2) * nodes, 2));
    const weights = place(randoms(2 * nodes, 3));
    for (const kernel of both) {
      kernel.combine(out, stride, matrix, columns + 2, rows, columns, nodes, weights, lower, add);
    }
    expectAlike(both, out, 2 * rows * stride, `combine ${rows}×${columns}, ${nodes} nodes`);

    const sparse = randoms(9 * (rows + 1), 4).map((value, i) => (i % 3 === 0 ? 0 : value));
    const a = place(sparse);
    const b = place(randoms(9 * (columns + 2), 5).map((value, i) => (i % 4 === 0 ? 0 : value)));
    const wide = place(randoms(4 * rows * stride, 8));
    const w = place(randoms(36, 6));
    for (const kernel of both) {
      kernel.gram(out, stride, a, rows + 1, rows, b, columns + 2, columns, 9, w, 1, lower);
      kernel.gram(wide, stride, a, rows + 1, rows, b, columns + 2, columns, 9, w, 2, lower);
    }
    expectAlike(both, out, 2 * rows * stride, `gram ${rows}×${columns}`);
    expectAlike(both, wide, 4 * rows * stride, `gram ${rows}×${columns}, two pairs`);

    for (const transposed of [0, 1] as const) {
      const many = transposed ? columns : rows;
      const m = place(randoms(many * (rows + columns), 11));
      const factors = place(randoms(2 * many, 12));
      for (const kernel of both) kernel.scaled(out, stride, m, rows + columns, rows, columns, factors, transposed);
      expectAlike(both, out, 2 * rows * stride, `scaled ${rows}×${columns}`, 0);
    }
    const further = place(randoms(2 * rows * (rows + 1), 13));
    for (const kernel of both) kernel.addLower(further, rows + 1, out, stride, Math.min(rows, columns));
    expectAlike(both, further, 2 * rows * (rows + 1), `addLower ${rows}`, 0);

    const square = place(randoms(2 * rows * stride, 9));
    const scratch = place(new Float64Array(18 * rows));
    const before = both[0].memory().slice(square / 8, square / 8 + 2 * rows * stride);
    for (const kernel of both) kernel.denseGram(square, stride, a, rows + 1, rows, 9, w, scratch);
    for (let p = 0; p < rows; p++) {
      for (let q = 0; q <= p; q++) {
        for (let lane = 0; lane < 2; lane++) {
          let sum = before[2 * (p * stride + q) + lane]!;
          for (let n = 0; n < 9; n++) {
            sum += sparse[n * (rows + 1) + p]! * sparse[n * (rows + 1) + q]! * both[0].memory()[w / 8 + 2 * n + lane]!;
          }
          for (const kernel of both) {
            const value = kernel.memory()[square / 8 + 2 * (p * stride + q) + lane]!;
            assertClose(value, sum, { abs: 1e-13, because: `${kernel.kind}, denseGram of ${rows}` });
          }
        }
      }
    }
  }
});

/** Symmetric and indefinite, safe without pivoting: alternating signs on a strong diagonal. */
function quasidefinite(P: number, stride: number, seed: number): Float64Array {
  const out = randoms(2 * P * stride, seed);
  for (let p = 0; p < P; p++)
    for (let lane = 0; lane < 2; lane++) out[2 * p * (stride + 1) + lane] = p % 2 === 0 ? P : -P;
  return out;
}

for (const [P, Q] of [
  [1, 1],
  [2, 3],
  [7, 9],
  [11, 12],
  [20, 22],
  [21, 5],
] as const) {
  test(`kernel: eliminate and solveUpper of ${P} unknowns and ${Q} columns, against TypeScript and against the equations`, () => {
    const { both, place } = twins(8000, P);
    const stride = P + 2;
    const given = quasidefinite(P, stride, 10 + P);
    const columns = randoms(2 * P * Q, 20 + P);
    const square = randoms(2 * Q * Q, 30 + P);
    const s = place(given.slice());
    const x = place(columns.slice());
    const t = place(square.slice());
    const scratch = place(new Float64Array(2 * P * Q));
    for (const kernel of both) {
      kernel.eliminate(s, stride, x, t, scratch, P, Q);
      kernel.solveUpper(s, stride, x, P, Q);
    }
    expectAlike(both, x, 2 * P * Q, "same arithmetic but for its order");
    const memory = both[0].memory();
    const at = (p: number, q: number, lane: number): number =>
      given[2 * (Math.max(p, q) * stride + Math.min(p, q)) + lane]!;
    for (let lane = 0; lane < 2; lane++) {
      for (let q = 0; q < Q; q++) {
        for (let p = 0; p < P; p++) {
          let sum = 0;
          for (let k = 0; k < P; k++) sum += at(p, k, lane) * memory[x / 8 + 2 * (k * Q + q) + lane]!;
          assertClose(sum, columns[2 * (p * Q + q) + lane]!, { abs: 1e-12, because: "S·x is what was given" });
        }
        for (let p = q; p < Q; p++) {
          let sum = square[2 * (p * Q + q) + lane]!;
          for (let k = 0; k < P; k++) sum -= columns[2 * (k * Q + p) + lane]! * memory[x / 8 + 2 * (k * Q + q) + lane]!;
          assertClose(memory[t / 8 + 2 * (p * Q + q) + lane]!, sum, { abs: 1e-12, because: "t − xᵀ·S⁻¹·x" });
          assertClose(both[1].memory()[t / 8 + 2 * (p * Q + q) + lane]!, sum, { abs: 1e-12, because: "the twin too" });
        }
      }
    }
  });
}

test("kernel: memory grows and keeps what it holds", () => {
  for (const kernel of [webAssemblyKernel(), typeScriptKernel()]) {
    const first = kernel.alloc(10);
    kernel.memory()[first / 8] = 3.5;
    const far = kernel.alloc(2_000_000);
    kernel.memory()[far / 8 + 1_999_999] = 1;
    expect(kernel.memory()[first / 8]).toBe(3.5);
    expect(far % 16).toBe(0);
  }
});
