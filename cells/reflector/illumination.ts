// The feed's field where the dish is, on the nodes of one Gauss rule: what every sub-efficiency integrates.

import { gaussLegendre } from "../math/quadrature.ts";
import type { PatternInterpolant } from "../pattern/interpolant.ts";

/** Samples over 0 ≤ θ ≤ halfAngle; ∫f dθ = Σ weight·f. All arrays [nodeCount]. */
export interface Illumination {
  /** rad */
  theta: Float64Array;
  /** rad */
  weight: Float64Array;
  /** C = (E + H)/2, √(W/sr) */
  copolar: { re: Float64Array; im: Float64Array };
  /** |X|², X = (E − H)/2, W/sr: the cross-polar intensity in the 45° plane */
  crossPolarIntensity: Float64Array;
}

/**
 * Copolar field and cross-polar intensity of a feed on Gauss–Legendre nodes from the axis to an angle.
 *
 * @param feed      with its phases referred to the point that stands at the focus
 * @param angle     rad, 0 < angle < π/2: the rim, or the edge of the shaded disc
 * @param nodeCount 64 for a pattern whose main lobe fills the dish
 */
export function illuminationOf(feed: PatternInterpolant, angle: number, nodeCount = 64): Illumination {
  const rule = gaussLegendre(nodeCount);
  const theta = rule.nodes.map((node) => (angle * (1 + node)) / 2);
  const copolar = { re: new Float64Array(nodeCount), im: new Float64Array(nodeCount) };
  const crossPolarIntensity = new Float64Array(nodeCount);
  for (let i = 0; i < nodeCount; i++) {
    const e = feed.ePlane(theta[i]!);
    const h = feed.hPlane(theta[i]!);
    copolar.re[i] = (e.re + h.re) / 2;
    copolar.im[i] = (e.im + h.im) / 2;
    crossPolarIntensity[i] = ((e.re - h.re) ** 2 + (e.im - h.im) ** 2) / 4;
  }
  return { theta, weight: rule.weights.map((weight) => (weight * angle) / 2), copolar, crossPolarIntensity };
}
