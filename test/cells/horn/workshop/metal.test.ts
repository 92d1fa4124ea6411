import { describe, expect, test } from "vitest";
import { largestInnerRadius, outerWall, wallFeatures } from "../../../../cells/horn/workshop/metal.ts";
import { assertClose } from "../../../assert-close.ts";
import { corrugatedProfile } from "../../figures/examples.ts";

describe("features of a wall", () => {
  test("a step up alone is a diameter step", () => {
    const features = wallFeatures({ z: [-0.14, -0.12, -0.12, 0], radius: [0.0125, 0.0125, 0.0165, 0.034] });
    expect(features.steps).toEqual([{ z: -0.12, from: 0.0125, to: 0.0165 }]);
    expect(features.slots).toEqual([]);
  });

  test("up and down again is a slot: all 36, with their depths", () => {
    const { steps, slots } = wallFeatures(corrugatedProfile);
    expect(steps).toEqual([]);
    expect(slots).toHaveLength(36);
    const depth = (i: number) => slots[i]!.outerRadius - slots[i]!.innerRadius;
    assertClose(depth(0), 13.5e-3, { abs: 1e-12, because: "the law of depths at the throat" });
    assertClose(depth(35), 7.9e-3, { abs: 1e-12, because: "the law of depths at the mouth" });
  });

  test("a step that rounding spread over a last digit is still one", () => {
    const z = -0.12;
    const { steps } = wallFeatures({ z: [-0.14, z, z + 1e-17, 0], radius: [0.0125, 0.0125, 0.0165, 0.0165] });
    expect(steps).toHaveLength(1);
    expect(wallFeatures({ z: [-0.1, -0.05, -0.05 - 2e-17, 0], radius: [0.01, 0.01, 0.012, 0.02] }).steps).toHaveLength(
      1,
    );
  });

  test("a smooth cone has none", () => {
    expect(wallFeatures({ z: [-0.1, 0], radius: [0.01, 0.03] })).toEqual({ steps: [], slots: [] });
  });

  test.each([
    [{ z: [0], radius: [0.01] }, "must have as many z as radii, at least two; got 1 and 1"],
    [{ z: [-0.1, 0], radius: [0.01] }, "got 2 and 1"],
    [{ z: [-0.1, -0.2], radius: [0.01, 0.02] }, "z must not fall; got -0.2 m after -0.1 m"],
    [{ z: [-0.1, 0], radius: [0.01, 0] }, "point 2 must have a finite z and a positive radius in m; got z 0, radius 0"],
    [{ z: [-0.1, Number.NaN], radius: [0.01, 0.02] }, "point 2 must have a finite z"],
  ])("no profile: %o", (profile, message) => {
    expect(() => wallFeatures(profile)).toThrow(message);
  });
});

describe("outer wall", () => {
  test("a cone's runs parallel in radius", () => {
    expect(outerWall({ z: [-0.1, 0], radius: [0.01, 0.03] }, 0.002)).toEqual([
      [-0.1, 0.012],
      [0, 0.032],
    ]);
  });

  test("at a step the wall is as thick along the axis as across it", () => {
    const outer = outerWall({ z: [-0.14, -0.12, -0.12, 0], radius: [0.0125, 0.0125, 0.0165, 0.0165] }, 0.002);
    expect(outer.map(([z, r]) => [Math.round(z * 1e6) / 1e3, Math.round(r * 1e6) / 1e3])).toEqual([
      [-140, 14.5],
      [-122, 14.5],
      [-122, 18.5],
      [0, 18.5],
    ]);
  });

  test("slots are covered to their bottoms, the mouth included", () => {
    const outer = outerWall(corrugatedProfile, 0.002);
    const radiusAt = (z: number): number => {
      const i = outer.findIndex(([at], k) => k > 0 && at >= z);
      const [z0, r0] = outer[i - 1]!;
      const [z1, r1] = outer[i]!;
      return z1 > z0 ? r0 + ((z - z0) / (z1 - z0)) * (r1 - r0) : r1;
    };
    // between middles the wall runs straight: it may be thinner at a slot's corner by half the rise over a pitch
    for (const { start, end, outerRadius } of wallFeatures(corrugatedProfile).slots)
      for (const z of [start, (start + end) / 2, end]) expect(radiusAt(z)).toBeGreaterThan(outerRadius + 0.0015);
    expect(outer.at(-1)).toEqual([0, largestInnerRadius(corrugatedProfile) + 0.002]);
    expect(outer.every(([z], i) => i === 0 || z >= outer[i - 1]![0])).toBe(true);
  });

  test("a long ridge between slots is a wall of its own", () => {
    const profile = {
      z: [-0.1, -0.09, -0.09, -0.087, -0.087, 0],
      radius: [0.01, 0.01, 0.02, 0.02, 0.01, 0.01],
    };
    const outer = outerWall(profile, 0.001);
    expect(outer.at(-1)).toEqual([0, 0.011]);
    expect(Math.max(...outer.map(([, r]) => r))).toBe(0.021);
  });

  test("behind a slot the wall follows a flare that is wider than the slot", () => {
    const profile = {
      z: [-0.09, -0.06, -0.06, -0.055, -0.055, -0.03, 0],
      radius: [0.01, 0.01, 0.02, 0.02, 0.01, 0.01, 0.03],
    };
    const outer = outerWall(profile, 0.002);
    expect(outer.slice(-2)).toEqual([
      [-0.03, 0.012],
      [0, 0.032],
    ]);
  });

  test("steps nearer than the wall is thick leave no knot", () => {
    const profile = { z: [-0.05, -0.02, -0.02, -0.019, -0.019, 0], radius: [0.01, 0.01, 0.012, 0.012, 0.015, 0.02] };
    const outer = outerWall(profile, 0.003);
    expect(outer.every(([z], i) => i === 0 || z >= outer[i - 1]![0])).toBe(true);
    expect(outer.every(([, r], i) => i === 0 || r >= outer[i - 1]![1])).toBe(true);
  });
});
