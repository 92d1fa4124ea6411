// 200 malformed notebooks on the way that every notebook goes: compiled, evaluated, painted, checked, and written to by the desk.
// Each fault is told in words at its place; nothing crashes, nothing waits for ever.

import { readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { createDesk } from "../../build/desk.ts";
import { checkFigures } from "../../build/draw-check.ts";
import { headlessDocument } from "../../build/make-export.ts";
import { compileNotebook } from "../../runtime/compile.ts";
import type { DeskAnswer } from "../../runtime/desk.ts";
import { createStudy } from "../../runtime/engine.ts";
import { renderStudy } from "../../runtime/page/render.ts";
import { studyValues } from "../../runtime/plain-values.ts";
import { bundled, importText } from "../runtime/load-notebook.ts";
import { malformedNotebooks } from "./malformed-notebooks.ts";
import { fixtures, ownFolder, run, runtimeImport } from "./run-command.ts";

const sound = readFileSync(join(fixtures, "decided.ts"), "utf8").replace('"../../../runtime/index.ts"', runtimeImport);

const COUNT = 200;
const notebooks = () => malformedNotebooks(sound, runtimeImport, COUNT, 20261201);

test("200 malformed notebooks: evaluated and painted, each fault in its own cell", async () => {
  let unreadable = 0;
  let failures = 0;
  for (const source of notebooks()) {
    const { code, problems } = compileNotebook(source, "a.ts");
    for (const { message, line } of problems) {
      expect(message).toMatch(/\S/);
      expect(line).toBeLessThanOrEqual(source.split(/\r\n|[\n\u2028\u2029]/).length);
    }
    if (problems.some(({ kind }) => kind === "parse")) {
      unreadable++;
      continue;
    }
    const script = await bundled(code, "a.ts").catch((error: Error) => error);
    if (script instanceof Error) {
      // an import that leads nowhere: the bundler says where
      expect(script.message, source).toMatch(/a\.ts:\d+:\d+: ERROR/);
      continue;
    }
    const study = createStudy((await importText(script)).notebook, { frozen: true });
    const patience = new Promise((resolve) => setTimeout(() => resolve("waits for ever"), 10_000).unref());
    expect(await Promise.race([study.settled(), patience]), source).toBeUndefined();
    for (const { state, failure } of study.cells) {
      expect(["current", "failed"]).toContain(state);
      if (state !== "failed") continue;
      failures++;
      expect(failure?.reason, source).toMatch(/\S/);
    }
    expect(JSON.parse(JSON.stringify(studyValues(study))).notebook).toBe("a.ts");
    for (const { text } of checkFigures(study).findings) expect(text).toMatch(/\S/);
    const html = renderStudy(study, { document: headlessDocument(), still: true, imprint: "" });
    expect(html).not.toMatch(/<script|<img|\son\w+=/i);
    study.dispose();
  }
  // they are malformed indeed, and most get as far as evaluation
  expect(unreadable).toBeGreaterThan(COUNT / 20);
  expect(unreadable).toBeLessThan(COUNT / 2);
  expect(failures).toBeGreaterThan(2 * COUNT);
}, 300_000);

test("200 malformed notebooks: every write of the desk is done or refused in words, and leaves no half-written file", async () => {
  const folder = await ownFolder();
  const path = join(folder, "a.ts");
  const draft = {
    ...{ decision: "d", chosen: "c", reasons: "r", author: "a" },
    numbers: [{ label: "Area", expression: "area", unit: "m^2", tolerance: "0.1 m^2" }],
  };
  const answers = { done: 0, refused: 0 };
  let count = 0;
  for (const source of notebooks()) {
    const known = new Set(compileNotebook(source, "a.ts").problems.map(({ message }) => message));
    const desk = createDesk({ path, label: "a.ts" });
    const requests: [string, object][] = [
      ["keepGivens", { texts: { side: "2 m" } }],
      ["keepGivens", { texts: { cell0: "2 m", cell1: "a", cell2: "on" } }],
      ["addNote", { after: "area", markdown: "x ${side}" }],
      ["addNote", { after: "cell3", markdown: "x ${other}" }],
      ["addRationale", { beside: "areas", draft, now: [1] }],
      ["editRationale", { cell: "squareChosen", draft, now: [1] }],
      ["agreeAgain", { cell: "squareChosen", author: "a", now: { Area: 1, Side: 1, l: 1 } }],
      ["replaceCell", { cell: "area", source: "export const area = side;" }],
      ["fork", { name: `fork ${count++}`, texts: { side: "2 m" } }],
    ];
    for (const [name, body] of requests) {
      // a lone half of a pair can't be kept in UTF-8, so what is read back is the version that the page would have
      writeFileSync(path, source);
      const base = readFileSync(path, "utf8");
      const answer = (await desk[name]!({ base, ...body })) as DeskAnswer;
      const after = readFileSync(path, "utf8");
      expect(answer.sentence, `${name} of\n${source}`).toMatch(/^[^\n]*\S.*[.!?]$|npm run/s);
      expect(answer.sentence).not.toMatch(/\bat .*:\d+:\d+|unforeseen/);
      answers[answer.ok ? "done" : "refused"]++;
      if (!answer.ok) expect(after, name).toBe(base);
      const problems = compileNotebook(after, "a.ts").problems.map(({ message }) => message);
      expect(problems.filter((message) => !known.has(message))).toEqual([]);
    }
  }
  // half of the notebooks are misused rather than torn, and the desk still writes into some of the torn ones
  expect(answers.done).toBeGreaterThan(COUNT / 2);
  expect(answers.refused).toBeGreaterThan(COUNT);
  expect(readdirSync(folder).filter((name) => !/^(a|fork-\d+)\.ts$/.test(name))).toEqual([]);
}, 300_000);

test("malformed notebooks by the real check: a report and exit code 1, never a stack", async () => {
  const folder = await ownFolder();
  const path = join(folder, "a.ts");
  const some = [...notebooks()].filter((_, i) => i % 99 < 2);
  for (const source of some) {
    writeFileSync(path, source);
    const { code, out, err } = await run(["check", path]);
    expect([0, 1, 3], `${code}: ${err}`).toContain(code);
    expect(out).toMatch(/^a\.ts\n\n {2}types .*\n[\s\S]*\na\.ts: (nothing|something) was found/);
    expect(out + err).not.toMatch(/\bat \S+ ?\(.*:\d+:\d+\)|unforeseen/);
  }
}, 120_000);
