import { describe, expect, test } from "vitest";
import { compileNotebook } from "../../../runtime/compile.ts";
import { createStudy } from "../../../runtime/engine.ts";
import { loadNotebook } from "../load-notebook.ts";

const IMPORT = 'import { background, given, margin, note } from "../runtime/index.ts";';

interface Expected {
  kind: string;
  at: [line: number, column: number];
  cell?: string;
  message: RegExp;
}

const table: [situation: string, lines: string[], expected: Expected[]][] = [
  [
    "an unknown name, with the one that is near",
    ["const dish = 1;", "const x = dihs + 1;"],
    [{ kind: "unknown-name", at: [2, 11], cell: "x", message: /^dihs is not a cell.*is dish meant\?$/ }],
  ],
  [
    "an unknown name in a closure",
    ["const x = () => nowhere;"],
    [{ kind: "unknown-name", at: [1, 17], cell: "x", message: /^nowhere is not/ }],
  ],
  [
    "a name that only a page knows",
    ["const x = document.title;"],
    [{ kind: "unknown-name", at: [1, 11], cell: "x", message: /document is out of reach/ }],
  ],
  [
    "a word of the vocabulary that is not imported",
    ["const x = figure({}, {});"],
    [{ kind: "missing-import", at: [1, 11], cell: "x", message: /^figure is not imported; add it to the import/ }],
  ],
  [
    "a name defined twice",
    ["const x = 1;", "const y = 2;", "const x = 3;"],
    [{ kind: "duplicate", at: [3, 7], cell: "x", message: /^x is defined twice, on lines 1 and 3$/ }],
  ],
  [
    "a name both imported and defined",
    [IMPORT, "const note = 3;"],
    [
      {
        kind: "duplicate",
        at: [2, 7],
        cell: "note",
        message: /^note is imported on line 1 and defined again on line 2$/,
      },
    ],
  ],
  [
    "a name defined twice inside a function",
    ["const x = () => {", "  let z = 1;", "  let z = 2;", "  return z;", "};"],
    [{ kind: "duplicate", at: [3, 7], cell: "x", message: /'z' has already been declared/ }],
  ],
  [
    "a cycle, with its whole path",
    ["const a = () => b();", "const b = () => c();", "const c = () => a();", "const d = a;"],
    [{ kind: "cycle", at: [1, 7], cell: "a", message: /a → b → c → a/ }],
  ],
  [
    "two cycles",
    ["const a = () => b();", "const b = () => a();", "const c = () => d;", "function d() { return c; }"],
    [
      { kind: "cycle", at: [1, 7], cell: "a", message: /a → b → a/ },
      { kind: "cycle", at: [3, 7], cell: "c", message: /c → d → c/ },
    ],
  ],
  [
    "a cycle through a destructuring, without the hidden cell",
    ["const { p } = { p: () => q };", "const q = () => p;"],
    [{ kind: "cycle", at: [1, 9], cell: "p", message: /p → q → p/ }],
  ],
  ["a cell of itself", ["const x = x + 1;"], [{ kind: "cycle", at: [1, 11], cell: "x", message: /x → x/ }]],
  [
    "use before definition (tsc: TS2448)",
    ["const x = y + 1;", "const y = 1;"],
    [
      {
        kind: "use-before-definition",
        at: [1, 11],
        cell: "x",
        message: /^y is used on line 1 before it is defined on line 2/,
      },
    ],
  ],
  [
    "use before definition in a function that is called at once",
    ["const x = (() => y)();", "const y = 1;"],
    [{ kind: "use-before-definition", at: [1, 18], cell: "x", message: /^y is used/ }],
  ],
  [
    "use of a class before its definition (tsc: TS2449)",
    ["class X extends Y {}", "class Y {}"],
    [{ kind: "use-before-definition", at: [1, 17], cell: "X", message: /^Y is used/ }],
  ],
  ["let", ["let x = 1;"], [{ kind: "statement", at: [1, 5], cell: "x", message: /^x is declared with let/ }]],
  [
    "var, taken apart",
    ["var { x, y } = { x: 1, y: 2 };"],
    [
      { kind: "statement", at: [1, 5], cell: "x", message: /^x is declared with var/ },
      { kind: "statement", at: [1, 5], cell: "y", message: /^y is declared with var/ },
    ],
  ],
  [
    "an assignment to another cell",
    ["const x = { v: 1 };", "const y = () => { x = 2; };"],
    [{ kind: "assignment", at: [2, 19], cell: "y", message: /^y assigns to the cell x/ }],
  ],
  [
    "counting another cell up",
    ["const x = 1;", "function y() { x++; }"],
    [{ kind: "assignment", at: [2, 16], cell: "y", message: /^y assigns to the cell x/ }],
  ],
  [
    "a destructuring assignment to another cell",
    ["const x = 1;", "const y = () => { [x] = [2]; };"],
    [{ kind: "assignment", at: [2, 20], cell: "y", message: /^y assigns/ }],
  ],
  [
    "an assignment to an import",
    [IMPORT, "const y = () => { note = 2; };"],
    [{ kind: "assignment", at: [2, 19], cell: "y", message: /^y assigns to the import note/ }],
  ],
  [
    "a default export",
    ["export default 3;"],
    [{ kind: "statement", at: [1, 1], cell: "line 1", message: /no default export/ }],
  ],
  [
    "a loop",
    ["for (const i of [1]) { console.log(i); }"],
    [{ kind: "statement", at: [1, 1], cell: "line 1", message: /^a for loop can't stand/ }],
  ],
  ["if", ["if (true) {}"], [{ kind: "statement", at: [1, 1], cell: "line 1", message: /^if can't stand/ }]],
  ["an enum", ["enum E { A }"], [{ kind: "statement", at: [1, 1], cell: "E", message: /^E is an enum/ }]],
  [
    "an enum inside a function",
    ["const x = () => {", "  enum E { A }", "  return E.A;", "};"],
    [{ kind: "statement", at: [2, 3], cell: "x", message: /^an enum or a namespace leaves code behind/ }],
  ],
  [
    "a namespace",
    ["namespace N { export const a = 1; }"],
    [{ kind: "statement", at: [1, 1], cell: "line 1", message: /namespace/ }],
  ],
  [
    "a given that depends on a cell",
    [IMPORT, "const limit = 3;", 'const x = given("2 m", { label: "X", why: "", min: 1, max: limit });'],
    [{ kind: "given", at: [3, 11], cell: "x", message: /^x is a given, so it can't depend on limit/ }],
  ],
  [
    "a given inside an expression",
    [IMPORT, 'const x = 2 * given("2 m", { label: "X", why: "", min: 1, max: 3 });'],
    [{ kind: "given", at: [2, 15], cell: "x", message: /must be alone as the value of a top-level const/ }],
  ],
  [
    "a given by another name, unnamed",
    ['import { given as input } from "../runtime/vocabulary.ts";', 'input.switch(true, { label: "X", why: "" });'],
    [{ kind: "given", at: [2, 1], cell: "line 2", message: /must be alone/ }],
  ],
  [
    "given handed on",
    [IMPORT, "const x = given;"],
    [{ kind: "given", at: [2, 11], cell: "x", message: /must be called where it stands/ }],
  ],
  [
    "a margin note beside nothing",
    [IMPORT, "margin(3)`x`;"],
    [{ kind: "margin", at: [2, 8], cell: "line 2", message: /must name the cell/ }],
  ],
  [
    "an arrow in the background",
    [IMPORT, "const x = await background(() => 3);"],
    [{ kind: "background", at: [2, 28], cell: "x", message: /must be given the name of an imported function/ }],
  ],
  [
    "a notebook function in the background that needs a given",
    [
      IMPORT,
      'const g = given("1", { label: "G", why: "", min: 0, max: 2 });',
      "function heavy() { return g; }",
      "const x = await background(heavy);",
    ],
    [
      {
        kind: "background",
        at: [3, 10],
        cell: "heavy",
        message: /^heavy is called in the background but needs g, a given/,
      },
    ],
  ],
  [
    "import equals",
    ['import x = require("x");', "const y = 1;"],
    [{ kind: "statement", at: [1, 1], message: /write import/ }],
  ],
];

describe("problems", () => {
  test.each(table)("%s", (_, lines, expected) => {
    const { problems } = compileNotebook(lines.join("\n"), "notebooks/test.ts");
    expect(
      problems.map(({ kind, line, column, cell }) => ({ kind, at: [line, column], ...(cell ? { cell } : {}) })),
    ).toEqual(expected.map(({ message: _message, ...rest }) => rest));
    problems.forEach((problem, i) => {
      expect(problem.message).toMatch((expected[i] as Expected).message);
      expect(problem.message).not.toContain("\n");
      expect(problem.file).toBe("notebooks/test.ts");
    });
  });

  test("a file that can't be read: one problem with its place, no cells", () => {
    const { problems, cells, code } = compileNotebook("const a = 1;\nconst b = (;\n", "notebooks/test.ts");
    expect(cells).toEqual([]);
    expect(problems).toMatchObject([{ kind: "parse", line: 2, column: 12 }]);
    expect(problems[0]?.message).toMatch(/^notebooks\/test.ts can't be read: /);
    expect(code).toContain("export const notebook");
  });

  test.each(["", "// nothing", "#!/usr/bin/env node", 'import "./x.ts";', ";;"])(
    "a file without cells: %j",
    (source) => {
      expect(compileNotebook(source, "t.ts")).toMatchObject({ cells: [], problems: [] });
    },
  );

  test("what belongs to the module and not to a cell passes", () => {
    const source = `export type A = number; export interface B { a: A } const a: A = 1; export { a, a as b };
export function f(x: number): number; export function f(x: any) { return x; }
declare module "x" { export const y: number } declare global { interface Window { z: 1 } }`;
    expect(compileNotebook(source, "t.ts").problems).toEqual([]);
  });

  test("bad cells fail with the problem's words, and the rest lives", async () => {
    const notebook = await loadNotebook(`const good = 1;
const bad = goood + 1;
const needsBad = bad + good;
let moving = 3;
const alsoGood = good + 1;
const a = () => b; const b = () => a;
const twice = 1, fine = 2;
const twice = 3;
const readsTwice = twice;
for (;;) {}
export const { p, q } = { p: nowhere, q: 1 }, r = good;
`);
    const study = createStudy(notebook);
    await study.settled();
    const states = Object.fromEntries(study.cells.map((cell) => [cell.name, cell.state]));
    expect(states).toMatchObject({ good: "current", alsoGood: "current", fine: "current", r: "current" });
    for (const name of ["bad", "needsBad", "moving", "a", "b", "twice", "readsTwice", "line 11", "p", "q"]) {
      expect(states[name], name).toBe("failed");
    }
    expect(study.cell("needsBad").failure).toMatchObject({
      reason: "goood is not a cell, an import or a known name; is good meant?",
      cell: "bad",
      file: "notebooks/test.ts",
      line: 3,
      path: ["bad", "needsBad"],
    });
    expect(study.cell("a").failure?.reason).toContain("a → b → a");
    expect(study.cell("readsTwice").failure).toMatchObject({ path: ["twice", "readsTwice"] });
    study.dispose();
  });
});
