import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { readPatternCuts } from "../../../../cells/horn/measured/pattern-cuts.ts";
import { readTouchstone } from "../../../../cells/horn/measured/touchstone.ts";
import { dish } from "../../../../cells/reflector/dish.ts";
import { measuredPerformance } from "../../../../cells/trade/measured-performance.ts";
import { assertClose, assertComplexClose, seededRandom } from "../../../assert-close.ts";

describe("readTouchstone", () => {
  test("version 1: the specification's defaults, comments, numbers over several lines", () => {
    // Touchstone File Format Specification, IBIS: "# GHz S MA R 50" when there is no option line (from memory)
    const match = readTouchstone("! a horn\n1.0 0.5 90 ! first\n2.0\n 0.25\n 180\n");
    expect(match.frequencies).toEqual([1e9, 2e9]);
    expect(match.reference).toBe(50);
    assertComplexClose(match.s11[0]!, { re: 0, im: 0.5 }, { abs: 1e-15, because: "0.5 at 90°" });
    assertComplexClose(match.s11[1]!, { re: -0.25, im: 0 }, { abs: 1e-15, because: "0.25 at 180°" });
  });

  test("options in any order and case; DB and RI", () => {
    const db = readTouchstone("# r 75 db s mhz\n9000 -20 0\n");
    expect([db.reference, db.frequencies[0]]).toEqual([75, 9e9]);
    assertClose(db.s11[0]!.re, 0.1, { rel: 1e-14, because: "−20 dB" });
    expect(readTouchstone("#RI Hz\n1e9 -0.1 0.2\n").s11[0]).toEqual({ re: -0.1, im: 0.2 });
  });

  test("version 2: keywords, reference, [End]", () => {
    const text =
      "[Version] 2.0\n# GHz S RI R 50\n[Number of Ports] 1\n[Number of Frequencies] 2\n[Reference] 75.0\n[Network Data]\n8 0.1 0\n9 0 0.1\n[End]\n";
    expect(readTouchstone(text)).toEqual({
      frequencies: [8e9, 9e9],
      s11: [
        { re: 0.1, im: 0 },
        { re: 0, im: 0.1 },
      ],
      reference: 75,
    });
    expect(() => readTouchstone(text.replace("[End]\n", ""))).toThrow("[End] is expected in a file of version 2");
    expect(() => readTouchstone(text.replace("Frequencies] 2", "Frequencies] 3"))).toThrow(
      "3 frequencies are announced; got 2",
    );
    expect(() => readTouchstone(text.replace("Ports] 1", "Ports] 2"), "h.s1p")).toThrow(
      "h.s1p, line 3: one port is expected; got 2",
    );
  });

  test.each([
    ["", "line 1: at least one frequency is expected; got none"],
    ["# GHz Y RI\n1 0 0", "line 1: S-parameters are expected; got Y-parameters"],
    ["1 0.1 0 0.2 0", "line 1: three numbers a frequency are expected, as a one-port has; got 5 numbers in all"],
    ["1 0.1 0\n1 0.1 0", "line 2: frequencies must rise; got 1 after 1"],
    ["1 abc 0", "line 1: a number is expected as first number of S11; got abc"],
    ["1 NaN 0", "line 1: a number is expected as first number of S11; got NaN"],
    ["1 -20 0", "|S11| of at most 1 is expected"],
    ["# GHz S XX R 50\n1 0 0", 'line 1: an option like "# GHz S MA R 50" is expected; got xx'],
    ["1e305 0.1 0", "a frequency above 0 is expected; got 1e305"],
    ["8 0.1 0\n# GHz S RI R 50\n", "line 2: the option line is expected before the numbers"],
    ["[Version] 2.0\n[Reference] -5\n", "a reference above 0 ohm is expected; got -5"],
    ["[Noise Data]\n", "noise data has no place in the file of a horn"],
  ])("%j", (text, message) => {
    expect(() => readTouchstone(text)).toThrow(message);
  });
});

/** cosⁿ feed as someone would have measured it: dB to so many digits, in steps. */
function cosineCuts(n: number, step: number, side: "both" | "one", withPhase = false): string {
  const rows: string[] = [];
  for (let theta = side === "both" ? -180 : 0; theta <= 180 + 1e-9; theta += step) {
    const intensity = Math.abs(theta) < 90 ? Math.cos((theta * Math.PI) / 180) ** n : 0;
    const level = (intensity > 1e-12 ? 10 * Math.log10(intensity) : -120).toFixed(4);
    rows.push(withPhase ? `${theta},${level},10,${level},10` : `${theta},${level},${level}`);
  }
  const head = withPhase ? "theta_deg,e_db,e_phase_deg,h_db,h_phase_deg" : "theta_deg,e_db,h_db";
  return `${head}\n${rows.join("\n")}\n`;
}

// test/references/cosn-feed-efficiency.csv: closed forms (Silver 1949, ch. 12), half-angle, n, spillover, illumination …
const closedForm = readFileSync(new URL("../../../references/cosn-feed-efficiency.csv", import.meta.url), "utf8")
  .trim()
  .split("\n")
  .filter((line) => !line.startsWith("#"))
  .map((line) => line.split(","));
const columns = closedForm[0]!;
const at = (row: string[], name: RegExp) => Number(row[columns.findIndex((column) => name.test(column))]);

describe("readPatternCuts and measuredPerformance", () => {
  test.each([2, 4, 6, 8])("a cosⁿ feed measured every degree, n = %i: the closed-form efficiencies", (n) => {
    const rows = closedForm
      .slice(1)
      .filter((row) => at(row, /^n$/) === n && at(row, /^half_angle/) >= 30 && at(row, /^half_angle/) <= 75);
    expect(rows.length).toBeGreaterThan(2);
    for (const phase of [false, true]) {
      const [measured] = readPatternCuts(cosineCuts(n, 1, "both", phase), 10e9);
      for (const row of rows) {
        const psi = at(row, /^half_angle/);
        const found = measuredPerformance(measured!, dish({ diameter: 3, halfAngle: (psi * Math.PI) / 180 }));
        assertClose(found.spilloverEfficiency, at(row, /^spillover/), {
          abs: 2e-4,
          because: "splines through 1° samples, a kink at 90°",
        });
        assertClose(found.illuminationEfficiency, at(row, /^illumination/), {
          abs: 2e-4,
          because: "splines through 1° samples",
        });
        expect(found.phaseEfficiency === null).toBe(!phase);
        if (phase) assertClose(found.phaseEfficiency!, 1, { abs: 1e-6, because: "a constant phase is none" });
        expect(found.unknown.length > 0).toBe(!phase);
      }
    }
  });

  test("either side, any step, short of 180°: averaged, told, and what is beyond stays unknown", () => {
    const [one] = readPatternCuts(cosineCuts(6, 2.5, "one"), 10e9);
    expect([one!.asymmetryDb, one!.thetaMaxDeg]).toEqual([null, 180]);
    const short = `theta_deg,e_db,h_db\n${[-60, -40, -20, -10, 0, 10, 20, 40, 60].map((t) => `${t},${-((t / 10) ** 2) * 0.5 - (t > 0 ? 0.2 : 0)},${-((t / 10) ** 2) * 0.5}`).join("\n")}`;
    const [part] = readPatternCuts(short, 10e9);
    assertClose(part!.asymmetryDb!, 0.2, {
      abs: 0.06,
      because: "one side is 0.2 dB lower, all but boresight: the spline swings there",
    });
    expect(part!.warnings.map(({ text }) => text).join(" ")).toMatch(
      /Nothing was measured beyond 60°.* it would be \d+ % of all/,
    );
    expect(() => measuredPerformance(part!, dish({ diameter: 2, halfAngle: 1.2 }))).toThrow(
      "the cuts must reach the rim at 68.8 deg; got 60 deg",
    );
  });

  test("several frequencies, and the 45° plane as measured", () => {
    const text = `frequency_ghz,theta_deg,e_db,h_db,cross45_db\n${[8, 9].flatMap((f) => [0, 10, 20, 30, 40, 50].map((t) => `${f},${t},${-t * 0.3},${-t * 0.3},${t === 0 ? -60 : -30 + (f - 8)}`)).join("\n")}`;
    const all = readPatternCuts(text, undefined);
    expect(all.map(({ frequency }) => frequency)).toEqual([8e9, 9e9]);
    const reflector = dish({ diameter: 2, halfAngle: 0.6 });
    expect(all.map((one) => measuredPerformance(one, reflector).crossPolarPeakDb)).toEqual([-30, -29]);
  });

  test.each([
    ["theta_deg,e_db\n0,0", "pattern, line 1: a column h_db is expected; the columns are theta_deg, e_db"],
    [
      "theta_deg,e_db,h_db,e_phase_deg\n0,0,0,0",
      "column e_phase_deg: the phase of both cuts is expected, or of neither",
    ],
    ["frequency_ghz,theta_deg,e_db,h_db\n1e305,0,0,0", "a frequency above 0 is expected for every row"],
    ["theta_deg,e_db,h_db\n5,0,0\n10,1,1", "line 2, column theta_deg: a row at 0, boresight, is expected"],
    ["theta_deg,e_db,h_db\n0,0,0\n0,1,1", "line 3, column theta_deg: each angle is expected once; 0 stands twice"],
    ["theta_deg,e_db,h_db\n0,0,0\n200,1,1", "an angle from −180 to 180 is expected; got 200"],
    ["theta_deg,e_db,h_db\n0,0,0\n1,-1e6,1", "column e_db: a level from -200 to 100 dB is expected; got -1000000"],
    ["theta_deg,e_db,h_db\n0,0,0\n1,0,1", "at least five angles on a side"],
  ])("%j", (text, message) => {
    expect(() => readPatternCuts(text, 10e9)).toThrow(message);
  });
});

test("300 spoiled pattern tables and 300 spoiled Touchstone files: numbers, or the line and what was expected", () => {
  const random = seededRandom(20261205);
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
    "[",
    "]",
    "#",
    "!",
    ";",
    "R",
    "é",
    "9".repeat(400),
    " ",
    "\t",
    "\uFEFF",
  ];
  const spoil = (good: string, times: number): string => {
    let text = good;
    for (let j = 0; j < times; j++) {
      const at = Math.floor(random() * text.length);
      const kind = random();
      if (kind < 0.5) text = text.slice(0, at) + pieces[Math.floor(random() * pieces.length)] + text.slice(at);
      else if (kind < 0.75) text = text.slice(0, at) + text.slice(at + 1 + Math.floor(random() * 8));
      else if (kind < 0.9)
        text = text.slice(0, at) + text.slice(at).replace(/\d/, () => String(Math.floor(random() * 10)));
      else text = text.slice(0, at);
    }
    return text;
  };
  const finite = (value: unknown): boolean =>
    typeof value === "number"
      ? Number.isFinite(value)
      : typeof value !== "object" || value === null || Object.values(value).every(finite);
  const cuts = cosineCuts(6, 15, "both", true);
  const touchstone = "! horn\n# GHz S RI R 50\n8.0 0.1 0.02\n8.5 0.05 -0.01\n9.0 -0.02 0.03\n";
  const two =
    "[Version] 2.0\n# GHz S RI R 50\n[Number of Ports] 1\n[Number of Frequencies] 2\n[Network Data]\n8 0.1 0\n9 0 0.1\n[End]\n";
  let read = 0;
  for (let i = 0; i < 300; i++) {
    for (const [name, make] of [
      ["CsvError", () => readPatternCuts(spoil(cuts, 1 + (i % 4)), 10e9, "spoiled")],
      ["TouchstoneError", () => readTouchstone(spoil(i % 2 ? touchstone : two, 1 + (i % 4)), "spoiled")],
    ] as const) {
      try {
        expect(finite(make())).toBe(true);
        read++;
      } catch (error) {
        expect((error as Error).name, (error as Error).stack).toBe(name);
        expect((error as Error).message).toMatch(/^spoiled, line \d+/);
      }
    }
  }
  expect(read).toBeGreaterThan(50);
  expect(read).toBeLessThan(550);
});
