// The three cuts of a pattern in decibels, as they are drawn.

import type { ComplexVector } from "../../math/complex.ts";
import { levelFloorDb } from "../../pattern/cuts.ts";
import type { FeedPattern } from "../../pattern/feed-pattern.ts";
import { boresightIntensity } from "../../pattern/power.ts";
import { toDeg } from "../../units.ts";

/** dB against boresight copolar, all [sampleCount]; −300 stands for a zero field. */
export interface CutLevels {
  thetaDeg: number[];
  ePlaneDb: number[];
  hPlaneDb: number[];
  /** in the 45° plane, Ludwig's third definition */
  crossPolarDb: number[];
}

/** More samples than this to 180° only make the drawing heavy. */
const mostSamples = 721;

/**
 * Levels at the pattern's own samples from boresight to `thetaMax`, rad; a pattern finer than 0.25° is thinned to it.
 * @throws {RangeError} not a pattern
 */
export function cutLevels(pattern: FeedPattern, thetaMax: number): CutLevels {
  const reference = boresightIntensity(pattern);
  const { theta, ePlane, hPlane } = pattern;
  const every = Math.max(1, Math.round((theta.length - 1) / (mostSamples - 1)));
  const levels: CutLevels = { thetaDeg: [], ePlaneDb: [], hPlaneDb: [], crossPolarDb: [] };
  const decibels = (power: number): number => Math.max(levelFloorDb, 10 * Math.log10(power / reference));
  const power = ({ re, im }: ComplexVector, i: number): number => re[i]! ** 2 + im[i]! ** 2;
  for (let i = 0; i < theta.length && theta[i]! <= thetaMax + 1e-9; i += every) {
    // 60, not 59.99999999999999, in a column of angles
    levels.thetaDeg.push(Math.round(toDeg(theta[i]!) * 1e9) / 1e9);
    levels.ePlaneDb.push(decibels(power(ePlane, i)));
    levels.hPlaneDb.push(decibels(power(hPlane, i)));
    const cross = (ePlane.re[i]! - hPlane.re[i]!) ** 2 + (ePlane.im[i]! - hPlane.im[i]!) ** 2;
    levels.crossPolarDb.push(decibels(cross / 4));
  }
  return levels;
}
