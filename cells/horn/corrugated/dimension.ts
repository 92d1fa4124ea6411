// First dimensions of the corrugated horn.

import { speedOfLight } from "../../constants.ts";
import { cutoffRadius, TE11 } from "../../guide/mode.ts";
import { balancedSlotDepth } from "../../guide/slot.ts";
import { levelAt } from "../../pattern/cuts.ts";
import type { Candidate, UnrealizableHorn } from "../candidate.ts";
import type { Flare } from "../flare.ts";
import { coarseThetaCountFor } from "../kind.ts";
import { mouthForTaper } from "../mouth.ts";
import {
  ghz,
  largestRadiusWaves,
  metSentence,
  mm,
  refusedByDiameter,
  refusedByMouth,
  refusedByTaper,
  unrealizable,
} from "../refusal.ts";
import {
  checkedLimits,
  cutoffFactor,
  type FeedRequirement,
  type HornLimits,
  type KnownLimits,
  nearCutoffWarnings,
} from "../requirement.ts";
import {
  type CorrugatedGeometry,
  converterCount,
  corrugatedDimensions,
  corrugatedLength,
  corrugatedOuterDiameter,
  corrugatedProfile,
  corrugations,
  fewestCorrugations,
  mostCorrugations,
  wallAt,
} from "./geometry.ts";
import { he11Pattern } from "./model.ts";
import { validity } from "./validity.ts";

// Rules of thumb, common practice; most of them collected in Granet & James 2005. Wavelengths at band centre.
const preferredPitch = 1 / 8;
const longestPitch = 1 / 5;
const shortestPitch = 1 / 10;
const preferredSlotFill = 0.75;
const leastSlotFill = 0.7;
/** ka of the throat at band centre; at most this ka at the upper, short of TM11's 3.83 */
const throatKa = 3;
const largestThroatKa = 3.7;
/** Lower band edge over balanced frequency, at least: a slow wave begins at about 0.92. */
const leastBandLow = 0.95;

/**
 * Dimensions a corrugated horn: throat at ka ≈ 3; mouth and length from the wanted mean taper at the rim and the wanted phase
 * error, solved on the pattern of HE11 with the hybrid factor that the actual last slot gives it; a whole number of
 * corrugations of pitch λ/10…λ/5, as many as come nearest to λ/8; slots of 0.7 or 0.75 of the pitch with teeth no thinner
 * than the workshop's limit; depths from 0.42 λ over six slots to the balanced depth.
 *
 * The slots are balanced at band centre, in a wide band lower, so that the lower edge keeps clear of the slow wave. The
 * horn is refused when the band reaches beyond what HE11 alone describes (`validity`).
 *
 * @throws {RangeError} illegal requirement or limits (see `checkedLimits`)
 * @source Granet & James, "Design of corrugated horns: a primer", IEEE Antennas Propag. Mag. 47(2), 76–84, 2005; Clarricoats &
 *   Olver, "Corrugated Horns for Microwave Antennas", 1984
 */
export function corrugatedHorn(requirement: FeedRequirement, limits: HornLimits = {}): Candidate {
  const known = checkedLimits("corrugatedHorn", requirement, limits);
  const { bandLow, bandCenter, bandHigh, halfAngle, feedTaperDb } = requirement;
  const wavelength = speedOfLight / bandCenter;
  const comb = combFor(known.toothThickness, wavelength);
  const throat = throatFor(requirement);
  const refused = refusedByTaper("corrugated", requirement) ?? refusal(comb) ?? refusal(throat);
  if (refused) return refused;
  const { pitch: wantedPitch, slotFill } = comb as Comb;
  const throatRadius = throat as number;

  const balanceFrequency = Math.min(bandCenter, bandLow / leastBandLow);
  const cutoff = cutoffRadius(TE11, bandLow);
  const throatLength = wavelength / 4;
  const found = mouthForTaper({
    taperOf: (flare) => {
      const last = { innerRadius: flare.radius, depth: balancedSlotDepth(balanceFrequency, flare.radius) };
      const thetaCount = coarseThetaCountFor(flare.radius, bandCenter);
      return -levelAt(he11Pattern({ flare, last, slotFill }, bandCenter, thetaCount), halfAngle).meanDb;
    },
    wantedDb: feedTaperDb,
    smallest: cutoffFactor.mouth * cutoff,
    largest: largestRadiusWaves * wavelength,
    startRadiusFor: (radius) => Math.min(throatRadius, radius),
    wavelength,
    phaseError: known.phaseError,
    minLength: fewestCorrugations * wantedPitch,
    maxFlareLength: known.maxLength - throatLength,
  });
  if (!found.found)
    return refusedByMouth("corrugated", found, {
      requirement,
      limits: known,
      smallestMouth: `${cutoffFactor.mouth} times the TE11 cutoff radius at ${ghz(bandLow)}`,
      pattern: "HE11",
      otherLength: throatLength,
    });

  const { flare, shortened } = found;
  const count = countFor(flare, wantedPitch, { wavelength, tooth: known.toothThickness });
  if (typeof count !== "number") return count;
  const pitch = flare.length / count;
  const slotWidth = Math.min(slotFill * pitch, pitch - known.toothThickness);
  const all = corrugations(flare, count, { bandCenter, bandHigh, balanceFrequency });
  const ends = [all[0]!, all[count - 1]!].map((corrugation) => wallAt(corrugation, slotWidth / pitch));
  const geometry: CorrugatedGeometry = {
    throatLength,
    flare,
    pitch,
    slotWidth,
    converterCount,
    corrugations: all,
    wall: known.wall,
    balanceFrequency,
    validity: validity(ends[0]!, ends[1]!, pitch),
  };
  return refusedByBand(geometry, requirement) ?? candidate(geometry, requirement, known, shortened);
}

interface Comb {
  pitch: number;
  slotFill: number;
}

const refusal = (value: Comb | number | UnrealizableHorn): UnrealizableHorn | null =>
  typeof value === "object" && "feasible" in value ? value : null;

/** Pitch to aim at, and slot over pitch, for teeth of at least the thickness that can be turned. */
function combFor(tooth: number, wavelength: number): Comb | UnrealizableHorn {
  const preferred = preferredPitch * wavelength;
  if (tooth <= (1 - preferredSlotFill) * preferred) return { pitch: preferred, slotFill: preferredSlotFill };
  const pitch = Math.max(preferred, tooth / (1 - leastSlotFill));
  if (pitch <= longestPitch * wavelength) return { pitch, slotFill: leastSlotFill };
  return unrealizable(
    "corrugated",
    `Teeth of ${mm(tooth, 2)}, the thinnest that can be turned, are too thick for this band: with slots of at least ${100 * leastSlotFill} % of the pitch it would be ${mm(pitch, 2)}, where a fifth of a wavelength, ${mm(longestPitch * wavelength, 2)}, is the most at which the wall still acts as a whole.`,
  );
}

/** Throat radius that carries TE11 with margin and keeps TM11 away over the band. */
function throatFor({ bandLow, bandCenter, bandHigh }: FeedRequirement): number | UnrealizableHorn {
  const perKa = (frequency: number): number => speedOfLight / (2 * Math.PI * frequency);
  const narrowest = cutoffFactor.throat * cutoffRadius(TE11, bandLow);
  const widest = largestThroatKa * perKa(bandHigh);
  if (narrowest > widest)
    return unrealizable(
      "corrugated",
      `The band is too wide for one throat: TE11 at ${ghz(bandLow)} asks a radius of at least ${mm(narrowest)}, and to keep EH12 away at ${ghz(bandHigh)} it may be at most ${mm(widest)}.`,
    );
  return Math.min(widest, Math.max(narrowest, throatKa * perKa(bandCenter)));
}

/** Corrugations on the flare: the whole number nearest to the wanted pitch among those that keep pitch and tooth in bounds. */
function countFor(
  { length }: Flare,
  wantedPitch: number,
  { wavelength, tooth }: { wavelength: number; tooth: number },
): number | UnrealizableHorn {
  const rounding = 1e-9;
  const fewest = Math.max(fewestCorrugations, Math.ceil(length / (longestPitch * wavelength) - rounding));
  const shortest = Math.max(shortestPitch * wavelength, tooth / (1 - leastSlotFill));
  const most = Math.floor(length / shortest + rounding);
  if (fewest > most)
    return unrealizable(
      "corrugated",
      `The flare of ${mm(length)} can't be divided: it needs at least ${fewest} corrugations, and pitches of at least ${mm(shortest, 2)} (a tenth of a wavelength; slots of ${100 * leastSlotFill} % of it and teeth of ${mm(tooth, 2)}) leave room for ${most}.`,
    );
  const count = Math.min(most, Math.max(fewest, Math.round(length / wantedPitch)));
  if (count <= mostCorrugations) return count;
  return unrealizable(
    "corrugated",
    `The flare would be ${mm(length)} long and take ${count} corrugations; more than ${mostCorrugations} are no practical horn.`,
  );
}

function refusedByBand(geometry: CorrugatedGeometry, { bandLow, bandHigh }: FeedRequirement): UnrealizableHorn | null {
  const { low, high, lowReason, highReason } = geometry.validity;
  if (bandLow < low)
    return unrealizable(
      "corrugated",
      `The band is too wide for slots of one kind: below ${ghz(low)} ${lowReason}, and the band begins at ${ghz(bandLow)}.`,
    );
  if (bandHigh > high)
    return unrealizable(
      "corrugated",
      `The band is too wide for slots of one kind: above ${ghz(high)} ${highReason}, and the band ends at ${ghz(bandHigh)}.`,
    );
  return null;
}

function candidate(
  geometry: CorrugatedGeometry,
  requirement: FeedRequirement,
  limits: KnownLimits,
  shortened: boolean,
): Candidate {
  const { flare, corrugations: all, pitch, slotWidth, validity: range } = geometry;
  const outerDiameter = corrugatedOuterDiameter(geometry);
  const tooWide = refusedByDiameter("corrugated", outerDiameter, { requirement, limits });
  if (tooWide) return tooWide;
  const length = corrugatedLength(geometry);
  const met = metSentence(requirement, limits, { phaseError: flare.phaseError, shortened, length });
  return {
    feasible: true,
    kind: "corrugated",
    reason: `${met}; ${all.length} slots of ${mm(slotWidth, 2)} with teeth of ${mm(pitch - slotWidth, 2)}; below ${ghz(range.low)} ${range.lowReason}, above ${ghz(range.high)} ${range.highReason}.`,
    profile: corrugatedProfile(geometry),
    throatRadius: flare.startRadius,
    apertureRadius: flare.radius,
    length,
    outerDiameter,
    dimensions: corrugatedDimensions(geometry),
    geometry,
    warnings: nearCutoffWarnings(flare.startRadius / cutoffRadius(TE11, requirement.bandLow)),
  };
}
