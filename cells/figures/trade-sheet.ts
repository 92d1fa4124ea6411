// A trade as a table: each figure at band centre, the worst over the band beneath it, and the word on it under the study's limits.

import type { FeedKind } from "../horn/horn-profile.ts";
import type { Trade, TradeFigures, TradeRow } from "../trade/trade-table.ts";
import type { Verdict, VerdictWord } from "../trade/verdict.ts";
import { toMm } from "../units.ts";
import { decimal } from "./kit/words.ts";
import { kindNames } from "./trade-words.ts";

/** Rows of a table as plain data: what the page's `table` takes. */
export interface TradeSheet {
  columns: { label: string; kind: FeedKind }[];
  rows: {
    key: string;
    label: string;
    under?: string;
    total?: boolean;
    cells: { text: string; word?: string; verdict?: VerdictWord }[] | string;
  }[];
  /** for CSV: SI units named in the first row; an unrealizable feed's places are empty */
  data: (string | number)[][];
}

interface Line {
  field: keyof TradeFigures;
  label: string;
  unit: string;
  /** value as shown, without its unit */
  shown: (value: number) => string;
  /** the word for its worst over the band, default "worst"; none: it doesn't change over the band */
  over?: "worst" | "up to" | "none";
}

const percentage = (value: number): string => decimal(100 * value, 1);
const inMm = (value: number): string => decimal(toMm(value), 1);
const oneDecimal = (value: number): string => decimal(value, 1);

/** Anything weaker than this isn't meant as a number: an ideal mouth radiates none at all. */
const noCrossPolarDb = -60;

const lines: readonly Line[] = [
  { field: "gainDbi", label: "Gain", unit: "dBi", shown: (value) => decimal(value, 2) },
  { field: "totalEfficiency", label: "Efficiency, all losses", unit: "%", shown: percentage },
  { field: "apertureEfficiency", label: "Aperture efficiency", unit: "%, product of the next four", shown: percentage },
  { field: "spilloverEfficiency", label: "Spillover", unit: "%", shown: percentage },
  { field: "illuminationEfficiency", label: "Illumination", unit: "%", shown: percentage },
  { field: "phaseEfficiency", label: "Phase", unit: "%", shown: (value) => decimal(100 * value, 2) },
  { field: "polarizationEfficiency", label: "Polarisation", unit: "%", shown: (value) => decimal(100 * value, 2) },
  {
    field: "crossPolarPeakDb",
    label: "Highest cross-polar",
    unit: "dB",
    shown: (value) => (value < noCrossPolarDb ? `below ${decimal(noCrossPolarDb, 0)}` : decimal(value, 1)),
  },
  { field: "returnLossDb", label: "Return loss at the throat", unit: "dB", shown: oneDecimal },
  { field: "edgeTaperDb", label: "Edge taper, space loss included", unit: "dB", shown: oneDecimal, over: "up to" },
  { field: "halfPowerBeamwidthDeg", label: "Half-power beamwidth", unit: "deg", shown: oneDecimal, over: "up to" },
  { field: "phaseCenterM", label: "Phase centre from the mouth", unit: "mm, − inside", shown: inMm, over: "up to" },
  { field: "lengthM", label: "Length", unit: "mm", shown: inMm, over: "none" },
  { field: "apertureDiameterM", label: "Mouth, inner diameter", unit: "mm", shown: inMm, over: "none" },
  { field: "outerDiameterM", label: "Outside diameter", unit: "mm", shown: inMm, over: "none" },
];

type SweptRow = Extract<TradeRow, { feasible: true }>;
const isSwept = (row: TradeRow): row is SweptRow => row.feasible;

/**
 * The table of a trade. A feed that can't be realized has no column but a sentence across all of them, with the reason.
 * @param trade rows of `tradeTable`, at least one
 * @throws {RangeError} no rows
 */
export function tradeSheet(trade: Trade): TradeSheet {
  if (trade.rows.length === 0) throw new RangeError("tradeSheet: trade must have at least one row; got none");
  const swept = trade.rows.filter(isSwept);
  const known = lines.filter(({ field }) => swept.every((row) => row[field] !== null));
  const rows: TradeSheet["rows"] = swept.length === 0 ? [] : known.map((line) => lineOf(line, swept));
  for (const row of trade.rows)
    if (!row.feasible)
      rows.push({ key: row.kind, label: `${kindNames[row.kind]}: not realisable for this dish`, cells: row.reason });
  if (swept.some(({ verdicts }) => verdicts.length > 0))
    rows.push({ key: "all", label: "In all", total: true, cells: swept.map(overallCell) });
  return { columns: swept.map(({ kind }) => ({ label: kindNames[kind], kind })), rows, data: numbersOf(trade) };
}

function lineOf(
  { field, label, unit, shown, over = "worst" }: Line,
  swept: readonly SweptRow[],
): TradeSheet["rows"][number] {
  const limit = swept.flatMap(({ verdicts }) => verdicts).find((verdict) => verdict.field === field);
  return {
    key: field,
    label,
    under: limit ? `${unit}; ${limit.sense} ${shown(limit.limit)}` : unit,
    cells: swept.map((row) => {
      const worst = shown(row.worst[field] as number);
      const judged = row.verdicts.find((verdict) => verdict.field === field);
      const words = [...(over === "none" ? [] : [`${over} ${worst}`]), ...(judged ? [judged.words] : [])].join(", ");
      return {
        text: shown(row[field] as number),
        ...(words ? { word: words } : {}),
        ...(judged ? { verdict: judged.verdict } : {}),
      };
    }),
  };
}

function overallCell({ verdict, verdicts }: SweptRow): { text: string; verdict: VerdictWord } {
  const missed = verdicts.filter((judged: Verdict) => judged.verdict === "misses").length;
  const all = verdicts.length === 1 ? "its limit" : `all ${verdicts.length} limits`;
  const text =
    verdict === "misses"
      ? `misses ${missed} of ${verdicts.length}`
      : verdict === "barely"
        ? `passes ${all}, barely`
        : `passes ${all}`;
  return { text, verdict };
}

function numbersOf({ rows }: Trade): (string | number)[][] {
  const fields = lines.map(({ field }) => field);
  const named = (field: string, at: string): string => `${field}, ${at}`;
  return [
    ["kind", "feasible", ...fields.flatMap((field) => [named(field, "band centre"), named(field, "worst")]), "reason"],
    ...rows.map((row): (string | number)[] => [
      row.kind,
      row.feasible ? "yes" : "no",
      ...fields.flatMap((field) => [row[field] ?? "", row.worst[field] ?? ""]),
      row.reason,
    ]),
  ];
}
