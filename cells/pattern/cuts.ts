// Levels, widths and cross-polar of a pattern.

import { requireNumber, requirePositive } from "../check.ts";
import type { Complex, ComplexVector } from "../math/complex.ts";
import { brentMinimum, brentRoot } from "../math/roots.ts";
import { toDeg } from "../units.ts";
import type { FeedPattern } from "./feed-pattern.ts";
import { patternInterpolant } from "./interpolant.ts";
import { boresightIntensity } from "./power.ts";
import { requirePattern } from "./theta-grid.ts";

/** Half power in dB: 3.0103. */
export const halfPowerDb = 10 * Math.log10(2);

/** Levels below this, and a zero field, are given as this: a decibel value has to be a number. */
export const levelFloorDb = -300;

function toLevelDb(powerRatio: number): number {
  return Math.max(levelFloorDb, 10 * Math.log10(powerRatio));
}

const power = ({ re, im }: Complex): number => re * re + im * im;

/** Copolar in the 45° plane, Ludwig's third definition: (E + H)/2, [thetaCount]. @throws {RangeError} not a pattern */
export function copolar45(pattern: FeedPattern): ComplexVector {
  return combined("copolar45", pattern, 1);
}

/** Cross-polar in the 45° plane, Ludwig's third definition: (E − H)/2, [thetaCount]. @throws {RangeError} not a pattern */
export function crossPolar45(pattern: FeedPattern): ComplexVector {
  return combined("crossPolar45", pattern, -1);
}

function combined(where: string, pattern: FeedPattern, sign: 1 | -1): ComplexVector {
  requirePattern(where, pattern);
  const { ePlane, hPlane } = pattern;
  return {
    re: ePlane.re.map((e, i) => (e + sign * hPlane.re[i]!) / 2),
    im: ePlane.im.map((e, i) => (e + sign * hPlane.im[i]!) / 2),
  };
}

/** The cuts as levels, dB against boresight copolar (−300 stands for zero), [thetaCount]; theta in degrees. */
export interface CutLevels {
  thetaDeg: number[];
  ePlaneDb: number[];
  hPlaneDb: number[];
  /** 45° plane, Ludwig's third definition */
  copolar45Db: number[];
  crossPolar45Db: number[];
}

/** Levels of both principal planes and of the 45° plane at every angle of the pattern. @throws {RangeError} not a pattern */
export function cutLevels(pattern: FeedPattern): CutLevels {
  const reference = boresightIntensity(pattern);
  const levels = ({ re, im }: ComplexVector): number[] =>
    Array.from(re, (value, i) => toLevelDb((value ** 2 + im[i]! ** 2) / reference));
  return {
    thetaDeg: Array.from(pattern.theta, toDeg),
    ePlaneDb: levels(pattern.ePlane),
    hPlaneDb: levels(pattern.hPlane),
    copolar45Db: levels(copolar45(pattern)),
    crossPolar45Db: levels(crossPolar45(pattern)),
  };
}

export interface PatternLevel {
  ePlaneDb: number;
  hPlaneDb: number;
  /** of the intensity averaged over φ: (|E|² + |H|²)/2 */
  meanDb: number;
  /** of the cross-polar in the 45° plane */
  crossPolarDb: number;
}

/**
 * Levels at one angle, dB against the copolar intensity on boresight (negative down the beam; −300 stands for zero).
 * @param theta rad, 0…π
 * @throws {RangeError} not a pattern, theta outside
 */
export function levelAt(pattern: FeedPattern, theta: number): PatternLevel {
  requireNumber("levelAt: theta", theta, { min: 0, max: Math.PI, unit: "rad" });
  const interpolant = patternInterpolant(pattern);
  const reference = boresightIntensity(pattern);
  const e = power(interpolant.ePlane(theta)) / reference;
  const h = power(interpolant.hPlane(theta)) / reference;
  return {
    ePlaneDb: toLevelDb(e),
    hPlaneDb: toLevelDb(h),
    meanDb: toLevelDb((e + h) / 2),
    crossPolarDb: toLevelDb(power(interpolant.crossPolar45(theta)) / reference),
  };
}

/**
 * Full beamwidth, rad, between the two directions in which the pattern first falls `levelDb` below boresight.
 * @param levelDb decibels below boresight, > 0: 10 for the −10 dB width, `halfPowerDb` for half power
 * @param plane   "E", "H", or "D": copolar in the 45° plane
 * @throws {RangeError} not a pattern; levelDb not positive; the pattern never falls that far
 * @accuracy at 0.5° 1e-8 rad for k·radius = 10, 1e-6 rad for 40 (test/cells/radiation/sampling)
 */
export function beamwidth(pattern: FeedPattern, levelDb: number, plane: "E" | "H" | "D"): number {
  requirePositive("beamwidth: levelDb", levelDb, "dB");
  const interpolant = patternInterpolant(pattern);
  const cut = { E: interpolant.ePlane, H: interpolant.hPlane, D: interpolant.copolar45 }[plane];
  if (!cut) throw new RangeError(`beamwidth: plane must be "E", "H" or "D"; got ${String(plane)}`);
  const target = power(cut(0)) * 10 ** (-levelDb / 10);
  const { theta } = pattern;
  for (let i = 1; i < theta.length; i++) {
    if (power(cut(theta[i]!)) < target) {
      return 2 * brentRoot((at) => power(cut(at)) - target, theta[i - 1]!, theta[i]!, { tolerance: 1e-12 });
    }
  }
  throw new RangeError(`beamwidth: the ${plane}-plane pattern must fall by ${levelDb} dB somewhere; it never does`);
}

/** Highest cross-polar of a pattern and where it is. */
export interface CrossPolarPeak {
  /** dB against boresight copolar; −300 where there is none */
  levelDb: number;
  /** rad */
  theta: number;
}

/**
 * Highest cross-polar level in the 45° plane (where it is highest) for 0 ≤ θ ≤ maxTheta.
 * @param maxTheta rad, default π/2
 * @throws {RangeError} not a pattern; maxTheta not in (0, π]
 */
export function crossPolarPeakAt(pattern: FeedPattern, maxTheta: number = Math.PI / 2): CrossPolarPeak {
  requireNumber("crossPolarPeak: maxTheta", maxTheta, { above: 0, max: Math.PI, unit: "rad" });
  const interpolant = patternInterpolant(pattern);
  const level = (theta: number): number => power(interpolant.crossPolar45(theta));
  const { theta } = pattern;
  let best = 0;
  for (let i = 1; i < theta.length && theta[i]! <= maxTheta; i++) {
    if (level(theta[i]!) > level(theta[best]!)) best = i;
  }
  const low = theta[Math.max(0, best - 1)]!;
  const high = Math.min(maxTheta, theta[Math.min(theta.length - 1, best + 1)]!);
  const peak = brentMinimum((at) => -level(at), low, high, { tolerance: 1e-7 });
  const candidates = [
    { theta: peak.x, power: -peak.value },
    { theta: theta[best]!, power: level(theta[best]!) },
    { theta: maxTheta, power: level(maxTheta) },
  ].sort((p, q) => q.power - p.power);
  const { theta: at, power: highest } = candidates[0]!;
  return { levelDb: toLevelDb(highest / boresightIntensity(pattern)), theta: at };
}

/** The level of `crossPolarPeakAt`, dB against boresight copolar. */
export function crossPolarPeak(pattern: FeedPattern, maxTheta: number = Math.PI / 2): number {
  return crossPolarPeakAt(pattern, maxTheta).levelDb;
}
