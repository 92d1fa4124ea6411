// Why there is no such horn, in sentences with the numbers.

import type { Warning } from "../check.ts";
import { toDeg, toMm } from "../units.ts";
import type { UnrealizableHorn } from "./candidate.ts";
import type { FeedKind } from "./horn-profile.ts";
import type { MouthMissed } from "./mouth.ts";
import { type FeedRequirement, type KnownLimits, largestPhaseError } from "./requirement.ts";

/** Largest mouth that is tried, wavelengths of radius: a feed for a focus this long is no horn any more. */
export const largestRadiusWaves = 12.5;

/** Half-angle from which a dish is called deep here, rad: f/D below about 0.45. */
const deepDish = (58 * Math.PI) / 180;

export function unrealizable(kind: FeedKind, reason: string, warnings: Warning[] = []): UnrealizableHorn {
  return { feasible: false, kind, reason, warnings };
}

export const mm = (length: number, digits = 1): string => `${toMm(length).toFixed(digits)} mm`;
export const ghz = (frequency: number): string => `${(frequency / 1e9).toFixed(3)} GHz`;
export const db = (value: number): string => `${Math.abs(value).toFixed(2)} dB`;
const degrees = (angle: number): string => `${toDeg(angle).toFixed(1)}°`;

/** What no horn of any kind can do; null when there is nothing against it. */
export function refusedByTaper(kind: FeedKind, { feedTaperDb, halfAngle }: FeedRequirement): UnrealizableHorn | null {
  if (feedTaperDb > 0) return null;
  return unrealizable(
    kind,
    `The feed would have to be ${db(feedTaperDb)} stronger toward the rim at ${degrees(halfAngle)} than on its axis, because the longer path alone already lowers the edge by more than the taper wanted; a horn of one lobe can't.`,
  );
}

/**
 * The search for a mouth failed: says on which side.
 * @param smallestMouth what sets the smallest mouth, as the sentence names it: "1.15 times the TE11 cutoff radius at 7.9 GHz"
 * @param pattern       whose pattern: "TE11"
 */
export function refusedByMouth(
  kind: FeedKind,
  missed: MouthMissed,
  about: {
    requirement: FeedRequirement;
    limits: KnownLimits;
    smallestMouth: string;
    pattern: string;
    otherLength: number;
  },
): UnrealizableHorn {
  const { requirement, limits, smallestMouth, pattern, otherLength } = about;
  const rim = `the rim at ${degrees(requirement.halfAngle)}`;
  const wanted = db(requirement.feedTaperDb);
  const deep =
    requirement.halfAngle > deepDish ? "; a dish this deep usually takes a choke-ring or wide-flare feed" : "";
  switch (missed.side) {
    case "smallest":
      return unrealizable(
        kind,
        `A mouth wide enough in beam would be too small: toward ${rim} the pattern may fall ${wanted}, but the smallest mouth, ${mm(missed.radius)} in radius (${smallestMouth}), already falls ${db(missed.reachedDb)}${deep}.`,
      );
    case "mainLobe":
      return unrealizable(
        kind,
        `The pattern can't fall ${wanted} toward ${rim}: the main lobe of a ${pattern} mouth ends there at ${db(missed.reachedDb)}, at a radius of ${mm(missed.radius)}, and a wider mouth only brings the first side lobe onto the rim.`,
      );
    case "largest":
      return unrealizable(
        kind,
        `Even a mouth of ${mm(missed.radius)} radius, ${largestRadiusWaves} wavelengths, falls only ${db(missed.reachedDb)} toward ${rim}, where ${wanted} is wanted; larger horns are outside this model.`,
      );
    case "length": {
      const whole = missed.wantedLength + otherLength;
      const atLimit =
        missed.phaseError === null
          ? "within the limit no flare reaches the taper"
          : `within the limit the phase error over the mouth would be ${missed.phaseError.toFixed(2)} wavelengths, above ${largestPhaseError}`;
      return unrealizable(
        kind,
        `The horn would be ${mm(whole)} long for a phase error of ${limits.phaseError} wavelengths, where ${mm(limits.maxLength)} is allowed; ${atLimit}.`,
      );
    }
  }
}

/** A horn found, but wider than the study allows or than the dish; null when it fits. */
export function refusedByDiameter(
  kind: FeedKind,
  outerDiameter: number,
  { requirement, limits }: { requirement: FeedRequirement; limits: KnownLimits },
): UnrealizableHorn | null {
  if (outerDiameter > limits.maxDiameter)
    return unrealizable(
      kind,
      `The horn would be ${mm(outerDiameter)} across its walls, where ${mm(limits.maxDiameter)} is allowed.`,
    );
  const { dishDiameter } = requirement;
  if (dishDiameter !== undefined && outerDiameter >= dishDiameter)
    return unrealizable(
      kind,
      `The horn would be ${mm(outerDiameter)} across its walls and shade the whole dish of ${mm(dishDiameter)}.`,
    );
  return null;
}

/** The first half of a feasible horn's reason: taper met, phase error kept or given up. */
export function metSentence(
  requirement: FeedRequirement,
  limits: KnownLimits,
  found: { phaseError: number; shortened: boolean; length: number },
): string {
  const taper = `Meets the feed taper of ${db(requirement.feedTaperDb)} at ${degrees(requirement.halfAngle)} at band centre`;
  const error = `${found.phaseError.toFixed(3)} wavelengths`;
  return found.shortened
    ? `${taper}, shortened to the ${mm(limits.maxLength)} allowed at the cost of a phase error of ${error} over the mouth, where ${limits.phaseError} was wanted`
    : `${taper} with a phase error of ${error} over the mouth, ${mm(found.length)} long`;
}
