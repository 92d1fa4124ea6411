import { describe, expect, test } from "vitest";
import { bestRow, tradeSentences, tradeSheet } from "../../../cells/figures/index.ts";
import type { Trade, TradeFigures, TradeLimits, TradeRow } from "../../../cells/index.ts";
import { verdicts } from "../../../cells/index.ts";

const figures: TradeFigures = {
  spilloverEfficiency: 0.9,
  polarizationEfficiency: 0.99,
  illuminationEfficiency: 0.88,
  phaseEfficiency: 1,
  apertureEfficiency: 0.784,
  totalEfficiency: 0.75,
  gainDbi: 45,
  crossPolarPeakDb: -40,
  edgeTaperDb: 11,
  halfPowerBeamwidthDeg: 37,
  phaseCenterM: -0.005,
  returnLossDb: null,
  lengthM: 0.1,
  apertureDiameterM: 0.07,
  outerDiameterM: 0.09,
};

function row(kind: TradeRow["kind"], worst: Partial<TradeFigures>, limits: TradeLimits): TradeRow {
  const worstFigures = { ...figures, ...worst };
  const judged = verdicts({ ...worstFigures }, limits);
  const verdict = judged.some((one) => one.verdict === "misses") ? "misses" : "passes";
  return { kind, feasible: true, reason: "", ...figures, worst: worstFigures, verdicts: judged, verdict, warnings: [] };
}

function noRow(kind: TradeRow["kind"], reason: string): TradeRow {
  const none = Object.fromEntries(Object.keys(figures).map((name) => [name, null])) as never as Record<
    keyof TradeFigures,
    null
  >;
  return { kind, feasible: false, reason, ...none, worst: none, verdicts: [], verdict: null, warnings: [] };
}

const limits = { maxCrossPolarPeakDb: -25, minTotalEfficiency: 0.65 };
const trade: Trade = {
  rows: [
    row("smooth", { crossPolarPeakDb: -19.2, totalEfficiency: 0.62, gainDbi: 44.1 }, limits),
    noRow("dualMode", "The dish is too deep for TM11."),
    row("corrugated", { gainDbi: 44.7, totalEfficiency: 0.74 }, limits),
  ],
};

describe("tradeSheet", () => {
  const sheet = tradeSheet(trade);

  test("a column a feed that can be built; the other is a sentence with its reason", () => {
    expect(sheet.columns).toEqual([
      { label: "Smooth cone", kind: "smooth" },
      { label: "Corrugated", kind: "corrugated" },
    ]);
    const refused = sheet.rows.find(({ key }) => key === "dualMode")!;
    expect(refused.label).toBe("Dual-mode: not realisable for this dish");
    expect(refused.cells).toBe("The dish is too deep for TM11.");
    for (const { cells } of sheet.rows) if (typeof cells !== "string") expect(cells).toHaveLength(2);
  });

  test("value at band centre, worst beneath, word under the limit", () => {
    const line = sheet.rows.find(({ key }) => key === "crossPolarPeakDb")!;
    expect(line.under).toBe("dB; at most −25.0");
    expect(line.cells).toEqual([
      { text: "−40.0", word: "worst −19.2, misses by 5.8 dB", verdict: "misses" },
      { text: "−40.0", word: "worst −40.0, passes", verdict: "passes" },
    ]);
    expect(sheet.rows.at(-1)!.cells).toEqual([
      { text: "misses 2 of 2", verdict: "misses" },
      { text: "passes all 2 limits", verdict: "passes" },
    ]);
  });

  test("the numbers for CSV are in SI, a place empty where there is none", () => {
    const [names, smooth, dualMode] = sheet.data;
    expect(sheet.data.every((cells) => cells.length === names!.length)).toBe(true);
    expect(smooth![names!.indexOf("phaseCenterM, band centre")]).toBe(-0.005);
    expect(dualMode![names!.indexOf("gainDbi, worst")]).toBe("");
    expect(dualMode!.at(-1)).toBe("The dish is too deep for TM11.");
  });

  test("no feed at all: only the reasons", () => {
    const bare = tradeSheet({ rows: [noRow("smooth", "Too wide."), noRow("dualMode", "Too deep.")] });
    expect(bare.columns).toEqual([]);
    expect(bare.rows.map(({ cells }) => cells)).toEqual(["Too wide.", "Too deep."]);
    expect(() => tradeSheet({ rows: [] })).toThrow("tradeSheet: trade must have at least one row; got none");
  });
});

describe("tradeSentences", () => {
  test("what passes, what misses and by how much, what can't be built", () => {
    expect(bestRow(trade)!.kind).toBe("corrugated");
    expect(tradeSentences(trade)).toBe(
      "The corrugated horn passes every limit: 44.70 dBi and 74.0 % at the worst of the band. " +
        "The smooth cone misses the limit on cross-polar by 5.8 dB and the limit on total efficiency by 3.0 points. " +
        "A dual-mode horn can't be realised for this dish.",
    );
  });

  test("two that pass: the gain of the second against the first; none that pass: said so", () => {
    const two = { rows: [row("smooth", { gainDbi: 44.1 }, limits), row("corrugated", { gainDbi: 44.7 }, limits)] };
    expect(tradeSentences(two)).toMatch(/^The corrugated horn passes every limit with the most gain: 44\.70 dBi/);
    expect(tradeSentences(two)).toContain("The smooth cone passes too, with −0.60 dB of gain against it.");
    expect(tradeSentences({ rows: [noRow("smooth", "")] })).toMatch(/^No candidate passes every limit\./);
  });
});
