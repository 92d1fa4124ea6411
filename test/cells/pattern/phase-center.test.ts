import { describe, expect, test } from "vitest";
import { movedPhaseOrigin, phaseCenter } from "../../../cells/pattern/phase-center.ts";
import { directivity } from "../../../cells/pattern/power.ts";
import { assertClose } from "../../assert-close.ts";
import { huygens, patternOf, waveNumber } from "./feeds.ts";

describe("phaseCenter", () => {
  test.each([0, -0.012, 0.02, -0.1, 0.25])("a point source at z = %d m is found there", (z) => {
    for (const halfAngle of [0.2, 0.8, Math.PI / 2]) {
      const center = phaseCenter(huygens({ z }), halfAngle);
      assertClose(center.z, z, {
        abs: 1e-7 + 1e-5 * Math.abs(z) ** 2,
        because: "spline at 0.5° of a phase that turns k·z",
      });
      assertClose(center.splitZ, 0, { abs: 1e-12, because: "equal planes" });
      expect(center.residualRad).toBeLessThan(1e-3);
    }
  });

  test("sampling converges: a source at 10 cm to 1e-9 m at 0.125°", () => {
    const center = phaseCenter(huygens({ z: -0.1, thetaCount: 1441 }), 0.7);
    assertClose(center.z, -0.1, { abs: 1e-9, because: "spline error 256 times smaller than at 0.5°" });
  });

  test("E and H sources at different places: each cut finds its own, the split is their distance", () => {
    const e = patternOf(
      () => 1,
      () => 1,
      { z: -0.01 },
    );
    const h = patternOf(
      () => 1,
      () => 1,
      { z: -0.004 },
    );
    const center = phaseCenter({ ...e, hPlane: h.hPlane, ePlane: e.ePlane }, 0.6);
    assertClose(center.ePlaneZ, -0.01, { abs: 1e-8, because: "spline at 0.5°" });
    assertClose(center.hPlaneZ, -0.004, { abs: 1e-8, because: "spline at 0.5°" });
    assertClose(center.splitZ, -0.006, { abs: 1e-8, because: "their difference" });
    assertClose(center.z, -0.007, { abs: 1e-4, because: "between, as equal cuts weigh alike" });
  });

  test("a cubic phase: least squares against the normal equations by hand", () => {
    // arg F = ε cos³θ, |F| = 1, weight sin θ: with x = cos θ uniform on (c, 1) the slope is cov(x, x³)/var(x).
    const epsilon = 0.3;
    const halfAngle = 0.9;
    const pattern = patternOf(
      () => 1,
      () => 1,
    );
    const turn = pattern.theta.map((t) => epsilon * Math.cos(t) ** 3);
    const cut = { re: turn.map(Math.cos), im: turn.map(Math.sin) };
    const c = Math.cos(halfAngle);
    const moment = (p: number): number => (1 - c ** (p + 1)) / ((p + 1) * (1 - c));
    const slope = (moment(4) - moment(1) * moment(3)) / (moment(2) - moment(1) ** 2);
    const center = phaseCenter({ ...pattern, ePlane: cut, hPlane: cut }, halfAngle);
    assertClose(center.z, (epsilon * slope) / waveNumber, { rel: 1e-6, because: "spline at 0.5°" });
  });

  test("safe unwrapping: a sign change of the field far down the flank doesn't pull the fit", () => {
    const withNull = (t: number): number => Math.exp(-6 * t * t) - 1e-4;
    const center = phaseCenter(patternOf(withNull, withNull, { z: -0.03 }), 1.5);
    assertClose(center.z, -0.03, { abs: 1e-4, because: "the flank carries 1e-8 of the power" });
  });

  test("a phase too fast for the samples is refused", () => {
    expect(() => phaseCenter(huygens({ z: 8, thetaCount: 91 }), 1)).toThrow(/phase must turn less than 2\.5 rad/);
  });

  test("halfAngle out of range", () => {
    for (const halfAngle of [0, -1, 1.6, Number.NaN]) {
      expect(() => phaseCenter(huygens(), halfAngle)).toThrow(/halfAngle/);
    }
  });
});

describe("movedPhaseOrigin", () => {
  test("moved to its phase center a pattern has flat phase; the place stays the same", () => {
    const pattern = huygens({ z: -0.015 });
    const moved = movedPhaseOrigin(pattern, -0.015);
    expect(moved.phaseOriginZ).toBe(-0.015);
    moved.ePlane.im.forEach((im) => {
      assertClose(im, 0, { abs: 1e-14, because: "rounding" });
    });
    assertClose(phaseCenter(moved, 0.7).z, -0.015, { abs: 1e-12, because: "real field" });
    assertClose(directivity(moved), directivity(pattern), { rel: 1e-14, because: "phase only" });
  });

  test("there and back", () => {
    const pattern = huygens({ z: 0.01 });
    const back = movedPhaseOrigin(movedPhaseOrigin(pattern, 0.04), 0);
    pattern.hPlane.im.forEach((im, i) => {
      assertClose(back.hPlane.im[i]!, im, { abs: 1e-14, because: "two rotations" });
    });
  });
});
