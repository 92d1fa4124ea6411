// Idealized feeds for checks and first estimates: no horn has exactly these patterns.

import { requireNumber, requirePositive } from "../check.ts";
import type { FeedPattern } from "./feed-pattern.ts";
import { radiatedPower } from "./power.ts";
import { defaultThetaCount, thetaGrid } from "./theta-grid.ts";

export interface IdealFeedOptions {
  /** default 361 (0.5°); an odd count has a sample at 90°, where the cosine feed ends */
  thetaCount?: number;
  /** Hz, default 10 GHz: only what turns phase into length depends on it */
  frequency?: number;
}

/**
 * Feed with power pattern cosⁿθ up to 90°, zero beyond; both planes alike, no cross-polar, phase center at the origin.
 *
 *   U = 2(n+1)/(4π) · cosⁿθ W/sr for 1 W,   field ∝ cos^{n/2}θ
 *
 * @param n real, > 0 and ≤ 2000
 * @throws {RangeError} n outside
 * @source Silver, Microwave Antenna Theory and Design, 1949, section 12.4; Balanis, Antenna Theory, eq. 15-57
 */
export function cosineFeed(n: number, options: IdealFeedOptions = {}): FeedPattern {
  requireNumber("cosineFeed: n", n, { above: 0, max: 2000 });
  const boresight = Math.sqrt((n + 1) / (2 * Math.PI));
  const half = Math.PI / 2;
  // cos(π/2) is 6e-17 in floating point: beyond and at 90° the field is zero.
  const field = (theta: number): number => (theta < half - 1e-12 ? boresight * Math.cos(theta) ** (n / 2) : 0);
  return realFeed(field, options, 1);
}

/**
 * Feed with a Gaussian field in angle, e^{−(θ/θ₀)²·T/8.686}, so that the pattern is down by T dB at the half-angle;
 * both planes alike, 1 W in all, continued to π.
 * @param shape.halfAngle rad, in (0, π)
 * @param shape.taperDb   level at the half-angle, dB below boresight, > 0
 * @throws {RangeError} either outside
 */
export function gaussianFeed(
  shape: { halfAngle: number; taperDb: number },
  options: IdealFeedOptions = {},
): FeedPattern {
  requireNumber("gaussianFeed: halfAngle", shape.halfAngle, { above: 0, below: Math.PI, unit: "rad" });
  requirePositive("gaussianFeed: taperDb", shape.taperDb, "dB");
  const field = (theta: number): number => 10 ** ((-shape.taperDb / 20) * (theta / shape.halfAngle) ** 2);
  const bare = realFeed(field, options);
  const scale = 1 / Math.sqrt(radiatedPower(bare));
  return realFeed((theta) => scale * field(theta), options, 1);
}

function realFeed(field: (theta: number) => number, options: IdealFeedOptions, aperturePower?: number): FeedPattern {
  const frequency = options.frequency ?? 10e9;
  requirePositive("ideal feed: frequency", frequency, "Hz");
  const theta = thetaGrid(options.thetaCount ?? defaultThetaCount);
  const cut = () => ({ re: theta.map(field), im: new Float64Array(theta.length) });
  const pattern: FeedPattern = { frequency, theta, ePlane: cut(), hPlane: cut(), phaseOriginZ: 0, warnings: [] };
  return aperturePower === undefined ? pattern : { ...pattern, aperturePower };
}
