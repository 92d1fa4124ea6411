// A built horn's pattern from a table of measured cuts.

import type { Warning } from "../../check.ts";
import type { ComplexVector } from "../../math/complex.ts";
import { cubicSpline } from "../../math/spline.ts";
import type { FeedPattern } from "../../pattern/feed-pattern.ts";
import { CsvError, type CsvTable, numberColumn, readCsvTable } from "../csv-table.ts";

/** Plain data. */
export interface MeasuredPattern {
  /** Hz */
  frequency: number;
  /** each cut against its own boresight; without phases both cuts are taken as in phase everywhere */
  pattern: FeedPattern;
  hasPhase: boolean;
  /** the 45° plane as measured, dB against boresight copolar, by |θ|; null where it wasn't */
  cross45: { thetaDeg: number[]; levelDb: number[] } | null;
  /** deg, as far as both cuts were measured; nothing is known beyond */
  thetaMaxDeg: number;
  /** largest difference of the two sides of a cut above −30 dB, dB; null for a cut of one side */
  asymmetryDb: number | null;
  warnings: Warning[];
}

/** Angles of the pattern handed on: every quarter of a degree. */
const thetaCount = 721;
/** Levels are believed between these, dB: anything else is a slip of units. */
const levels = { low: -200, high: 100 };

/**
 * Cuts from CSV. Columns: theta_deg, e_db and h_db; with phases e_phase_deg and h_phase_deg; cross45_db for the 45° plane;
 * frequency_ghz for several frequencies in one table. θ from boresight, either sign, any step, a row at 0 in each set. Both
 * sides of a cut are averaged: as complex numbers where phases are there, else in power.
 *
 * @param frequency Hz, where the table has no frequency_ghz
 * @param file what messages call it; default "pattern"
 * @returns one pattern a frequency, in the order of the table
 * @throws {CsvError} with line and column: a column that is missing, no boresight, an angle twice, fewer than five angles a side
 */
export function readPatternCuts(text: string, frequency: number | undefined, file = "pattern"): MeasuredPattern[] {
  const table = readCsvTable(text, file);
  const frequencies = table.columns.includes("frequency_ghz")
    ? numberColumn(table, "frequency_ghz").map((value) => value * 1e9)
    : table.rows.map(() => frequency ?? Number.NaN);
  if (table.rows.length === 0) throw new CsvError(file, 2, "", "rows of angles are expected; got none");
  if (frequencies.some((f) => !(f > 0 && Number.isFinite(f))))
    throw new CsvError(file, 1, "frequency_ghz", "a frequency above 0 is expected for every row");
  const sets = new Map<number, CsvTable["rows"]>();
  table.rows.forEach((row, i) => {
    const set = sets.get(frequencies[i]!);
    if (set) set.push(row);
    else sets.set(frequencies[i]!, [row]);
  });
  return [...sets].map(([f, rows]) => onePattern({ ...table, rows }, f));
}

interface Sample {
  theta: number;
  re: number;
  im: number;
}

function onePattern(table: CsvTable, frequency: number): MeasuredPattern {
  const { file, rows } = table;
  const theta = numberColumn(table, "theta_deg");
  const phases = ["e_phase_deg", "h_phase_deg"].filter((name) => table.columns.includes(name));
  if (phases.length === 1)
    throw new CsvError(file, 1, phases[0]!, "the phase of both cuts is expected, or of neither; this one stands alone");
  const hasPhase = phases.length === 2;
  const seen = new Set<number>();
  theta.forEach((angle, i) => {
    if (Math.abs(angle) > 180)
      throw new CsvError(file, rows[i]!.line, "theta_deg", `an angle from −180 to 180 is expected; got ${angle}`);
    if (seen.has(angle))
      throw new CsvError(file, rows[i]!.line, "theta_deg", `each angle is expected once; ${angle} stands twice`);
    seen.add(angle);
  });
  const boresight = theta.indexOf(0);
  if (boresight < 0) throw new CsvError(file, rows[0]!.line, "theta_deg", "a row at 0, boresight, is expected");
  const cut = (name: string, phaseName: string): Sample[] => {
    const level = levelColumn(table, name);
    const phase = hasPhase ? numberColumn(table, phaseName) : theta.map(() => 0);
    return theta.map((angle, i) => {
      const size = 10 ** ((level[i]! - level[boresight]!) / 20);
      const turn = ((phase[i]! - phase[boresight]!) * Math.PI) / 180;
      return { theta: angle, re: size * Math.cos(turn), im: size * Math.sin(turn) };
    });
  };
  const cuts = [cut("e_db", "e_phase_deg"), cut("h_db", "h_phase_deg")] as const;
  const halves = cuts.map((samples) => sidesOf(samples, file, rows[0]!.line));
  const thetaMaxDeg = Math.max(...halves[0]!.map((side) => side.at(-1)!.theta));
  const grid = Float64Array.from({ length: thetaCount }, (_, i) => (Math.PI * i) / (thetaCount - 1));
  const [e, h] = halves.map((sides) => averaged(sides, grid, thetaMaxDeg, hasPhase)) as [ComplexVector, ComplexVector];
  const copolar = numberColumn(table, "e_db")[boresight]!;
  const cross = table.columns.includes("cross45_db") ? levelColumn(table, "cross45_db") : null;
  const pattern: FeedPattern = { frequency, theta: grid, ePlane: e, hPlane: h, phaseOriginZ: 0, warnings: [] };
  return {
    frequency,
    pattern,
    hasPhase,
    cross45: cross && {
      thetaDeg: theta.map(Math.abs),
      // against boresight copolar, which the E-plane cut shares
      levelDb: cross.map((level) => level - copolar),
    },
    thetaMaxDeg,
    asymmetryDb: asymmetry(halves, grid),
    warnings: warningsOf(pattern, thetaMaxDeg, hasPhase),
  };
}

function levelColumn(table: CsvTable, name: string): number[] {
  return numberColumn(table, name).map((level, i) => {
    if (level >= levels.low && level <= levels.high) return level;
    throw new CsvError(
      table.file,
      table.rows[i]!.line,
      name,
      `a level from ${levels.low} to ${levels.high} dB is expected; got ${level}`,
    );
  });
}

/** The sides of a cut that were measured, each from boresight outward. */
function sidesOf(samples: readonly Sample[], file: string, line: number): Sample[][] {
  const side = (sign: 1 | -1) =>
    samples
      .filter(({ theta }) => theta === 0 || Math.sign(theta) === sign)
      .map((sample) => ({ ...sample, theta: Math.abs(sample.theta) }))
      .sort((a, b) => a.theta - b.theta);
  const sides = [side(1), side(-1)].filter((one) => one.length > 1);
  if (sides.length === 0 || sides.some((one) => one.length < 5))
    throw new CsvError(file, line, "theta_deg", "at least five angles on a side that is measured are expected");
  return sides;
}

const splineOf = (side: readonly Sample[]) => {
  const theta = side.map((sample) => (sample.theta * Math.PI) / 180);
  return {
    last: theta.at(-1)!,
    re: cubicSpline(
      theta,
      side.map(({ re }) => re),
    ),
    im: cubicSpline(
      theta,
      side.map(({ im }) => im),
    ),
  };
};

/** Both sides on one grid: complex mean with phases, power mean without; 0 beyond what was measured. */
function averaged(
  sides: readonly Sample[][],
  grid: Float64Array,
  thetaMaxDeg: number,
  hasPhase: boolean,
): ComplexVector {
  const splines = sides.map(splineOf);
  const end = (thetaMaxDeg * Math.PI) / 180;
  const re = new Float64Array(grid.length);
  const im = new Float64Array(grid.length);
  grid.forEach((theta, i) => {
    const known = splines.filter(({ last }) => theta <= last + 1e-9);
    if (known.length === 0 || theta > end + 1e-9) return;
    const values = known.map((one) => ({ re: one.re.at(theta), im: one.im.at(theta) }));
    if (hasPhase) {
      re[i] = values.reduce((sum, value) => sum + value.re, 0) / values.length;
      im[i] = values.reduce((sum, value) => sum + value.im, 0) / values.length;
    } else re[i] = Math.sqrt(values.reduce((sum, value) => sum + value.re ** 2, 0) / values.length);
  });
  return { re, im };
}

function asymmetry(halves: readonly Sample[][][], grid: Float64Array): number | null {
  const found = halves.flatMap((sides) => {
    if (sides.length < 2) return [];
    const [a, b] = sides.map(splineOf) as [ReturnType<typeof splineOf>, ReturnType<typeof splineOf>];
    return [...grid].flatMap((theta) => {
      if (theta > Math.min(a.last, b.last)) return [];
      const [p, q] = [a, b].map((one) => one.re.at(theta) ** 2 + one.im.at(theta) ** 2) as [number, number];
      return Math.min(p, q) > 1e-3 ? [Math.abs(10 * Math.log10(p / q))] : [];
    });
  });
  return found.length === 0 ? null : Math.max(...found);
}

function warningsOf(pattern: FeedPattern, thetaMaxDeg: number, hasPhase: boolean): Warning[] {
  const warnings: Warning[] = [];
  if (!hasPhase)
    warnings.push({
      code: "outside-validated-range",
      text: "The cuts have no phases: phase efficiency and phase centre are unknown, and so is the cross-polar that follows from the two planes.",
    });
  if (thetaMaxDeg < 180) {
    const beyond = beyondShare(pattern, thetaMaxDeg);
    warnings.push({
      code: "outside-validated-range",
      text: `Nothing was measured beyond ${thetaMaxDeg}°: power there is left out of the spillover. Were it as strong everywhere as at the last angle, it would be ${(100 * beyond).toPrecision(2)} % of all.`,
    });
  }
  return warnings;
}

/** Share of the power beyond the last angle if the level stayed there. */
function beyondShare({ theta, ePlane, hPlane }: FeedPattern, thetaMaxDeg: number): number {
  const intensity = (i: number) => ePlane.re[i]! ** 2 + ePlane.im[i]! ** 2 + hPlane.re[i]! ** 2 + hPlane.im[i]! ** 2;
  const step = theta[1]!;
  let inside = 0;
  let last = 0;
  theta.forEach((angle, i) => {
    if (angle > (thetaMaxDeg * Math.PI) / 180 + 1e-9) return;
    inside += intensity(i) * Math.sin(angle) * step;
    last = i;
  });
  const outside = intensity(last) * (1 + Math.cos((thetaMaxDeg * Math.PI) / 180));
  return outside / (inside + outside);
}
