import { transform } from "esbuild";
import { expect, test } from "vitest";
import { compileNotebook } from "../../../runtime/compile.ts";
import { seededRandom } from "../../assert-close.ts";

const GOOD = `import { background, given, margin, note, show } from "../runtime/index.ts";
import { sweepOf, type Sweep } from "../cells/sweep.ts";

/** The dish. */
export const dish = given("2.4 m", { label: "Dish", why: "ours", min: "0.3 m", max: "20 m" });
const kind = given.choice(["smooth", "dualMode"], { label: "Kind", why: "" });
interface Point { x: number; y?: string }
type Points = readonly Point[];
const { area, edge: [first, ...rest] = [1, 2] } = { area: Math.PI * (dish / 2) ** 2, edge: undefined };
function half(x: number): number;
function half(x: unknown) { return Number(x) / 2; }
class Horn<T extends Points> { #length = half(area); static of = (n: number) => new Horn(n); constructor(n: number) { this.#length = n; } get length() { return this.#length; } }
const sweep: Sweep = await background(sweepOf, dish, kind);
const list = [first, ...rest].map((one, i) => ({ one, [\`k\${i}\`]: one as number satisfies number }));
for (const unused of list) { console.log(unused!); }
let moving = 3;
note\`The dish is \${show(dish, "m", 2)} wide, \${list.length} points.\`;
margin(sweep, { mark: "warning" })\`\${kind === "smooth" ? "" : Horn.of(3).length}\`;
const late = () => after; const after = late ? 1 : 2;
`;

const TOKENS = [
  "(",
  ")",
  "{",
  "}",
  "[",
  "]",
  "`",
  "${",
  "'",
  '"',
  ";",
  ",",
  "=>",
  "=",
  "const ",
  "let ",
  "function ",
  "class ",
  "await ",
  "export ",
  "import ",
  "export default ",
  "type ",
  "enum E { A } ",
  "/*",
  "*/",
  "//",
  "\n",
  "\r\n",
  "\u2028",
  " a",
  " dish",
  "?.",
  "...",
  "yield ",
  "return ",
  "#x",
  "@d ",
  "0x",
  "1n",
  "\u0000",
  "💥",
  "<T>",
  "as any",
  "!",
  "in ",
  "of ",
  "async ",
  "static ",
  "declare ",
  "namespace N {} ",
  "label: ",
  "debugger;",
  "import x = y;",
  "export = 3;",
  "using u = 1;",
  "arguments",
  "new.target",
  "super",
  "with(a){}",
  "delete dish",
  "dish = 3",
  "given",
  "__proto__",
];

test("500 spoiled notebooks: problems with a place, lines kept, and what is compiled is TypeScript", async () => {
  const random = seededRandom(99);
  const upTo = (n: number) => Math.floor(random() * n);
  let unreadable = 0;
  for (let i = 0; i < 500; i++) {
    let source = GOOD;
    for (let edits = 1 + upTo(3); edits > 0; edits--) {
      const at = upTo(source.length);
      const kind = random();
      if (kind < 0.45) source = source.slice(0, at) + TOKENS[upTo(TOKENS.length)] + source.slice(at);
      else if (kind < 0.7) source = source.slice(0, at) + source.slice(at + 1 + upTo(6));
      else if (kind < 0.85) {
        const lines = source.split("\n");
        lines.splice(upTo(lines.length), 1, lines[upTo(lines.length)] as string);
        source = lines.join("\n");
      } else if (kind < 0.9) source = source.slice(0, at);
      else source = source.slice(0, at) + source.slice(upTo(source.length));
    }
    const { code, cells, problems } = compileNotebook(source, "notebooks/spoiled.ts");
    const lineCount = source.split(/\r\n|[\n\u2028\u2029]/).length;
    for (const problem of problems) {
      expect(problem.message, source).toMatch(/\S/);
      expect(problem.line).toBeGreaterThanOrEqual(1);
      expect(problem.line).toBeLessThanOrEqual(lineCount);
      expect(problem.column).toBeGreaterThanOrEqual(1);
    }
    expect(new Set(cells.map((cell) => cell.name)).size, source).toBe(cells.length);
    if (problems.some(({ kind }) => kind === "parse")) {
      unreadable++;
      expect(cells).toEqual([]);
      continue;
    }
    await expect(
      transform(code, { loader: "ts" }).then(() => "compiled"),
      source,
    ).resolves.toBe("compiled");
    const names = new Set(cells.map((cell) => cell.name));
    for (const cell of cells) expect(cell.inputs.filter((input) => !names.has(input))).toEqual([]);
    for (const { cell } of problems)
      if (cell !== undefined) expect(names.has(cell), `${cell} in\n${source}`).toBe(true);
  }
  expect(unreadable).toBeGreaterThan(100);
  expect(unreadable).toBeLessThan(450);
});
