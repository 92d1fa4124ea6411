import { AssertionError } from "node:assert";

/** How near is near enough, and why: the reason is part of the claim. */
export interface Tolerance {
  rel?: number;
  abs?: number;
  because: string;
}

/** Fails unless |actual − expected| ≤ max(abs, rel·|expected|); the failure prints error, limit and reason. NaN always fails. */
export function assertClose(actual: number, expected: number, { rel = 0, abs = 0, because }: Tolerance): void {
  const error = Math.abs(actual - expected);
  const limit = Math.max(abs, rel * Math.abs(expected));
  if (error <= limit) return;
  throw new AssertionError({
    message: `got ${actual}, expected ${expected}: error ${error.toExponential(2)} is over ${limit.toExponential(2)} (${because})`,
    actual,
    expected,
    operator: "close to",
  });
}

/** Complex: the error is that of the vector. */
export function assertComplexClose(
  actual: { re: number; im: number },
  expected: { re: number; im: number },
  { rel = 0, abs = 0, because }: Tolerance,
): void {
  const error = Math.hypot(actual.re - expected.re, actual.im - expected.im);
  const limit = Math.max(abs, rel * Math.hypot(expected.re, expected.im));
  if (error <= limit) return;
  throw new AssertionError({
    message: `got ${actual.re}${actual.im < 0 ? "−" : "+"}j${Math.abs(actual.im)}, expected ${expected.re}${expected.im < 0 ? "−" : "+"}j${Math.abs(expected.im)}: error ${error.toExponential(2)} is over ${limit.toExponential(2)} (${because})`,
  });
}

/** A small seeded generator (mulberry32), so that a failing case can be run again: uniform in [0, 1). */
export function seededRandom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}
