// Horns: first dimensions, closed-form pattern and ohmic loss, by kind. The one place that knows which kinds there are.

import { requireNumber, requirePositive } from "../check.ts";
import type { CorrugatedWall } from "../guide/hybrid.ts";
import type { FeedPattern } from "../pattern/feed-pattern.ts";
import type { Candidate, RealizableHorn } from "./candidate.ts";
import { corrugatedHorn } from "./corrugated/dimension.ts";
import { type CorrugatedGeometry, wallAt } from "./corrugated/geometry.ts";
import { corrugatedAttenuation } from "./corrugated/loss.ts";
import { corrugatedMouth, corrugatedPattern } from "./corrugated/model.ts";
import { dualModeHorn } from "./dual-mode/dimension.ts";
import type { DualModeGeometry } from "./dual-mode/geometry.ts";
import { dualModeAttenuation, dualModeMouth, dualModePattern } from "./dual-mode/model.ts";
import { tuneDualMode } from "./dual-mode/tune.ts";
import type { FeedKind } from "./horn-profile.ts";
import { type HornKind, thetaCountFor } from "./kind.ts";
import type { MouthTerm } from "./mouth-field.ts";
import type { FeedRequirement, HornLimits } from "./requirement.ts";
import { smoothHorn } from "./smooth/dimension.ts";
import type { SmoothGeometry } from "./smooth/geometry.ts";
import { smoothAttenuation, smoothMouth, smoothPattern } from "./smooth/model.ts";

export type { Candidate, Dimension, RealizableHorn, UnrealizableHorn } from "./candidate.ts";
export type { FeedKind, HornProfile } from "./horn-profile.ts";
export type { MouthTerm } from "./mouth-field.ts";
export { type FeedRequirement, type HornLimits, largestPhaseError } from "./requirement.ts";
export { corrugatedHorn, dualModeHorn, smoothHorn, tuneDualMode };

/** Kinds that are dimensioned and modelled here. */
export type DimensionedKind = "smooth" | "dualMode" | "corrugated";

/** In the order in which a study lists them. */
export const dimensionedKinds: readonly DimensionedKind[] = ["smooth", "dualMode", "corrugated"];

const smooth: HornKind<SmoothGeometry> = {
  dimension: smoothHorn,
  pattern: smoothPattern,
  mouth: smoothMouth,
  attenuation: smoothAttenuation,
};
const dualMode: HornKind<DualModeGeometry> = {
  dimension: dualModeHorn,
  pattern: dualModePattern,
  mouth: dualModeMouth,
  attenuation: dualModeAttenuation,
};
const corrugated: HornKind<CorrugatedGeometry> = {
  dimension: corrugatedHorn,
  pattern: corrugatedPattern,
  mouth: corrugatedMouth,
  attenuation: corrugatedAttenuation,
};

const kinds: Record<DimensionedKind, HornKind<unknown>> = {
  smooth,
  dualMode,
  corrugated,
};

function kindOf(where: string, kind: FeedKind): HornKind<unknown> {
  if (Object.hasOwn(kinds, kind)) return kinds[kind as DimensionedKind];
  throw new RangeError(`${where}: kind must be one of ${dimensionedKinds.join(", ")}; got ${String(kind)}`);
}

/**
 * First dimensions of a horn of a kind for what a dish asks: a horn that can be built, or the sentence that says why not.
 * @throws {RangeError} unknown kind, illegal requirement or limits; never for a legal requirement, however absurd
 */
export function dimensionHorn(kind: DimensionedKind, requirement: FeedRequirement, limits: HornLimits = {}): Candidate {
  return kindOf("dimensionHorn", kind).dimension(requirement, limits);
}

/**
 * Far field of a dimensioned horn by the closed form of its kind, for 1 W of TE11 at its throat; phases at the centre of the
 * mouth. Outside the band where the model holds, the pattern carries a warning.
 *
 * @param frequency Hz
 * @throws {RangeError} frequency not positive, or below the cutoff of the horn's own mode; a kind without a model
 */
export function closedFormPattern(horn: RealizableHorn, frequency: number): FeedPattern {
  requirePositive("closedFormPattern: frequency", frequency, "Hz");
  const thetaCount = thetaCountFor(horn.apertureRadius, frequency);
  return kindOf("closedFormPattern", horn.kind).pattern(horn.geometry, frequency, thetaCount);
}

/**
 * The modes at a dimensioned horn's mouth by the closed form of its kind, for 1 W of TE11 at its throat, before the phase of
 * the flare. Holds functions: not for sending to a worker.
 *
 * @param frequency Hz
 * @throws {RangeError} as `closedFormPattern`
 */
export function mouthTerms(horn: RealizableHorn, frequency: number): MouthTerm[] {
  requirePositive("mouthTerms: frequency", frequency, "Hz");
  return kindOf("mouthTerms", horn.kind).mouth(horn.geometry, frequency);
}

/** The corrugated walls at a horn's first and last slot; null for a horn of another kind. */
export function corrugatedWalls(horn: RealizableHorn): { throat: CorrugatedWall; mouth: CorrugatedWall } | null {
  if (horn.kind !== "corrugated") return null;
  const { corrugations, slotWidth, pitch } = horn.geometry as CorrugatedGeometry;
  const wall = (at: number): CorrugatedWall => wallAt(corrugations.at(at)!, slotWidth / pitch);
  return { throat: wall(0), mouth: wall(-1) };
}

/**
 * Ohmic loss from throat to mouth, dB, positive, over the actual profile (power-loss method, straight guide at each z).
 * A turned surface is rougher than the conductivity says: tens of percent more, common practice.
 *
 * @param frequency    Hz
 * @param conductivity S/m; aluminium 3.8e7, copper 5.8e7 (Pozar, appendix F, from memory)
 * @throws {RangeError} frequency at or below a cutoff on the way, conductivity not positive
 */
export function ohmicLossDb(horn: RealizableHorn, frequency: number, conductivity: number): number {
  requirePositive("ohmicLossDb: frequency", frequency, "Hz");
  requireNumber("ohmicLossDb: conductivity", conductivity, { above: 0, unit: "S/m" });
  return (20 / Math.LN10) * kindOf("ohmicLossDb", horn.kind).attenuation(horn.geometry, frequency, conductivity);
}
