import { describe, expect, test } from "vitest";
import {
  type Candidate,
  corrugatedHorn,
  dualModeHorn,
  type RealizableHorn,
  smoothHorn,
} from "../../../../cells/horn/index.ts";
import { type BuildableHorn, buildSheet } from "../../../../cells/horn/workshop/build-sheet.ts";
import { assertClose } from "../../../assert-close.ts";
import { corrugatedProfile } from "../../figures/examples.ts";
import { askedBy, kuBand } from "../asked.ts";

const at = { highestFrequency: 11.7e9 };
const realizable = (horn: Candidate): RealizableHorn => {
  if (!horn.feasible) throw new Error(horn.reason);
  return horn;
};
const own = (z: number[], radius: number[], wall = 0.002): BuildableHorn => ({
  kind: "custom",
  profile: { z, radius },
  outerDiameter: 2 * (Math.max(...radius) + wall),
});
const lines = (horn: BuildableHorn, givens = at) =>
  buildSheet(horn, givens).dimensions.map(({ label, value, unit, tolerance }) => {
    const shown = unit === "m" ? Number((value * 1e3).toFixed(4)) : value;
    return `${label} ${shown}${tolerance ? ` ± ${Number((tolerance.plusMinus * 1e3).toFixed(4))}` : ""}`;
  });

describe("build sheet", () => {
  test("a step and a flare: from the datum inward, each bore once", () => {
    // λ = 25.62 mm at 11.7 GHz: λ/100 = 0.256, λ/200 = 0.128, D/1000 = 0.025
    expect(lines(own([-0.14, -0.12, -0.12, -0.1, 0], [0.0125, 0.0125, 0.0165, 0.0165, 0.034]))).toEqual([
      "mouth, inside 68 ± 0.1",
      "corner, z from the mouth -100 ± 0.2",
      "step, z from the mouth -120 ± 0.2",
      "step, inside, mouth side 33 ± 0.1",
      "throat, z from the mouth -140 ± 0.2",
      "throat, inside 25 ± 0.02",
      "outside, largest 72 ± 0.3",
      "wall 2 ± 0.1",
    ]);
  });

  test("slots: 36 rows from the throat, as the profile was made", () => {
    const sheet = buildSheet({ kind: "corrugated", profile: corrugatedProfile, outerDiameter: 2 * 47.9e-3 }, at);
    expect(sheet.slots).toHaveLength(36);
    sheet.slots.forEach(({ number, z, width, innerRadius, depth }, n) => {
      const exact = { abs: 1e-9, because: "read from the polyline" };
      expect(number).toBe(n + 1);
      assertClose(z, (-144 + 4 * n + 3) / 1e3, exact);
      assertClose(width, 3e-3, exact);
      assertClose(innerRadius, (12 + (26 * (n + 1)) / 36) / 1e3, exact);
      assertClose(depth, (n < 8 ? 13.5 - 0.7 * n : 7.9) / 1e3, exact);
    });
    expect(sheet.stations.map(({ name, z }) => [name, z])).toEqual([
      ["throat", -0.164],
      ["corner", -0.144],
      ["mouth", 0],
    ]);
    const named = Object.fromEntries(sheet.dimensions.map((one) => [one.label, one.value]));
    assertClose(named.tooth!, 1e-3, { abs: 1e-9, because: "pitch 4 less width 3" });
    expect(named.slots).toBe(36);
  });

  test.each([
    ["smooth", smoothHorn],
    ["dual-mode", dualModeHorn],
    ["corrugated", corrugatedHorn],
  ] as const)("%s: mouth, throat, length, outside and wall are the horn's own", (_, make) => {
    const horn = realizable(make(askedBy(0.8, ...kuBand), { wall: 2.5e-3 }));
    const sheet = buildSheet(horn, at);
    const value = (label: string) => sheet.dimensions.find((one) => one.label === label)!.value;
    const rounding = { rel: 1e-9, because: "read from the polyline" };
    assertClose(value("mouth, inside"), 2 * horn.apertureRadius, rounding);
    assertClose(value("throat, inside"), 2 * horn.throatRadius, rounding);
    assertClose(value("throat, z from the mouth"), -horn.length, rounding);
    assertClose(value("outside, largest"), horn.outerDiameter, rounding);
    assertClose(sheet.wall, 2.5e-3, rounding);
    expect(JSON.parse(JSON.stringify(sheet))).toEqual(sheet);
  });

  test("tube: volume, mass and the metals' order, by hand", () => {
    // π(22² − 20²)·100 mm³ = 26.389 cm³; 71.25 g, 224.0 g, 235.9 g
    const sheet = buildSheet(own([-0.1, 0], [0.02, 0.02]), at);
    assertClose(sheet.volume, 26.389e-6, { abs: 1e-9, because: "by hand to five figures" });
    const weights = sheet.masses.map(({ mass }) => mass);
    [71.25e-3, 224.05e-3, 235.92e-3].forEach((mass, i) => {
      assertClose(weights[i]!, mass, { abs: 6e-6, because: "by hand to four or five figures" });
    });
  });

  test("volume of a corrugated horn: as a sum over thin rings", () => {
    const sheet = buildSheet({ kind: "corrugated", profile: corrugatedProfile, outerDiameter: 2 * 47.9e-3 }, at);
    const radius = (wall: readonly (readonly [number, number])[], z: number): number => {
      const i = wall.findIndex(([end], k) => k > 0 && end >= z && wall[k - 1]![0] < end);
      const [z0, r0] = wall[i - 1]!;
      const [z1, r1] = wall[i]!;
      return r0 + ((r1 - r0) * (z - z0)) / (z1 - z0);
    };
    const count = 41_000;
    const step = 0.164 / count;
    let sum = 0;
    for (let i = 0; i < count; i++) {
      const z = -0.164 + (i + 0.5) * step;
      sum += Math.PI * step * (radius(sheet.outer, z) ** 2 - radius(sheet.inner, z) ** 2);
    }
    assertClose(sheet.volume, sum, { rel: 1e-6, because: "rings of 4 µm that end at every corner" });
  });

  test("tolerances follow the wavelength, and say where they come from", () => {
    const sheet = buildSheet(own([-0.02, 0], [0.00125, 0.006]), { highestFrequency: 94e9 });
    // λ = 3.189 mm: λ/200 = 0.0159, λ/100 = 0.0319; D/1000 = 0.0025
    expect(sheet.dimensions.slice(0, 3).map(({ tolerance }) => tolerance!.plusMinus)).toEqual([1.5e-5, 3e-5, 2e-6]);
    expect(sheet.dimensions[0]!.tolerance!.basis).toMatch(/^λ\/200/);
    expect(sheet.machining.find(({ field }) => field === "tolerance")).toMatchObject({
      verdict: "misses",
      value: 2e-6,
    });
  });

  test("a curve of many points: ends, steps and outside only", () => {
    const z = Array.from({ length: 40 }, (_, i) => -0.1 + (0.1 * i) / 39);
    const sheet = buildSheet(
      own(
        z.with(39, 0),
        z.map((one) => 0.01 + (0.1 + one) ** 2),
      ),
      at,
    );
    expect(sheet.stations.length).toBe(40);
    expect(sheet.dimensions.map(({ label }) => label)).toEqual([
      "mouth, inside",
      "throat, z from the mouth",
      "throat, inside",
      "outside, largest",
      "wall",
    ]);
  });

  test("bad input names what is wrong", () => {
    const tube = own([-0.1, 0], [0.02, 0.02]);
    expect(() => buildSheet(tube, { highestFrequency: 0 })).toThrow("highest frequency must be a number above 0 Hz");
    expect(() => buildSheet(tube, { ...at, wall: -1e-3 })).toThrow(
      "buildSheet: wall must be a number above 0 m; got -0.001 m",
    );
    expect(() => buildSheet({ ...tube, outerDiameter: 0.03 }, at)).toThrow(
      "buildSheet: wall must be a number above 0 m",
    );
    expect(() => buildSheet(own([-0.1, -0.01], [0.02, 0.02]), at)).toThrow(
      "must end at the mouth, z = 0 m; got -0.01 m",
    );
    expect(() => buildSheet(tube, { ...at, shop: { wall: [0, 1] } })).toThrow("wall, usual must be a number above 0");
  });
});
