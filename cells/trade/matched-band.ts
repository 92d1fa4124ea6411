// One horn in one dish over the band, by mode matching of its actual inner wall.

import { requireInteger } from "../check.ts";
import type { Candidate, RealizableHorn, UnrealizableHorn } from "../horn/index.ts";
import { type BandAnalysis, type Convergence, createMatcher, type Resonance } from "../matching/index.ts";
import type { FeedPattern } from "../pattern/feed-pattern.ts";
import type { ApertureModes } from "../radiation/aperture-modes.ts";
import { aperturePattern } from "../radiation/aperture-pattern.ts";
import type { Dish } from "../reflector/dish.ts";
import { type BandResult, fewestFrequencies, type OverBandOptions, overBand, type UnsweptBand } from "./over-band.ts";

/** Frequencies over a band by mode matching, where nothing else is asked. */
export const matchedFrequencies = 41;

/** What the dish and its losses are, for a horn analysed already. */
export type MatchedInDishOptions = Pick<OverBandOptions, "surfaceError" | "strutShare" | "conductivity">;

/** A band by mode matching. Plain data. */
export type MatchedBand = SweptMatchedBand | (UnsweptBand & { model: "mode matching" });

export type SweptMatchedBand = Extract<BandResult, { feasible: true }> & {
  model: "mode matching";
  /** at band centre */
  pattern: FeedPattern;
  /** modes at the mouth at band centre */
  modes: ApertureModes;
  /** S11 of TE11 at the throat, [count], as `frequencies` */
  s11: { re: number; im: number }[];
  /** amplitude of TM11 over that of TE11 at the mouth, [count], as `frequencies` */
  modeRatio: { re: number; im: number }[];
  /** too narrow for the frequencies asked for */
  resonances: Resonance[];
  /** largest |1 − all that travels away| over the band */
  powerBalance: number;
  convergence: Convergence;
};

/** A horn analysed over a band, whatever dish it is for. Plain data. */
export type AnalysedHorn =
  | {
      feasible: true;
      horn: RealizableHorn;
      bandLow: number;
      bandHigh: number;
      analysis: BandAnalysis;
    }
  | { feasible: false; horn: UnrealizableHorn; bandLow: number; bandHigh: number };

export interface AnalysedHornOptions {
  /** Hz, both ends included */
  bandLow: number;
  bandHigh: number;
  /** equally spaced frequencies, at least 21; default 41; an even number becomes the next odd one, so that band centre is among them */
  count?: number;
  /** wanted error of S11; default 1e-3 */
  reflectionError?: number;
  /** wanted error of the mouth's field, dB; default −50 */
  crossPolarErrorDb?: number;
}

// Couplings and section results of the last few horns: a worker that turns the same horn in another dish has them still. What
// it keeps changes no digit of what it gives.
const matcher = createMatcher();

/**
 * Mode matching of a horn's profile over a band, sampled finer where something moves fast. Heavy: some hundred milliseconds,
 * for a worker. What depends on the dish follows in `matchedInDish`.
 * @throws {RangeError} band edges out of order, as `bandAnalysis`
 */
export function analysedHorn(
  candidate: Candidate,
  { bandLow, bandHigh, count = matchedFrequencies, reflectionError, crossPolarErrorDb }: AnalysedHornOptions,
  progress?: (share: number) => void,
): AnalysedHorn {
  if (!candidate.feasible) return { feasible: false, horn: candidate, bandLow, bandHigh };
  if (!(bandLow <= bandHigh))
    throw new RangeError(
      `analysedHorn: the band's lower edge must not be above its upper edge; got ${bandLow / 1e9} GHz and ${bandHigh / 1e9} GHz`,
    );
  const asked = Math.max(requireInteger("analysedHorn: count", count, { min: 1 }), fewestFrequencies);
  const last = asked % 2 === 1 ? asked - 1 : asked;
  const spaced = Array.from({ length: last + 1 }, (_, i) =>
    i === last ? bandHigh : i === last / 2 ? (bandLow + bandHigh) / 2 : bandLow + ((bandHigh - bandLow) * i) / last,
  );
  const frequencies = bandLow === bandHigh ? [bandLow] : spaced;
  const analysis = matcher.band(
    candidate.profile,
    { frequencies, reflectionError, crossPolarErrorDb, sampling: bandLow === bandHigh ? "asked" : "finer" },
    progress,
  );
  return { feasible: true, horn: candidate, bandLow, bandHigh, analysis };
}

/**
 * As `overBand`, with pattern, match and mode content by mode matching: an analysed horn in one dish. Some ten milliseconds for
 * each ten frequencies, for a worker too.
 * @throws {RangeError} as `overBand`
 */
export function matchedInDish(analysed: AnalysedHorn, dish: Dish, options: MatchedInDishOptions = {}): MatchedBand {
  const { horn, bandLow, bandHigh } = analysed;
  const within = { ...options, bandLow, bandHigh };
  if (!analysed.feasible) return { ...refused(overBand(horn, dish, within)), model: "mode matching" };
  const { analysis } = analysed;
  const patterns = analysis.apertureModes.map((modes) => aperturePattern(modes));
  const at = (frequency: number): number => nearest(analysis.frequencies, frequency);
  const band = overBand(horn, dish, {
    ...within,
    frequencies: analysis.frequencies,
    patternAt: (frequency) => patterns[at(frequency)]!,
    reflectionAt: (frequency) => {
      const { re, im } = complexAt(analysis.s11, at(frequency));
      return Math.hypot(re, im);
    },
  });
  if (!band.feasible) return { ...band, model: "mode matching" };
  const middle = at((bandLow + bandHigh) / 2);
  return {
    ...band,
    warnings: [
      ...band.warnings,
      ...analysis.warnings.filter(({ text }) => !band.warnings.some((one) => one.text === text)),
    ],
    model: "mode matching",
    pattern: patterns[middle]!,
    modes: analysis.apertureModes[middle]!,
    s11: analysis.frequencies.map((_, i) => complexAt(analysis.s11, i)),
    modeRatio: analysis.apertureModes.map(ratioOf),
    resonances: analysis.resonances,
    powerBalance: Math.max(...analysis.powerBalance.map(Math.abs)),
    convergence: analysis.convergence,
  };
}

/** Both steps at once. */
export function matchedOverBand(
  candidate: Candidate,
  dish: Dish,
  options: AnalysedHornOptions & MatchedInDishOptions,
  progress?: (share: number) => void,
): MatchedBand {
  return matchedInDish(analysedHorn(candidate, options, progress), dish, options);
}

function refused(band: BandResult): UnsweptBand {
  if (!band.feasible) return band;
  throw new Error("matchedInDish: a horn that can't be realized was swept");
}

function nearest(frequencies: readonly number[], wanted: number): number {
  let best = 0;
  for (let i = 1; i < frequencies.length; i++)
    if (Math.abs(frequencies[i]! - wanted) < Math.abs(frequencies[best]! - wanted)) best = i;
  return best;
}

const complexAt = ({ re, im }: BandAnalysis["s11"], i: number): { re: number; im: number } => ({
  re: re[i]!,
  im: im[i]!,
});

/** TM11 over TE11: the second amplitude over the first. */
function ratioOf({ amplitudes }: ApertureModes): { re: number; im: number } {
  const [te, tm] = [complexAt(amplitudes, 0), complexAt(amplitudes, 1)];
  const power = te.re ** 2 + te.im ** 2;
  return { re: (tm.re * te.re + tm.im * te.im) / power, im: (tm.im * te.re - tm.re * te.im) / power };
}
