// Every word of the vocabulary with what it takes and refuses. Long, because they are many.

import fc from "fast-check";
import { marked } from "marked";
import { describe, expect, test } from "vitest";
import {
  background,
  caution,
  figure,
  given,
  head,
  lead,
  margin,
  markdown,
  note,
  rationale,
  restsOn,
  show,
  table,
} from "../../runtime/index.ts";
import type { Progress } from "../../runtime/vocabulary.ts";

const about = { label: "Dish diameter", why: "the rim we own" };

describe("given, in a plain module", () => {
  test("returns its SI default", () => {
    expect(given("2.4 m", { ...about, min: "0.3 m", max: "20 m" })).toBe(2.4);
    expect(given("8.4 GHz", { ...about, min: "8000 MHz", max: 9, step: "25 MHz" })).toBe(8.4e9);
    expect(given("0.8", { ...about, min: 0.25, max: 2 })).toBe(0.8);
    expect(given("11 dB", { ...about, min: 0, max: 30 })).toBe(11);
    expect(given.choice(["smooth", "dualMode"], about)).toBe("smooth");
    expect(given.choice(["smooth", "dualMode"], { ...about, default: "dualMode" })).toBe("dualMode");
    expect(given.switch(true, about)).toBe(true);
    expect(given.text("Hill", about)).toBe("Hill");
  });

  test.each([
    [
      "out of its own range",
      () => given("30 m", { ...about, min: "30 cm", max: "20 m" }),
      "given: the default is refused: Dish diameter must be a length between 30 cm and 20 m; got 30 m",
    ],
    [
      "no label",
      () => given("2.4 m", { label: " ", why: "", min: 1, max: 3 }),
      "given: a given needs a label, the words that name it on the page; the one of 2.4 m has none",
    ],
    ["no options at all", () => given("2.4 m", undefined as never), "given: a given needs a label"],
    ["no limit", () => given("2.4 m", { ...about, min: "1 m" } as never), "given: Dish diameter needs its max"],
    [
      "limits the wrong way round",
      () => given("2.4 m", { ...about, min: 3, max: 2 }),
      "given: Dish diameter must have min below max; got 3 and 2",
    ],
    [
      "a limit of another kind",
      () => given("2.4 m", { ...about, min: "1 Hz", max: 3 }),
      "given: Dish diameter must be a length; got 1 Hz, which is a frequency",
    ],
    [
      "a default that is no quantity",
      () => given("wide", { ...about, min: 1, max: 3 }),
      "given: Dish diameter must be a number with its unit",
    ],
    [
      "a step of nothing",
      () => given("2.4 m", { ...about, min: 1, max: 3, step: 0 }),
      "must have a positive step; got 0",
    ],
    [
      "a choice of one",
      () => given.choice(["a"], about),
      "given.choice: Dish diameter must offer at least two different options",
    ],
    [
      "a default that is no option",
      () => given.choice(["a", "b"], { ...about, default: "c" as never }),
      "Dish diameter must be one of a, b; got c",
    ],
    [
      "a switch of text",
      () => given.switch("yes" as never, about),
      "given.switch: Dish diameter must be true or false; got yes",
    ],
  ])("refuses %s", (_, declare, message) => {
    expect(declare).toThrow(message);
  });
});

describe("show", () => {
  test.each([
    [2.4, "m", 2, "2.40 m"],
    [8.025e9, "GHz", 3, "8.025 GHz"],
    [-23.56, "dB", 1, "−23.6 dB"],
    [(34.7 * Math.PI) / 180, "deg", 1, "34.7°"],
    [0.6214, "%", 1, "62.1 %"],
    [0.0003, "mm", 1, "0.3 mm"],
    [290, "K", 0, "290 K"],
    [-0.0001, "m", 2, "0.00 m"],
    [0.8, "", 2, "0.80"],
    [12345.678, "", undefined, "12346"],
    [0.605629, undefined, undefined, "0.6056"],
    [3e-7, "", undefined, "3×10⁻⁷"],
    [-1.25e9, "", undefined, "−1.25×10⁹"],
    [0, "m", undefined, "0 m"],
    [52.4, "W/m²", 1, "52.4 W/m²"],
    [2.7e3, "g/cm^3", 2, "2.70 g/cm³"],
  ])("%d in %s to %s places: %s", (value, unit, digits, text) => {
    // The space before the unit doesn't break.
    expect(show(value, unit, digits)).toBe(text.replace(" ", "\u00a0"));
  });

  test.each([
    [Number.NaN, "dB", 1, "show: value must be finite; got NaN for a quantity in dB"],
    [Number.NEGATIVE_INFINITY, "", 1, "show: value must be finite; got -Infinity"],
    ["3" as never, "m", 1, "show: value must be a number; got string"],
    [3, "furlings", 1, '"furlings" is not a unit known here'],
    [3, "m", -1, "show: digits must be a whole number from 0 to 15; got -1"],
  ])("refuses %s in %s", (value, unit, digits, message) => {
    expect(() => show(value, unit, digits)).toThrow(message);
  });
});

describe("prose", () => {
  test("numbers, texts, lists, nested notes", () => {
    expect(
      note`Rim at ${0.605629} rad, ${show(0.605629, "deg", 1)}; ${["a", 2]}; ${true}; ${note`**n** ${1}`}`,
    ).toEqual({
      shows: "note",
      markdown: "Rim at 0.6056 rad, 34.7°; a, 2; yes; **n** 1",
    });
    expect(lead`x`.shows).toBe("lead");
    expect(caution("Radiation")`Keep ${3} m away.`).toEqual({
      shows: "caution",
      title: "Radiation",
      markdown: "Keep 3 m away.",
    });
    expect(note`${markdown("**strong**")}`.markdown).toBe("**strong**");
  });

  test("indentation of the source is no markup", () => {
    const text = note`
      ## Title

      Words
        - item ${1}
    `;
    expect(text.markdown).toBe("## Title\n\nWords\n  - item 1");
  });

  test.each([
    [() => note`${undefined}`, "note: value 1 in the text must be a number or text; got undefined"],
    [() => note`${1} ${null}`, "note: value 2 in the text must be a number or text; got null"],
    [() => note`${{}}`, "got an object"],
    [() => lead`${Number.NaN}`, "lead: value 1 in the text must be finite; got NaN"],
    [() => margin(1)`${[1, Number.POSITIVE_INFINITY]}`, "margin: value 1 in the text must be finite; got Infinity"],
  ])("refuses what has no place in prose: %#", (write, message) => {
    expect(write).toThrow(message);
  });

  test("text from outside is never markup: the page's Markdown reader gives back the very text", () => {
    const words = fc.array(
      fc.constantFrom(
        "<script>alert(1)</script>",
        "**b**",
        "_i_",
        "`c`",
        "[l](javascript:x)",
        "![i](x)",
        "# h",
        "> q",
        "- l",
        "1. l",
        "2) l",
        "| t |",
        "~~d~~",
        "http://a.b",
        "www.a.b",
        "a@b.c",
        "&lt;",
        "&amp;amp;",
        "\\",
        "---",
        "===",
        "```",
        "    code",
        "<!-- c -->",
        "x",
        "7",
        " ",
        "\n",
        "\n\n",
        "\r\n",
        "\u2028",
      ),
      { maxLength: 8 },
    );
    const plain = (html: string) =>
      html
        .replace(/&lt;/g, "<")
        .replace(/&gt;/g, ">")
        .replace(/&quot;/g, '"')
        .replace(/&#39;/g, "'")
        .replace(/&amp;/g, "&");
    fc.assert(
      fc.property(words, (parts) => {
        const text = parts.join("");
        const html = marked.parse(note`${text}`.markdown, { async: false, gfm: true });
        expect(html.replace(/<\/?p>/g, "")).not.toMatch(/<[a-z!/]/i);
        const squeezed = (one: string) => one.replace(/\s+/g, " ").trim();
        expect(squeezed(plain(html.replace(/<\/?p>/g, "")))).toBe(squeezed(text));
      }),
      { seed: 45, numRuns: 2000 },
    );
  });
});

describe("head, margin, figure, table", () => {
  test("head: facts are texts; more than six are refused", () => {
    expect(
      head({
        document: "Memo",
        title: "Feed",
        facts: [
          ["Dish", "2.40 m"],
          ["f/D", 0.8],
        ],
      }).facts,
    ).toEqual([
      ["Dish", "2.40 m"],
      ["f/D", "0.8"],
    ]);
    expect(() => head({ document: "", title: "x", facts: Array(7).fill(["a", "b"]) })).toThrow("six at most; got 7");
    expect(() => head({ document: "", title: "", facts: [] })).toThrow("title");
  });

  test("margin: mark, row, empty text", () => {
    expect(margin({}, { mark: "warning", row: "dualMode" })`x`).toEqual({
      shows: "margin",
      mark: "warning",
      row: "dualMode",
      markdown: "x",
    });
    expect(margin({})`  `).toEqual({ shows: "margin", mark: "reading", markdown: "" });
  });

  test("figure: needs a text alternative, a way to draw, a caption", () => {
    const drawing = { alt: "a dish", draw: () => ({}) as Element };
    expect(figure(drawing, { caption: "The dish." })).toEqual({ shows: "figure", caption: "The dish.", drawing });
    expect(() => figure({ ...drawing, alt: "" }, { caption: "x" })).toThrow("text alternative");
    expect(() => figure(drawing, {} as never)).toThrow("caption");
    expect(() => figure(undefined as never, { caption: "x" })).toThrow("drawing");
  });

  test("table: texts and numbers become cells; a row that doesn't fit is named", () => {
    const shown = table({
      columns: ["Smooth", { label: "Dual mode", kind: "dualMode" }],
      rows: [
        {
          label: "Gain",
          under: "dBi",
          cells: [show(45.61, "", 1), { text: "46.0", word: "passes", verdict: "passes" }],
        },
        { label: "Length", key: "length", cells: "not realisable: too short" },
        { label: "Count", cells: [3, 4.00001] },
      ],
      caption: "At band centre.",
    });
    expect(shown).toMatchObject({
      shows: "table",
      columns: [{ label: "Smooth" }, { label: "Dual mode", kind: "dualMode" }],
    });
    expect(shown.rows.map((row) => row.cells)).toEqual([
      [{ text: "45.6" }, { text: "46.0", word: "passes", verdict: "passes" }],
      "not realisable: too short",
      [{ text: "3" }, { text: "4" }],
    ]);
    expect(() => table({ columns: ["a", "b"], rows: [{ label: "Gain", cells: ["1"] }] })).toThrow(
      'table: row "Gain" must have 2 cells, one a column; got 1',
    );
    expect(() => table({ columns: ["a"], rows: [{ label: "Gain", cells: [Number.NaN] }] })).toThrow("finite");
  });
});

test("background, in a plain module: calls the function", async () => {
  const heavy = (a: number, b: { c: number }, progress?: Progress) => {
    progress?.(0.5);
    return a + b.c;
  };
  const sum: number = await background(heavy, 1, { c: 2 });
  expect(sum).toBe(3);
  expect(await background(async (text: string) => text.length, "four")).toBe(4);
  await expect(
    background(() => {
      throw new RangeError("no");
    }),
  ).rejects.toThrow("no");
});

test("background: the argument list is checked against the function's own, progress left out and nothing else", () => {
  const banded = (d: number, band: readonly [number, number], progress?: Progress) => ({ d, band, progress });
  const optional = (d: number, options?: { x: number }, progress?: Progress) => ({ d, options, progress });
  const typed = () => {
    const result: Promise<{ d: number }> = background(banded, 1, [1, 2]);
    // @ts-expect-error a third frequency
    void background(banded, 1, [1, 2, 3]);
    // @ts-expect-error an optional argument left out would let progress slip into its place
    void background(optional, 1);
    void background(optional, 1, undefined);
    return result;
  };
  // The compiler is the test: `tsc` refuses this file if one of the lines above were accepted.
  expect(typed()).toBeInstanceOf(Promise);
});

describe("rationale and restsOn: what can't be taken is told in words", () => {
  const number = () => restsOn("Side", 1, { agreed: "1 m", mayMove: "1 mm" });
  const sound = { decision: "d", chosen: "c", author: "a", date: "2026-12-01", reasons: "r", numbers: [number()] };
  test.each<[string, () => unknown, string]>([
    ["no details", () => rationale(1, undefined as never), "rationale: needs what was decided"],
    ["no words", () => rationale(1, { ...sound, chosen: " " }), "rationale: chosen must be said in words; got nothing"],
    ["no day", () => rationale(1, { ...sound, date: "2026-02-30" }), "must be a day like 2026-11-30; got 2026-02-30"],
    [
      "no reasons",
      () => rationale(1, { ...sound, reasons: null as never }),
      "rationale: reasons must be a note or text",
    ],
    ["a bare number", () => rationale(1, { ...sound, numbers: [null as never] }), "must each be written by restsOn"],
    ["the same label twice", () => rationale(1, { ...sound, numbers: [number(), number()] }), 'got "Side" twice'],
    ["a history that is none", () => rationale(1, { ...sound, history: 3 as never }), "history must be a list of"],
    [
      "nothing agreed",
      () => restsOn("Side", 1, null as never),
      'Side needs agreed and mayMove as texts like "96.6 mm"',
    ],
    [
      "another kind",
      () => restsOn("Side", 1, { agreed: "1 m", mayMove: "1 GHz" }),
      "restsOn: what Side may move by must be",
    ],
    ["no number", () => restsOn("Side", Number.NaN, { agreed: "1 m", mayMove: "1 m" }), "Side must be finite; got NaN"],
  ])("%s", (_words, make, message) => {
    expect(make).toThrow(message);
  });
});
