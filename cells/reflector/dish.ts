// The dish: a front-fed paraboloid of revolution, and what its shape alone decides.

import { requireNumber, requirePositive } from "../check.ts";
import { speedOfLight } from "../constants.ts";
import { fieldToDb, fromDeg, powerToDb, toDeg } from "../units.ts";

/** A front-fed paraboloid. Plain data. */
export interface Dish {
  /** m */
  diameter: number;
  /** m, vertex to focus */
  focalLength: number;
  /** focal length over diameter, above 0.25 */
  fOverD: number;
  /** rad, from the axis to the rim, seen from the focus; below π/2 */
  halfAngle: number;
  /** m, vertex to the plane of the rim */
  depth: number;
}

/** A dish by its diameter (m) and either f/D or the half-angle to the rim (rad). */
export type DishGivens = { diameter: number; fOverD: number } | { diameter: number; halfAngle: number };

/**
 * Geometry of a front-fed paraboloid z = r²/4f:  tan(ψ/2) = 1/(4 f/D),  depth = D²/16f.
 *
 * The models behind this project put the feed's copolar field over the front half-space in the dish, so the rim must lie
 * in front of the focus: ψ < 90°, the same as f/D > 0.25.
 *
 * @throws {RangeError} diameter not positive; f/D ≤ 0.25, or half-angle not within 0…90°
 * @source Silver, "Microwave Antenna Theory and Design", 1949, §12; the parabola itself
 */
export function dish(givens: DishGivens): Dish {
  const diameter = requirePositive("dish: diameter", givens.diameter, "m");
  const fOverD = "fOverD" in givens ? shallowEnough(givens.fOverD) : fOverDOf(givens.halfAngle);
  const focalLength = fOverD * diameter;
  return { diameter, focalLength, fOverD, halfAngle: rimHalfAngle(fOverD), depth: diameter / (16 * fOverD) };
}

const rimHalfAngle = (fOverD: number): number => 2 * Math.atan(1 / (4 * fOverD));

function shallowEnough(fOverD: number): number {
  requirePositive("dish: f/D", fOverD);
  if (fOverD > 0.25) return fOverD;
  const degrees = toDeg(rimHalfAngle(fOverD));
  throw new RangeError(
    `dish: the half-angle to the rim must be below 90 deg, which asks f/D above 0.25; got ${degrees.toFixed(1)} deg from f/D ${fOverD}`,
  );
}

function fOverDOf(halfAngle: number): number {
  requirePositive("dish: half-angle", halfAngle, "rad");
  if (halfAngle >= Math.PI / 2)
    throw new RangeError(
      `dish: the half-angle to the rim must be below 90 deg; got ${toDeg(halfAngle).toFixed(1)} deg`,
    );
  // a rim closer to the axis than this is a flat plate to any feed, and 1/tan would lose the last digits
  requireNumber("dish: half-angle", halfAngle, { min: fromDeg(0.1), unit: "rad" });
  return 1 / (4 * Math.tan(halfAngle / 2));
}

/**
 * Space loss: how much weaker a feed of even pattern lights the rim than the vertex, because the path to the rim is longer.
 *
 *   20 log₁₀(ρ(ψ)/f) = −20 log₁₀((1 + cos ψ)/2) dB, positive
 *
 * @param halfAngle rad, 0 ≤ halfAngle < π
 * @returns dB, positive: `edgeTaperDb = feedTaperDb + spaceLossDb`
 * @throws {RangeError} half-angle out of range
 * @source Silver 1949, §12; closed form
 */
export function spaceLossDb(halfAngle: number): number {
  requireNumber("spaceLossDb: half-angle", halfAngle, { min: 0, below: Math.PI, unit: "rad" });
  // + 0: a rim at the vertex loses 0, not −0
  return -fieldToDb((1 + Math.cos(halfAngle)) / 2) + 0;
}

/**
 * Directivity of the dish's aperture lit evenly and in phase, (πD/λ)²: what 100 % aperture efficiency would give.
 * Good for an aperture of many wavelengths.
 *
 * @returns dBi
 * @throws {RangeError} diameter or frequency not positive
 * @source IEEE Std 145, "aperture efficiency"; closed form
 */
export function uniformGainDbi(diameter: number, frequency: number): number {
  requirePositive("uniformGainDbi: diameter", diameter, "m");
  requirePositive("uniformGainDbi: frequency", frequency, "Hz");
  return powerToDb(((Math.PI * diameter * frequency) / speedOfLight) ** 2);
}

/** Angle from the axis, rad, at which the feed sees the point of the dish at radius `radius` (m): 2 atan(r/2f). */
export function angleToRadius(dish: Dish, radius: number): number {
  return 2 * Math.atan(radius / (2 * dish.focalLength));
}
