// A profile as CSV in, everything out: the three listed horns through the command line, against an independent program's results.

import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { assertClose, assertComplexClose } from "../assert-close.ts";
import { ownFolder, projectRoot, run } from "../build/run-command.ts";
import { profiles } from "../cells/matching/listed-profiles.ts";

const notebook = join(projectRoot, "notebooks/own-horn.ts");

// test/references/mode-matching.json says where it comes from and by which conventions.
interface Listed {
  f_GHz: number;
  S11: [number, number];
  aperture_modes: { mode: string; re: number; im: number }[];
  D_int_dBi: number;
  D_pow_dBi: number;
  theta_deg: number[];
  E_dB: number[];
  H_dB: number[];
  co45_dB: number[];
  cx45_dB: number[];
}
const listed = JSON.parse(readFileSync(join(projectRoot, "test/references/mode-matching.json"), "utf8")) as Record<
  string,
  Record<string, Listed>
>;
const cases = (["smoothCone", "dualMode", "corrugated"] as const).flatMap((horn) =>
  Object.values(listed[horn]!).map((one) => ({ horn, one, name: `${horn} at ${one.f_GHz} GHz` })),
);

interface Values {
  givens: { points: number };
  cells: {
    frequencyHz: number[];
    s11: { re: number; im: number }[];
    returnLossDb: number[];
    apertureModes: { mode: string; re: number; im: number }[][];
    directivityDbi: number[];
    apertureDirectivityDbi: number[];
    crossPolarPeakDb: number[];
    pattern: Record<"thetaDeg" | "ePlaneDb" | "hPlaneDb" | "copolar45Db" | "crossPolar45Db", number[]>;
    powerBalance: number[];
    convergence: { reflectionError: number; reached: boolean };
  };
}

async function values(horn: keyof typeof profiles, sets: readonly string[]): Promise<Values> {
  const folder = await ownFolder();
  const { z, radius } = profiles[horn];
  const rows = z.map((at, i) => `${(at * 1e3).toFixed(9)},${(radius[i]! * 1e3).toFixed(9)}`);
  writeFileSync(join(folder, "wall.csv"), `z_mm,r_mm\r\n${rows.join("\r\n")}\r\n`);
  const args = ["values", notebook, "--set", "profile=@wall.csv", ...sets.flatMap((set) => ["--set", set])];
  const { code, out, err } = await run(args, { cwd: folder });
  expect([code, err]).toEqual([0, ""]);
  return JSON.parse(out);
}

describe("own horn, against the listed analyses", () => {
  test.each(cases)("$name", async ({ horn, one }) => {
    const { cells } = await values(horn, [
      `bandLow=${one.f_GHz - 0.25} GHz`,
      `bandHigh=${one.f_GHz + 0.25} GHz`,
      "points=3",
    ]);
    const at = cells.frequencyHz.findIndex((f) => Math.abs(f - one.f_GHz * 1e9) < 1);
    expect(at).toBeGreaterThan(0);
    const [re, im] = one.S11;
    assertComplexClose(cells.s11[at]!, { re, im }, { abs: 3e-4, because: "wanted error of S11, 1e-3, kept with room" });
    one.aperture_modes.forEach(({ mode, ...amplitude }) => {
      const found = cells.apertureModes[at]!.find((each) => each.mode === mode);
      if (found)
        assertComplexClose(found, amplitude, { abs: 1e-3, because: `${mode}: −50 dB asked of the mouth's field` });
    });
    expect(cells.apertureModes[at]!.length).toBeGreaterThanOrEqual(4);
    assertClose(cells.directivityDbi[at]!, one.D_int_dBi, { abs: 0.01, because: "one part in 400 of the power" });
    assertClose(cells.apertureDirectivityDbi[at]!, one.D_pow_dBi, {
      abs: 0.01,
      because: "one part in 400 of the power",
    });
    const { thetaDeg, ...levels } = cells.pattern;
    one.theta_deg.forEach((theta, i) => {
      const k = thetaDeg.findIndex((angle) => Math.abs(angle - theta) < 1e-9);
      for (const [name, level] of [
        ["ePlaneDb", one.E_dB[i]!],
        ["hPlaneDb", one.H_dB[i]!],
        ["copolar45Db", one.co45_dB[i]!],
        ["crossPolar45Db", one.cx45_dB[i]!],
      ] as const)
        assertClose(10 ** (levels[name][k]! / 20), 10 ** (level / 20), {
          abs: 5e-4,
          because: `${name} at ${theta}°, of boresight`,
        });
    });
    const peak = Math.max(...one.cx45_dB);
    if (peak > -50)
      assertClose(cells.crossPolarPeakDb[at]!, peak, {
        abs: 0.1,
        because: "their peak is on a grid of 1°, a shallow top",
      });
    for (const balance of cells.powerBalance) expect(Math.abs(balance)).toBeLessThan(1e-9);
    expect(cells.convergence.reached).toBe(true);
  });

  test("as many equally spaced frequencies as asked, both ends included, and the pattern at band centre", async () => {
    const { cells } = await values("smoothCone", ["bandLow=9 GHz", "bandHigh=11 GHz", "points=6"]);
    for (let i = 0; i < 6; i++) {
      const wanted = 9e9 + (2e9 * i) / 5;
      expect(
        cells.frequencyHz.some((f) => Math.abs(f - wanted) < 1e-3),
        `${wanted} Hz`,
      ).toBe(true);
    }
    expect(cells.s11).toHaveLength(cells.frequencyHz.length);
    const middle = await values("smoothCone", ["bandLow=9.9 GHz", "bandHigh=10.1 GHz", "points=3"]);
    expect(cells.pattern.ePlaneDb[60]!).toBeCloseTo(middle.cells.pattern.ePlaneDb[60]!, 3);
  });

  test("a wall that can't be: one sentence with the line, exit 1", async () => {
    const { code, err } = await run(["values", notebook, "--set", "profile=z_mm,r_mm\n0,11\n5,-2"]);
    expect(code).toBe(1);
    expect(err).toContain("wall failed: profile, line 3, column r_mm: a radius above 0 is expected; got -2");
  });
});
