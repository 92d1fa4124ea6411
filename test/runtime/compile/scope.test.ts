// biome-ignore-all lint/suspicious/noTemplateCurlyInString: notebooks stand here as texts
import { describe, expect, test } from "vitest";
import { compileNotebook } from "../../../runtime/compile.ts";

// The expected names are what ECMA-262 (scope of bindings, hoisting) and the TypeScript handbook (types are erased) say of each
// snippet: `x` is the cell under test; a, b, c, f are cells, defined before it.
const CELLS = "const a = 1; const b = { c: 2 }; const c = [3]; function f(v: unknown) { return v; }";

const inputsOf = (snippet: string, name = "x"): string[] => {
  const { cells, problems } = compileNotebook(`${CELLS}\n${snippet}\n`, "test.ts");
  expect(problems).toEqual([]);
  const cell = cells.find((one) => one.name === name);
  if (!cell) throw new Error(`no cell ${name}`);
  return [...cell.inputs].sort();
};

const table: [situation: string, snippet: string, inputs: string[]][] = [
  ["a plain reference", "const x = a + 1;", ["a"]],
  ["no reference", "const x = 1;", []],
  ["each once", "const x = a + a * a;", ["a"]],
  ["a member's name is no reference", "const x = b.c;", ["b"]],
  ["a computed member is one", "const x = b[a];", ["a", "b"]],
  ["optional chaining", "const x = b?.[a]?.c?.(c);", ["a", "b", "c"]],
  ["a key of an object literal is none", "const x = { a: 1, b: 2 };", []],
  ["a shorthand field is one", "const x = { a, b: 2 };", ["a"]],
  ["a computed key is one", "const x = { [a]: 1 };", ["a"]],
  ["spread", "const x = { ...b, z: [...c] };", ["b", "c"]],
  ["a method's name is none, its body is", "const x = { a() { return b; } };", ["b"]],
  ["getter and setter", "const x = { get a() { return b; }, set a(c) { f(c); } };", ["b", "f"]],
  ["a template literal", "const x = `a ${a} b ${`${b.c}`}`;", ["a", "b"]],
  ["a tagged template", "const x = String.raw`a ${a}`;", ["a"]],
  ["a regular expression", "const x = /a+b/g.test('a');", []],
  ["a closure", "const x = () => a;", ["a"]],
  ["a parameter shadows", "const x = (a: number) => a + c.length;", ["c"]],
  ["a default sees the outer name", "const x = (z = a) => z;", ["a"]],
  ["a default sees the parameter before it", "const x = (a: number, z = a) => z;", []],
  ["a default doesn't see the body's var", "const x = function (z = a) { var a = 2; return z + a; };", ["a"]],
  ["a parameter taken apart", "const x = ({ a, c: [b = f(1)] }: any) => a + b;", ["f"]],
  ["a rest parameter", "const x = (...a: number[]) => a.length;", []],
  ["a let in a block ends with it", "const x = () => { { let a = 1; f(a); } return a; };", ["a", "f"]],
  ["a var is lifted out of its block", "const x = () => { if (c) { var a = 1; } return a; };", ["c"]],
  [
    "a var is lifted out of loops, switch, try",
    "const x = () => { for (;;) { try { switch (1) { case 1: var a = 1; } } finally {} } return a; };",
    [],
  ],
  [
    "a var doesn't leave an inner function",
    "const x = () => { (() => { var a = 1; return a; })(); return a; };",
    ["a"],
  ],
  [
    "a function in a block is known before its line",
    "const x = () => { const r = a(); function a() { return 1; } return r; };",
    [],
  ],
  ["a function in a block ends with it", "const x = () => { { function a() { return 1; } a(); } return a; };", ["a"]],
  ["a let shadows in its whole block", "const x = () => { const g = () => a; let a = 1; return g() + a; };", []],
  [
    "a named function expression knows itself",
    "const x = function a(n: number): number { return n ? a(n - 1) : 0; };",
    [],
  ],
  ["a named class expression knows itself", "const x = class a { static of() { return new a(); } };", []],
  ["recursion is no input", "const x = (n: number): number => (n ? x(n - 1) : a);", ["a"]],
  [
    "a function declaration's recursion is no input",
    "function x(n: number): number { return n ? x(n - 1) : a; }",
    ["a"],
  ],
  ["a catch parameter", "const x = () => { try { return b; } catch (a) { return a; } };", ["b"]],
  ["a catch parameter taken apart", "const x = () => { try { return 1; } catch ({ a = c }) { return a; } };", ["c"]],
  ["a catch without parameter", "const x = () => { try { return 1; } catch { return a; } };", ["a"]],
  ["a label is none", "const x = () => { a: for (const i of c) { if (i) continue a; break a; } };", ["c"]],
  ["a loop's own names", "const x = () => { for (let a = 0; a < 3; a++) f(a); };", ["f"]],
  ["for of", "const x = () => { for (const a of c) f(a); return a; };", ["a", "c", "f"]],
  ["for of, taken apart with a default", "const x = () => { for (const { a = b } of c) f(a); };", ["b", "c", "f"]],
  ["for in", "const x = () => { for (const a in b) f(a); };", ["b", "f"]],
  [
    "a switch is one block",
    "const x = (n: number) => { switch (n) { case 0: let a = 1; return a; default: return b; } };",
    ["b"],
  ],
  ["destructuring into a hidden cell", "const { x, y = a } = f(b) as any;", ["{ x, y }"]],
  ["arguments", "const x = function () { return arguments.length + a; };", ["a"]],
  ["typeof is a reference", "const x = typeof a;", ["a"]],
  ["typeof of a name that may not exist", "const x = typeof somewhere === 'undefined' ? a : 1;", ["a"]],
  ["new and instanceof", "const x = new Map([[a, b]]) instanceof Map;", ["a", "b"]],
  ["an immediately called function", "const x = (() => { const a = 2; return a + c.length; })();", ["c"]],
  ["an async arrow", "const x = async () => (await f(a)) as number;", ["a", "f"]],
  ["a generator", "const x = function* () { yield a; yield* c; };", ["a", "c"]],
  ["meta properties and literals", "const x = import.meta.url + 1n + 0x1f + Infinity + Number(undefined) + NaN;", []],
  ["a sequence", "const x = (a, b);", ["a", "b"]],
  [
    "an assignment to a local",
    "const x = () => { let z; z = a; [z] = c; ({ c: z = 1 } = b); return z; };",
    ["a", "b", "c"],
  ],
  ["a dynamic import's argument", "const x = () => import(`./${a}.ts`);", ["a"]],
  // classes
  [
    "a class: parent, static, method, field",
    "class x extends (f(Object) as any) { static s = a; #p = b; m() { return c; } }",
    ["a", "b", "c", "f"],
  ],
  [
    "a class: names of members are none",
    "class x { a = 1; b() {} static c = 2; #f = 3; get f() { return this.#f; } }",
    [],
  ],
  ["a class: computed keys", "class x { [`m${a}`]() {} static [String(b.c)] = 1; }", ["a", "b"]],
  ["a class: private name in object", "class x { #a = 1; has(o: object) { return #a in o; } }", []],
  ["a class: static block", "class x { static { const a = 1; f(a); var b = 2; f(b); } }", ["f"]],
  ["a class: constructor parameters", "class x { constructor(a: number, z = b) { f(a); f(z); } }", ["b", "f"]],
  ["a class: knows itself", "class x { static made = () => new x(); }", []],
  // types
  ["a type annotation", "const x: typeof a = 1;", []],
  ["typeof in a type, as", "const x = 1 as typeof b.c;", []],
  ["satisfies", "const x = { z: c } satisfies Record<string, typeof a>;", ["c"]],
  ["non-null, angle brackets", "const x = (<number>a)! + b!.c;", ["a", "b"]],
  ["type arguments of a call", "const x = f<typeof a>(b);", ["b", "f"]],
  ["type arguments of new", "const x = new Map<typeof a, keyof typeof b>();", []],
  ["an instantiation expression", "const x = f<typeof a>;", ["f"]],
  ["parameter and return types", "function x<T extends typeof a>(z: T): z is T & typeof b { return Boolean(z); }", []],
  ["a type predicate's and `this` parameter", "const x = function (this: typeof a, z: typeof b) { return z; };", []],
  [
    "an inner type and interface",
    "const x = () => { type A = typeof a; interface B { b: typeof b } return (z: A & B) => z; };",
    [],
  ],
  [
    "implements and index signature",
    "interface I { c: number } class x implements I { c = 1; [k: string]: typeof a; }",
    [],
  ],
  ["declare field and abstract method", "abstract class x { declare a: typeof b; abstract c(): typeof c; }", []],
  [
    "an overloaded function",
    "function x(z: number): number;\nfunction x(z: string): string;\nfunction x(z: any) { return f(z); }",
    ["f"],
  ],
  ["a conditional type on a cell", "const x = null as unknown as (typeof a extends number ? typeof b : typeof c);", []],
  ["an optional parameter with a type", "const x = (a?: typeof b, ...z: (typeof c)[]) => [a, z];", []],
];

describe("inputs of a cell", () => {
  test.each(table)("%s", (_, snippet, inputs) => {
    expect(inputsOf(snippet)).toEqual(inputs);
  });

  test("a destructuring: parts read the hidden cell, which reads the rest", () => {
    const snippet = "const { x, b: [y = a, ...z], ...w } = f(c) as any;";
    expect(inputsOf(snippet, "x")).toEqual(["{ x, y, z, w }"]);
    expect(inputsOf(snippet, "w")).toEqual(["{ x, y, z, w }"]);
    expect(inputsOf(snippet, "{ x, y, z, w }")).toEqual(["a", "c", "f"]);
  });

  test("a destructuring: a default may use a part before it", () => {
    expect(inputsOf("const [x, y = x] = c;", "{ x, y }")).toEqual(["c"]);
  });

  test("one statement, several cells", () => {
    expect(inputsOf("const w = a, x = w + 1, { y } = b as any;")).toEqual(["w"]);
    expect(inputsOf("const w = a, x = w + 1, { y } = b as any;", "{ y }")).toEqual(["b"]);
  });

  test("types, imports and ambient names are no cells", () => {
    const source = `import { p, type Q } from "./p.ts"; import type R from "./r.ts"; import s, * as t from "./s.ts";
interface I { a: number } type T = I & Q & R; declare const ambient: T; export type { T };
const x = [p, s, t.u, ambient] as unknown as T[];`;
    const { cells, problems } = compileNotebook(source, "test.ts");
    expect(problems).toEqual([]);
    expect(cells.map(({ name, inputs, imports }) => ({ name, inputs, imports }))).toEqual([
      { name: "x", inputs: [], imports: ["p", "s", "t"] },
    ]);
  });

  test("a function's body may refer to a later cell", () => {
    expect(inputsOf("const x = () => later; const later = a;")).toEqual(["later"]);
    expect(inputsOf("const x = early(); function early() { return a; }")).toEqual(["early"]);
  });
});
