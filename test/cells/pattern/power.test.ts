import { describe, expect, test } from "vitest";
import { apertureDirectivity, boresightIntensity, directivity, radiatedPower } from "../../../cells/pattern/power.ts";
import { thetaGrid, thetaQuadrature } from "../../../cells/pattern/theta-grid.ts";
import { assertClose } from "../../assert-close.ts";
import { dipole, huygens, patternOf } from "./feeds.ts";

describe("thetaQuadrature", () => {
  test.each([3, 4, 9, 90, 361])("%i angles: ∫ cos^j θ sin θ dθ exact up to the grid's own order", (count) => {
    const theta = thetaGrid(count);
    const weights = thetaQuadrature(count);
    for (let j = 0; j <= Math.min(8, count - 1); j++) {
      const sum = weights.reduce((total, w, i) => total + w * Math.cos(theta[i]!) ** j, 0);
      assertClose(sum, j % 2 ? 0 : 2 / (j + 1), {
        abs: 1e-14,
        because: "Clenshaw–Curtis is exact for polynomials in cos θ",
      });
    }
  });

  test("error at a kink falls at least with the square of the spacing", () => {
    // ∫₀^{π/2} cos θ sin θ dθ = ½: intensity of slope 1 at 90°.
    const error = (count: number): number => {
      const theta = thetaGrid(count);
      const weights = thetaQuadrature(count);
      return Math.abs(weights.reduce((sum, w, i) => sum + w * Math.max(0, Math.cos(theta[i]!)), 0) - 0.5);
    };
    expect(error(361)).toBeLessThan(error(181) / 3.9);
    expect(error(361)).toBeLessThan(2e-5);
  });
});

describe("radiatedPower and directivity", () => {
  // Balanis, Antenna Theory: short dipole D = 1.5 (section 4.2), Huygens source D = 3 (section 12.2; from memory). Computed.
  test("short dipole: 8π/3 W, D = 1.5", () => {
    assertClose(radiatedPower(dipole()), (8 * Math.PI) / 3, { rel: 1e-14, because: "a polynomial in cos θ" });
    assertClose(directivity(dipole()), 1.5, { rel: 1e-14, because: "a polynomial in cos θ" });
  });

  test("Huygens source: D = 3, wherever its phase origin", () => {
    for (const z of [0, -0.05])
      assertClose(directivity(huygens({ z })), 3, { rel: 1e-13, because: "a polynomial in cos θ" });
  });

  test("apertureDirectivity needs the aperture's power", () => {
    expect(() => apertureDirectivity(huygens())).toThrow(/must carry aperturePower/);
    assertClose(apertureDirectivity({ ...huygens(), aperturePower: 4 }), Math.PI, {
      rel: 1e-14,
      because: "definition",
    });
    expect(boresightIntensity(huygens())).toBe(1);
  });
});

describe("what is no pattern is refused", () => {
  test("unequal lengths, θ not uniform, θ short of π, nothing on boresight", () => {
    const good = huygens({ thetaCount: 19 });
    expect(() => radiatedPower({ ...good, theta: good.theta.slice(1) })).toThrow(/ePlane\.re must have 18 samples/);
    expect(() => radiatedPower({ ...good, theta: good.theta.map((t) => t * 0.5) })).toThrow(/uniform from 0 to π/);
    expect(() => radiatedPower(patternOf(Math.sin, Math.sin))).toThrow(/zero on boresight/);
    expect(() => radiatedPower(patternOf(() => Number.NaN, Math.cos))).toThrow(
      /zero on boresight; got a copolar field of NaN/,
    );
    expect(() => thetaGrid(2)).toThrow(/thetaCount/);
  });
});
