// The trade: every candidate in one row, band centre and worst over the band side by side, judged.

import type { Warning } from "../check.ts";
import type { FeedKind } from "../horn/index.ts";
import type { BandPoint, BandResult, SweptBand } from "./over-band.ts";
import { type TradeLimits, type Verdict, type VerdictWord, verdicts } from "./verdict.ts";

/** The numbers of a row. Signs and references as in `BandPoint`. */
export interface TradeFigures {
  spilloverEfficiency: number;
  polarizationEfficiency: number;
  illuminationEfficiency: number;
  phaseEfficiency: number;
  /** product of the four above */
  apertureEfficiency: number;
  /** blockage, surface and ohmic loss included */
  totalEfficiency: number;
  gainDbi: number;
  crossPolarPeakDb: number;
  edgeTaperDb: number;
  halfPowerBeamwidthDeg: number;
  phaseCenterM: number;
  /** null by a model that doesn't know the match */
  returnLossDb: number | null;
  lengthM: number;
  /** inner diameter of the mouth */
  apertureDiameterM: number;
  /** over the walls */
  outerDiameterM: number;
}

/** A feed that can't be built has no numbers: null, and its reason. */
export type NoFigures = Record<keyof TradeFigures, null>;

interface RowFacts {
  kind: FeedKind;
  reason: string;
  warnings: Warning[];
}

export type TradeRow =
  | (RowFacts & TradeFigures & { feasible: true; worst: TradeFigures; verdicts: Verdict[]; verdict: VerdictWord })
  | (RowFacts & NoFigures & { feasible: false; worst: NoFigures; verdicts: []; verdict: null });

export interface Trade {
  rows: TradeRow[];
}

/** The figures that a sweep gives at each frequency, and which of its values is the worst. */
const swept = {
  spilloverEfficiency: "least",
  polarizationEfficiency: "least",
  illuminationEfficiency: "least",
  phaseEfficiency: "least",
  apertureEfficiency: "least",
  totalEfficiency: "least",
  gainDbi: "least",
  crossPolarPeakDb: "greatest",
  edgeTaperDb: "farthest",
  halfPowerBeamwidthDeg: "greatest",
  phaseCenterM: "farthest",
  returnLossDb: "least",
} as const satisfies Partial<Record<keyof TradeFigures, "least" | "greatest" | "farthest">>;

type SweptName = keyof typeof swept;
const sweptNames = Object.keys(swept) as SweptName[];

const figureNames: readonly (keyof TradeFigures)[] = [...sweptNames, "lengthM", "apertureDiameterM", "outerDiameterM"];

/**
 * Sets candidates side by side: each figure at band centre, and the worst over the band beside it (`worst`): the least
 * efficiency and gain, the highest cross-polar, the broadest beam, the edge taper and phase centre farthest from those at
 * band centre. Limits are judged on the worst.
 *
 * @param bands results of `overBand`, in the order of the rows
 * @throws {RangeError} a limit that isn't a finite number
 */
export function tradeTable(bands: readonly BandResult[], limits: TradeLimits = {}): Trade {
  return { rows: bands.map((band) => (band.feasible ? sweptRow(band, limits) : emptyRow(band))) };
}

function sweptRow(band: SweptBand, limits: TradeLimits): TradeRow {
  const { horn, center, points } = band;
  const fixed = {
    lengthM: horn.length,
    apertureDiameterM: 2 * horn.apertureRadius,
    outerDiameterM: horn.outerDiameter,
  };
  const atCenter = figures((name) => center[name]);
  const worst = { ...figures((name) => worstOf(name, points, center)), ...fixed };
  const judged = verdicts({ ...worst }, limits);
  return {
    kind: band.kind,
    feasible: true,
    reason: band.reason,
    ...atCenter,
    ...fixed,
    worst,
    verdicts: judged,
    verdict: overall(judged),
    warnings: band.warnings,
  };
}

function emptyRow({ kind, reason, warnings }: { kind: FeedKind; reason: string; warnings: Warning[] }): TradeRow {
  const none = Object.fromEntries(figureNames.map((name) => [name, null])) as NoFigures;
  return { kind, feasible: false, reason, ...none, worst: none, verdicts: [], verdict: null, warnings };
}

function figures(value: (name: SweptName) => number | null): Pick<TradeFigures, SweptName> {
  return Object.fromEntries(sweptNames.map((name) => [name, value(name)])) as Pick<TradeFigures, SweptName>;
}

function worstOf(name: SweptName, points: readonly BandPoint[], center: BandPoint): number | null {
  const values = points.map((point) => point[name]).filter((value) => value !== null);
  const middle = center[name];
  if (middle === null || values.length < points.length) return null;
  switch (swept[name]) {
    case "least":
      return Math.min(...values);
    case "greatest":
      return Math.max(...values);
    case "farthest": {
      const distance = (value: number): number => Math.abs(value - middle);
      return values.reduce((far, value) => (distance(value) > distance(far) ? value : far), middle);
    }
  }
}

const overall = (judged: readonly Verdict[]): VerdictWord =>
  judged.some(({ verdict }) => verdict === "misses")
    ? "misses"
    : judged.some(({ verdict }) => verdict === "barely")
      ? "barely"
      : "passes";
