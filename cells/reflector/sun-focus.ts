// The sun in the focus of a dish: how much power, how small the image, how strong, and how near the pointing has to be.

import { requireNumber, requirePositive } from "../check.ts";
import type { Dish } from "./dish.ts";

/** Specular reflectance for sunlight. Orders of magnitude, common practice; a dish in doubt has to be tried, with care. */
export const specularReflectance = {
  /** bright metal, polished or freshly spun */
  polished: 0.85,
  /** gloss paint: the reflection of its smooth surface alone */
  glossPaint: 0.05,
  /** matt or textured paint, as antenna makers use it */
  mattPaint: 0.005,
} as const;

export type DishSurface = keyof typeof specularReflectance;

/** Half of the 0.53° that the sun is wide, rad. */
export const sunRadius = (0.53 / 2) * (Math.PI / 180);

export interface SunGivens {
  surface: DishSurface;
  /** rad rms in each direction: how far the surface's normal strays; default 0, a perfect paraboloid and the worst case */
  slopeError?: number;
  /** W/m², direct, on a surface that faces the sun; default 1000, clear sky and high sun */
  irradiance?: number;
  /** share of the dish that the feed and its supports shade, 0…1; default 0 */
  blockage?: number;
  /** m, radius of the feed's mouth; with it comes the pointing at which the image meets the feed */
  feedRadius?: number;
}

/** An estimate: figures good to a factor of two at best. */
export interface SunFocus {
  /** W, specularly reflected toward the focus */
  power: number;
  /** W/m² in the middle of the image, for a small plate that faces the dish */
  irradiance: number;
  /** irradiance over the sun's own */
  concentration: number;
  /** m, diameter of the image of a perfect dish, rays from the vertex */
  imageDiameter: number;
  /** rad between boresight and the sun's centre, within which part of the image falls on the feed; only with `feedRadius` */
  reach?: number;
}

/**
 * The sun focused by a front-fed paraboloid that points at it.
 *
 *   middle of the image: ρ I (sin ψ / sin s)² · (1 − e^{−s²/2(2σ)²}),   power: ρ I (1 − b) πD²/4,   image: 2 f tan s
 *
 * Seen from the focus, a perfect dish is filled with the sun's own radiance I/(π sin² s) out to the rim angle ψ, whatever its
 * focal length; s is the sun's radius. Slope errors σ blur it: a Gaussian of 2σ in each direction, taken in the middle of an
 * even disc. The diffuse part of a painted surface adds less than one sun and is left out, as are limb darkening and haze.
 *
 * @throws {RangeError} unknown surface, a number out of range
 * @accuracy against traced rays at f/D 0.5: 0.2 % up to 1 mrad of slope error, 3.5 % too low at 4 mrad (sideways the
 *   blur is 2σ cos i, i the angle of incidence); the reflectance is far less certain
 * @source sin² law: Welford & Winston, "High Collection Nonimaging Optics", 1989, chapter 2 (from memory)
 */
export function sunFocus(dish: Dish, givens: SunGivens): SunFocus {
  const { surface, slopeError = 0, irradiance: sun = 1000, blockage = 0, feedRadius } = givens;
  if (!Object.hasOwn(specularReflectance, surface))
    throw new RangeError(
      `sunFocus: surface must be one of ${Object.keys(specularReflectance).join(", ")}; got ${String(surface)}`,
    );
  requireNumber("sunFocus: slope error", slopeError, { min: 0, max: 0.1, unit: "rad" });
  requireNumber("sunFocus: irradiance", sun, { above: 0, max: 1400, unit: "W/m²" });
  requireNumber("sunFocus: blockage", blockage, { min: 0, below: 1 });
  if (feedRadius !== undefined) requirePositive("sunFocus: feed radius", feedRadius, "m");
  const reflectance = specularReflectance[surface];
  const blur = 2 * slopeError;
  const kept = blur === 0 ? 1 : -Math.expm1(-(sunRadius ** 2) / (2 * blur ** 2));
  const concentration = reflectance * (Math.sin(dish.halfAngle) / Math.sin(sunRadius)) ** 2 * kept;
  const imageDiameter = 2 * dish.focalLength * Math.tan(sunRadius);
  return {
    power: reflectance * sun * (1 - blockage) * (Math.PI / 4) * dish.diameter ** 2,
    irradiance: concentration * sun,
    concentration,
    imageDiameter,
    ...(feedRadius === undefined ? {} : { reach: Math.atan((feedRadius + imageDiameter / 2) / dish.focalLength) }),
  };
}
