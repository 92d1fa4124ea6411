// A horn known by its inner wall alone, over a band: everything that mode matching tells of it.

import { requireInteger, requirePositive, type Warning } from "../../check.ts";
import { modeName } from "../../guide/mode.ts";
import { bandAnalysis, type Convergence, type Resonance } from "../../matching/index.ts";
import type { ComplexVector } from "../../math/complex.ts";
import { type CutLevels, crossPolarPeak, cutLevels } from "../../pattern/cuts.ts";
import type { FeedPattern } from "../../pattern/feed-pattern.ts";
import { phaseCenter } from "../../pattern/phase-center.ts";
import { apertureDirectivity, directivity } from "../../pattern/power.ts";
import { aperturePattern } from "../../radiation/aperture-pattern.ts";
import { fieldToDb, powerToDb } from "../../units.ts";
import type { HornProfile } from "../horn-profile.ts";

export interface OwnBandOptions {
  /** Hz, both ends included */
  bandLow: number;
  bandHigh: number;
  /** equally spaced frequencies, ends included; at least 2 */
  points: number;
  /** the mouth's own reflection: left out, or as of an infinite flange; default left out */
  mouth?: "none" | "flange";
}

/** Plain data. Lists are [frequencyCount] where nothing else is said. */
export interface OwnBand {
  /** Hz, ascending: those asked for, and more where something moves fast */
  frequencyHz: number[];
  /** of TE11 at the start of the profile */
  s11: { re: number; im: number }[];
  /** dB, positive; 100 stands for more */
  returnLossDb: number[];
  /** power waves at the mouth for 1 W of TE11 at the start, [frequencyCount][mode] */
  apertureModes: { mode: string; re: number; im: number }[][];
  /** from the power that the pattern radiates */
  directivityDbi: number[];
  /** from the power that the modes at the mouth carry, which includes what the model radiates nowhere */
  apertureDirectivityDbi: number[];
  /** dB against boresight copolar, highest over 0…90° in the 45° plane */
  crossPolarPeakDb: number[];
  /** m from the mouth, negative inside, fitted over 30° from the axis */
  phaseCenterM: number[];
  /** 1 less all that travels away */
  powerBalance: number[];
  /** the pattern at band centre, as levels and as fields */
  pattern: CutLevels;
  centerPattern: FeedPattern;
  /** return loss at band centre without and with the mouth's own reflection, dB */
  mouthEffect: { noneDb: number; flangeDb: number };
  convergence: Convergence;
  /** too narrow to be seen at the frequencies asked for */
  resonances: Resonance[];
  warnings: Warning[];
}

/** Return loss beyond which |S11| is rounding. */
const largestReturnLossDb = 100;

/** Half-width of the beam over which a phase centre is fitted, rad. */
const beam = Math.PI / 6;

/**
 * Mode matching of a profile at equally spaced frequencies.
 * @throws {RangeError} band edges out of order, fewer than two points, TE11 below cutoff at the start; a profile that makes no sense
 */
export function ownBand(
  profile: HornProfile,
  { bandLow, bandHigh, points, mouth = "none" }: OwnBandOptions,
  progress?: (share: number) => void,
): OwnBand {
  requirePositive("ownBand: band, lower edge", bandLow, "Hz");
  requirePositive("ownBand: band, upper edge", bandHigh, "Hz");
  if (bandLow >= bandHigh)
    throw new RangeError(
      `ownBand: the band's lower edge must be below its upper edge; got ${bandLow / 1e9} GHz and ${bandHigh / 1e9} GHz`,
    );
  requireInteger("ownBand: points", points, { min: 2, max: 20_001 });
  const frequencies = Array.from({ length: points }, (_, i) =>
    i === points - 1 ? bandHigh : bandLow + ((bandHigh - bandLow) * i) / (points - 1),
  );
  const analysis = bandAnalysis(
    profile,
    { frequencies, sampling: "finer", mouthAdmittance: mouth },
    progress && ((share) => progress(0.85 * share)),
  );
  const patterns = analysis.apertureModes.map((modes) => aperturePattern(modes));
  const center = (bandLow + bandHigh) / 2;
  const middle = analysis.frequencies.findIndex((f) => Math.abs(f - center) <= 1e-12 * center);
  const centerPattern =
    patterns[middle] ?? aperturePattern(bandAnalysis(profile, { frequencies: [center] }).apertureModes[0]!);
  const returned = (mouthAdmittance: "none" | "flange"): number => {
    const { s11 } = bandAnalysis(profile, { frequencies: [center], mouthAdmittance });
    return Math.min(largestReturnLossDb, -fieldToDb(Math.hypot(s11.re[0]!, s11.im[0]!)));
  };
  progress?.(1);
  const s11 = pairs(analysis.s11);
  return {
    frequencyHz: analysis.frequencies,
    s11,
    returnLossDb: s11.map(({ re, im }) => Math.min(largestReturnLossDb, -fieldToDb(Math.hypot(re, im)))),
    apertureModes: analysis.apertureModes.map(({ amplitudes }) =>
      pairs(amplitudes).map((amplitude, i) => ({
        mode: modeName({ family: i % 2 === 0 ? "TE" : "TM", m: 1, n: (i >> 1) + 1 }),
        ...amplitude,
      })),
    ),
    directivityDbi: patterns.map((pattern) => powerToDb(directivity(pattern))),
    apertureDirectivityDbi: patterns.map((pattern) => powerToDb(apertureDirectivity(pattern))),
    crossPolarPeakDb: patterns.map((pattern) => crossPolarPeak(pattern)),
    phaseCenterM: patterns.map((pattern) => phaseCenter(pattern, beam).z),
    powerBalance: analysis.powerBalance,
    pattern: cutLevels(centerPattern),
    centerPattern,
    mouthEffect: { noneDb: returned("none"), flangeDb: returned("flange") },
    convergence: analysis.convergence,
    resonances: analysis.resonances,
    warnings: analysis.warnings,
  };
}

const pairs = ({ re, im }: ComplexVector): { re: number; im: number }[] =>
  Array.from(re, (value, i) => ({ re: value, im: im[i]! }));
