// The uniform θ grid that every pattern lives on, and the quadrature that fits it.

import { requireInteger } from "../check.ts";
import type { FeedPattern } from "./feed-pattern.ts";

/** 0.5° apart. */
export const defaultThetaCount = 361;

/**
 * θ uniform from 0 to π, both included, rad.
 * @param thetaCount whole, 3…20001
 * @throws {RangeError} outside these
 */
export function thetaGrid(thetaCount: number = defaultThetaCount): Float64Array {
  requireInteger("thetaGrid: thetaCount", thetaCount, { min: 3, max: 20001 });
  return Float64Array.from({ length: thetaCount }, (_, i) => (Math.PI * i) / (thetaCount - 1));
}

// Filled once per count and then only read: a table, not scratch.
const weightTables = new Map<number, Float64Array>();

/**
 * Weights w with ∫₀^π g(θ) sin θ dθ ≈ Σ w[i]·g(θ[i]) on the uniform grid (Clenshaw–Curtis).
 *
 * A smooth intensity, continued through both poles, is an even function of period 2π: its cosine series converges
 * exponentially, and this rule integrates each of its terms exactly as long as the grid resolves it. At a kink (a feed
 * cut off at 90°) the error falls with the square of the spacing or faster.
 *
 * @returns [thetaCount], never to be written to
 * @accuracy exact to rounding for a radiator of radius a sampled at thetaCount > 2ka + 20 points
 * @source   Clenshaw & Curtis, Numerische Mathematik 2, 197–205, 1960
 */
export function thetaQuadrature(thetaCount: number): Float64Array {
  let weights = weightTables.get(thetaCount);
  if (!weights) {
    requireInteger("thetaQuadrature: thetaCount", thetaCount, { min: 3, max: 20001 });
    weights = clenshawCurtis(thetaCount);
    weightTables.set(thetaCount, weights);
  }
  return weights;
}

function clenshawCurtis(count: number): Float64Array {
  const n = count - 1;
  // cos(2jπi/n) from a table of one period: argument reduced in whole numbers.
  const cosines = Float64Array.from({ length: 2 * n }, (_, i) => Math.cos((Math.PI * i) / n));
  const weights = new Float64Array(count);
  for (let i = 0; i <= n; i++) {
    let sum = 1;
    for (let j = 1; 2 * j <= n; j++) {
      const term = (2 * cosines[(2 * j * i) % (2 * n)]!) / (1 - 4 * j * j);
      sum += 2 * j === n ? term / 2 : term;
    }
    weights[i] = ((i === 0 || i === n ? 1 : 2) * sum) / n;
  }
  return weights;
}

/**
 * Checks that a pattern is what FeedPattern says: lengths agree, θ uniform from 0 to π, boresight not zero.
 * @throws {RangeError} naming what is wrong
 */
export function requirePattern(where: string, pattern: FeedPattern): void {
  const { theta, ePlane, hPlane } = pattern;
  const count = theta.length;
  if (count < 3) throw new RangeError(`${where}: a pattern needs at least 3 angles; got ${count}`);
  for (const [name, part] of [
    ["ePlane.re", ePlane.re],
    ["ePlane.im", ePlane.im],
    ["hPlane.re", hPlane.re],
    ["hPlane.im", hPlane.im],
  ] as const) {
    if (part.length !== count)
      throw new RangeError(`${where}: ${name} must have ${count} samples as theta; got ${part.length}`);
  }
  const spacing = Math.PI / (count - 1);
  for (const i of [0, 1, count >> 1, count - 1]) {
    if (!(Math.abs(theta[i]! - i * spacing) <= 1e-6 * spacing)) {
      throw new RangeError(
        `${where}: theta must be uniform from 0 to π; sample ${i} of ${count} is ${theta[i]} rad instead of ${i * spacing} rad`,
      );
    }
  }
  const boresight = Math.hypot(ePlane.re[0]! + hPlane.re[0]!, ePlane.im[0]! + hPlane.im[0]!) / 2;
  if (!(boresight > 0 && Number.isFinite(boresight))) {
    throw new RangeError(`${where}: the pattern must not be zero on boresight; got a copolar field of ${boresight}`);
  }
}
