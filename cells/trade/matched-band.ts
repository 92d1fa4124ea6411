// One horn in one dish over the band, by mode matching of its actual inner wall.

import type { Candidate } from "../horn/index.ts";
import { type BandAnalysis, bandAnalysis, type Convergence, type Resonance } from "../matching/index.ts";
import type { FeedPattern } from "../pattern/feed-pattern.ts";
import type { ApertureModes } from "../radiation/aperture-modes.ts";
import { aperturePattern } from "../radiation/aperture-pattern.ts";
import type { Dish } from "../reflector/dish.ts";
import { type BandResult, fewestFrequencies, type OverBandOptions, overBand, type UnsweptBand } from "./over-band.ts";

/** Frequencies over a band by mode matching, where nothing else is asked. */
export const matchedFrequencies = 41;

export interface MatchedBandOptions extends Omit<OverBandOptions, "patternAt" | "reflectionAt"> {
  /** wanted error of S11; default 1e-3 */
  reflectionError?: number;
  /** wanted error of the mouth's field, dB; default −50 */
  crossPolarErrorDb?: number;
}

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

/**
 * As `overBand`, with pattern, match and mode content by mode matching of the horn's profile, at an odd number of frequencies
 * so that the middle one is band centre. Heavy: some hundred milliseconds, for a worker.
 *
 * @param options.count frequencies, at least 21; default 41; an even number becomes the next odd one
 * @throws {RangeError} as `overBand` and `bandAnalysis`
 */
export function matchedOverBand(
  candidate: Candidate,
  dish: Dish,
  options: MatchedBandOptions,
  progress?: (share: number) => void,
): MatchedBand {
  const { bandLow, bandHigh, reflectionError, crossPolarErrorDb } = options;
  const asked = Math.max(options.count ?? matchedFrequencies, fewestFrequencies);
  const count = asked % 2 === 1 ? asked : asked + 1;
  const within = { ...options, count };
  if (!candidate.feasible) return { ...refused(overBand(candidate, dish, within)), model: "mode matching" };
  const frequencies = Array.from({ length: count }, (_, i) => bandLow + ((bandHigh - bandLow) * i) / (count - 1));
  const analysis = bandAnalysis(
    candidate.profile,
    { frequencies, reflectionError, crossPolarErrorDb },
    progress && ((share) => progress(0.8 * share)),
  );
  const patterns = analysis.apertureModes.map((modes) => aperturePattern(modes));
  const band = overBand(candidate, dish, {
    ...within,
    patternAt: (frequency) => patterns[nearest(analysis.frequencies, frequency)]!,
    reflectionAt: (frequency) => {
      const { re, im } = complexAt(analysis.s11, nearest(analysis.frequencies, frequency));
      return Math.hypot(re, im);
    },
  });
  progress?.(1);
  if (!band.feasible) return { ...band, model: "mode matching" };
  const middle = (count - 1) / 2;
  // the analysis may have sampled finer where something moves fast
  const at = frequencies.map((frequency) => nearest(analysis.frequencies, frequency));
  return {
    ...band,
    warnings: [
      ...band.warnings,
      ...analysis.warnings.filter(({ text }) => !band.warnings.some((one) => one.text === text)),
    ],
    model: "mode matching",
    pattern: patterns[at[middle]!]!,
    modes: analysis.apertureModes[at[middle]!]!,
    s11: at.map((i) => complexAt(analysis.s11, i)),
    modeRatio: at.map((i) => ratioOf(analysis.apertureModes[i]!)),
    resonances: analysis.resonances,
    powerBalance: Math.max(...analysis.powerBalance.map(Math.abs)),
    convergence: analysis.convergence,
  };
}

function refused(band: BandResult): UnsweptBand {
  if (!band.feasible) return band;
  throw new Error("matchedOverBand: a horn that can't be realized was swept");
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
