// What the page writes into a notebook's file: as little as needed, in the words a person would have written, or nothing. One file: the rules are the same for all writes.

import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { compileNotebook } from "../../../runtime/compile.ts";
import { addNote, replaceCell } from "../../../runtime/source/cells.ts";
import { fileNameFor, forkSource } from "../../../runtime/source/fork-source.ts";
import { keepGivens } from "../../../runtime/source/keep-givens.ts";
import { addRationale, agreeAgain, editRationale } from "../../../runtime/source/rationale-source.ts";
import { seededRandom } from "../../assert-close.ts";
import { fixtures } from "../../build/run-command.ts";

const file = "notebooks/decided.ts";
const source = readFileSync(join(fixtures, "decided.ts"), "utf8");
const today = "2026-12-01";

/** Lines taken away and added, in order. */
function difference(before: string, after: string): { gone: string[]; come: string[] } {
  const [a, b] = [before.split("\n"), after.split("\n")];
  let top = 0;
  while (top < a.length && a[top] === b[top]) top++;
  let end = 0;
  while (end < a.length - top && end < b.length - top && a.at(-1 - end) === b.at(-1 - end)) end++;
  return { gone: a.slice(top, a.length - end), come: b.slice(top, b.length - end) };
}

describe("keepGivens", () => {
  test("a quantity: its text and nothing else", () => {
    expect(difference(source, keepGivens(source, file, { side: "94 in" }))).toEqual({
      gone: ['export const side = given("1.2 m", { label: "Side", why: "as cut", min: "0.1 m", max: "5 m" });'],
      come: ['export const side = given("94 in", { label: "Side", why: "as cut", min: "0.1 m", max: "5 m" });'],
    });
  });

  test("a choice, a switch and a text; back again is the file as it was", () => {
    const kept = keepGivens(source, file, { finish: "painted", framed: "on", remark: "z,r\n0,1\n" });
    expect(kept).toContain(
      'given.choice(["bare", "painted"], { label: "Finish", why: "bare reflects", default: "painted" })',
    );
    expect(kept).toContain("given.switch(true, {");
    expect(kept).toContain("given.text(`z,r\n0,1\n`, {");
    const back = keepGivens(kept, file, { finish: "bare", framed: "off", remark: "none" });
    expect(back).toBe(source.replace('why: "bare reflects" }', 'why: "bare reflects", default: "bare" }'));
  });

  test("nothing to change changes nothing; a result can't be kept", () => {
    expect(keepGivens(source, file, { side: "1.2 m", finish: "bare", framed: "off", remark: "none" })).toBe(source);
    expect(() => keepGivens(source, file, { area: "2 m^2" })).toThrow("notebooks/decided.ts: area is no given");
    expect(() => keepGivens(source, file, { nope: "2" })).toThrow("has no cell nope");
    expect(() => keepGivens(source, file, { finish: "gilded" })).toThrow(
      "Finish must be one of bare, painted; got gilded",
    );
  });

  test("hostile texts come out as the value of one literal", () => {
    const hostile = [
      '"); globalThis.ran = 1; ("',
      "`${globalThis.ran = 1}`",
      "</script><script>ran()</script>",
      "\\",
      "a\u2028b\u2029c",
      "line\n${x}`\\`",
      "\r\n\r",
      "*/ // <!--",
      "💥\ud800",
    ];
    for (const text of hostile) {
      const kept = keepGivens(source, file, { remark: text });
      const { cells, problems } = compileNotebook(kept, file);
      expect(problems).toEqual([]);
      // a text of several lines moves what has no name of its own
      const names = (all: typeof cells) => all.map(({ name }) => name.replace(/^line \d+/, "a line"));
      expect(names(cells)).toEqual(names(compileNotebook(source, file).cells));
      const literal = /given\.text\(([\s\S]*), \{ label: "Remark"/.exec(kept)![1]!;
      expect(new Function(`return ${literal}`)()).toBe(text);
    }
  });
});

describe("cells", () => {
  test("replaceCell: the cell with its comment, nothing else", () => {
    const { cells } = compileNotebook(source, file);
    for (const { name, source: text } of cells) expect(replaceCell(source, file, name, text)).toBe(source);
    const changed = replaceCell(source, file, "area", "export const area = side ** 2;\n");
    expect(difference(source, changed)).toEqual({
      gone: ["export const area = side ** 2 * (framed ? 0.9 : 1);"],
      come: ["export const area = side ** 2;"],
    });
  });

  test("replaceCell: a text that doesn't read, or spoils the notebook, is refused at its line", () => {
    const line = source.split("\n").findIndex((text) => text.startsWith("export const area ")) + 1;
    for (const text of ["export const area = (;", "export const area = side *", "export const area = {", "}"]) {
      try {
        replaceCell(source, file, "area", text);
        expect.unreachable(text);
      } catch (error) {
        expect(error).toMatchObject({ name: "RewriteRefused", line });
      }
    }
    expect(() => replaceCell(source, file, "area", "export const area = nothing * 2;")).toThrow(/nothing/);
    expect(() => replaceCell(source, file, "area", "export const side = 2;")).toThrow(/side/);
    expect(() => replaceCell(source, file, "area", "// gone")).toThrow("holds no cell");
  });

  test("addNote: after a cell and the comment at its end; live numbers by ${}", () => {
    const added = addNote(source, file, "line 13", 'It is `square`: ${show(area, "m^2", 1)} of ${side}.');
    expect(difference(source, added).come).toEqual([
      'note`It is \\`square\\`: ${show(area, "m^2", 1)} of ${side}.`;',
      "",
    ]);
    expect(() => addNote(source, file, "side", "${area} comes later")).toThrow(
      "reads area, which is no cell before it",
    );
    expect(() => addNote(source, file, "side", "  ")).toThrow("has no text");
  });

  test("addNote: expressions only read", () => {
    for (const expression of [
      "fetch('x')",
      "side = 2",
      "globalThis",
      "side.constructor",
      'side["constructor"]',
      "(() => side)()",
      "side, side",
      "side /* hidden */",
      "show(show)",
      "new Date()",
      "`x`",
      "side ? 1 : 2",
      "",
      "side; side",
      "await side",
    ]) {
      expect(() => addNote(source, file, "areas", `\${${expression}}`), expression).toThrow(/RewriteRefused|;|cell/);
    }
    expect(addNote(source, file, "areas", "${-side * 2 + area / (side ** 2)}")).toContain(
      "${-side * 2 + area / (side ** 2)}",
    );
  });

  test("addNote: names that are missing are imported, in order", () => {
    const bare =
      'import { given } from "../runtime/index.ts";\n\nexport const a = given("1 m", { label: "A", why: "", min: 0, max: 2 });\n';
    expect(addNote(bare, file, "a", "${show(a)}")).toBe(
      'import { given, note, show } from "../runtime/index.ts";\n\nexport const a = given("1 m", { label: "A", why: "", min: 0, max: 2 });\n\nnote`${show(a)}`;\n',
    );
  });
});

const draft = {
  decision: "Paint it.",
  chosen: "painted plate",
  reasons: 'It rusts; ${show(area, "m^2", 1)} takes one tin.',
  author: "P. Inter",
  numbers: [{ label: "Area", expression: "area", unit: "m^2", tolerance: "0.1 m^2" }],
};

describe("rationales", () => {
  test("addRationale: source that a person would have written", () => {
    const { source: written, name } = addRationale(source, file, { beside: "areas", draft, now: [1.4399999], today });
    expect(name).toBe("paintedPlateChosen");
    expect(
      difference(source, written).come.join("\n").trim(),
    ).toBe(`export const paintedPlateChosen = rationale(areas, {
  decision: "Paint it.",
  chosen: "painted plate",
  author: "P. Inter",
  date: "2026-12-01",
  reasons: note\`It rusts; \${show(area, "m^2", 1)} takes one tin.\`,
  numbers: [restsOn("Area", area, { agreed: "1.44 m^2", mayMove: "0.1 m^2" })],
});`);
    expect(compileNotebook(written, file).cells.find((cell) => cell.name === name)!.beside).toBe("areas");
    const second = addRationale(written, file, { beside: "areas", draft, now: [1.44], today });
    expect(second.name).toBe("paintedPlateChosen2");
  });

  test("addRationale: what is missing is said", () => {
    const add = (changes: object, now = [1.44]) =>
      addRationale(source, file, { beside: "areas", draft: { ...draft, ...changes }, now, today });
    expect(() => add({ decision: " " })).toThrow("the rationale's decision has no words yet");
    expect(() => add({ numbers: [] })).toThrow("rests on at least one number");
    expect(() => add({}, [Number.NaN])).toThrow("Area has no number now");
    expect(() => add({ numbers: [{ ...draft.numbers[0]!, tolerance: "1 GHz" }] })).toThrow(
      /what Area may move by must be an area/,
    );
    expect(() => add({ numbers: [{ ...draft.numbers[0]!, expression: "fetch('x')" }] })).toThrow(
      "calls something else than show",
    );
    expect(() => addRationale(source, file, { beside: "line 13", draft, now: [1], today })).toThrow("named cell");
  });

  test("agreeAgain: new numbers, day and name; the former agreement goes into the history", () => {
    const now = { Area: 1.6901234, Side: 1.3 };
    const once = agreeAgain(source, file, { cell: "squareChosen", author: "B. Cutter", now, today });
    expect(difference(source, once)).toEqual({
      gone: [
        '  date: "2026-11-20",',
        '  reasons: note`The shear is straight, and ${show(area, "m^2", 2)} is enough.`,',
        "  numbers: [",
        '    restsOn("Area", area, { agreed: "1.44 m^2", mayMove: "0.05 m^2" }),',
        '    restsOn("Side", side, { agreed: "1.20 m", mayMove: "0.05 m" }),',
        "  ],",
      ],
      come: [
        '  date: "2026-12-01",',
        '  reasons: note`The shear is straight, and ${show(area, "m^2", 2)} is enough.`,',
        "  numbers: [",
        '    restsOn("Area", area, { agreed: "1.69 m^2", mayMove: "0.05 m^2" }),',
        '    restsOn("Side", side, { agreed: "1.30 m", mayMove: "0.05 m" }),',
        "  ],",
        '  history: [{ author: "B. Cutter", date: "2026-11-20", agreed: { Area: "1.44 m^2", Side: "1.20 m" } }],',
      ],
    });
    const twice = agreeAgain(once, file, {
      cell: "squareChosen",
      author: "N. Ewer",
      now: { Area: 1, Side: 1 },
      today: "2026-12-24",
    });
    expect(twice).toContain(
      '    { author: "B. Cutter", date: "2026-12-01", agreed: { Area: "1.69 m^2", Side: "1.30 m" } },\n  ],\n});',
    );
    expect(twice.match(/date: "/g)).toHaveLength(3);
    expect(() => agreeAgain(source, file, { cell: "squareChosen", author: "A", now: { Area: 1 }, today })).toThrow(
      "Side has no number now",
    );
    expect(() => agreeAgain(source, file, { cell: "area", author: "A", now, today })).toThrow("area is no rationale");
  });

  test("editRationale: a number that was there keeps what was agreed, a new one is agreed as it is", () => {
    const edited = editRationale(source, file, {
      cell: "squareChosen",
      draft: {
        ...draft,
        decision: "Cut it square.",
        numbers: [
          { label: "Area", expression: "area", unit: "m^2", tolerance: "0.2 m^2" },
          { label: "Edge", expression: "side * 4", unit: "m", tolerance: "0.1 m" },
        ],
      },
      now: [9, 4.8],
    });
    expect(edited).toContain('restsOn("Area", area, { agreed: "1.44 m^2", mayMove: "0.2 m^2" })');
    expect(edited).toContain('restsOn("Edge", side * 4, { agreed: "4.80 m", mayMove: "0.1 m" })');
    expect(edited).not.toContain('restsOn("Side"');
    expect(edited).toContain('chosen: "painted plate"');
  });

  test("hostile words stay words", () => {
    for (const text of ['"}); ran(); ({"', "`${ran()}`".replace("$", ""), "</script>", "\\u0060", "a\nb", "*/"]) {
      const words = { ...draft, decision: text, chosen: text, author: text, reasons: text };
      words.numbers = [{ ...draft.numbers[0]!, label: text }];
      const { source: written, name } = addRationale(source, file, {
        beside: "areas",
        draft: words,
        now: [1.44],
        today,
      });
      const { cells, problems } = compileNotebook(written, file);
      expect(problems).toEqual([]);
      expect(cells.length).toBe(compileNotebook(source, file).cells.length + 1);
      expect(cells.find((cell) => cell.name === name)).toBeDefined();
    }
  });
});

describe("forkSource", () => {
  const details = { name: "A small plate", from: "notebooks/decided.ts", today, texts: { side: "0.4 m" } };
  const forked = forkSource(source, "notebooks/a-small-plate.ts", details);

  test("says where it came from, has the new givens and title, inherits its rationales", () => {
    expect(forked.split("\n")[0]).toBe("// Forked from notebooks/decided.ts on 2026-12-01: A small plate.");
    expect(forked).toContain('given("0.4 m", { label: "Side"');
    expect(forked).toContain('title: "A small plate"');
    expect(forked).toContain('  ],\n  inherited: "notebooks/decided.ts",\n});');
    const again = forkSource(forked, "x.ts", { ...details, name: "Next", from: "a-small-plate.ts" });
    expect(again.match(/Forked from/g)).toHaveLength(1);
    expect(again).toContain('inherited: "a-small-plate.ts"');
  });

  test("agreeing confirms what was inherited", () => {
    const agreed = agreeAgain(forked, "x.ts", {
      cell: "squareChosen",
      author: "M. E.",
      now: { Area: 0.16, Side: 0.4 },
      today,
    });
    expect(agreed).not.toContain("inherited");
    expect(agreed).toContain('restsOn("Area", area, { agreed: "0.16 m^2", mayMove: "0.05 m^2" })');
    expect(compileNotebook(agreed, "x.ts").problems).toEqual([]);
  });

  test("imports lead on from another folder", () => {
    const moved = forkSource(source, "x.ts", { ...details, moved: (path) => path.replace("../../../", "./") });
    expect(moved).toContain('from "./runtime/index.ts"');
  });

  test("file names", () => {
    expect(fileNameFor("Ridge, 1.8 m")).toBe("ridge-1-8-m");
    expect(fileNameFor("Öreg-hegy / ../../etc")).toBe("oreg-hegy-etc");
    expect(fileNameFor("日本")).toBe("");
  });
});

test("200 spoiled notebooks: a clear refusal or a notebook no worse than it was, never a crash", () => {
  const random = seededRandom(20261202);
  const pieces = [
    "(",
    "}",
    "`",
    '"',
    "${",
    "/*",
    "=>",
    "await ",
    "const ",
    "\u0000",
    "export ",
    "import ",
    "rationale(",
    ";",
    "\\",
  ];
  let refused = 0;
  for (let i = 0; i < 200; i++) {
    let text = source;
    for (let j = 0; j <= i % 3; j++) {
      const at = Math.floor(random() * text.length);
      const kind = random();
      if (kind < 0.4) text = text.slice(0, at) + pieces[Math.floor(random() * pieces.length)] + text.slice(at);
      else if (kind < 0.8) text = text.slice(0, at) + text.slice(at + 1 + Math.floor(random() * 12));
      else text = text.slice(0, at);
    }
    const before = compileNotebook(text, file).problems.map(({ message }) => message);
    for (const change of [
      () => keepGivens(text, file, { side: "2 m" }),
      () => addNote(text, file, "area", "x"),
      () => addRationale(text, file, { beside: "areas", draft, now: [1], today }).source,
      () => agreeAgain(text, file, { cell: "squareChosen", author: "A", now: { Area: 1, Side: 1 }, today }),
      () => forkSource(text, file, { name: "F", from: file, today, texts: { side: "2 m" } }),
    ]) {
      try {
        const after = compileNotebook(change(), file).problems.map(({ message }) => message);
        expect(after.filter((message) => !before.includes(message))).toEqual([]);
      } catch (error) {
        expect((error as Error).name, (error as Error).stack).toBe("RewriteRefused");
        expect((error as Error).message).toMatch(/\S/);
        refused++;
      }
    }
  }
  expect(refused).toBeGreaterThan(100);
});
