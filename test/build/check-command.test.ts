// `check`, by the real command: what it finds, and that it finds nothing where nothing is.

import { expect, test } from "vitest";
import { ownFolder, run, smallNotebook, writeNotebook } from "./run-command.ts";

const given = 'given("2 m", { label: "Length", why: "test", min: "1 m", max: "3 m" })';

async function check(text: string, args: string[] = []) {
  const folder = await ownFolder();
  return run(["check", await writeNotebook(folder, "tried.ts", text), ...args]);
}

test("check: a sound notebook, with givens as in the file and as set", async () => {
  const { code, out, err } = await run(["check", smallNotebook]);
  expect([code, err]).toEqual([0, expect.stringMatching(/^(.*: \w+.*\n)*$/)]);
  for (const line of [
    "types      ✓ pass",
    "structure  ✓ sound",
    "cells      ✓ all 17 have a value",
    "figures    ✓ 1 drawn at 760 and 354 px",
  ]) {
    expect(out).toContain(line);
  }
  expect(out.trimEnd().endsWith("small.ts: nothing was found.")).toBe(true);
  const heavy = await run(["check", smallNotebook, "--set", "outer=4 m"]);
  expect(heavy.code).toBe(0);
  expect(heavy.out).toContain("warnings   ✓ 1, all shown\n      weight: outside-validated-range: area is over 20 m²");
});

test("check: a wrong type, in the notebook", async () => {
  const { code, out } = await check(
    `import { given } from "VOCABULARY";\nexport const length = ${given};\nexport const words: string = length;\n`,
  );
  expect(code).toBe(1);
  expect(out).toContain("types      ✗ 1 finding");
  expect(out).toContain("tried.ts:3: Type 'number' is not assignable to type 'string'.");
});

test("check: a cycle is printed with the names on it, and the rest is still looked at", async () => {
  const { code, out } = await check(
    "export const a: number = c + 1;\nexport const b: number = a + 1;\nexport const c: number = b + 1;\nexport const d = 4;\n",
  );
  expect(code).toBe(1);
  expect(out).toMatch(/structure {2}✗/);
  expect(out).toMatch(/tried\.ts:\d: \w: .*a → c → b → a|a → b → c → a|c → b → a → c/);
  expect(out).toMatch(/cells {6}✗ 3 of 4 failed/);
});

test("check: a failing cell with the path to those that follow from it", async () => {
  const { code, out } = await check(
    'export const root = ((x: number) => { if (x < 9) throw new RangeError("root: x must be at least 9; got " + x); return x; })(4);\nexport const next = root + 1;\n',
  );
  expect(code).toBe(1);
  expect(out).toContain("tried.ts:1: root: root: x must be at least 9; got 4");
  expect(out).toContain("tried.ts:1: next: root: x must be at least 9; got 4 (root → next)");
});

test("check: a warning that stands nowhere on the page, and a number that isn't finite", async () => {
  const text = `import { note } from "VOCABULARY";
export const result = { value: 1 / 0, warnings: [{ code: "slow", text: "took 3 (three) seconds" }] };
`;
  const hidden = await check(text);
  expect(hidden.code).toBe(1);
  expect(hidden.out).toContain("numbers    ✗ 1 finding\n      result.value is Infinity");
  expect(hidden.out).toContain(
    "warnings   ✗ 1 of 1 not shown\n      result: NOT SHOWN ON THE PAGE: slow: took 3 (three) seconds",
  );
  const shown = await check(
    `${text.replace("1 / 0", "1")}note\`Mind: \${result.warnings.map(({ text }) => text)}\`;\n`,
  );
  expect([shown.code, shown.out]).toEqual([0, expect.stringContaining("warnings   ✓ 1, all shown")]);
});

test("check: a figure that can't be drawn, or that holds a number which is none", async () => {
  const { code, out } = await check(`import { figure } from "VOCABULARY";
export const broken = figure({ alt: "nothing", draw: () => { throw new Error("axis: no extent"); } }, { caption: "Broken." });
export const odd = figure({ alt: "odd", draw({ document }) {
  const svg = document.createElementNS("http://www.w3.org/2000/svg", "svg");
  svg.setAttribute("viewBox", \`0 0 \${0 / 0} 1\`);
  return svg;
} }, { caption: "Odd." });
`);
  expect(code).toBe(1);
  expect(out).toContain("tried.ts:2: broken can't be drawn at 760 px: axis: no extent");
  expect(out).toContain('odd at 354 px it holds "0 0 NaN 1"');
});

test("check: a notebook that doesn't parse or lacks a file is a finding, not a crash", async () => {
  const torn = await check("export const a = (1 + ;\n");
  expect(torn.code).toBe(1);
  expect(torn.out).toMatch(/structure {2}✗ 1 finding\n {6}tried\.ts:1: /);
  const lonely = await check('import { a } from "./away.ts";\nexport const b = a;\n');
  expect(lonely.code).toBe(1);
  expect(lonely.out).toContain('tried.ts:1: imports "./away.ts", and there is no such file');
  expect(torn.err + lonely.err).not.toMatch(/\bat .*:\d+:\d+/);
  const missing = await run(["check", "no-such.ts"]);
  expect(missing.code).toBe(2);
});
