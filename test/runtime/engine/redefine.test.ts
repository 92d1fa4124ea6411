import { expect, test } from "vitest";
import { createStudy } from "../../../runtime/engine.ts";
import type { Study } from "../../../runtime/study.ts";
import { loadNotebook } from "../load-notebook.ts";

const counts = (study: Study): Record<string, number> =>
  Object.fromEntries(study.cells.map((cell) => [cell.name, cell.evaluations]));

const BEFORE = `
const a = given("1", { label: "A", why: "", min: 0, max: 10 });
const b = given("2 m", { label: "B", why: "", min: "0 m", max: "20 m" });
const left = a + 1;
const right = b * 2;
note\`left is \${left}\`;
const both = left + right;
`;

const versions = async (...bodies: string[]) => Promise.all(bodies.map((body) => loadNotebook(body)));

test("redefine: an edited cell and its downstream are evaluated, nothing else; lines and anonymous cells move along", async () => {
  const [before, after] = await versions(
    BEFORE,
    BEFORE.replace("const right = b * 2;", "// a line more\n// and another\nconst right = b * 3;"),
  );
  const study = createStudy(before as never);
  await study.settled();
  const noteBefore = study.cells.find((cell) => cell.name.startsWith("line "));
  study.redefine(after as never);
  expect(study.cell("both").state).toBe("behind");
  expect(study.cell("left").state).toBe("current");
  await study.settled();
  expect(study.cell("both").value).toBe(8);
  const noteAfter = study.cells.find((cell) => cell.name.startsWith("line "));
  expect(noteAfter).toBe(noteBefore);
  expect(noteAfter?.line).toBe(9);
  expect(counts(study)).toEqual({ a: 1, b: 1, left: 1, right: 2, "line 9": 1, both: 2 });
  expect(study.cells.map((cell) => cell.name)).toEqual(["a", "b", "left", "right", "line 9", "both"]);
  expect(study.source).toContain("// a line more");
  study.dispose();
});

test("redefine: the same text again evaluates nothing", async () => {
  const [before, after] = await versions(BEFORE, BEFORE);
  const study = createStudy(before as never);
  await study.settled();
  const earlier = counts(study);
  study.redefine(after as never);
  await study.settled();
  expect(counts(study)).toEqual(earlier);
  study.dispose();
});

test("redefine: cells come, go and are renamed; what read them fails or heals", async () => {
  const [one, two, three] = await versions(
    "const a = 1; const b = a + 1; const c = b * 10;",
    "const a2 = 5; const b = a + 1; const c = b * 10;",
    "const a2 = 5; const b = a2 + 1; const c = b * 10; const d = c;",
  );
  const study = createStudy(one as never);
  await study.settled();
  expect(study.cell("c").value).toBe(20);
  study.redefine(two as never);
  await study.settled();
  expect(study.cell("c").failure).toMatchObject({ cell: "b", path: ["b", "c"] });
  expect(() => study.cell("a")).toThrow("no cell");
  study.redefine(three as never);
  await study.settled();
  expect([study.cell("c").value, study.cell("d").value]).toEqual([60, 60]);
  expect(study.cells.map((cell) => cell.name)).toEqual(["a2", "b", "c", "d"]);
  study.dispose();
});

test("redefine: a cell becomes a part of a destructuring, a given, a function, and back", async () => {
  const bodies = [
    "const x = 1; const y = x;",
    "const { x, z } = { x: 2, z: 3 }; const y = x;",
    'const x = given("4", { label: "X", why: "", min: 0, max: 10 }); const y = x;',
    "function x() { return 5; } const y = x;",
    "const x = 6; const y = x;",
  ];
  const modules = await versions(...bodies);
  const study = createStudy(modules[0] as never);
  const values: unknown[] = [];
  for (const module of modules) {
    study.redefine(module);
    await study.settled();
    const { value } = study.cell("y");
    values.push(typeof value === "function" ? value() : value);
    expect(study.givens).toHaveLength(module === modules[2] ? 1 : 0);
  }
  expect(values).toEqual([1, 2, 4, 5, 6]);
  study.dispose();
});

test("redefine: entered givens are kept, untouched ones follow the file, impossible ones are refused with a sentence", async () => {
  const [before, after, broken, narrow] = await versions(
    BEFORE,
    BEFORE.replace('given("1"', 'given("3"').replace('given("2 m"', 'given("5 m"'),
    BEFORE.replace('given("2 m"', 'given("2 mm of"'),
    BEFORE.replace('max: "20 m"', 'max: "6 m"'),
  );
  const study = createStudy(before as never);
  study.set("b", "7 m");
  await study.settled();
  study.redefine(after as never);
  await study.settled();
  expect(study.givens.map(({ text, defaultText }) => [text, defaultText])).toEqual([
    ["3", "3"],
    ["7 m", "5 m"],
  ]);
  expect(study.cell("both").value).toBe(4 + 14);
  study.redefine(broken as never);
  await study.settled();
  expect(study.cell("both").failure?.cell).toBe("b");
  study.redefine(before as never);
  await study.settled();
  expect(study.givens[1]?.text).toBe("7 m");
  study.redefine(narrow as never);
  await study.settled();
  expect(study.givens[1]).toMatchObject({
    text: "2 m",
    value: 2,
    refusal: { entered: "7 m", message: "B must be a length between 0 m and 6 m; got 7 m" },
  });
  study.dispose();
});

test("redefine: an imported file that changed evaluates the cells that use an import, and what depends on them", async () => {
  const notebook = await loadNotebook("const a = 1; const b = show(a); const c = b + a; const d = a + 1;");
  const study = createStudy({ ...notebook, importsDigest: "one" });
  await study.settled();
  study.redefine({ ...notebook, importsDigest: "two" });
  await study.settled();
  expect(counts(study)).toEqual({ a: 1, b: 2, c: 2, d: 1 });
  study.redefine({ ...notebook, importsDigest: "two" });
  await study.settled();
  expect(counts(study)).toEqual({ a: 1, b: 2, c: 2, d: 1 });
  study.dispose();
});

test("redefine while a cell works: its result is dropped if it changed, kept if not", async () => {
  const slow = (n: number) =>
    `const a = await new Promise((r) => setTimeout(() => r(${n}), 20)); const b = a; const c = 1;`;
  const [one, same, other] = await versions(slow(1), `${slow(1)} const d = b;`, `${slow(2)} const d = b;`);
  const study = createStudy(one as never);
  await new Promise((resolve) => setTimeout(resolve, 5));
  expect(study.cell("a").state).toBe("working");
  study.redefine(same as never);
  await study.settled();
  expect([study.cell("a").evaluations, study.cell("d").value]).toEqual([1, 1]);
  study.again("a");
  await new Promise((resolve) => setTimeout(resolve, 5));
  study.redefine(other as never);
  await study.settled();
  expect([study.cell("a").evaluations, study.cell("d").value]).toEqual([3, 2]);
  study.dispose();
});
