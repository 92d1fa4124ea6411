// `values`, help and errors, by the real command.

import { writeFile } from "node:fs/promises";
import { join } from "node:path";
import { csvParse } from "d3-dsv";
import { expect, test } from "vitest";
import { assertClose } from "../assert-close.ts";
import { isOneSentence, ownFolder, projectRoot, run, smallNotebook, writeNotebook } from "./run-command.ts";

test("help: overall and of each verb, on standard output, exit 0", async () => {
  const overall = await run(["--help"]);
  expect(overall.code).toBe(0);
  expect(overall.err).toBe("");
  for (const verb of ["open", "values", "export", "check"]) {
    expect(overall.out).toContain(`  ${verb}`);
    const { code, out, err } = await run([verb, "--help"]);
    expect([code, err]).toEqual([0, ""]);
    expect(out).toContain(`hornbook ${verb}`);
    expect(out.split("\n").every((line) => line.length <= 130)).toBe(true);
  }
  expect((await run(["help", "values"])).out).toContain("hornbook values");
  expect((await run(["--version"])).out).toMatch(/^\d+\.\d+\.\d+\n$/);
});

test.each<[string[], RegExp]>([
  [["vaules", "x.ts"], /there is no verb "vaules"\. Did you mean "values"\?/],
  [["values"], /values needs a notebook/],
  [["values", "no-such.ts"], /no-such\.ts: there is no such file/],
  [["values", "notebooks"], /is a folder/],
  [["values", join(projectRoot, "package.json")], /isn't a notebook; a notebook is a \.ts file/],
  [["values", smallNotebook, "--onyl", "area"], /no option --onyl\. Did you mean "--only"\?/],
  [["values", smallNotebook, "--only", "arae"], /has no cell arae\. Did you mean "area"\?/],
  [["values", smallNotebook, "--only", "outer"], /outer is a given/],
  [["values", smallNotebook, "--set", "otuer=2 m"], /has no given otuer\. Did you mean "outer"/],
  [["values", smallNotebook, "--set", "area=2"], /area is a result, not a given/],
  [
    ["values", smallNotebook, "--set", "outer=2 kg"],
    /--set outer: Outer radius must be a length between 0\.1 m and 5 m; got 2 kg/,
  ],
  [["values", smallNotebook, "--set", "outer=70 m"], /--set outer: .*between 0\.1 m and 5 m; got 70 m/],
  [["values", smallNotebook, "--set", "outer=wide"], /--set outer: Outer radius/],
  [["values", smallNotebook, "--set", "finish=gold"], /Finish must be one of bare, painted; got gold/],
  [["values", smallNotebook, "--set", "doubled=perhaps"], /Both sides must be on or off; got perhaps/],
  [["values", smallNotebook, "--set", "outer"], /--set must be name=value; got "outer"/],
  [
    ["values", smallNotebook, "--set", "remark=@no-such.txt"],
    /--set remark: can't read no-such\.txt: there is no such file/,
  ],
])("errors: %j ends with 2 and one sentence", async (args, words) => {
  const { code, out, err } = await run(args);
  expect(err).toMatch(words);
  expect([code, out, isOneSentence(err)]).toEqual([2, "", true]);
});

test("errors: no verb at all shows the help and ends with 2", async () => {
  const { code, out, err } = await run([]);
  expect([code, out]).toEqual([2, ""]);
  expect(err).toContain("hornbook VERB");
});

test("errors: HORNBOOK_TRACE adds the stack", async () => {
  const { code, err } = await run(["values", "no-such.ts"], { env: { HORNBOOK_TRACE: "1" } });
  expect(code).toBe(2);
  expect(err).toMatch(/at .*:\d+:\d+/);
});

test("values: one JSON object with the numbers of the notebook, in SI", async () => {
  const { code, out, err } = await run(["values", smallNotebook]);
  expect([code, err]).toEqual([0, ""]);
  const values = JSON.parse(out);
  expect(Object.keys(values)).toEqual(["notebook", "givens", "cells", "warnings", "failed"]);
  expect(values.givens).toMatchObject({ outer: 1.2, inner: 0.3, finish: "bare", doubled: false, remark: "none" });
  assertClose(values.cells.area, Math.PI * (1.2 ** 2 - 0.3 ** 2), { rel: 1e-15, because: "the same four operations" });
  // Basel problem (Euler, 1735): the sum tends to π²/6; the tail after n terms is 1/n − 1/(2n²).
  assertClose(values.cells.sum, Math.PI ** 2 / 6 - 1 / 2e6 + 1 / 8e12, {
    abs: 1e-12,
    because: "next term of the tail is 1/(6n³); two million roundings added from the small end",
  });
  expect(values.warnings).toEqual([]);
  expect(values.failed).toEqual([]);
});

test("values: givens in any unit, a text from a file, a warning that the page shows", async () => {
  const folder = await ownFolder();
  await writeFile(join(folder, "remark.txt"), "first line\nsecond, with <b>marks</b>\n");
  const args = ["--set", "outer=118.11023622047244 in", "--set", "doubled=on", "--set", "remark=@remark.txt"];
  const { code, out } = await run(["values", smallNotebook, ...args], { cwd: folder });
  expect(code).toBe(0);
  const values = JSON.parse(out);
  assertClose(values.givens.outer, 3, { rel: 1e-15, because: "an inch is 25.4 mm exactly; one rounding" });
  expect(values.givens.remark).toBe("first line\nsecond, with <b>marks</b>\n");
  assertClose(values.cells.area, 2 * Math.PI * (9 - 0.09), { rel: 1e-14, because: "a few roundings" });
  expect(values.warnings).toEqual([
    { cell: "weight", code: "outside-validated-range", text: "area is over 20 m²", shown: true },
  ]);
});

test("values: --only limits the cells, --csv writes their table", async () => {
  const only = JSON.parse((await run(["values", smallNotebook, "--only", "radii,area"])).out);
  expect(Object.keys(only.cells).sort()).toEqual(["area", "radii"]);
  const { code, out } = await run(["values", smallNotebook, "--only", "areas", "--csv"]);
  expect(code).toBe(0);
  expect(out.split("\r\n")[0]).toBe("radius (m),area within (m²)");
  const rows = csvParse(out);
  expect(rows.map((row) => Number(row["radius (m)"]))).toEqual([0.3, 0.75, 1.2]);
  const areas = rows.map((row) => Number(row["area within (m²)"]));
  expect(areas).toEqual([0.3, 0.75, 1.2].map((radius) => Math.PI * radius ** 2));
});

test("values: a failed cell has its reason, the rest its values, and the exit code is 1", async () => {
  const { code, out, err } = await run(["values", smallNotebook, "--set", "inner=1.5 m"]);
  expect(code).toBe(1);
  expect(err).toBe(
    "hornbook: area failed: ringArea: inner must be below outer (1.2 m); got 1.5 m; 4 cells depend on it (test/build/fixtures/small.ts:14)\n",
  );
  const { cells, failed } = JSON.parse(out);
  expect(failed[0]).toMatchObject({
    cell: "area",
    began: "area",
    reason: "ringArea: inner must be below outer (1.2 m); got 1.5 m",
    line: 14,
    path: ["area"],
  });
  const follows = failed.find(({ cell }: { cell: string }) => cell === "opening");
  expect(follows).toMatchObject({ began: "area" });
  expect(follows.path[0]).toBe("area");
  expect(cells.sum).toBeGreaterThan(1.6);
  expect(cells).not.toHaveProperty("area");
});

test("values: a half-angle of 90° and a band upside down fail with the sentence of the physics", async () => {
  const folder = await ownFolder();
  const path = await writeNotebook(
    folder,
    "dish.ts",
    `import { given } from "VOCABULARY";
export const halfAngle = given("35 deg", { label: "Half-angle", why: "test", min: "1 deg", max: "120 deg" });
export const bandLow = given("8 GHz", { label: "Band low", why: "test", min: "1 GHz", max: "50 GHz" });
export const bandHigh = given("9 GHz", { label: "Band high", why: "test", min: "1 GHz", max: "50 GHz" });
export const fOverD = ((angle: number) => {
  if (!(angle < Math.PI / 2)) throw new RangeError(\`fOverD: halfAngle must be below 90 deg; got \${(angle * 180) / Math.PI} deg\`);
  return 1 / (4 * Math.tan(angle / 2));
})(halfAngle);
export const center = ((low: number, high: number) => {
  if (!(low < high)) throw new RangeError(\`band: bandLow must be below bandHigh; got \${low} Hz and \${high} Hz\`);
  return (low + high) / 2;
})(bandLow, bandHigh);
`,
  );
  const wide = await run(["values", path, "--set", "halfAngle=90 deg"]);
  expect(wide.code).toBe(1);
  const wideValues = JSON.parse(wide.out);
  expect(wideValues.failed).toHaveLength(1);
  expect(wideValues.failed[0].reason).toMatch(/must be below 90 deg; got 90 deg/);
  expect(wideValues.cells.center).toBe(8.5e9);
  const swapped = await run(["values", path, "--set", "bandLow=10 GHz"]);
  expect(swapped.code).toBe(1);
  expect(JSON.parse(swapped.out).failed[0].reason).toMatch(/bandLow must be below bandHigh; got 10000000000 Hz/);
});

test("values: a notebook that doesn't parse is told with its line, exit 2", async () => {
  const folder = await ownFolder();
  const path = await writeNotebook(
    folder,
    "torn.ts",
    'import { note } from "VOCABULARY";\nconst a = 1;\nconst b = (a + ;\n',
  );
  const { code, out, err } = await run(["values", path]);
  expect([code, out]).toEqual([2, ""]);
  expect(err).toMatch(/^hornbook: torn\.ts:3: /);
  expect(err.trimEnd().split("\n")).toHaveLength(1);
});

test("values: imports that are missing are told with their line, exit 2", async () => {
  const folder = await ownFolder();
  const path = await writeNotebook(
    folder,
    "lonely.ts",
    'import { note } from "VOCABULARY";\nimport { a } from "./not-there.ts";\nimport { b } from "no-such-package";\nexport const c = a + b;\n',
  );
  const { code, err } = await run(["values", path]);
  expect(code).toBe(2);
  expect(err).toContain('lonely.ts:2: imports "./not-there.ts", and there is no such file');
  expect(err).toContain('lonely.ts:3: imports the package "no-such-package", which isn\'t installed');
});

test("values: a number that isn't finite is null and told; what a notebook logs stays off standard output", async () => {
  const folder = await ownFolder();
  const path = await writeNotebook(
    folder,
    "odd.ts",
    `import { background } from "VOCABULARY";
import { loud } from "./loud.ts";
export const odd = { ratio: 0 / 0, list: [1, 1 / 0] };
export const said = ((text: string) => { console.log(text); return text.length; })("to be ignored");
export const far = await background(loud, 3);
`,
  );
  await writeFile(
    join(folder, "loud.ts"),
    'export function loud(n: number): number {\n  console.log("from afar");\n  return n;\n}\n',
  );
  const { code, out, err } = await run(["values", path]);
  expect(code).toBe(0);
  const values = JSON.parse(out);
  expect(values.cells).toMatchObject({ odd: { ratio: null, list: [1, null] }, said: 13, far: 3 });
  expect(values.warnings.map(({ text }: { text: string }) => text)).toEqual([
    "odd.ratio is NaN",
    "odd.list[1] is Infinity",
  ]);
  expect(err).toContain("to be ignored");
  expect(err).toContain("from afar");
});

test("values: progress of what takes over a second goes to standard error", async () => {
  const { code, out, err, progress } = await run([
    "values",
    smallNotebook,
    "--set",
    "terms=100000000",
    "--only",
    "sum",
  ]);
  expect(code).toBe(0);
  expect(() => JSON.parse(out)).not.toThrow();
  // On a machine that sums a hundred million terms within a second there is nothing to say.
  if (progress !== "") expect(progress).toMatch(/small\.ts: evaluating, \d+ of 17 cells; sum/);
  expect(err).toBe("");
});
