// The running study, state by state. Long, because every way into a state is one test.

import { describe, expect, test } from "vitest";
import { createStudy } from "../../../runtime/engine.ts";
import type { CellState, NotebookModule, Study } from "../../../runtime/study.ts";
import { loadNotebook } from "../load-notebook.ts";

const GIVENS = `
const a = given("1", { label: "A", why: "", min: -1000, max: 1000 });
const b = given("2 m", { label: "B", why: "wide", min: "0 m", max: "20 m", step: "10 cm" });`;

const states = (study: Study): Record<string, CellState> =>
  Object.fromEntries(study.cells.map((cell) => [cell.name, cell.state]));
const counts = (study: Study): Record<string, number> =>
  Object.fromEntries(study.cells.map((cell) => [cell.name, cell.evaluations]));
const ticks = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

/** A promise with its handles, by name: an async cell of the test waits for it. */
class Gates {
  readonly open = new Map<string, (value?: unknown) => void>();
  wait = (name: string): Promise<unknown> => new Promise((resolve) => this.open.set(name, resolve));
}

/** A small hand-written notebook: cells as functions, names of inputs from their parameters. */
function handmade(cells: Record<string, (...inputs: never[]) => unknown>, file = "notebooks/hand.ts"): NotebookModule {
  return {
    file,
    source: "",
    backgroundFunctions: {},
    cells: Object.entries(cells).map(([name, define], i) => {
      const inputs = (/\(([^)]*)\)/.exec(define.toString())?.[1] ?? "")
        .split(",")
        .map((one) => one.trim())
        .filter(Boolean);
      const given = define.toString().includes("declares");
      return {
        ...{ name, inputs, role: given ? "given" : "value", background: false, line: i + 1, endLine: i + 1 },
        ...{ source: define.toString(), define: define as never },
      };
    }),
  };
}

const number = (value: number) => () => ({
  ...{
    declares: "given",
    form: "quantity",
    label: "N",
    why: "",
    unit: "",
    defaultText: String(value),
    default: value,
    min: -1e6,
    max: 1e6,
  },
});

describe("states", () => {
  test("before the first pass everything is behind, without a value", async () => {
    const study = createStudy(await loadNotebook(`${GIVENS}\nconst x = a * 2;`));
    expect(states(study)).toEqual({ a: "current", b: "current", x: "behind" });
    expect(study.cell("x").value).toBeUndefined();
    await study.settled();
    expect(states(study)).toEqual({ a: "current", b: "current", x: "current" });
    study.dispose();
  });

  test("an async cell works; what reads it stays behind with its old value", async () => {
    const gates = new Gates();
    const n = number(1);
    const notebook = handmade({
      n: () => ({ ...n(), declares: "given" }),
      slow: async (n: number) => {
        await gates.wait(`slow ${n}`);
        return n * 10;
      },
      reads: (slow: number) => slow + 1,
      quick: (n: number) => n + 1,
    });
    const study = createStudy(notebook);
    await ticks(5);
    expect(states(study)).toEqual({ n: "current", slow: "working", reads: "behind", quick: "current" });
    gates.open.get("slow 1")?.();
    await study.settled();
    expect(study.cell("reads").value).toBe(11);
    study.set("n", "2");
    expect(states(study)).toEqual({ n: "current", slow: "behind", reads: "behind", quick: "behind" });
    expect(study.cell("reads").value).toBe(11);
    await ticks(5);
    expect(states(study)).toEqual({ n: "current", slow: "working", reads: "behind", quick: "current" });
    expect([study.cell("slow").value, study.cell("reads").value]).toEqual([10, 11]);
    // The newest begins while the former is still under way, and the former's result is dropped.
    study.set("n", "3");
    await ticks(5);
    expect(gates.open.has("slow 3")).toBe(true);
    gates.open.get("slow 3")?.();
    await study.settled();
    expect([study.cell("slow").value, study.cell("reads").value]).toEqual([30, 31]);
    gates.open.get("slow 2")?.();
    await ticks(5);
    expect([study.cell("slow").value, study.cell("reads").value]).toEqual([30, 31]);
    expect(counts(study)).toEqual({ n: 3, slow: 3, reads: 2, quick: 3 });
    study.dispose();
  });

  test("a failure names the cell where it began, the file, the line and the path; the rest lives", async () => {
    const study = createStudy(
      await loadNotebook(`${GIVENS}
const root = Math.sqrt(a);
const checked = ((x: number) => { if (!(x > 0.5)) throw new RangeError("root must be above 0.5; got " + x); return x; })(root);
const one = checked + 1;
const two = one + b;
const apart = b * 2;
`),
    );
    await study.settled();
    expect(study.cell("two").value).toBe(4);
    study.set("a", "0");
    await study.settled();
    expect(states(study)).toMatchObject({
      root: "current",
      checked: "failed",
      one: "failed",
      two: "failed",
      apart: "current",
    });
    expect(study.cell("two").failure).toMatchObject({
      ...{ reason: "root must be above 0.5; got 0", cell: "checked", file: "notebooks/test.ts", line: 6 },
      path: ["checked", "one", "two"],
    });
    expect(study.cell("two").value).toBeUndefined();
    expect(study.cell("two").failure?.cause).toBeInstanceOf(RangeError);
    const before = counts(study);
    study.set("a", "4");
    await study.settled();
    expect(states(study)).toMatchObject({ checked: "current", two: "current" });
    expect(study.cell("two").value).toBe(5);
    expect(counts(study)).toEqual({ ...before, a: 3, root: 3, checked: 3, one: 2, two: 2 });
    study.dispose();
  });

  test.each([
    ["a text", 'throw "no";', "threw no"],
    ["nothing", "throw undefined;", "threw undefined"],
    ["an error without words", "throw new TypeError();", "TypeError"],
    ["several lines", 'throw new Error("a\\n  b");', "a b"],
    ["a rejected promise", 'return Promise.reject(new Error("late"));', "late"],
  ])("whatever is thrown becomes one sentence: %s", async (_, body, reason) => {
    const study = createStudy(await loadNotebook(`const x = (() => { ${body} })();`));
    await study.settled();
    expect(study.cell("x").failure?.reason).toBe(reason);
    study.dispose();
  });

  test("a value may be anything: a function, a class, a generator, null, undefined, NaN", async () => {
    const study = createStudy(
      await loadNotebook(`
function* values() { yield 1; }
const generator = values();
const nothing = undefined; const none = null; const nan = NaN;
class K { n = 3; }
const all = [...generator, nothing, none, nan, new K().n];
`),
    );
    await study.settled();
    expect(study.cell("all").value).toEqual([1, undefined, null, Number.NaN, 3]);
    expect(new Set(Object.values(states(study)))).toEqual(new Set(["current"]));
    study.dispose();
  });
});

describe("givens", () => {
  test("a refused text leaves everything as it was and is kept as the given's refusal", async () => {
    const study = createStudy(await loadNotebook(`${GIVENS}\nconst x = a * b;`));
    await study.settled();
    const before = counts(study);
    const message = "B must be a length between 0 m and 20 m; got 8 GHz, which is a frequency";
    expect(study.set("b", "8 GHz")).toEqual({ ok: false, message });
    expect(study.givens[1]).toMatchObject({ text: "2 m", value: 2, refusal: { entered: "8 GHz", message } });
    await study.settled();
    expect(counts(study)).toEqual(before);
    expect(study.cell("x").state).toBe("current");
    expect(study.set("b", "3 m")).toEqual({ ok: true });
    expect(study.givens[1]?.refusal).toBeUndefined();
    study.dispose();
  });

  test("an equal value in other words changes the field and evaluates nothing", async () => {
    const study = createStudy(await loadNotebook(`${GIVENS}\nconst x = a * b;`));
    await study.settled();
    const before = counts(study);
    expect(study.set("b", "200cm")).toEqual({ ok: true });
    expect(study.givens[1]).toMatchObject({ text: "200 cm", value: 2, defaultText: "2 m", unit: "m", step: 0.1 });
    expect(study.cell("x").state).toBe("current");
    await study.settled();
    expect(counts(study)).toEqual(before);
    study.dispose();
  });

  test("several at once: one evaluation; one refusal leaves all as they were", async () => {
    const study = createStudy(await loadNotebook(`${GIVENS}\nconst x = a * b;`));
    await study.settled();
    expect(study.setAll({ a: "5", b: "30 m" })).toMatchObject({ ok: false, name: "b" });
    expect(study.cell("a").value).toBe(1);
    expect(study.setAll({ a: "5", b: "3 m" })).toEqual({ ok: true });
    await study.settled();
    expect(study.cell("x").value).toBe(15);
    expect(study.cell("x").evaluations).toBe(2);
    study.set("a", "6");
    study.set("a", "7");
    study.set("b", "4");
    await study.settled();
    expect([study.cell("x").value, study.cell("x").evaluations]).toEqual([28, 3]);
    study.reset();
    await study.settled();
    expect([study.cell("x").value, study.givens.map((given) => given.text)]).toEqual([2, ["1", "2 m"]]);
    study.dispose();
  });

  test("an unknown name", async () => {
    const study = createStudy(await loadNotebook(`${GIVENS}\nconst x = a * b;`));
    expect(study.set("x", "3")).toEqual({ ok: false, message: 'there is no given "x"; the givens are a, b' });
    expect(study.set("__proto__", "3")).toMatchObject({ ok: false });
    expect(() => study.cell("nope")).toThrow('there is no cell "nope" in notebooks/test.ts');
    study.dispose();
  });

  test("a study begins with the texts it is handed; what doesn't fit is refused", async () => {
    const study = createStudy(await loadNotebook(`${GIVENS}\nconst x = a * b;`), {
      givens: { a: "7", b: "wide", gone: "1" },
    });
    await study.settled();
    expect(study.cell("x").value).toBe(14);
    expect(study.givens[1]?.refusal?.message).toBe(
      "B must be a length between 0 m and 20 m; got wide, which is not a number",
    );
    study.dispose();
  });

  test("a declaration that is wrong fails its cell, says so when entered, and leaves the rest alive", async () => {
    const study = createStudy(
      await loadNotebook(`
const low = given("2 m", { label: "Low", why: "", min: "3 m", max: "5 m" });
const good = given("2 m", { label: "Good", why: "", min: "1 m", max: "5 m" });
const x = low * 2; const y = good * 2;`),
    );
    await study.settled();
    expect(states(study)).toEqual({ low: "failed", good: "current", x: "failed", y: "current" });
    expect(study.cell("x").failure).toMatchObject({ cell: "low", line: 3, path: ["low", "x"] });
    expect(study.cell("x").failure?.reason).toMatch(
      /^given: the default is refused: Low must be a length between 3 m and 5 m; got 2 m$/,
    );
    expect(study.set("low", "4 m")).toMatchObject({
      ok: false,
      message: expect.stringMatching(/^low can't be entered: its own declaration is wrong/),
    });
    study.dispose();
  });

  test("choice, switch and text", async () => {
    const study = createStudy(
      await loadNotebook(`
const kind = given.choice(["smooth", "dualMode"], { label: "Kind", why: "", default: "dualMode" });
const rings = given.switch(false, { label: "Rings", why: "" });
const name = given.text("Hill", { label: "Site", why: "", longest: 10 });
const x = [kind, rings, name];`),
    );
    await study.settled();
    expect(study.cell("x").value).toEqual(["dualMode", false, "Hill"]);
    expect(study.setAll({ kind: " smooth ", rings: "Yes", name: "<b>" })).toEqual({ ok: true });
    await study.settled();
    expect(study.cell("x").value).toEqual(["smooth", true, "<b>"]);
    expect(study.givens.map(({ form, text }) => [form, text])).toEqual([
      ["choice", "smooth"],
      ["switch", "on"],
      ["text", "<b>"],
    ]);
    expect(study.set("kind", "round")).toEqual({
      ok: false,
      message: "Kind must be one of smooth, dualMode; got round",
    });
    expect(study.set("rings", "maybe")).toEqual({ ok: false, message: "Rings must be on or off; got maybe" });
    expect(study.set("name", "far too long")).toEqual({
      ok: false,
      message: "Site must be at most 10 characters long; got 12",
    });
    study.dispose();
  });
});

describe("listeners", () => {
  test("one call for a burst, with all that changed and nothing else", async () => {
    const study = createStudy(
      await loadNotebook(`${GIVENS}\nconst x = a * 2; const y = x + 1; const z = y + x; const apart = b;`),
    );
    const calls: string[][] = [];
    const leave = study.subscribe((changed) => calls.push(changed.map((cell) => `${cell.name} ${cell.state}`).sort()));
    await study.settled();
    await ticks(2);
    expect(calls).toHaveLength(1);
    study.set("a", "2");
    study.set("a", "3");
    await study.settled();
    await ticks(2);
    expect(calls.slice(1)).toEqual([["a current", "x current", "y current", "z current"]]);
    study.set("a", "nonsense");
    await ticks(2);
    expect(calls.slice(2)).toEqual([["a current"]]);
    leave();
    study.set("a", "5");
    await study.settled();
    await ticks(2);
    expect(calls).toHaveLength(3);
    study.dispose();
  });

  test("a listener may set a given", async () => {
    const study = createStudy(await loadNotebook(`${GIVENS}\nconst x = a * 2;`));
    study.subscribe(() => {
      if (Number(study.cell("a").value) < 5) study.set("a", String(Number(study.cell("a").value) + 1));
    });
    await ticks(50);
    expect(study.cell("x").value).toBe(10);
    study.dispose();
  });
});

describe("stop and again", () => {
  test("a stopped cell stays behind, and so does what reads it, until asked again or an input moves", async () => {
    const gates = new Gates();
    const study = createStudy(
      handmade({
        n: () => ({ ...number(1)(), declares: "given" }),
        m: () => ({ ...number(1)(), declares: "given" }),
        slow: (n: number) => gates.wait(`slow ${n}`),
        reads: (slow: number, m: number) => [slow, m],
      }),
    );
    await ticks(5);
    study.stop("slow");
    await study.settled();
    expect(states(study)).toMatchObject({ slow: "behind", reads: "behind" });
    study.set("m", "2");
    await study.settled();
    expect(states(study)).toMatchObject({ slow: "behind", reads: "behind" });
    study.again("reads");
    await ticks(5);
    expect(states(study)).toMatchObject({ slow: "working", reads: "behind" });
    gates.open.get("slow 1")?.("done");
    await study.settled();
    expect(study.cell("reads").value).toEqual(["done", 2]);
    expect(study.cell("reads").evaluations).toBe(1);
    study.set("n", "2");
    await ticks(5);
    study.stop("slow");
    expect(states(study)).toMatchObject({ slow: "behind", reads: "behind" });
    expect(study.cell("slow").value).toBe("done");
    study.set("n", "3");
    await ticks(5);
    expect(study.cell("slow").state).toBe("working");
    gates.open.get("slow 3")?.("third");
    await study.settled();
    expect(study.cell("reads").value).toEqual(["third", 2]);
    study.stop("slow");
    expect(study.cell("slow").state).toBe("current");
    study.dispose();
  });

  test("again evaluates a cell and its downstream once more", async () => {
    let calls = 0;
    const study = createStudy(handmade({ x: () => ++calls, y: (x: number) => x * 10, z: () => 0 }));
    await study.settled();
    study.again("x");
    expect(states(study)).toEqual({ x: "behind", y: "behind", z: "current" });
    await study.settled();
    expect([study.cell("y").value, counts(study)]).toEqual([20, { x: 2, y: 2, z: 1 }]);
    study.dispose();
  });
});

describe("robustness", () => {
  test("a cycle in a module from elsewhere is printed", async () => {
    const study = createStudy(
      handmade({ x: (z: number) => z, y: (x: number) => x, z: (y: number) => y, apart: () => 1 }),
    );
    await study.settled();
    expect(states(study)).toEqual({ x: "failed", y: "failed", z: "failed", apart: "current" });
    expect(study.cell("x").failure?.reason).toBe("x needs its own value: x → z → y → x");
    study.dispose();
  });

  test("names that the reactive library or JavaScript gives a meaning", async () => {
    const study = createStudy(
      handmade({
        invalidation: () => 1,
        visibility: (invalidation: number) => invalidation + 1,
        constructor: (visibility: number) => visibility + 1,
      }),
    );
    await study.settled();
    expect(study.cell("constructor").value).toBe(3);
    study.dispose();
  });

  test("dispose: nothing is evaluated any more, and nobody waits for ever", async () => {
    const gates = new Gates();
    const study = createStudy(handmade({ slow: () => gates.wait("x"), reads: (slow: number) => slow }));
    const settled = study.settled();
    await ticks(5);
    study.dispose();
    await settled;
    gates.open.get("x")?.(1);
    await ticks(5);
    expect(study.cell("reads").evaluations).toBe(0);
  });

  test("frozen: a cell that changes what it received fails, and what it received stays", async () => {
    const study = createStudy(
      await loadNotebook("const list = [3, 1, 2]; const sorted = list.sort(); const copy = [...list].sort();"),
      { frozen: true },
    );
    await study.settled();
    expect(states(study)).toEqual({ list: "current", sorted: "failed", copy: "current" });
    expect(study.cell("list").value).toEqual([3, 1, 2]);
    study.dispose();
  });
});
