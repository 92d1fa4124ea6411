// The one form in which every feed, of any kind and by any model, hands its far field on.

import type { Warning } from "../check.ts";
import type { ComplexVector } from "../math/complex.ts";

/**
 * Far field of a feed that is a body of revolution driven by one TE11 polarization (x), time e^{+jωt}.
 *
 *   E_θ(θ, φ) =  cos φ · ePlane(θ) · e^{−jkr}/r · √(2η0)
 *   E_φ(θ, φ) = −sin φ · hPlane(θ) · e^{−jkr}/r · √(2η0)
 *
 * so that the radiation intensity is U(θ, φ) = cos²φ |ePlane|² + sin²φ |hPlane|², W/sr, and
 * ePlane(0) = hPlane(0). In the 45° plane by Ludwig's third definition: copolar C = (E + H)/2, cross-polar X = (E − H)/2.
 * Phases are referred to the point z = phaseOriginZ on the axis (0 = centre of the aperture, +z out of the horn).
 */
export interface FeedPattern {
  /** Hz */
  frequency: number;
  /** rad, [thetaCount], uniform from 0 to π, both included */
  theta: Float64Array;
  /** √(W/sr), [thetaCount] */
  ePlane: ComplexVector;
  /** √(W/sr), [thetaCount] */
  hPlane: ComplexVector;
  /** m; 0 = centre of the aperture */
  phaseOriginZ: number;
  /** W, power that the aperture's modes carry outward, where the model knows it; the radiated integral otherwise */
  aperturePower?: number;
  warnings: Warning[];
}
