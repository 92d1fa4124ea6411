import { describe, expect, test } from "vitest";
import {
  beamwidth,
  copolar45,
  crossPolar45,
  crossPolarPeak,
  crossPolarPeakAt,
  halfPowerDb,
  levelAt,
  levelFloorDb,
} from "../../../cells/pattern/cuts.ts";
import { gaussianFeed } from "../../../cells/pattern/ideal-feeds.ts";
import { patternInterpolant, resample } from "../../../cells/pattern/interpolant.ts";
import { assertClose } from "../../assert-close.ts";
import { dipole, huygens, patternOf } from "./feeds.ts";

describe("levels and widths", () => {
  test("short dipole: half-power width 90° in the E-plane, none in the H-plane", () => {
    assertClose(beamwidth(dipole(), halfPowerDb, "E"), Math.PI / 2, { abs: 1e-8, because: "spline at 0.5°" });
    expect(() => beamwidth(dipole(), halfPowerDb, "H")).toThrow(/H-plane pattern must fall by 3\.01/);
  });

  test("Huygens source: −10 dB where ((1 + cos θ)/2)² = 0.1, alike in E, H and 45°", () => {
    const expected = 2 * Math.acos(2 * Math.sqrt(0.1) - 1);
    for (const plane of ["E", "H", "D"] as const) {
      assertClose(beamwidth(huygens(), 10, plane), expected, { abs: 1e-8, because: "spline at 0.5°" });
    }
  });

  test("Gaussian feed: the width at the taper is twice the half-angle; widths go as the root of the level", () => {
    const feed = gaussianFeed({ halfAngle: 0.6, taperDb: 12 });
    assertClose(beamwidth(feed, 12, "E"), 1.2, { abs: 1e-8, because: "spline at 0.5°" });
    assertClose(beamwidth(feed, 3, "H"), 0.6, { abs: 1e-8, because: "spline at 0.5°" });
  });

  test("levelAt: dipole at 60°", () => {
    const level = levelAt(dipole(), Math.PI / 3);
    const because = "spline at 0.5°";
    assertClose(level.ePlaneDb, 20 * Math.log10(0.5), { abs: 1e-7, because });
    assertClose(level.hPlaneDb, 0, { abs: 1e-9, because });
    assertClose(level.meanDb, 10 * Math.log10(0.625), { abs: 1e-7, because });
    assertClose(level.crossPolarDb, 20 * Math.log10(0.25), { abs: 1e-7, because });
  });

  test("a null is a number", () => {
    expect(levelAt(huygens(), Math.PI).ePlaneDb).toBeLessThan(-150);
    expect(levelAt(huygens(), 0.5).crossPolarDb).toBe(levelFloorDb);
    expect(crossPolarPeak(huygens())).toBe(levelFloorDb);
  });
});

describe("45° plane by Ludwig's third definition (Ludwig 1973)", () => {
  test("co is (E + H)/2, cross (E − H)/2; their powers add to the plane's", () => {
    const pattern = dipole({ thetaCount: 37 });
    const co = copolar45(pattern);
    const cross = crossPolar45(pattern);
    pattern.theta.forEach((theta, i) => {
      assertClose(co.re[i]!, (Math.cos(theta) + 1) / 2, { abs: 1e-15, because: "one addition" });
      const power = co.re[i]! ** 2 + cross.re[i]! ** 2;
      assertClose(power, (Math.cos(theta) ** 2 + 1) / 2, { abs: 1e-15, because: "U in the 45° plane" });
    });
  });

  test("crossPolarPeak: found between samples, and at the limit of the range", () => {
    // X = ½ sin²(2θ): peak at 45°, −6.0206 dB.
    const pattern = patternOf(
      (t) => 1 + 0.5 * Math.sin(2 * t) ** 2,
      (t) => 1 - 0.5 * Math.sin(2 * t) ** 2,
      { thetaCount: 352 },
    );
    const peak = crossPolarPeakAt(pattern);
    assertClose(peak.theta, Math.PI / 4, { abs: 1e-5, because: "a flat top" });
    assertClose(peak.levelDb, 20 * Math.log10(0.5), { abs: 1e-6, because: "spline at 0.5°" });
    const early = crossPolarPeakAt(pattern, 0.3);
    assertClose(early.theta, 0.3, { abs: 1e-12, because: "rising up to the limit" });
    assertClose(early.levelDb, 20 * Math.log10(0.5 * Math.sin(0.6) ** 2), { abs: 1e-6, because: "spline at 0.5°" });
  });
});

describe("interpolation", () => {
  test("error falls with the fourth power of the spacing", () => {
    const error = (thetaCount: number): number => {
      const cut = patternInterpolant(huygens({ thetaCount, z: 0.03 }));
      const exact = patternInterpolant(huygens({ thetaCount: 2881, z: 0.03 }));
      let worst = 0;
      for (let t = 0; t <= Math.PI; t += 0.0137) {
        const p = cut.ePlane(t);
        const q = exact.ePlane(t);
        worst = Math.max(worst, Math.hypot(p.re - q.re, p.im - q.im));
      }
      return worst;
    };
    expect(error(91) / error(181)).toBeGreaterThan(10);
    expect(error(361)).toBeLessThan(1e-6);
  });

  test("resample: there and back", () => {
    const pattern = dipole({ z: -0.02 });
    const back = resample(resample(pattern, 721), 361);
    expect(back.theta.length).toBe(361);
    pattern.ePlane.re.forEach((value, i) => {
      assertClose(back.ePlane.re[i]!, value, { abs: 1e-14, because: "the finer grid holds every old angle" });
    });
  });
});

test("refusals name value and unit", () => {
  expect(() => beamwidth(huygens(), -3, "E")).toThrow(/levelDb must be a number above 0 dB; got -3 dB/);
  expect(() => levelAt(huygens(), 4)).toThrow(/theta .* rad; got 4 rad/);
  expect(() => crossPolarPeak(huygens(), 0)).toThrow(/maxTheta/);
  expect(() => beamwidth(huygens(), 3, "Q" as "E")).toThrow(/plane must be "E", "H" or "D"; got Q/);
});
