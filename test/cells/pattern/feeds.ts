// Patterns with a closed form, for the tests of the pattern's integrals.

import { speedOfLight } from "../../../cells/constants.ts";
import type { FeedPattern } from "../../../cells/pattern/feed-pattern.ts";
import { thetaGrid } from "../../../cells/pattern/theta-grid.ts";

export const frequency = 10e9;
export const waveNumber = (2 * Math.PI * frequency) / speedOfLight;

/** A pattern of two real functions of θ under the phase of a point source at z. */
export function patternOf(
  e: (theta: number) => number,
  h: (theta: number) => number,
  { thetaCount = 361, z = 0 }: { thetaCount?: number; z?: number } = {},
): FeedPattern {
  const theta = thetaGrid(thetaCount);
  const cut = (f: (theta: number) => number) => ({
    re: theta.map((t) => f(t) * Math.cos(waveNumber * z * Math.cos(t))),
    im: theta.map((t) => f(t) * Math.sin(waveNumber * z * Math.cos(t))),
  });
  return { frequency, theta, ePlane: cut(e), hPlane: cut(h), phaseOriginZ: 0, warnings: [] };
}

/** Huygens source: (1 + cos θ)/2 in both planes. Power 4π/3 · 1 W/sr, directivity 3 (Balanis, Antenna Theory, section 12.2). */
export const huygens = (options = {}): FeedPattern =>
  patternOf(
    (t) => (1 + Math.cos(t)) / 2,
    (t) => (1 + Math.cos(t)) / 2,
    options,
  );

/** Short dipole along x: cos θ in the E-plane, 1 in the H-plane. Power 8π/3 · 1 W/sr, directivity 1.5. */
export const dipole = (options = {}): FeedPattern => patternOf(Math.cos, () => 1, options);
