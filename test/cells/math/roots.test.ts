import { describe, expect, test } from "vitest";
import { ConvergenceError } from "../../../cells/check.ts";
import { brentMinimum, brentRoot } from "../../../cells/math/roots.ts";
import { assertClose } from "../../assert-close.ts";

describe("brentRoot", () => {
  test("x = cos x (Dottie number, OEIS A003957)", () => {
    const root = brentRoot((x) => x - Math.cos(x), 0, 1);
    assertClose(root, 0.7390851332151607, { abs: 1e-14, because: "default tolerance" });
  });

  test("a ninefold root, where secants fail", () => {
    assertClose(
      brentRoot((x) => x ** 9, -1, 4, { tolerance: 1e-10 }),
      0,
      { abs: 1e-10, because: "its tolerance" },
    );
  });

  test("root at an end, ends in either order", () => {
    expect(brentRoot((x) => x, 0, 1)).toBe(0);
    expect(brentRoot((x) => x - 1, 0, 1)).toBe(1);
    assertClose(
      brentRoot((x) => x - 0.3, 1, 0),
      0.3,
      { abs: 1e-14, because: "default tolerance" },
    );
  });

  test("no sign change and NaN are refused with the values", () => {
    expect(() => brentRoot((x) => x * x + 1, -1, 1)).toThrow(/must change sign between -1 and 1; got 2 and 2/);
    expect(() => brentRoot(() => Number.NaN, 0, 1)).toThrow(RangeError);
  });

  test("too few steps: the best value travels with the error", () => {
    try {
      brentRoot((x) => x - Math.cos(x), 0, 1, { maxIterations: 2 });
      expect.unreachable();
    } catch (error) {
      expect(error).toBeInstanceOf(ConvergenceError);
      assertClose((error as ConvergenceError).best as number, 0.739, { abs: 0.1, because: "two secant steps" });
    }
  });
});

describe("brentMinimum", () => {
  test("a smooth minimum", () => {
    const { x, value } = brentMinimum((t) => (t - 0.3) ** 2 - 2, -1, 2);
    assertClose(x, 0.3, { abs: 1e-8, because: "square root of the precision" });
    assertClose(value, -2, { abs: 1e-15, because: "flat bottom" });
  });

  test("a kink and a minimum at the edge", () => {
    assertClose(brentMinimum((t) => Math.abs(t - 0.7), 0, 1).x, 0.7, { abs: 1e-8, because: "tolerance" });
    assertClose(brentMinimum((t) => t, 2, 3).x, 2, { abs: 1e-8, because: "tolerance" });
  });

  test("NaN is refused", () => {
    expect(() => brentMinimum(() => Number.NaN, 0, 1)).toThrow(/got NaN/);
  });
});
