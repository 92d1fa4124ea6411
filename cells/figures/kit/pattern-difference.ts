// How far two patterns of one horn lie apart.

import { requireNumber } from "../../check.ts";
import { levelFloorDb } from "../../pattern/cuts.ts";
import type { FeedPattern } from "../../pattern/feed-pattern.ts";
import { patternInterpolant } from "../../pattern/interpolant.ts";
import { boresightIntensity } from "../../pattern/power.ts";
import { toDeg } from "../../units.ts";

export interface DifferenceRange {
  /** rad: angles from boresight to here count */
  thetaMax: number;
  /** dB against boresight: only where the reference is at least this high; a null is no error of many dB */
  floorDb: number;
}

/** Levels of `other` less those of `reference`, each against its own boresight; [sampleCount], NaN where the reference is below the floor. */
export interface PatternDifference {
  thetaDeg: number[];
  ePlaneDb: number[];
  hPlaneDb: number[];
  /** over the angles that count, each weighing the same; NaN if none does */
  ePlaneRmsDb: number;
  hPlaneRmsDb: number;
}

/**
 * Difference in dB at the samples of the reference; the other pattern is interpolated by splines on real and imaginary parts.
 * @throws {RangeError} not patterns, thetaMax outside (0, π], floor not negative
 */
export function patternDifference(
  reference: FeedPattern,
  other: FeedPattern,
  range: DifferenceRange,
): PatternDifference {
  const thetaMax = requireNumber("patternDifference: end of the range", range.thetaMax, {
    above: 0,
    max: Math.PI,
    unit: "rad",
  });
  const floor = requireNumber("patternDifference: floor", range.floorDb, { below: 0, unit: "dB" });
  const [at, against] = [patternInterpolant(other), patternInterpolant(reference)];
  const [atBoresight, againstBoresight] = [boresightIntensity(other), boresightIntensity(reference)];
  const decibels = ({ re, im }: { re: number; im: number }, intensity: number): number =>
    Math.max(levelFloorDb, 10 * Math.log10((re * re + im * im) / intensity));
  const result: PatternDifference = { thetaDeg: [], ePlaneDb: [], hPlaneDb: [], ePlaneRmsDb: 0, hPlaneRmsDb: 0 };
  for (const theta of reference.theta) {
    if (theta > thetaMax + 1e-9) break;
    result.thetaDeg.push(toDeg(theta));
    for (const [cut, name] of [
      ["ePlane", "ePlaneDb"],
      ["hPlane", "hPlaneDb"],
    ] as const) {
      const expected = decibels(against[cut](theta), againstBoresight);
      result[name].push(expected < floor ? Number.NaN : decibels(at[cut](theta), atBoresight) - expected);
    }
  }
  result.ePlaneRmsDb = rms(result.ePlaneDb);
  result.hPlaneRmsDb = rms(result.hPlaneDb);
  return result;
}

function rms(values: readonly number[]): number {
  const known = values.filter((value) => Number.isFinite(value));
  return Math.sqrt(known.reduce((sum, value) => sum + value * value, 0) / known.length);
}
