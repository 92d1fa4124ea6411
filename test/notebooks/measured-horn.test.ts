// A built horn's files in, held against the model of its wall: through the command line.

import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { ownFolder, projectRoot, run } from "../build/run-command.ts";

const notebook = join(projectRoot, "notebooks/measured-horn.ts");

async function inDish(sets: readonly string[], cwd: string) {
  const { code, out, err } = await run(["values", notebook, ...sets.flatMap((set) => ["--set", set])], { cwd });
  return { code, err, values: code === 2 ? undefined : JSON.parse(out) };
}

test("measured horn: with phases the whole sum, near the model it was invented from", async () => {
  const { code, values } = await inDish([], await ownFolder());
  expect(code).toBe(0);
  const { inDish: measured, modelInDish } = values.cells;
  // the demonstration's errors are of a tenth of a decibel
  expect(Math.abs(measured.illuminationEfficiency - modelInDish.illuminationEfficiency)).toBeLessThan(0.01);
  expect(Math.abs(measured.phaseEfficiency - modelInDish.phaseEfficiency)).toBeLessThan(0.005);
  expect(Math.abs(measured.phaseCenterM - modelInDish.feedPositionZ)).toBeLessThan(2e-3);
  expect(measured.unknown).toEqual([expect.stringMatching(/Power beyond 105° was not measured.*upper bound/)]);
});

test("measured horn: a file without phases leaves unknown what it can't tell", async () => {
  const folder = await ownFolder();
  const rows = [0, 10, 20, 30, 40, 50, 60].map((t) => `${t},${-(t ** 2) / 150},${-(t ** 2) / 160}`);
  writeFileSync(join(folder, "cuts.csv"), `theta_deg,e_db,h_db\r\n${rows.join("\r\n")}\r\n`);
  const { code, values } = await inDish(["cuts=@cuts.csv"], folder);
  expect(code).toBe(0);
  const { inDish: measured } = values.cells;
  expect([
    measured.phaseEfficiency,
    measured.apertureEfficiency,
    measured.phaseCenterM,
    measured.crossPolarPeakDb,
  ]).toEqual([null, null, null, null]);
  expect(measured.unknown).toHaveLength(4);
  // the figure compares no angle that was not measured
  const { alt } = values.cells.pattern.drawing;
  expect(alt).toContain("from 0° to 60°");
  expect(Number(/rms E ([\d.]+)/.exec(alt)![1])).toBeLessThan(20);
  expect(measured.amplitudeEfficiency).toBeGreaterThan(0.4);
});

test("measured horn: a bad file is one sentence with its line, exit 1", async () => {
  const { code, err } = await inDish(["match=# GHz S MA R 50\n8 abc 0\n"], await ownFolder());
  expect(code).toBe(1);
  expect(err).toContain("touchstone failed: match, line 2: a number is expected as first number of S11; got abc");
});
