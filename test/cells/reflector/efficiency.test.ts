import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import type { FeedPattern } from "../../../cells/pattern/feed-pattern.ts";
import { cosineFeed, gaussianFeed } from "../../../cells/pattern/ideal-feeds.ts";
import { movedPhaseOrigin } from "../../../cells/pattern/phase-center.ts";
import { dish } from "../../../cells/reflector/dish.ts";
import { dishEfficiency } from "../../../cells/reflector/efficiency.ts";
import { uniformBlockageEfficiency } from "../../../cells/reflector/losses.ts";
import { fromDeg } from "../../../cells/units.ts";
import { assertClose } from "../../assert-close.ts";

const atAngle = (halfAngleDeg: number) => dish({ diameter: 3, halfAngle: fromDeg(halfAngleDeg) });

/** A feed whose field lights the aperture of `fOverD` as `light(ρ)`, ρ = 0 on the axis, 1 at the rim; real, both planes alike. */
function feedLighting(fOverD: number, light: (rho: number) => number): FeedPattern {
  const theta = Float64Array.from({ length: 721 }, (_, i) => (Math.PI * i) / 720);
  const field = theta.map((t) => {
    if (t >= Math.PI / 2 - 1e-12) return 0;
    return light(4 * fOverD * Math.tan(t / 2)) / Math.cos(t / 2) ** 2;
  });
  const cut = () => ({ re: field.slice(), im: new Float64Array(theta.length) });
  return { frequency: 10e9, theta, ePlane: cut(), hPlane: cut(), phaseOriginZ: 0, warnings: [] };
}

describe("dishEfficiency: cosⁿ feeds", () => {
  // Silver 1949 ch. 12, Balanis eq. 15-57…61, closed form; computed outside this project, six decimals, no measurement.
  const rows = readFileSync(new URL("../../references/cosn-feed-efficiency.csv", import.meta.url), "utf8")
    .trim()
    .split("\n")
    .slice(1)
    .map((line) => line.split(",").map(Number) as [number, number, number, number, number, number]);

  test("the reference has all 60 rows", () => expect(rows).toHaveLength(60));

  test.each(rows)("n = %i, half-angle %f°", (n, halfAngleDeg, _fOverD, efficiency, spillover, illumination) => {
    const found = dishEfficiency(cosineFeed(n), atAngle(halfAngleDeg), { phaseCenter: 0 });
    const close = { abs: 3e-6, because: "six decimals printed; splines and power sum at 0.5° stay below 2e-6" };
    assertClose(found.apertureEfficiency, efficiency, close);
    assertClose(found.spilloverEfficiency, spillover, close);
    assertClose(found.illuminationEfficiency, illumination, close);
    assertClose(found.polarizationEfficiency, 1, { abs: 1e-14, because: "both planes alike" });
    assertClose(found.phaseEfficiency, 1, { abs: 1e-12, because: "one phase" });
  });

  test("the default feed position is the phase centre, here the origin", () => {
    const found = dishEfficiency(cosineFeed(4), atAngle(53));
    assertClose(found.feedPositionZ, 0, { abs: 1e-12, because: "a feed of one phase" });
  });

  test("Gaussian beam: optimum 0.81453 at an edge taper of 10.913 dB", () => {
    // Goldsmith 1998, 2(1 − e^{−a})²/a: spillover 0.9190, taper 0.8864. It is the limit of small angles: 1° half-angle.
    const halfAngle = fromDeg(1);
    const feed = gaussianFeed({ halfAngle, taperDb: 10.913 }, { thetaCount: 7201 });
    const found = dishEfficiency(feed, dish({ diameter: 40, halfAngle }));
    const close = { abs: 2e-4, because: "four decimals printed; a rim at 1° instead of 0 changes 1e-4" };
    assertClose(found.apertureEfficiency, 0.81453, close);
    assertClose(found.spilloverEfficiency, 0.919, close);
    assertClose(found.illuminationEfficiency, 0.8864, close);
  });
});

describe("dishEfficiency: the other factors", () => {
  test("apertureEfficiency is the product of the four, the gain that of all", () => {
    const found = dishEfficiency(cosineFeed(6), atAngle(45), {
      phaseCenter: 3e-3,
      blockageDiameter: 0.3,
      strutShare: 0.02,
      surfaceError: 0.5e-3,
      ohmicLossDb: 0.05,
    });
    const four =
      found.spilloverEfficiency * found.polarizationEfficiency * found.illuminationEfficiency * found.phaseEfficiency;
    const rounding = { rel: 1e-14, because: "a product" };
    assertClose(found.apertureEfficiency, four, rounding);
    const all = four * found.blockageEfficiency * found.surfaceEfficiency * found.radiationEfficiency;
    assertClose(found.totalEfficiency, all, rounding);
    assertClose(found.gainDbi, found.uniformGainDbi + 10 * Math.log10(all), { abs: 1e-12, because: "the same in dB" });
    assertClose(found.directivityDbi - found.gainDbi, 0.05, {
      abs: 1e-12,
      because: "only the ohmic loss stands between",
    });
  });

  test("phase: the feed half a wavelength off the focus along the axis", () => {
    // Closed form for small angles and even light: the phase over the aperture is quadratic, δ = k z (1 − cos θ), and
    // η = sinc²(δ_rim/2). With light even in the aperture and f/D 8 the next order is below 1e-4.
    const fOverD = 8;
    const reflector = dish({ diameter: 3, fOverD });
    const feed = feedLighting(fOverD, () => 1);
    const wavelength = 299_792_458 / 10e9;
    const shift = 60 * wavelength;
    const atRim = 2 * Math.PI * 60 * (1 - Math.cos(reflector.halfAngle));
    const expected = (Math.sin(atRim / 2) / (atRim / 2)) ** 2;
    const found = dishEfficiency(feed, reflector, { phaseCenter: shift });
    assertClose(found.phaseEfficiency, expected, { abs: 1e-3, because: "leading order in the half-angle of 3.6°" });
    expect(expected).toBeLessThan(0.99);
  });

  test("phase: a feed referred to another origin is the same feed", () => {
    const feed = cosineFeed(6);
    const moved = movedPhaseOrigin(feed, 0.02);
    const one = dishEfficiency(feed, atAngle(45), { phaseCenter: 0.004 });
    const other = dishEfficiency(moved, atAngle(45), { phaseCenter: 0.004 });
    assertClose(other.apertureEfficiency, one.apertureEfficiency, {
      rel: 2e-8,
      because: "the same field splined under two phase ramps; 2e-7 is what the sum claims",
    });
  });

  test("a null inside the dish doesn't upset the feed's position", () => {
    // field J1-like: falls through zero at 40° and turns sign, seen from a point 7 mm behind the origin
    const feed = feedLighting(0.5, (rho) => 1 - (rho / 0.75) ** 2);
    const moved = { ...movedPhaseOrigin(feed, 7e-3), phaseOriginZ: 0 };
    const found = dishEfficiency(moved, dish({ diameter: 3, fOverD: 0.5 }));
    assertClose(found.feedPositionZ, -7e-3, { abs: 1e-6, because: "one phase in the main lobe" });
  });

  test.each([0.05, 0.1, 0.15, 0.2])("blockage: evenly lit, d/D %f", (ratio) => {
    const reflector = dish({ diameter: 3, fOverD: 0.5 });
    const feed = feedLighting(0.5, () => 1);
    const found = dishEfficiency(feed, reflector, { phaseCenter: 0, blockageDiameter: 3 * ratio });
    assertClose(found.blockageEfficiency, uniformBlockageEfficiency(ratio), { abs: 1e-7, because: "splines at 0.25°" });
  });

  // Null field under a parabola on a pedestal, −10 dB at the rim; closed form, four decimals.
  test.each([
    [0.05, 0.9924],
    [0.1, 0.9699],
    [0.15, 0.9333],
    [0.2, 0.8837],
  ])("blockage: parabola on a pedestal of −10 dB, d/D %f", (ratio, efficiency) => {
    const pedestal = 10 ** (-10 / 20);
    const reflector = dish({ diameter: 3, fOverD: 0.5 });
    const feed = feedLighting(0.5, (rho) => pedestal + (1 - pedestal) * Math.max(0, 1 - rho * rho));
    const found = dishEfficiency(feed, reflector, { phaseCenter: 0, blockageDiameter: 3 * ratio });
    assertClose(found.blockageEfficiency, efficiency, { abs: 1e-4, because: "four decimals printed" });
  });

  test("polarization: unequal planes lose what the 45° cross-polar carries", () => {
    // E = 1.2 g, H = 0.8 g: C = g, X = 0.2 g everywhere, so the copolar share is 1/1.04, closed form.
    const feed = cosineFeed(4);
    const unequal: FeedPattern = {
      ...feed,
      ePlane: { re: feed.ePlane.re.map((v) => 1.2 * v), im: feed.ePlane.im },
      hPlane: { re: feed.hPlane.re.map((v) => 0.8 * v), im: feed.hPlane.im },
    };
    const found = dishEfficiency(unequal, atAngle(53), { phaseCenter: 0 });
    assertClose(found.polarizationEfficiency, 1 / 1.04, { rel: 1e-13, because: "one ratio at every angle" });
    const even = dishEfficiency(feed, atAngle(53), { phaseCenter: 0 });
    assertClose(found.spilloverEfficiency, even.spilloverEfficiency, {
      rel: 1e-13,
      because: "the same share everywhere",
    });
  });

  test("spillover and what misses the dish are all the power", () => {
    // The two shares come from different rules: Gauss inside the dish, here Simpson's outside it.
    const feed = gaussianFeed({ halfAngle: fromDeg(50), taperDb: 9 }, { thetaCount: 3601 });
    const ring = (i: number): number => feed.ePlane.re[i]! ** 2 * Math.sin(feed.theta[i]!);
    const simpson = (from: number, to: number): number => {
      let sum = 0;
      for (let i = from; i < to; i += 2) sum += ring(i) + 4 * ring(i + 1) + ring(i + 2);
      return sum;
    };
    const found = dishEfficiency(feed, atAngle(50), { phaseCenter: 0 });
    const lost = simpson(1000, 3600) / simpson(0, 3600);
    assertClose(found.spilloverEfficiency + lost, 1, { abs: 1e-10, because: "Simpson's rule at 0.05°, h⁴/180" });
  });

  test("warnings: a small dish and a rough one say so", () => {
    const small = dishEfficiency(cosineFeed(4), dish({ diameter: 0.3, halfAngle: fromDeg(53) }), {
      surfaceError: 10e-3,
    });
    expect(small.warnings.map(({ code }) => code)).toEqual(["outside-validated-range", "outside-validated-range"]);
    expect(small.warnings[0]!.text).toMatch(/10\.0 wavelengths wide/);
    expect(Number.isFinite(small.gainDbi)).toBe(true);
  });

  test("refuses a shade as wide as the dish and a negative loss", () => {
    expect(() => dishEfficiency(cosineFeed(4), atAngle(53), { blockageDiameter: 3 })).toThrow(/blockage diameter/);
    expect(() => dishEfficiency(cosineFeed(4), atAngle(53), { ohmicLossDb: -1 })).toThrow(RangeError);
  });
});
