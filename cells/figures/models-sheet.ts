// The same horns by two models: what the better one says, what the other said, and where they disagree by more than one would
// let pass.

import type { FeedKind } from "../horn/horn-profile.ts";
import type { Trade, TradeFigures, TradeRow } from "../trade/trade-table.ts";
import { toMm } from "../units.ts";
import { decimal, listed } from "./kit/words.ts";
import type { TradeSheet } from "./trade-sheet.ts";
import { kindNames, kindNouns } from "./trade-words.ts";

type SweptRow = Extract<TradeRow, { feasible: true }>;

interface Line {
  key: string;
  label: string;
  /** what the sentence calls it */
  noun: string;
  unit: string;
  value: (row: SweptRow) => number | null;
  shown: (value: number) => string;
  /** a difference that is worth a word, in the unit of `value` */
  notable: number;
  difference: (value: number) => string;
}

const fieldOf = (field: keyof TradeFigures) => (row: SweptRow) => row[field];
const worstOf = (field: keyof TradeFigures) => (row: SweptRow) => row.worst[field];
const inDb = (value: number): string => `${decimal(value, 1)} dB`;

/** Under this an ideal mouth's cross-polar is no number, and a real one's is below what the wall is turned to. */
const floorDb = -45;
const floored = (value: number | null): number | null => value && Math.max(value, floorDb);

const lines: readonly Line[] = [
  {
    ...{ key: "gainDbi", label: "Gain, band centre", noun: "gain", unit: "dBi", value: fieldOf("gainDbi") },
    ...{ shown: (value) => decimal(value, 2), notable: 0.1, difference: (value) => `${decimal(value, 2)} dB` },
  },
  {
    ...{ key: "apertureEfficiency", label: "Aperture efficiency, worst", noun: "aperture efficiency", unit: "%" },
    ...{ value: worstOf("apertureEfficiency"), shown: (value) => decimal(100 * value, 1), notable: 0.01 },
    difference: (value) => `${decimal(100 * value, 1)} points`,
  },
  {
    ...{ key: "crossPolarCenter", label: "Cross-polar, band centre", noun: "cross-polar at band centre", unit: "dB" },
    ...{ value: (row) => floored(row.crossPolarPeakDb), shown: crossPolar, notable: 2, difference: inDb },
  },
  {
    ...{ key: "crossPolarWorst", label: "Cross-polar, worst", noun: "cross-polar at its worst", unit: "dB" },
    ...{ value: (row) => floored(row.worst.crossPolarPeakDb), shown: crossPolar, notable: 2, difference: inDb },
  },
  {
    ...{ key: "edgeTaperDb", label: "Edge taper, band centre", noun: "edge taper", unit: "dB", notable: 0.5 },
    ...{ value: fieldOf("edgeTaperDb"), shown: (value) => decimal(value, 1), difference: inDb },
  },
  {
    ...{ key: "halfPowerBeamwidthDeg", label: "Half-power beamwidth", noun: "beamwidth", unit: "deg", notable: 1 },
    ...{ value: fieldOf("halfPowerBeamwidthDeg"), shown: (value) => decimal(value, 1) },
    difference: (value) => `${decimal(value, 1)}°`,
  },
  {
    ...{ key: "phaseCenterM", label: "Phase centre from the mouth", noun: "phase centre", unit: "mm, − inside" },
    ...{ value: fieldOf("phaseCenterM"), shown: (value) => decimal(toMm(value), 1), notable: 1e-3 },
    difference: (value) => `${decimal(toMm(value), 1)} mm`,
  },
  {
    ...{ key: "returnLossDb", label: "Return loss at the throat, worst", noun: "return loss", unit: "dB" },
    ...{ value: worstOf("returnLossDb"), shown: (value) => decimal(value, 1), notable: 1, difference: inDb },
  },
];

function crossPolar(value: number): string {
  return value <= floorDb ? `below ${decimal(floorDb, 0)}` : decimal(value, 1);
}

const isSwept = (row: TradeRow | undefined): row is SweptRow => row?.feasible === true;

/** Rows that both models could sweep. */
function pairs(first: Trade, second: Trade): { first: SweptRow; second: SweptRow }[] {
  return second.rows.flatMap((row) => {
    const other = first.rows.find(({ kind }) => kind === row.kind);
    return isSwept(row) && isSwept(other) ? [{ first: other, second: row }] : [];
  });
}

/**
 * A table of the second model's values with the first's beneath.
 * @param first  the quicker model's trade, named in `names.first`
 * @param second the better model's
 */
export function modelsSheet(first: Trade, second: Trade, names: { first: string }): TradeSheet {
  const both = pairs(first, second);
  return {
    columns: both.map(({ second: { kind } }) => ({ label: kindNames[kind], kind })),
    rows: lines.map(({ key, label, unit, value, shown }) => ({
      key,
      label,
      under: unit,
      cells: both.map((pair) => {
        const [before, now] = [value(pair.first), value(pair.second)];
        if (now === null) return { text: "not known" };
        return {
          text: shown(now),
          word: before === null ? `${names.first}: not known` : `${names.first} ${shown(before)}`,
        };
      }),
    })),
    data: [
      ["quantity", "unit (SI)", ...both.flatMap(({ second: { kind } }) => [`${kind}, ${names.first}`, kind])],
      ...lines.map(({ key, value }): (string | number)[] => [
        key,
        key.endsWith("M") ? "m" : "",
        ...both.flatMap((pair) => [value(pair.first) ?? "", value(pair.second) ?? ""]),
      ]),
    ],
  };
}

/** A sentence for each horn on what the models disagree about by more than one would let pass; none where they agree. */
export function disagreements(first: Trade, second: Trade): { kind: FeedKind; text: string }[] {
  return pairs(first, second).flatMap((pair) => {
    const parts = lines.flatMap(({ noun, value, notable, difference }) => {
      const [before, now] = [value(pair.first), value(pair.second)];
      if (before === null || now === null || Math.abs(now - before) <= notable) return [];
      return [`${noun} by ${difference(Math.abs(now - before))}`];
    });
    if (parts.length === 0) return [];
    return [
      { kind: pair.second.kind, text: `On the ${kindNouns[pair.second.kind]} the models differ in ${listed(parts)}.` },
    ];
  });
}
