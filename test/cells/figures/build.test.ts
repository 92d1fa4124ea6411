// The drawing for the workshop and its tables: what is read back is what went in.

import { describe, expect, test } from "vitest";
import { buildDrawing, buildTables } from "../../../cells/figures/index.ts";
import { assertClose } from "../../assert-close.ts";
import { drawnAt, strokes, textsOf } from "./drawn.ts";
import { corrugatedHorn, dualModeHorn, ownProfile, sheetOf, smoothHorn } from "./examples.ts";

const pathsWith = (drawn: Element, attribute: string, value: string): Element[] =>
  [...drawn.querySelectorAll("path")].filter((path) => path.getAttribute(attribute) === value);

/** The metal's outline, upper and lower half. */
const outlineOf = (drawn: Element): [number, number][][] => strokes(pathsWith(drawn, "stroke-linejoin", "round")[0]!);

/** px a mm, read from the scale bar. */
function perMm(drawn: Element): number {
  const bar = [...drawn.querySelectorAll("path")].find((path) => /^M0\.5 [\d.]+v6h/.test(path.getAttribute("d")!))!;
  const words = textsOf(drawn).find((text) => /^\d+(\.\d)? mm$/.test(text))!;
  return Number(/h([\d.]+)v/.exec(bar.getAttribute("d")!)![1]) / Number.parseFloat(words);
}

const cases = [
  ["smooth", smoothHorn],
  ["dual-mode", dualModeHorn],
  ["corrugated", corrugatedHorn],
  ["own profile", ownProfile],
] as const;

describe("build drawing", () => {
  for (const width of [760, 354])
    test.each(cases)(`%s at ${width} px: every corner of the metal in true proportions`, (_, horn) => {
      const sheet = sheetOf(horn);
      const drawn = drawnAt(buildDrawing(sheet), width);
      const scale = perMm(drawn);
      const [upper, lower] = outlineOf(drawn);
      const metal = [...sheet.inner, ...[...sheet.outer].reverse()];
      const axisY = (upper![0]![1] + lower![0]![1]) / 2;
      // the mouth's corner of the bore is the datum
      const mouthX = upper![sheet.inner.length - 1]![0];
      expect(upper).toHaveLength(metal.length);
      metal.forEach(([z, r], i) => {
        const paper = { abs: 0.05 + 0.02 * scale, because: "coordinates to 0.01 px, the bar's length to 0.01 px" };
        assertClose(upper![i]![0], mouthX + z * 1e3 * scale, paper);
        assertClose(upper![i]![1], axisY - r * 1e3 * scale, paper);
        assertClose(lower![i]![1], axisY + r * 1e3 * scale, paper);
      });
    });

  test("lengths count from the mouth, shortest nearest; diameters carry their tolerance where there is room", () => {
    const words = textsOf(drawnAt(buildDrawing(sheetOf(dualModeHorn))));
    // λ = 24.98 mm at 12 GHz: λ/100 → 0.2, λ/200 → 0.1, D/1000 of 25 mm → 0.02
    expect(words).toEqual(
      expect.arrayContaining([
        "100.00 ±0.2",
        "120.00 ±0.2",
        "140.00 ±0.2",
        "Ø 25.00 to",
        "Ø 33.00",
        "Ø 25.00 ±0.02",
        "Ø 68.00 ±0.1",
        "Ø 72.00 ±0.3",
        "datum, z = 0",
      ]),
    );
    const order = ["100.00 ±0.2", "120.00 ±0.2", "140.00 ±0.2"].map((one) => words.indexOf(one));
    expect(order).toEqual([...order].sort((a, b) => a - b));
  });

  test("slots are numbered within the bore and counted in words", () => {
    const drawing = buildDrawing(sheetOf(corrugatedHorn));
    const words = textsOf(drawnAt(drawing));
    expect(words).toEqual(expect.arrayContaining(["1", "5", "10", "30", "36"]));
    expect(words.join(" ")).toContain(
      "36 slots, numbered from the throat; slot width 3.000; pitch 4.000; tooth 1.000.",
    );
    expect(drawing.alt).toContain("36 slots, listed in the table of slots.");
  });

  test("words and numbers: the same horn without its picture", () => {
    const drawing = buildDrawing(sheetOf(dualModeHorn));
    expect(drawing.alt).toBe(
      "Section of the horn with dimensions in mm, z from the mouth: throat Ø 25.00 at z −140.00, step Ø 25.00 to 33.00 at z −120.00, corner Ø 33.00 at z −100.00 and mouth Ø 68.00 at z 0.00; outside Ø 72.00, wall 2.00.",
    );
    expect(drawing.data![0]).toEqual(["wall", "z from the mouth (mm)", "radius (mm)"]);
    expect(drawing.data!.filter(([wall]) => wall === "inner")).toHaveLength(5);
    assertClose(drawing.data![1]![1] as number, -140, { abs: 1e-9, because: "m to mm" });
  });

  test("cut metal is hatched, the bore is not", () => {
    const drawn = drawnAt(buildDrawing(sheetOf(smoothHorn)));
    const hatch = strokes(pathsWith(drawn, "stroke-width", "0.6")[0]!).flat();
    const [upper, lower] = outlineOf(drawn);
    const axisY = (upper![0]![1] + lower![0]![1]) / 2;
    expect(hatch.length).toBeGreaterThan(100);
    for (const [, y] of hatch) expect(Math.abs(y - axisY)).toBeGreaterThan(9.4 * perMm(drawn));
  });
});

describe("build tables", () => {
  const tables = buildTables(sheetOf(corrugatedHorn));

  test("a row a slot, in print and as numbers", () => {
    expect(tables.slots!.rows).toHaveLength(36);
    // slot 1: z −141, width 3, tooth 12 + 26/36, depth 13.5
    expect(tables.slots!.rows[0]).toMatchObject({
      label: "1",
      cells: [{ text: "−141.000" }, { text: "3.000" }, { text: "12.722" }, { text: "13.500" }],
    });
    const [head, ...numbers] = tables.slots!.data;
    expect(head).toEqual(["slot", "z of the mouth-side wall (mm)", "width (mm)", "inner radius (mm)", "depth (mm)"]);
    expect(numbers).toHaveLength(36);
    // tooth radius 12 + 26 = 38 at the mouth
    assertClose(numbers[35]![3] as number, 38, { abs: 1e-9, because: "m to mm" });
    // λ/500 of 24.98 mm
    expect(tables.slots!.caption).toContain("Each ±0.04 mm (λ/500).");
  });

  test("every dimension has its tolerance or says why not, and the reasons stand below", () => {
    for (const { cells } of tables.dimensions.rows)
      expect(cells[1]!.text === "exact" || cells[1]!.text === "for reference" || /^±\d/.test(cells[1]!.text)).toBe(
        true,
      );
    expect(tables.dimensions.caption).toContain("λ/500: balance of a slot within 0.8 %.");
    expect(tables.dimensions.rows.find(({ label }) => label === "Slots")!.cells[0]!.text).toBe("36");
    for (const row of tables.dimensions.data) expect(row).toHaveLength(tables.dimensions.data[0]!.length);
  });

  test("each check has a word, and each metal its mass", () => {
    const words = tables.machining.rows.map(({ key, cells }) => [key, cells[0]!.word]);
    expect(words).toEqual(
      expect.arrayContaining([
        ["slotAspect", "asks for care"],
        ["tooth", "passes"],
      ]),
    );
    expect(tables.mass.rows.map(({ label }) => label)).toEqual(["Aluminium 6061", "Brass C36000", "Copper C10100"]);
    const grams = tables.mass.data.slice(1).map((row) => row[2] as number);
    assertClose(grams[1]! / grams[0]!, 8.49 / 2.7, { rel: 1e-12, because: "one volume" });
  });

  test("no slots, no table of them; no number is ever missing", () => {
    for (const [, horn] of cases) {
      const { slots, ...others } = buildTables(sheetOf(horn));
      expect(slots === undefined).toBe(sheetOf(horn).slots.length === 0);
      const all = [slots, ...Object.values(others)].flatMap((one) => one?.data.flat() ?? []);
      for (const value of all) if (typeof value === "number") expect(Number.isFinite(value)).toBe(true);
      expect(JSON.stringify(others)).not.toMatch(/NaN|Infinity|undefined|null/);
    }
  });
});
