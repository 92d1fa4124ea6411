import { expect, test } from "vitest";
import { studyValues } from "../../runtime/plain-values.ts";
import type { CellView, Study } from "../../runtime/study.ts";

/** A settled study of the given values; those that are errors have failed. */
function studyOf(values: Record<string, unknown>): Study {
  const cells = Object.entries(values).map(([name, value], i): CellView => {
    const failed = value instanceof Error;
    return {
      ...{ name, role: "value", inputs: [], hidden: name.startsWith("_"), line: i + 1, endLine: i + 1, source: "" },
      ...{ state: failed ? "failed" : "current", value: failed ? undefined : value, evaluations: 1 },
      ...(failed
        ? { failure: { reason: value.message, cell: "root", file: "a.ts", line: 7, path: ["root", name] } }
        : {}),
    };
  });
  return { file: "a.ts", cells, givens: [{ name: "d", value: 2.4 }] } as unknown as Study;
}

test("studyValues: plain data as it is; typed arrays, maps, sets and dates as JSON has them", () => {
  const { cells, givens, notebook } = studyValues(
    studyOf({
      number: 1.5,
      nested: { re: Float64Array.of(1, -2), list: [true, null, "x", undefined], none: undefined },
      map: new Map([["a", 1]]),
      set: new Set([1, 2]),
      when: new Date(Date.UTC(2001, 8, 9)),
      big: 10n,
      call: () => 1,
      keys: JSON.parse('{"__proto__": 1, "constructor": 2}'),
      _parts: 1,
    }),
  );
  expect(notebook).toBe("a.ts");
  expect(givens).toEqual({ d: 2.4 });
  expect(JSON.stringify(cells)).toBe(
    '{"number":1.5,"nested":{"re":[1,-2],"list":[true,null,"x",null]},"map":{"a":1},"set":[1,2],' +
      '"when":"2001-09-09T00:00:00.000Z","big":"10","keys":{"__proto__":1,"constructor":2}}',
  );
});

test("studyValues: a number that isn't finite, or a value that holds itself, is null and told by its place", () => {
  const ring: { self?: unknown } = {};
  ring.self = ring;
  const shared = { a: 1 };
  const { cells, warnings } = studyValues(
    studyOf({ a: { b: [0, Number.NaN] }, c: -1 / 0, ring, twice: [shared, shared] }),
  );
  expect(cells).toEqual({ a: { b: [0, null] }, c: null, ring: { self: null }, twice: [{ a: 1 }, { a: 1 }] });
  expect(warnings.map(({ cell, code, text }) => [cell, code, text])).toEqual([
    ["a", "not-finite", "a.b[1] is NaN"],
    ["c", "not-finite", "c is -Infinity"],
    ["ring", "not-finite", "ring.self holds itself"],
  ]);
});

test("studyValues: each warning once, by the first cell that carries it, and whether the page shows it", () => {
  const slow = { code: "slow", text: "takes 3 s (or more)" };
  const vague = { code: "precision-loss", text: "lost 4 digits" };
  const { warnings } = studyValues(
    studyOf({
      horn: { parts: [{ warnings: [slow] }], warnings: [vague] },
      trade: { rows: [{ warnings: [slow] }] },
      said: { shows: "note", markdown: "Mind: takes 3 s\n\\(or more\\)." },
      beside: { shows: "margin", mark: "warning", markdown: "too long by 1.4 mm" },
      again: { shows: "margin", mark: "warning", markdown: "It takes 3 s \\(or more\\)" },
      quiet: { shows: "margin", mark: "warning", markdown: "" },
    }),
  );
  expect(warnings).toEqual([
    { cell: "horn", code: "precision-loss", text: "lost 4 digits", shown: false },
    { cell: "horn", code: "slow", text: "takes 3 s (or more)", shown: true },
    { cell: "beside", code: "margin", text: "too long by 1.4 mm", shown: true },
  ]);
});

test("studyValues: a warning is shown also in a table's word or a figure's caption", () => {
  const shows = (text: string, where: unknown) =>
    studyValues(studyOf({ result: { warnings: [{ code: "slow", text }] }, where })).warnings[0]!.shown;
  const row = { label: "Horn", cells: [{ text: "3 s", word: "is slow" }] };
  expect(shows("is slow", { shows: "table", columns: [], rows: [row] })).toBe(true);
  expect(shows("is fast", { shows: "table", columns: [], rows: [row] })).toBe(false);
  expect(
    shows("far off", { shows: "figure", caption: "The dish, far off.", drawing: { alt: "", draw: () => null } }),
  ).toBe(true);
});

test("studyValues: a failed cell has no value but its reason and where it began", () => {
  const { cells, failed } = studyValues(studyOf({ fine: 1, lost: new RangeError("no such horn") }));
  expect(cells).toEqual({ fine: 1 });
  expect(failed).toEqual([
    { cell: "lost", reason: "no such horn", began: "root", file: "a.ts", line: 7, path: ["root", "lost"] },
  ]);
});
