// Closed-form model of the corrugated horn: HE11 alone at the mouth, as the last slot makes it, under the flare's phase.

import { type HybridMode, hybridMode } from "../../guide/hybrid.ts";
import { hybridField } from "../../guide/hybrid-field.ts";
import type { FeedPattern } from "../../pattern/feed-pattern.ts";
import { hybridModePattern } from "../../radiation/hybrid-pattern.ts";
import { capSlant, type Flare } from "../flare.ts";
import type { MouthTerm } from "../mouth-field.ts";
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
  return hybridModePattern(he11At(mouth, frequency), { flareSlant: capSlant(mouth.flare), thetaCount });
}

/** @throws {RangeError} HE11 doesn't travel on this wall at this frequency */
function he11At({ last, slotFill }: { last: Corrugation; slotFill: number }, frequency: number): HybridMode {
  const mode = hybridMode("HE11", wallAt(last, slotFill), frequency);
  if (mode) return mode;
  throw new RangeError(
    `corrugated: HE11 must travel at the mouth; at ${(frequency / 1e9).toFixed(3)} GHz it doesn't on slots ${(last.depth * 1e3).toFixed(2)} mm deep`,
  );
}

export function corrugatedMouth(geometry: CorrugatedGeometry, frequency: number): MouthTerm[] {
  const last = geometry.corrugations[geometry.corrugations.length - 1]!;
  const mode = he11At({ last, slotFill: geometry.slotWidth / geometry.pitch }, frequency);
  return [
    {
      name: "HE11",
      powerShare: 1,
      phase: 0,
      amplitude: { re: 1, im: 0 },
      profile: (rho, phi) => hybridField(mode, rho, phi),
    },
  ];
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
