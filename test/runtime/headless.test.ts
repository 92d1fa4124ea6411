import { readFileSync } from "node:fs";
import { dirname } from "node:path";
import { describe, expect, test } from "vitest";
import { CellError } from "../../runtime/cell-error.ts";
import { compileNotebook } from "../../runtime/compile.ts";
import { createStudy } from "../../runtime/engine.ts";
import { evaluateNotebook } from "../../runtime/headless.ts";
import { nonFinitePath } from "../../runtime/non-finite.ts";
import * as plain from "./fixtures/small-notebook.ts";
import { bundled, importText, loadNotebook } from "./load-notebook.ts";

const BODY = `
const dish = given("2.4 m", { label: "Dish", why: "", min: "0.3 m", max: "20 m" });
const area = Math.PI * (dish / 2) ** 2;
const sweep = { list: Float64Array.of(1, 2), gain: new Map([["x", NaN]]), warnings: [{ code: "slow", text: "took long" }] };
const half = () => dish / 2;
const bad = dish > 3 ? (() => { throw new RangeError("dish must fit the shop; got " + dish); })() : dish;
const after = bad * 2;
note\`Area \${area}\`;
`;

describe("evaluateNotebook", () => {
  test("SI numbers of all cells, warnings, no failures", async () => {
    const values = await evaluateNotebook(await loadNotebook(BODY));
    expect(values.notebook).toBe("notebooks/test.ts");
    expect(values.givens).toEqual({ dish: 2.4 });
    expect(values.cells).toMatchObject({
      area: Math.PI * 1.44,
      sweep: { list: [1, 2], gain: { x: null } },
      bad: 2.4,
      after: 4.8,
    });
    expect(values.cells).not.toHaveProperty("half");
    expect(values.warnings.map(({ cell, code }) => [cell, code])).toEqual([
      ["sweep", "slow"],
      ["sweep", "not-finite"],
    ]);
    expect(values.failed).toEqual([]);
    expect(JSON.parse(JSON.stringify(values))).toEqual(values);
  });

  test("with givens; a failed cell is listed with its path", async () => {
    const values = await evaluateNotebook(await loadNotebook(BODY), { givens: { dish: "400 cm" } });
    expect(values.givens).toEqual({ dish: 4 });
    expect(values.failed).toMatchObject([
      { cell: "bad", reason: "dish must fit the shop; got 4", line: 7, path: ["bad"] },
      { cell: "after", reason: "dish must fit the shop; got 4", line: 7, path: ["bad", "after"] },
    ]);
  });

  test.each([
    [{ dish: "4 Hz" }, "dish", "Dish must be a length between 0.3 m and 20 m; got 4 Hz, which is a frequency"],
    [{ nope: "4" }, "nope", 'there is no given "nope"; the givens are dish'],
  ])("refuses %j and evaluates nothing", async (givens, name, message) => {
    const started = (): never => expect.unreachable("nothing is evaluated");
    await expect(
      evaluateNotebook(await loadNotebook(BODY), { givens: givens as never, started }),
    ).rejects.toMatchObject({
      ...{ name: "GivenRefused", given: name, message },
    });
  });

  test("a notebook imported as a plain module has the same values, givens at their defaults", async () => {
    const file = new URL("./fixtures/small-notebook.ts", import.meta.url).pathname;
    const { code, problems, cells } = compileNotebook(readFileSync(file, "utf8"), "small-notebook.ts");
    expect(problems).toEqual([]);
    const { notebook } = await importText(await bundled(code, "small-notebook.ts", { from: dirname(file) }));
    const study = createStudy(notebook);
    await study.settled();
    const exported = Object.entries(plain);
    expect(exported.length).toBeGreaterThan(10);
    for (const [name, value] of exported) expect(study.cell(name).value, name).toEqual(value);
    expect(cells.filter(({ role }) => role === "given").map(({ name }) => name)).toEqual([
      "dish",
      "low",
      "kind",
      "blocked",
    ]);
    expect(cells.filter(({ background }) => background).map(({ name }) => name)).toEqual(["sweep"]);
    expect(study.cell("beside").beside).toBe("gains");
    study.set("dish", "94 in");
    await study.settled();
    expect(study.cell("radius").value).toBe(2.3876 / 2);
    study.dispose();
  });
});

describe("CellError", () => {
  test("names the cell, the file, the line and the way, and keeps the cause", async () => {
    const study = createStudy(await loadNotebook(BODY), { givens: { dish: "4 m" } });
    await study.settled();
    const { failure } = study.cell("after");
    if (!failure) throw new Error("after must have failed");
    const error = new CellError(failure);
    expect(error.message).toBe("bad (notebooks/test.ts, line 7): dish must fit the shop; got 4; needed by after");
    expect(error.cause).toBeInstanceOf(RangeError);
    expect(error).toMatchObject({ cell: "bad", file: "notebooks/test.ts", line: 7, path: ["bad", "after"] });
    study.dispose();
  });
});

describe("nonFinitePath", () => {
  const cyclic: { self?: unknown; n: number } = { n: 1 };
  cyclic.self = cyclic;
  test.each([
    [1, undefined],
    [Number.NaN, "the value is NaN"],
    [{ rows: [{ gain: 1 }, { gain: Number.POSITIVE_INFINITY }] }, "rows[1].gain is Infinity"],
    [Float64Array.of(0, Number.NaN), "[1] is NaN"],
    [{ a: new Map([["k", [Number.NEGATIVE_INFINITY]]]) }, "a.k[0] is -Infinity"],
    [new Set([1, Number.NaN]), "[1] is NaN"],
    [["NaN", null, undefined, () => Number.NaN, 1n, new Date(0), { re: 1, im: -2 }], undefined],
    [cyclic, undefined],
  ])("%#", (value, path) => {
    expect(nonFinitePath(value)).toBe(path);
  });
});
