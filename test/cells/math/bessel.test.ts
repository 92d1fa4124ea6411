import { describe, expect, test } from "vitest";
import {
  besselIRatio,
  besselJ,
  besselJ0,
  besselJ1,
  besselJ2,
  besselJPrime,
  besselJPrime1,
  besselY0,
  besselY1,
  besselYPrime1,
} from "../../../cells/math/bessel.ts";
import { assertClose } from "../../assert-close.ts";
import { readReference } from "../../references/read.ts";

// Values, tool and command: test/references/bessel-mpmath.json (mpmath, 40 digits).
const reference = JSON.parse(readReference("bessel-mpmath.json")) as {
  functions: Record<string, string>[];
  orders: { n: number; x: string; J: string; JPrime: string }[];
  ratios: { n: number; x: string; ratio: string }[];
};

/** Size of the oscillation around x; an error matters against this, not against a value near a zero. */
const envelope = (x: number): number => Math.min(1, Math.sqrt(2 / (Math.PI * x)));

describe("Bessel functions against 40-digit values", () => {
  test.each(reference.functions)("J0, J1, J2, J1', Y0, Y1, Y1' at x = $x", (row) => {
    const x = Number(row.x);
    // The argument itself is rounded to a double: its half ulp moves an oscillating value by x·ε/2.
    const first = {
      abs: (4 + x) * Number.EPSILON * envelope(x),
      because: "4 ε of the envelope and the rounded argument",
    };
    assertClose(besselJ0(x), Number(row.J0), first);
    assertClose(besselJ1(x), Number(row.J1), first);
    assertClose(besselJ2(x), Number(row.J2), { ...first, abs: 3 * first.abs });
    assertClose(besselJPrime1(x), Number(row.JPrime1), { ...first, abs: 3 * first.abs });
    const second = { ...first, rel: 4 * Number.EPSILON };
    assertClose(besselY0(x), Number(row.Y0), second);
    assertClose(besselY1(x), Number(row.Y1), second);
    assertClose(besselYPrime1(x), Number(row.YPrime1), { ...second, abs: 3 * first.abs });
  });

  test.each(reference.orders)("J_$n and its derivative at x = $x", ({ n, x, J, JPrime }) => {
    const at = Number(x);
    const limit = { abs: (12 + at) * Number.EPSILON * envelope(at), because: "recurrence of up to 60 steps" };
    assertClose(besselJ(n, at), Number(J), limit);
    assertClose(besselJPrime(n, at), Number(JPrime), limit);
  });

  test.each(reference.ratios)("I_$n/I_{n−1} at x = $x", ({ n, x, ratio }) => {
    assertClose(besselIRatio(Number(x), n), Number(ratio), {
      rel: 1e-14,
      because: "a continued fraction of positive terms",
    });
  });

  test("besselJ2: the small arguments keep their relative precision", () => {
    // J2(x) = x²/8 − x⁴/96 + …
    assertClose(besselJ2(1e-5), 1.25e-11 * (1 - 1e-10 / 12), { rel: 1e-15, because: "series in x²" });
  });
});

describe("laws", () => {
  test("Wronskian: J1·Y0 − J0·Y1 = 2/(πx) (A&S 1964, 9.1.16)", () => {
    for (const x of [0.01, 0.7, 3, 7.99, 8.01, 25, 180]) {
      assertClose(besselJ1(x) * besselY0(x) - besselJ0(x) * besselY1(x), 2 / (Math.PI * x), {
        rel: 4e-14,
        because: "two products of values good to a few ε, cancelling by up to √x",
      });
    }
  });

  test("besselJ: the seam between upward and downward recurrence is smooth", () => {
    for (const n of [3, 8, 25]) {
      const below = besselJ(n, n - 1e-9);
      const above = besselJ(n, n + 1e-9);
      assertClose(above - below, 2e-9 * besselJPrime(n, n), { abs: 4e-15, because: "two evaluations at 1e-15" });
    }
  });

  test("parity: J_n(−x) = (−1)ⁿ J_n(x), the ratio of I is odd", () => {
    for (const n of [0, 1, 2, 3, 4, 9]) expect(besselJ(n, -5.5)).toBe((n % 2 ? -1 : 1) * besselJ(n, 5.5));
    expect(besselIRatio(-2)).toBe(-besselIRatio(2));
  });
});

describe("edges follow IEEE arithmetic", () => {
  test("at zero", () => {
    expect([0, 1, 2, 3].map((n) => besselJ(n, 0))).toEqual([1, 0, 0, 0]);
    expect(besselJPrime1(0)).toBe(0.5);
    expect(besselY0(0)).toBe(Number.NEGATIVE_INFINITY);
    expect(besselIRatio(0)).toBe(0);
  });

  test("out of domain is NaN, nothing throws", () => {
    expect(besselY1(-1)).toBeNaN();
    expect(besselJ(1.5, 2)).toBeNaN();
    expect(besselJ(-1, 2)).toBeNaN();
    expect(besselJ2(Number.NaN)).toBeNaN();
    expect(besselIRatio(1, 0)).toBeNaN();
    expect(besselJ(4, Number.POSITIVE_INFINITY)).toBe(0);
  });
});
