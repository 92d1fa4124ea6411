// One feed in one dish, over the band.

import { requireInteger, requireNumber, requirePositive, type Warning } from "../check.ts";
import type { Candidate, FeedKind, RealizableHorn } from "../horn/index.ts";
import { closedFormPattern, ohmicLossDb } from "../horn/index.ts";
import { beamwidth, crossPolarPeak, halfPowerDb, levelAt } from "../pattern/cuts.ts";
import type { FeedPattern } from "../pattern/feed-pattern.ts";
import { directivity } from "../pattern/power.ts";
import { type Dish, spaceLossDb } from "../reflector/dish.ts";
import { type DishPerformance, dishEfficiency } from "../reflector/efficiency.ts";
import { phaseCenterOverDish } from "../reflector/feed-position.ts";
import { fieldToDb, powerToDb, toDeg, toGHz, toMm } from "../units.ts";

/** Fewest frequencies over a band. */
export const fewestFrequencies = 21;
/** S/m, aluminium (Pozar, appendix F, from memory); an alloy or a rough surface is worse. */
export const aluminiumConductivity = 3.8e7;

export interface OverBandOptions {
  /** Hz, both ends included */
  bandLow: number;
  bandHigh: number;
  /** equally spaced frequencies, ends included; at least 21, which is the default */
  count?: number;
  /** Hz, ascending, both edges and band centre among them, at least 21: instead of equally spaced ones */
  frequencies?: readonly number[];
  /** m, rms of the dish; default 0 */
  surfaceError?: number;
  /** share of the aperture that struts shade, 0…1; default 0 */
  strutShare?: number;
  /** S/m of the horn's wall; default aluminium, 3.8e7 */
  conductivity?: number;
  /** the feed's pattern at a frequency; default the closed form of the horn's kind. Another model of the same horn goes here */
  patternAt?: (frequency: number) => FeedPattern;
  /** |S11| of TE11 at the horn's throat, by a model that knows it; default unknown */
  reflectionAt?: (frequency: number) => number;
}

/** A feed in its dish at one frequency. */
export interface BandPoint extends DishPerformance {
  /** dB against boresight copolar, highest over 0…90° in the 45° plane; −300 stands for none */
  crossPolarPeakDb: number;
  /** dB, positive: how far the dish's edge lies below its middle, φ-mean, space loss included */
  edgeTaperDb: number;
  /** full width, copolar in the 45° plane */
  halfPowerBeamwidthDeg: number;
  /** m, best fit over the dish at this frequency; 0 = mouth, negative inside the horn */
  phaseCenterM: number;
  /** m, E-plane minus H-plane */
  phaseCenterSplitM: number;
  /** dBi of the feed alone */
  feedDirectivityDbi: number;
  /** dB, positive, in the feed's walls */
  ohmicLossDb: number;
  /** dB, positive, of TE11 at the throat; null by a model that doesn't know the match */
  returnLossDb: number | null;
}

/** What the band gave, or why there is nothing to sweep. Plain data. */
export type BandResult = SweptBand | UnsweptBand;

export interface SweptBand {
  feasible: true;
  kind: FeedKind;
  reason: string;
  horn: RealizableHorn;
  /** m, the point of the feed's axis that stands at the focus, over the whole band: its phase centre at band centre */
  feedPositionZ: number;
  /** Hz, [count] */
  frequencies: number[];
  /** [count] */
  points: BandPoint[];
  center: BandPoint;
  /** each once, with the frequencies over which it was raised where not all */
  warnings: Warning[];
}

export interface UnsweptBand {
  feasible: false;
  kind: FeedKind;
  reason: string;
  warnings: Warning[];
}

/**
 * A horn in a dish over a band: sub-efficiencies, gain, cross-polar, beamwidths, taper and phase centre at equally spaced
 * frequencies. The feed stands where its phase centre at band centre is at the focus, and stays there: what its phase centre
 * does over the band costs phase efficiency. It shades the dish with its outside diameter.
 *
 * A candidate that isn't feasible passes through with its reason.
 *
 * @throws {RangeError} band edges out of order, fewer than 21 frequencies, an option out of range
 */
export function overBand(candidate: Candidate, dish: Dish, options: OverBandOptions): BandResult {
  const { bandLow, bandHigh } = options;
  requirePositive("overBand: band, lower edge", bandLow, "Hz");
  requirePositive("overBand: band, upper edge", bandHigh, "Hz");
  if (bandLow > bandHigh)
    throw new RangeError(
      `overBand: the band's lower edge must not be above its upper edge; got ${toGHz(bandLow)} GHz and ${toGHz(bandHigh)} GHz`,
    );
  const count = requireInteger("overBand: count", options.count ?? fewestFrequencies, { min: fewestFrequencies });
  if (!candidate.feasible) return candidate;
  const { kind, reason } = candidate;
  if (candidate.outerDiameter >= dish.diameter)
    return {
      feasible: false,
      kind,
      reason: `The horn, ${toMm(candidate.outerDiameter).toFixed(1)} mm across its walls, would shade the whole dish of ${toMm(dish.diameter).toFixed(1)} mm.`,
      warnings: candidate.warnings,
    };

  const bandCenter = (bandLow + bandHigh) / 2;
  const patternAt = options.patternAt ?? ((frequency: number) => closedFormPattern(candidate, frequency));
  const centerPattern = patternAt(bandCenter);
  const feedPositionZ = phaseCenterOverDish(centerPattern, dish).z;
  const pointAt = (frequency: number, pattern: FeedPattern): BandPoint =>
    bandPoint({ horn: candidate, dish, pattern, feedPositionZ, options, frequency });
  const center = pointAt(bandCenter, centerPattern);
  const frequencies = options.frequencies
    ? checkedFrequencies(options.frequencies, bandLow, bandHigh)
    : Array.from({ length: count }, (_, i) =>
        i === count - 1 ? bandHigh : bandLow + ((bandHigh - bandLow) * i) / (count - 1),
      );
  const points = frequencies.map((f) => (f === bandCenter ? center : pointAt(f, patternAt(f))));
  return {
    feasible: true,
    kind,
    reason,
    horn: candidate,
    feedPositionZ,
    frequencies,
    points,
    center,
    warnings: gatheredWarnings(candidate.warnings, points),
  };
}

function checkedFrequencies(frequencies: readonly number[], bandLow: number, bandHigh: number): number[] {
  const sound =
    frequencies.length >= fewestFrequencies &&
    frequencies[0] === bandLow &&
    frequencies.at(-1) === bandHigh &&
    frequencies.every((f, i) => i === 0 || f > frequencies[i - 1]!);
  if (sound || (bandLow === bandHigh && frequencies.length > 0)) return [...frequencies];
  throw new RangeError(
    `overBand: frequencies must ascend from the band's lower to its upper edge, at least ${fewestFrequencies} of them; got ${frequencies.length}`,
  );
}

interface PointInput {
  horn: RealizableHorn;
  dish: Dish;
  pattern: FeedPattern;
  feedPositionZ: number;
  options: OverBandOptions;
  frequency: number;
}

function bandPoint({ horn, dish, pattern, feedPositionZ, options, frequency }: PointInput): BandPoint {
  const loss = ohmicLossDb(horn, frequency, options.conductivity ?? aluminiumConductivity);
  const performance = dishEfficiency(pattern, dish, {
    phaseCenter: feedPositionZ,
    blockageDiameter: horn.outerDiameter,
    strutShare: options.strutShare,
    surfaceError: options.surfaceError,
    ohmicLossDb: loss,
  });
  const center = phaseCenterOverDish(pattern, dish);
  return {
    ...performance,
    crossPolarPeakDb: crossPolarPeak(pattern),
    edgeTaperDb: spaceLossDb(dish.halfAngle) - levelAt(pattern, dish.halfAngle).meanDb,
    halfPowerBeamwidthDeg: toDeg(beamwidth(pattern, halfPowerDb, "D")),
    phaseCenterM: center.z,
    phaseCenterSplitM: center.splitZ,
    feedDirectivityDbi: powerToDb(directivity(pattern)),
    ohmicLossDb: loss,
    returnLossDb: options.reflectionAt ? returnLossDb(options.reflectionAt(frequency)) : null,
  };
}

/** Largest return loss told: below |S11| = 1e-5 it is rounding and roughness, no property of a horn. */
const largestReturnLossDb = 100;

/** dB, positive. @throws {RangeError} a reflection outside 0…1 */
function returnLossDb(reflection: number): number {
  requireNumber("overBand: reflection", reflection, { min: 0, max: 1 + 1e-6 });
  return Math.min(largestReturnLossDb, -fieldToDb(reflection));
}

/** The horn's own warnings and those of every frequency, each kind once: numbers in a text vary over the band, so the first stands for all. */
function gatheredWarnings(own: Warning[], points: BandPoint[]): Warning[] {
  const seen = new Map<string, Warning>();
  for (const warning of [...own, ...points.flatMap((point) => point.warnings)]) {
    const key = warning.text.replace(/[\d.]+/g, "#");
    if (!seen.has(key)) seen.set(key, warning);
  }
  return [...seen.values()];
}
