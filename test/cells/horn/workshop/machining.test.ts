import { describe, expect, test } from "vitest";
import type { HornProfile } from "../../../../cells/horn/horn-profile.ts";
import { buildSheet } from "../../../../cells/horn/workshop/build-sheet.ts";
import type { ShopLimits } from "../../../../cells/horn/workshop/machining.ts";
import { hardestReach } from "../../../../cells/horn/workshop/reach.ts";
import { thinnestWall } from "../../../../cells/horn/workshop/thinnest-wall.ts";
import { assertClose } from "../../../assert-close.ts";
import { corrugatedProfile } from "../../figures/examples.ts";

const rounding = { rel: 1e-9, because: "arithmetic on the polyline" };

function checks(profile: HornProfile, shop?: Partial<ShopLimits>) {
  const widest = Math.max(...profile.radius);
  const { machining } = buildSheet(
    { kind: "custom", profile, outerDiameter: 2 * (widest + 0.002) },
    { highestFrequency: 10e9, ...(shop ? { shop } : {}) },
  );
  return Object.fromEntries(machining.map((one) => [one.field, one]));
}

describe("machining", () => {
  test("corrugated: the worst slot and tooth, by hand", () => {
    const found = checks(corrugatedProfile);
    // slot 1: 13.5 deep, 3 wide, tooth 1 thick
    assertClose(found.slotAspect!.value!, 4.5, rounding);
    expect(found.slotAspect).toMatchObject({ verdict: "barely", words: "slot 1, z −141.00 mm" });
    // its tooth stands between that slot and the next, 12 + 2·26/36 + 12.8 mm: 26.2444 over 12.7222
    assertClose(found.toothSlenderness!.value!, 13.5222, { abs: 5e-5, because: "by hand to four decimals" });
    expect(found.toothSlenderness!.verdict).toBe("barely");
    assertClose(found.tooth!.value!, 1e-3, { abs: 1e-9, because: "pitch 4 less width 3" });
    expect(found.tooth!.verdict).toBe("passes");
    expect(found.slotWidth!.verdict).toBe("passes");
  });

  test("a limit of the shop's own decides, and just meeting it passes", () => {
    expect(checks(corrugatedProfile, { tooth: [1e-3, 1e-3] }).tooth!.verdict).toBe("passes");
    expect(checks(corrugatedProfile, { tooth: [1.2e-3, 1.1e-3] }).tooth!.verdict).toBe("misses");
    expect(checks(corrugatedProfile, { slotAspect: [2, 4] }).slotAspect!.verdict).toBe("misses");
  });

  test("no slots: nothing is said of teeth", () => {
    expect(Object.keys(checks({ z: [-0.1, 0], radius: [0.01, 0.03] }))).toEqual(["wall", "reach", "tolerance"]);
  });
});

describe("reach", () => {
  test("a tube is bored from both ends: half its length on three quarters of its bore", () => {
    const { overhang, z } = hardestReach({ z: [-0.2, 0], radius: [0.01, 0.01] });
    assertClose(overhang!, 0.1 / 0.015, rounding);
    assertClose(z, -0.1, rounding);
  });

  test("a slot: bar and edge pass the bore together, from the nearer end", () => {
    // r 20 mm, cut to 45 mm: bar 3·20 − 45 − 0.5 = 14.5 mm; far wall 42 mm from the mouth, 63 from the throat
    const slotted = (outer: number) =>
      hardestReach({
        z: [-0.1, -0.042, -0.042, -0.037, -0.037, 0],
        radius: [0.02, 0.02, outer, outer, 0.02, 0.02],
      });
    const deep = slotted(0.045);
    expect(deep).toMatchObject({ from: "mouth", slot: 0, z: -0.042 });
    assertClose(deep.overhang!, 42 / 14.5, rounding);
    // cut to 30 mm: 42 on 29.5 mm is easier than boring the middle, 50 mm on 30 mm
    const shallow = slotted(0.03);
    expect(shallow.slot).toBeUndefined();
    assertClose(shallow.overhang!, 50 / 30, { rel: 0.01, because: "places are tried 0.5 mm apart" });
  });

  test("a slot deeper than the bore is wide: no bar passes", () => {
    const reach = hardestReach({
      z: [-0.1, -0.052, -0.052, -0.048, -0.048, 0],
      radius: [0.005, 0.005, 0.016, 0.016, 0.005, 0.005],
    });
    expect(reach).toMatchObject({ overhang: null, barDiameter: 0, slot: 0 });
    const found = checks({
      z: [-0.1, -0.052, -0.052, -0.048, -0.048, 0],
      radius: [0.005, 0.005, 0.016, 0.016, 0.005, 0.005],
    });
    expect(found.reach).toMatchObject({ value: null, verdict: "misses" });
    expect(found.reach!.words).toContain("no straight bar passes");
  });

  test("the bar from the mouth must pass a neck before the place", () => {
    // a neck of 4 mm radius at the mouth, behind it 20 mm: from the throat all but the neck is easy
    const neck = { z: [-0.1, -0.005, -0.005, 0], radius: [0.02, 0.02, 0.004, 0.004] };
    const { overhang } = hardestReach(neck);
    // from the throat: 95 mm on a bar of 30 mm; the neck itself from the mouth
    assertClose(overhang!, 0.095 / 0.03, rounding);
  });
});

describe("thinnest wall", () => {
  test("of a cone: the radial wall times the cosine of its angle", () => {
    const inner = [
      [-0.1, 0.01],
      [0, 0.05],
    ] as const;
    const outer = inner.map(([z, r]) => [z, r + 0.002] as const);
    assertClose(thinnestWall(inner, outer).thickness, 0.002 * Math.cos(Math.atan(0.4)), rounding);
  });

  test("where the bore breaks through, the wall is negative", () => {
    const outer = [
      [-0.1, 0.012],
      [0, 0.012],
    ] as const;
    const inner = [
      [-0.1, 0.01],
      [-0.05, 0.013],
      [0, 0.01],
    ] as const;
    assertClose(thinnestWall(inner, outer).thickness, -0.001, { rel: 1e-9, because: "arithmetic" });
  });
});
