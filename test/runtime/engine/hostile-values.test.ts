// Cells that throw what can't be read, or have a value that throws when it is looked at: a failed cell, never a study that hangs.

import { expect, test } from "vitest";
import { createStudy } from "../../../runtime/engine.ts";
import { studyValues } from "../../../runtime/plain-values.ts";
import { loadNotebook } from "../load-notebook.ts";

const trap = '{ get() { throw new Error("trap"); }, ownKeys() { throw new Error("no keys"); } }';
const thrown = (what: string) => `(() => { throw ${what}; })()`;

test.each([
  [thrown("null"), "threw null"],
  [thrown("undefined"), "threw undefined"],
  [thrown('Symbol("s")'), "threw Symbol(s)"],
  [thrown("Object.create(null)"), "threw something that can't be read"],
  [thrown(`new Proxy({}, ${trap})`), "threw something that can't be read"],
  [thrown('Object.defineProperty(new Error("x"), "stack", { get() { throw new Error("y"); } })'), "x"],
  [thrown('Object.assign(new Error("x"), { message: 5 })'), "5"],
  [`new Proxy({}, ${trap})`, "trap"],
  ["{ get then() { throw new Error('no then'); } }", "no then"],
  ["{ then() { throw new Error('thrown by then'); } }", "thrown by then"],
  ["await { then(take: never, refuse: (reason: unknown) => void) { refuse(Object.create(null)); } }", "can't be read"],
])("a cell that is %s fails by itself", async (value, reason) => {
  const study = createStudy(await loadNotebook(`const hostile = ${value};\nconst next = hostile;\nconst other = 1;`));
  await study.settled();
  expect(study.cells.map(({ state }) => state)).toEqual(["failed", "failed", "current"]);
  expect(study.cell("hostile").failure?.reason).toContain(reason);
  expect(study.cell("next").failure?.path).toEqual(["hostile", "next"]);
  study.dispose();
});

test("a value that can't be frozen fails where values are frozen", async () => {
  const keyless = 'new Proxy({}, { ownKeys() { throw new Error("no keys"); } })';
  const study = createStudy(await loadNotebook(`const hostile = ${keyless};\nconst other = 1;`), { frozen: true });
  await study.settled();
  expect(study.cell("hostile").failure?.reason).toBe("no keys");
  expect(study.cell("other").state).toBe("current");
  study.dispose();
});

test("studyValues: a field that throws, or that lies too deep, is told; all other values are there", async () => {
  const study = createStudy(
    await loadNotebook(`
const getter = { list: [{ get x() { throw new Error("not now"); } }, 2] };
const linked = (() => { let all = {}; for (let i = 0; i < 50_000; i++) all = { next: all }; return all; })();
const other = 1;`),
  );
  await study.settled();
  const { cells, warnings } = studyValues(study);
  expect(cells).toMatchObject({ getter: { list: [null, 2] }, other: 1 });
  expect(warnings.map(({ text }) => text)).toEqual([
    "getter.list[0] can't be read: not now",
    expect.stringMatching(/^linked\.next\.next.{0,120}… can't be read: /),
  ]);
  study.dispose();
});
