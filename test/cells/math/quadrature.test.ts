import { describe, expect, test } from "vitest";
import { gaussLegendre, integrate } from "../../../cells/math/quadrature.ts";
import { assertClose } from "../../assert-close.ts";

describe("gaussLegendre", () => {
  // Abramowitz & Stegun 1964, Table 25.4, n = 5 and n = 8 (15 digits).
  test("tabulated nodes and weights", () => {
    const because = "15 printed digits";
    const five = gaussLegendre(5);
    assertClose(five.nodes[4]!, 0.906179845938664, { abs: 5e-16, because });
    assertClose(five.weights[4]!, 0.236926885056189, { abs: 5e-16, because });
    assertClose(five.weights[2]!, 0.568888888888889, { abs: 5e-16, because });
    expect(five.nodes[2]).toBe(0);
    const eight = gaussLegendre(8);
    assertClose(eight.nodes[7]!, 0.960289856497536, { abs: 6e-16, because });
    assertClose(eight.weights[7]!, 0.101228536290376, { abs: 6e-16, because });
  });

  test.each([1, 2, 3, 16, 33, 64, 200])("%i points: exact for x^(2n−2), symmetric, weights add to 2", (count) => {
    const { nodes, weights } = gaussLegendre(count);
    const total = weights.reduce((sum, w) => sum + w, 0);
    assertClose(total, 2, { rel: 1e-14, because: "a sum of rounded weights" });
    const degree = 2 * count - 2;
    const moment = weights.reduce((sum, w, i) => sum + w * nodes[i]! ** degree, 0);
    assertClose(moment, 2 / (degree + 1), { rel: 4e-14 * count ** 0.5, because: "the rule's own degree" });
    nodes.forEach((x, i) => {
      expect(x).toBe(-nodes[count - 1 - i]! + 0);
    });
  });

  test("count out of range", () => {
    for (const count of [0, -3, 2.5, 2001, Number.NaN])
      expect(() => gaussLegendre(count)).toThrow(/gaussLegendre: count/);
  });
});

test("integrate: ∫₀^π sin x dx = 2", () => {
  assertClose(integrate(Math.sin, 0, Math.PI, 12), 2, {
    abs: 1e-14,
    because: "12 points resolve half a wave to rounding",
  });
});
