// A measured horn in a dish: what its cuts tell, and what they leave unknown.

import type { Warning } from "../check.ts";
import type { MeasuredPattern } from "../horn/measured/pattern-cuts.ts";
import { beamwidth, crossPolarPeak, halfPowerDb, levelAt } from "../pattern/cuts.ts";
import { type Dish, spaceLossDb } from "../reflector/dish.ts";
import { type DishEfficiencyOptions, dishEfficiency } from "../reflector/efficiency.ts";
import { phaseCenterOverDish } from "../reflector/feed-position.ts";
import { toDeg } from "../units.ts";

/** Null is unknown, never a guess. */
export interface MeasuredPerformance {
  /** Hz */
  frequency: number;
  spilloverEfficiency: number;
  illuminationEfficiency: number;
  /** from the two planes with their phases; null without */
  polarizationEfficiency: number | null;
  phaseEfficiency: number | null;
  /** product of the four; null if one is unknown */
  apertureEfficiency: number | null;
  /** spillover × illumination: as much as amplitudes alone allow */
  amplitudeEfficiency: number;
  /** dB, space loss included, φ-mean of both planes */
  edgeTaperDb: number;
  halfPowerBeamwidthDeg: number;
  /** dB: as measured in the 45° plane, or from both planes with phases; null if neither */
  crossPolarPeakDb: number | null;
  /** m from the point that phases refer to; null without phases */
  phaseCenterM: number | null;
  /** a sentence for each thing that can't be known */
  unknown: string[];
  warnings: Warning[];
}

/**
 * The efficiency sum of a measured feed (`dishEfficiency`), as far as its cuts go.
 * @throws {RangeError} a dish whose rim lies beyond the measured angles; options out of range
 */
export function measuredPerformance(
  measured: MeasuredPattern,
  dish: Dish,
  options: Omit<DishEfficiencyOptions, "phaseCenter"> = {},
): MeasuredPerformance {
  const { pattern, hasPhase, cross45, thetaMaxDeg } = measured;
  const rimDeg = toDeg(dish.halfAngle);
  if (rimDeg > thetaMaxDeg)
    throw new RangeError(
      `measuredPerformance: the cuts must reach the rim at ${rimDeg.toFixed(1)} deg; got ${thetaMaxDeg} deg`,
    );
  const center = hasPhase ? phaseCenterOverDish(pattern, dish).z : null;
  const sums = dishEfficiency(pattern, dish, { ...options, phaseCenter: center ?? 0 });
  const { spilloverEfficiency, illuminationEfficiency } = sums;
  const within = cross45 ? cross45.levelDb.filter((_, i) => cross45.thetaDeg[i]! <= 90) : [];
  return {
    frequency: measured.frequency,
    spilloverEfficiency,
    illuminationEfficiency,
    polarizationEfficiency: hasPhase ? sums.polarizationEfficiency : null,
    phaseEfficiency: hasPhase ? sums.phaseEfficiency : null,
    apertureEfficiency: hasPhase ? sums.apertureEfficiency : null,
    amplitudeEfficiency: spilloverEfficiency * illuminationEfficiency,
    edgeTaperDb: spaceLossDb(dish.halfAngle) - levelAt(pattern, dish.halfAngle).meanDb,
    halfPowerBeamwidthDeg: toDeg(beamwidth(pattern, halfPowerDb, "D")),
    crossPolarPeakDb: within.length > 0 ? Math.max(...within) : hasPhase ? crossPolarPeak(pattern) : null,
    phaseCenterM: center,
    unknown: [
      ...(thetaMaxDeg < 180
        ? [
            `Power beyond ${thetaMaxDeg}° was not measured: the spillover efficiency, and what is multiplied with it, is an upper bound.`,
          ]
        : []),
      ...(hasPhase
        ? []
        : [
            "Without phases nobody knows the phase efficiency: the aperture efficiency is at most spillover times illumination.",
            "Without phases the phase centre is unknown, and with it where the horn has to stand.",
            ...(cross45 ? [] : ["Without phases and without a 45° cut the cross-polar field is unknown."]),
          ]),
    ],
    warnings: [...measured.warnings, ...sums.warnings],
  };
}
