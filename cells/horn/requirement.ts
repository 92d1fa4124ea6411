// What a horn is asked for, and what it may not exceed. The dish (to the right of horn) fills the first, the reader the second.

import { requireNumber, requirePositive, type Warning } from "../check.ts";

/** What a dish asks of its feed. Plain data. */
export interface FeedRequirement {
  /** rad, from the axis to the rim, below π/2 */
  halfAngle: number;
  /** dB, positive: how far the φ-mean of the feed's own pattern is to fall from boresight to the rim, at band centre */
  feedTaperDb: number;
  /** Hz */
  bandLow: number;
  /** Hz, where dimensions are found: the arithmetic mean of the edges */
  bandCenter: number;
  /** Hz */
  bandHigh: number;
  /** m, where known: a horn wider than the dish is no feed for it */
  dishDiameter?: number;
}

/** Limits of a study and of the workshop. All lengths in m. */
export interface HornLimits {
  /** throat plane to mouth; default none */
  maxLength?: number;
  /** outside diameter, walls included; default none */
  maxDiameter?: number;
  /** wavelengths at band centre, d²/(8 l λ) at the rim of the mouth (l the slant length); default 0.1 */
  phaseError?: number;
  /** thinnest tooth of a corrugation that can be turned; default 0.8 mm */
  toothThickness?: number;
  /** wall of the horn at the mouth; default 2 mm */
  wall?: number;
}

/** Limits with their defaults filled in; no limit is Infinity. */
export type KnownLimits = Required<HornLimits>;

/**
 * Largest phase error that a horn shortened to `maxLength` may have, wavelengths. Common practice: a feed stays well short
 * of the optimum-gain horn (0.39 for TE11), whose main lobe is already filled in and whose phase centre wanders.
 */
export const largestPhaseError = 0.3;

/**
 * Checks a requirement and limits, and fills in defaults.
 *
 * Phase error 0.1 λ: common practice for a feed that must keep one phase centre over its band (the loss in directivity by
 * it is about 0.1 dB), against 0.39 λ for the shortest horn of a given gain.
 *
 * @throws {RangeError} half-angle outside 0…90°, band edges out of order, a limit not positive
 */
export function checkedLimits(where: string, requirement: FeedRequirement, limits: HornLimits): KnownLimits {
  requireNumber(`${where}: half-angle`, requirement.halfAngle, { above: 0, below: Math.PI / 2, unit: "rad" });
  requireNumber(`${where}: feed taper`, requirement.feedTaperDb, { unit: "dB" });
  requirePositive(`${where}: band, lower edge`, requirement.bandLow, "Hz");
  requireNumber(`${where}: band centre`, requirement.bandCenter, { min: requirement.bandLow, unit: "Hz" });
  requireNumber(`${where}: band, upper edge`, requirement.bandHigh, { min: requirement.bandCenter, unit: "Hz" });
  const limit = (name: string, value: number | undefined): number =>
    value === undefined || value === Number.POSITIVE_INFINITY
      ? Number.POSITIVE_INFINITY
      : requirePositive(`${where}: ${name}`, value, "m");
  return {
    maxLength: limit("largest length", limits.maxLength),
    maxDiameter: limit("largest diameter", limits.maxDiameter),
    phaseError: requireNumber(`${where}: phase error`, limits.phaseError ?? 0.1, {
      above: 0,
      max: largestPhaseError,
      unit: "wavelengths",
    }),
    toothThickness: requirePositive(`${where}: tooth thickness`, limits.toothThickness ?? 0.8e-3, "m"),
    wall: requirePositive(`${where}: wall`, limits.wall ?? 2e-3, "m"),
  };
}

/**
 * Radius over TE11 cutoff radius at the lower band edge. A throat keeps at least 1.15, where standard circular guides begin
 * their bands (IEC 60153-4, from memory). A mouth for a deep dish may be narrower, down to 1.1, and then is its own throat:
 * match and beam then change quickly at the lower edge, which the horn says in a warning.
 */
export const cutoffFactor = { throat: 1.15, mouth: 1.1 } as const;

/** The warning for a guide nearer to cutoff than a standard one. */
export function nearCutoffWarnings(factor: number): Warning[] {
  if (factor >= cutoffFactor.throat - 1e-9) return [];
  return [
    {
      code: "outside-validated-range",
      text: `The horn is only ${factor.toFixed(3)} times as wide as TE11 needs at the lower band edge, where ${cutoffFactor.throat} is usual: match and beam change quickly there, more than the model says.`,
    },
  ];
}
