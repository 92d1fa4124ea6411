import { describe, expect, test } from "vitest";
import { dish, spaceLossDb, uniformGainDbi } from "../../../cells/reflector/dish.ts";
import { ruzeEfficiency, surfaceLossDb, uniformBlockageEfficiency } from "../../../cells/reflector/losses.ts";
import { cosineFeedEfficiency, feedRequirement, optimumEdgeTaper } from "../../../cells/reflector/requirement.ts";
import { fromDeg, toDeg } from "../../../cells/units.ts";
import { assertClose } from "../../assert-close.ts";

describe("dish", () => {
  // tan(ψ/2) = 1/(4 f/D), paraboloid z = r²/4f: NRAO, Essential Radio Astronomy, eq. 3B1; space loss 20 log((1 + cos ψ)/2): closed form.
  const table: [fOverD: number, halfAngleDeg: number, spaceDb: number][] = [
    [0.3, 79.611, -4.581],
    [0.35, 71.075, -3.581],
    [0.375, 67.38, -3.194],
    [0.4, 64.011, -2.864],
    [0.45, 58.109, -2.336],
    [0.5, 53.13, -1.938],
    [0.6, 45.24, -1.39],
    [0.8, 34.708, -0.809],
    [1.0, 28.072, -0.527],
  ];
  test.each(table)("dish and spaceLossDb: f/D %f", (fOverD, halfAngleDeg, spaceDb) => {
    const { halfAngle } = dish({ diameter: 2.4, fOverD });
    assertClose(toDeg(halfAngle), halfAngleDeg, { abs: 1e-3, because: "three decimals printed" });
    assertClose(spaceLossDb(halfAngle), -spaceDb, { abs: 1e-3, because: "three decimals printed" });
  });

  test("dish: by f/D and by half-angle are one dish", () => {
    const byRatio = dish({ diameter: 3.7, fOverD: 0.42 });
    const byAngle = dish({ diameter: 3.7, halfAngle: byRatio.halfAngle });
    for (const key of ["focalLength", "fOverD", "halfAngle", "depth"] as const)
      assertClose(byAngle[key], byRatio[key], { rel: 8 * Number.EPSILON, because: "an arc tangent and back" });
  });

  test("dish: the rim lies on the parabola and at the half-angle", () => {
    const { diameter, focalLength, depth, halfAngle } = dish({ diameter: 2.4, fOverD: 0.8 });
    assertClose(depth, (diameter / 2) ** 2 / (4 * focalLength), { rel: 4 * Number.EPSILON, because: "z = r²/4f" });
    assertClose(Math.tan(halfAngle), diameter / 2 / (focalLength - depth), {
      rel: 1e-14,
      because: "seen from the focus",
    });
  });

  test("dish: a rim at or behind the focus is refused in one sentence", () => {
    expect(() => dish({ diameter: 2.4, fOverD: 0.25 })).toThrow(
      "dish: the half-angle to the rim must be below 90 deg, which asks f/D above 0.25; got 90.0 deg from f/D 0.25",
    );
    expect(() => dish({ diameter: 2.4, fOverD: 0.2 })).toThrow(/got 102\.7 deg from f\/D 0\.2/);
    expect(() => dish({ diameter: 2.4, halfAngle: fromDeg(95) })).toThrow(/must be below 90 deg; got 95\.0 deg/);
    expect(() => dish({ diameter: -1, fOverD: 0.4 })).toThrow(RangeError);
    expect(() => dish({ diameter: 1, fOverD: Number.NaN })).toThrow(RangeError);
    expect(() => dish({ diameter: 1, halfAngle: 0 })).toThrow(RangeError);
  });

  test("spaceLossDb: none at the vertex, refuses the backward direction", () => {
    expect(spaceLossDb(0)).toBe(0);
    expect(() => spaceLossDb(Math.PI)).toThrow(RangeError);
  });

  test("uniformGainDbi: 2.4 m at 14.2 GHz with 49.2 dBi is 65 % efficient", () => {
    // FCC filing SES-LIC-20151231-00980: 14.2 GHz, D 2.4 m, 49.2 dBi; efficiency .6521 with the exact c.
    assertClose(10 ** ((49.2 - uniformGainDbi(2.4, 14.2e9)) / 10), 0.6521, { abs: 1e-4, because: "four decimals" });
  });
});

describe("surface and blockage", () => {
  // Ruze, Proc. IEEE 54, 633, 1966: 685.81 (ε/λ)² dB.
  test.each([
    [100, 0.0686],
    [50, 0.2743],
    [32, 0.6697],
    [30, 0.762],
    [25, 1.0973],
    [20, 1.7145],
    [16, 2.6789],
  ])("surfaceLossDb: λ/%i", (part, lossDb) => {
    const wavelength = 299_792_458 / 10e9;
    assertClose(surfaceLossDb(wavelength / part, 10e9), lossDb, { abs: 1e-4, because: "four decimals printed" });
    assertClose(-10 * Math.log10(ruzeEfficiency(wavelength / part, 10e9)), lossDb, {
      abs: 1e-4,
      because: "four decimals printed",
    });
  });

  test("surfaceLossDb: finite where the efficiency underflows", () => {
    expect(ruzeEfficiency(0.1, 100e9)).toBe(0);
    expect(surfaceLossDb(0.1, 100e9)).toBeGreaterThan(1e5);
    expect(Number.isFinite(surfaceLossDb(0.1, 100e9))).toBe(true);
  });

  // Null field over an evenly lit aperture, closed form (1 − (d/D)²)²; common practice.
  test.each([
    [0.05, 0.995],
    [0.1, 0.9801],
    [0.15, 0.9555],
    [0.2, 0.9216],
  ])("uniformBlockageEfficiency: d/D %f", (ratio, efficiency) => {
    assertClose(uniformBlockageEfficiency(ratio), efficiency, { abs: 5.1e-5, because: "four decimals printed" });
  });

  test("uniformBlockageEfficiency: refuses a shade as wide as the dish", () => {
    expect(() => uniformBlockageEfficiency(1)).toThrow(RangeError);
    expect(() => surfaceLossDb(-1e-3, 1e9)).toThrow(RangeError);
  });
});

describe("what the dish asks", () => {
  // Silver 1949, Balanis eq. 15-57…61, closed form: optimum half-angle of cosⁿ feeds.
  test.each([
    [2, 65.99, 0.829],
    [4, 53.31, 0.8196],
    [6, 45.95, 0.8171],
    [8, 40.99, 0.8161],
  ])("cosineFeedEfficiency: best half-angle for n = %i", (n, bestDeg, efficiency) => {
    const at = (deg: number): number => cosineFeedEfficiency(n, fromDeg(deg));
    assertClose(at(bestDeg), efficiency, { abs: 1e-4, because: "four decimals printed" });
    expect(at(bestDeg)).toBeGreaterThan(at(bestDeg - 0.1));
    expect(at(bestDeg)).toBeGreaterThan(at(bestDeg + 0.1));
  });

  test("cosineFeedEfficiency: n = 2, 60°", () => {
    // closed form to 16 digits
    assertClose(cosineFeedEfficiency(2, fromDeg(60)), 0.8114202424506747, {
      rel: 1e-13,
      because: "48 Gauss nodes on a smooth integrand",
    });
  });

  test.each([10, 20, 40, 55])("optimumEdgeTaper: about −11 dB at half-angle %i°", (deg) => {
    const { edgeTaperDb, efficiency } = optimumEdgeTaper(fromDeg(deg));
    assertClose(edgeTaperDb, 11, { abs: 0.6, because: "common practice, a rounded value" });
    expect(efficiency).toBeGreaterThan(0.81);
    expect(efficiency).toBeLessThan(0.83);
  });

  test("optimumEdgeTaper: no exponent does better", () => {
    for (const deg of [20, 50, 80, 89]) {
      const { efficiency } = optimumEdgeTaper(fromDeg(deg));
      for (const exponent of [0.1, 0.5, 1, 2, 4, 8, 16, 32, 64])
        expect(cosineFeedEfficiency(exponent, fromDeg(deg))).toBeLessThanOrEqual(efficiency);
    }
  });

  test("optimumEdgeTaper: a narrow dish tends to the Gaussian beam's optimum", () => {
    // Goldsmith 1998: 2(1 − e^{−a})²/a has its maximum 0.81453 at an edge taper of 10.913 dB.
    const { edgeTaperDb, efficiency } = optimumEdgeTaper(fromDeg(1));
    assertClose(edgeTaperDb, 10.913, { abs: 1e-3, because: "three decimals printed" });
    assertClose(efficiency, 0.81453, { abs: 1e-5, because: "five decimals printed" });
  });

  test("feedRequirement: taper divided between feed and space", () => {
    const asked = feedRequirement({
      dish: dish({ diameter: 2.4, fOverD: 0.8 }),
      bandLow: 7.9e9,
      bandHigh: 8.4e9,
      edgeTaperDb: 11,
    });
    expect(asked.feedTaperDb + asked.spaceLossDb).toBe(11);
    expect(asked.bandCenter).toBe(8.15e9);
    assertClose(asked.spaceLossDb, 0.809, { abs: 1e-3, because: "three decimals printed" });
    expect(asked.feedDirectivityDbi).toBeGreaterThan(14);
  });

  test("feedRequirement: a taper below the space loss is legal and negative", () => {
    const asked = feedRequirement({
      dish: dish({ diameter: 2.4, fOverD: 0.3 }),
      bandLow: 8e9,
      bandHigh: 8e9,
      edgeTaperDb: 1,
    });
    expect(asked.feedTaperDb).toBeLessThan(0);
    expect(asked.feedDirectivityDbi).toBeNull();
  });

  test("feedRequirement: band edges out of order are refused with their values", () => {
    const of = (bandLow: number, bandHigh: number) => () =>
      feedRequirement({ dish: dish({ diameter: 2.4, fOverD: 0.8 }), bandLow, bandHigh, edgeTaperDb: 11 });
    expect(of(8.4e9, 7.9e9)).toThrow(/lower edge must not be above its upper edge; got 8\.4 GHz and 7\.9 GHz/);
    expect(of(0, 7.9e9)).toThrow(RangeError);
  });
});
