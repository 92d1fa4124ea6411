// biome-ignore-all lint/suspicious/noTemplateCurlyInString: notebooks stand here as texts
import { execFileSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { transform } from "esbuild";
import { expect, test } from "vitest";
import { compileNotebook } from "../../../runtime/compile.ts";
import { createStudy } from "../../../runtime/engine.ts";
import { bundled, loadNotebook, VOCABULARY } from "../load-notebook.ts";

const SOURCE = `${VOCABULARY}
import type { NotebookModule } from "../runtime/study.ts";

type Unused = NotebookModule;
/** The dish.
 *  Two lines. */
export const dish =
  given(
    "2.4 m",
    { label: "Dish", why: "", min: "0.3 m", max: "20 m" },
  );
export const
  // a comment in the way
  first
    : number =
  dish * 2,
  second = (
    first + 1
  );
function overloaded(x: number): number;
function overloaded(
  x: string,
): number;
function overloaded(x: unknown) {
  return Number(x);
}
export {
  dish as plate,
};
export const {
  p,
  q: [r],
} = { p: overloaded(1), q: [second] };
enum Bad {
  A,
}
note\`
  several
  lines \${r}
\`
class Thing<T extends { [k: string]: Unused }> {
  value = p;
}
const text = "LINE " + line(); const more = () => new Thing()
function line() { return 1; }
`;

test("compileNotebook: every line stays on its line", () => {
  const { code } = compileNotebook(SOURCE, "notebooks/test.ts");
  const before = SOURCE.split("\n");
  const after = code.split("\n");
  // Marks that occur on one line only must be on that very line of the compiled text.
  for (const mark of [
    ...['"2.4 m"', "label:", ": number =", "dish * 2", "first + 1", "Number(x)", "overloaded(1)", "several"],
    ...["lines ${r}", "class Thing", "value = p", "LINE", "type Unused"],
  ]) {
    const line = before.findIndex((text) => text.includes(mark));
    expect(line, mark).toBeGreaterThanOrEqual(0);
    expect(after[line], mark).toContain(mark);
  }
});

test.each(["\n", "\r\n"])("compileNotebook: line breaks %j are kept, refused statements included", (lineBreak) => {
  const source = [
    "let a = 1",
    "let b = [",
    "  2,",
    "]",
    "for (;;) {",
    "}",
    "const c = 3",
    "export {",
    "  c,",
    "}",
    "const d = c",
  ];
  const { code } = compileNotebook(source.join(lineBreak), "notebooks/test.ts");
  const lines = code.split(lineBreak);
  expect(lines[6]).toContain("const c = 3");
  expect(lines[10]).toContain("const d = c");
});

test("compileNotebook: the compiled text is TypeScript that esbuild takes", async () => {
  const { code, problems } = compileNotebook(SOURCE, "notebooks/test.ts");
  expect(problems.map((problem) => problem.cell)).toEqual(["Bad"]);
  const { warnings } = await transform(code, { loader: "ts" });
  expect(warnings).toEqual([]);
});

test("cells: first and last line, and source with its leading comment", () => {
  const { cells } = compileNotebook(SOURCE, "notebooks/test.ts");
  const of = (name: string) => cells.find((cell) => cell.name === name);
  expect(of("dish")).toMatchObject({ line: 7, endLine: 11, sourceLine: 5, role: "given" });
  expect(of("dish")?.source).toMatch(/^\/\*\* The dish\.[\s\S]*\);$/);
  expect(of("second")).toMatchObject({ line: 17, endLine: 19 });
  expect(cells.find((cell) => cell.name.startsWith("line "))?.source).toMatch(/^note`/);
});

test("cells: a comment belongs to the statement it touches from above", () => {
  const source = [
    "const a = 1; // tail of a",
    "// leads b",
    "const b = 2;",
    "// leads nothing",
    "",
    "/* leads c */",
    "// too",
    "const c = 3;",
    "// last",
  ];
  const { cells } = compileNotebook(source.join("\n"), "t.ts");
  expect(cells.map((cell) => cell.source)).toEqual([
    "const a = 1;",
    "// leads b\nconst b = 2;",
    "/* leads c */\n// too\nconst c = 3;",
  ]);
});

test("an error thrown on a line is reported with that line: from the stack where source maps are on, else the cell's own", async () => {
  const body = `const good = 1;
const bad = (() => {
  const step = good + 1;
  if (step > 1) throw new RangeError("radius must be positive; got -1");
  return step;
})();
const after = bad + 1;
`;
  const notebook = await loadNotebook(body);
  const study = createStudy(notebook);
  await study.settled();
  expect(study.cell("after").failure).toMatchObject({ cell: "bad", line: 3, path: ["bad", "after"] });
  study.dispose();

  const { code } = compileNotebook(`${VOCABULARY}\n${body}`, "notebooks/test.ts");
  const entry = `${code.replace(/export \{ (\S+) as notebook \};/, "const notebook = $1;")}
    import { evaluateNotebook } from "../runtime/headless.ts";
    console.log(JSON.stringify(await evaluateNotebook(notebook)));`;
  const directory = mkdtempSync(join(tmpdir(), "hornbook-lines-"));
  try {
    const script = join(directory, "run.mjs");
    writeFileSync(script, await bundled(entry, "notebooks/test.ts", { sourcemap: true }));
    const run = (flags: string[]) =>
      JSON.parse(execFileSync(process.execPath, [...flags, script], { encoding: "utf8" }));
    // Line 1 imports the vocabulary, so the throw stands on line 5.
    expect(run(["--enable-source-maps"]).failed).toMatchObject([
      { cell: "bad", reason: "radius must be positive; got -1", line: 5, path: ["bad"] },
      { cell: "after", reason: "radius must be positive; got -1", line: 5, path: ["bad", "after"] },
    ]);
    expect(run([]).failed[0]).toMatchObject({ cell: "bad", line: 3 });
  } finally {
    rmSync(directory, { recursive: true });
  }
});
