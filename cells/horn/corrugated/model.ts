// Closed-form model of the corrugated horn: HE11 alone at the mouth, as the last slot makes it, under the flare's phase.

import { hybridMode } from "../../guide/hybrid.ts";
import type { FeedPattern } from "../../pattern/feed-pattern.ts";
import { hybridModePattern } from "../../radiation/hybrid-pattern.ts";
import type { Flare } from "../flare.ts";
import { type CorrugatedGeometry, type Corrugation, wallAt } from "./geometry.ts";

/**
 * Pattern of 1 W of HE11 behind a flare whose last slot is given: dispersion, hybrid factor and with it the cross-polar follow
 * from the slot's own depth at each frequency.
 * @throws {RangeError} HE11 doesn't travel at the mouth at this frequency
 */
export function he11Pattern(
  mouth: { flare: Flare; last: Corrugation; slotFill: number },
  frequency: number,
  thetaCount: number,
): FeedPattern {
  const mode = hybridMode("HE11", wallAt(mouth.last, mouth.slotFill), frequency);
  if (!mode)
    throw new RangeError(
      `he11Pattern: HE11 must travel at the mouth; at ${(frequency / 1e9).toFixed(3)} GHz it doesn't on slots ${(mouth.last.depth * 1e3).toFixed(2)} mm deep`,
    );
  return hybridModePattern(mode, { flareSlant: mouth.flare.slant, thetaCount });
}

export function corrugatedPattern(geometry: CorrugatedGeometry, frequency: number, thetaCount: number): FeedPattern {
  const { flare, corrugations, slotWidth, pitch, validity } = geometry;
  const last = corrugations[corrugations.length - 1]!;
  const pattern = he11Pattern({ flare, last, slotFill: slotWidth / pitch }, frequency, thetaCount);
  if (frequency >= validity.low && frequency <= validity.high) return pattern;
  const [limit, side, why] =
    frequency < validity.low
      ? [validity.low, "Below", validity.lowReason]
      : [validity.high, "Above", validity.highReason];
  return {
    ...pattern,
    warnings: [
      ...pattern.warnings,
      {
        code: "outside-validated-range",
        text: `${side} ${(limit / 1e9).toFixed(3)} GHz ${why}; the pattern of HE11 alone doesn't hold there.`,
      },
    ],
  };
}
