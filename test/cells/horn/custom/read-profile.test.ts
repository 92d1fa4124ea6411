import { describe, expect, test } from "vitest";
import { numberColumn, readCsvTable } from "../../../../cells/horn/csv-table.ts";
import { readProfile } from "../../../../cells/horn/custom/read-profile.ts";
import { seededRandom } from "../../../assert-close.ts";

describe("readCsvTable", () => {
  test("RFC 4180: quotes, commas and line ends inside a field, all line ends, a byte order mark", () => {
    // RFC 4180 section 2, rules 5 to 7
    const text = '\uFEFFname,"a ""quoted"" one"\r\n"x, y","two\r\nlines"\n\nlast,1';
    const table = readCsvTable(text, "t.csv");
    expect(table.columns).toEqual(["name", 'a "quoted" one']);
    expect(table.rows).toEqual([
      { line: 2, cells: ["x, y", "two\nlines"] },
      { line: 5, cells: ["last", "1"] },
    ]);
  });

  test.each([
    ["", "t.csv, line 1: a header row with the names of the columns is expected; got nothing"],
    ["a,b\n1", "t.csv, line 2: 2 fields are expected, one a column; got 1 (is the separator a comma?)"],
    ["a,b\n1,2,3", "t.csv, line 2: 2 fields are expected, one a column; got 3"],
    ["a,a\n1,2", "t.csv, line 1, column a: each column needs a name of its own; this one stands twice"],
    ["a,\n1,2", "t.csv, line 1, column 2: every column needs a name; this one has none"],
    ['a,b\n1,"2\n3', "t.csv, line 2, column 2: the quote opened here is never closed"],
    ['a,b\n1,2"3', "t.csv, line 2, column 2: a quote may only stand at the ends of a field, or doubled in it"],
    ['a,b\n"1"x,2', "t.csv, line 2, column 1: a comma is expected after the closing quote"],
  ])("%j", (text, message) => {
    expect(() => readCsvTable(text, "t.csv")).toThrow(message);
  });

  test.each([
    ["1;5", "a number is expected; got 1;5"],
    ["NaN", "a number is expected; got NaN"],
    ["1e999", "a number is expected; got 1e999"],
    ['""', "a number is expected; got nothing"],
    ['"1,5"', "a number is expected; got 1,5; write a decimal point"],
    ["0x10", "a number is expected; got 0x10"],
  ])("a number: %s", (field, message) => {
    expect(() => numberColumn(readCsvTable(`a,b\n1,2\n${field},3`, "t.csv"), "a")).toThrow(
      `t.csv, line 3, column a: ${message}`,
    );
  });
});

describe("readProfile", () => {
  test("either way round, any datum: the mouth at z = 0", () => {
    const wall = { z: [-0.12, -0.1, -0.1, 0], radius: [0.011, 0.011, 0.013, 0.036] };
    const micron = ({ z, radius }: typeof wall) => [...z, ...radius].map((value) => Math.round(value * 1e9) / 1e9);
    const first = readProfile("z_mm,r_mm\n0,11\n20,11\n20,13\n120,36");
    expect(micron(first)).toEqual(micron(wall));
    expect(Object.is(first.z.at(-1), 0)).toBe(true);
    expect(micron(readProfile("r_mm,z_mm,remark\n36,0,mouth\n13,-100,\n11,-100,\n11,-120,throat\n"))).toEqual(
      micron(wall),
    );
  });

  test.each([
    ["z_mm,r_mm\n0,11", "profile, line 2: at least two points are expected; got 1"],
    ["z,r\n0,11\n1,2", "profile, line 1: a column z_mm is expected; the columns are z, r"],
    ["z_mm,r_mm\n0,11\n20,0", "profile, line 3, column r_mm: a radius above 0 is expected; got 0"],
    [
      "z_mm,r_mm\n0,11\n20,12\n10,13\n30,14",
      "line 4, column z_mm: z must keep rising from one end of the horn to the other; got 10 after 20",
    ],
    ["z_mm,r_mm\n5,11\n5,12", "profile, line 3, column z_mm: a horn has a length; every point has one z"],
    ["z_mm,r_mm\n0,11\n2e9,12", "millimetres are expected"],
  ])("%j", (text, message) => {
    expect(() => readProfile(text)).toThrow(message);
  });

  test("300 spoiled tables: a wall, or the line and what was expected; never anything else", () => {
    const random = seededRandom(20261204);
    const good = "z_mm,r_mm\n0,11\n20,11\n20,13\n60.5,20.25\n120,36\n";
    const pieces = [
      ",",
      '"',
      "\n",
      "\r",
      "-",
      "e",
      ".",
      "NaN",
      "Infinity",
      "\u0000",
      "1e400",
      "z_mm",
      "\uFEFF",
      ";",
      "9".repeat(400),
    ];
    let read = 0;
    for (let i = 0; i < 300; i++) {
      let text = good;
      for (let j = 0; j <= i % 4; j++) {
        const at = Math.floor(random() * text.length);
        const kind = random();
        if (kind < 0.5) text = text.slice(0, at) + pieces[Math.floor(random() * pieces.length)] + text.slice(at);
        else if (kind < 0.8) text = text.slice(0, at) + text.slice(at + 1 + Math.floor(random() * 6));
        else text = text.slice(0, at);
      }
      try {
        const { z, radius } = readProfile(text, "spoiled.csv");
        read++;
        expect([...z, ...radius].every(Number.isFinite)).toBe(true);
        expect(z.at(-1)).toBe(0);
        expect(radius.every((r) => r > 0)).toBe(true);
        expect(z.every((value, k) => k === 0 || value >= z[k - 1]!)).toBe(true);
      } catch (error) {
        expect((error as Error).name, (error as Error).stack).toBe("CsvError");
        expect((error as Error).message).toMatch(/^spoiled\.csv, line \d+(, column .+)?: /);
      }
    }
    expect(read).toBeGreaterThan(5);
    expect(read).toBeLessThan(250);
  });
});
