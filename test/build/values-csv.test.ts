// The form is RFC 4180 (2005), section 2; d3-dsv reads it back as an independent parser.

import { csvParse, csvParseRows } from "d3-dsv";
import { expect, test } from "vitest";
import { csvText, valuesCsv } from "../../build/values-csv.ts";

test("valuesCsv: rows of objects become columns, nested parts get dotted names", () => {
  const trade = {
    rows: [
      { kind: "smooth", gainDbi: 44.1, worst: { gainDbi: 43.9 } },
      { kind: "dualMode", gainDbi: null, worst: { gainDbi: null } },
    ],
  };
  expect(valuesCsv({ trade })).toBe("kind,gainDbi,worst.gainDbi\r\nsmooth,44.1,43.9\r\ndualMode,,\r\n");
});

test("valuesCsv: lists of equal length stand side by side", () => {
  expect(
    valuesCsv({
      frequencyHz: [8e9, 9e9],
      s11: [
        { re: 0.1, im: -0.2 },
        { re: 0, im: 1e-9 },
      ],
    }),
  ).toBe("frequencyHz,s11.re,s11.im\r\n8000000000,0.1,-0.2\r\n9000000000,0,1e-9\r\n");
});

test("valuesCsv: an object of equally long lists gives its lists as columns", () => {
  expect(valuesCsv({ pattern: { thetaDeg: [0, 1], ePlaneDb: [0, -0.1], note: "E" } })).toBe(
    "thetaDeg,ePlaneDb\r\n0,0\r\n1,-0.1\r\n",
  );
});

test("valuesCsv: what a figure carries as data is its table", () => {
  const cuts = {
    shows: "figure",
    caption: "Cuts",
    data: [
      ["θ (°)", "E (dB)"],
      [0, 0],
      [1, -0.5],
    ],
  };
  expect(valuesCsv({ cuts })).toBe("θ (°),E (dB)\r\n0,0\r\n1,-0.5\r\n");
});

test("valuesCsv: cells that don't fit together are written long, every number once", () => {
  const rows = csvParse(
    valuesCsv({ taper: 11, list: [1, 2, 3], horn: { length: 0.5, name: "a,b" } }).replaceAll("\r\n", "\n"),
  );
  expect(rows.columns).toEqual(["cell", "row", "quantity", "value"]);
  expect(rows.map((row) => Object.values(row))).toEqual([
    ["taper", "1", "taper", "11"],
    ["list", "1", "list", "1"],
    ["list", "2", "list", "2"],
    ["list", "3", "list", "3"],
    ["horn", "1", "length", "0.5"],
    ["horn", "1", "name", "a,b"],
  ]);
});

test("valuesCsv: numbers read back to the very same number", () => {
  const numbers = [Math.PI, 1 / 3, 5e-324, 1.7976931348623157e308, -0.1, 299792458];
  const read = csvParse(valuesCsv({ numbers })).map(({ numbers: text }) => Number(text));
  expect(read).toEqual(numbers);
});

test("csvText: quotes, commas and line breaks are quoted and read back", () => {
  const rows = [
    ['say "so"', "a,b", "line\nbreak", "cr\rhere", " space ", "", "=1+1"],
    ["1", "2", "3", "4", "5", "6", "7"],
  ];
  const text = csvText(rows);
  expect(text).toContain('"say ""so"""');
  expect(text.endsWith("\r\n")).toBe(true);
  expect(csvParseRows(text)).toEqual(rows);
});
