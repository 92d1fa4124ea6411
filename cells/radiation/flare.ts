// The spherical phase of a flared horn over its aperture.

import { requireNumber } from "../check.ts";
import { speedOfLight } from "../constants.ts";

/** Flare half-angle beyond which the phase cap is no longer a fair description of the mouth. */
export const widestCapAngle = Math.PI / 6;

/**
 * Path excess, m, of a spherical wave from the flare's apex to the aperture plane at radius ρ, against the axis:
 *
 *   δ(ρ) = √(L² + ρ²) − L,   L = √(slant² − radius²)
 *
 * The slant is the length of the cone's wall from the apex (where the wall, continued, meets the axis) to the rim; L is
 * the apex's distance from the aperture plane. At the rim δ = slant − L, about radius²/(2·slant).
 * An infinite slant is a flat aperture: 0.
 *
 * @param flare.slant m, > radius
 * @throws {RangeError} slant not above radius
 */
export function pathExcess(flare: { slant: number; radius: number }): (rho: number) => number {
  if (flare.slant === Number.POSITIVE_INFINITY) return () => 0;
  const axial = axialLength(flare);
  // δ = ρ²/(√(L² + ρ²) + L): no cancellation for a long flare.
  return (rho) => (rho * rho) / (Math.sqrt(axial * axial + rho * rho) + axial);
}

/** Phase error at the rim in wavelengths: s = δ(radius)/λ. @throws {RangeError} as `pathExcess` */
export function rimPhaseError(flare: { slant: number; radius: number; frequency: number }): number {
  return (pathExcess(flare)(flare.radius) * flare.frequency) / speedOfLight;
}

/** L of `pathExcess`, m. */
function axialLength(flare: { slant: number; radius: number }): number {
  const { slant, radius } = flare;
  requireNumber("flare: slant", slant, { above: radius, unit: "m" });
  return Math.sqrt((slant - radius) * (slant + radius));
}
