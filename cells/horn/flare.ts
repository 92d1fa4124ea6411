// The conical flare: its slant length, the phase error over its mouth, the length it takes.

import { requireNumber, requirePositive } from "../check.ts";
import { widestCapAngle } from "../radiation/flare.ts";

/** A cone from one radius to a larger one. All lengths in m. */
export interface Flare {
  /** radius where it begins */
  startRadius: number;
  /** radius of the mouth */
  radius: number;
  /** along the axis */
  length: number;
  /** apex to rim of the mouth, along the wall; null for a straight guide, which has no apex */
  slant: number | null;
  /** path excess of the spherical wave at the rim against the axis, wavelengths; about d²/(8·slant·λ) */
  phaseError: number;
}

/** A flare shorter than this doesn't form its spherical wave: wavelengths. Common practice. */
const shortestFlareWaves = 0.5;

/** What a flare keeps to. */
export interface FlareRule {
  /** wavelengths, > 0, at most */
  phaseError: number;
  /** m */
  wavelength: number;
  /** m; default half a wavelength */
  minLength?: number;
}

/**
 * The flare between two radii, of a given length.
 * @param from.startRadius m
 * @param from.radius      m, not below the start
 * @param length           m
 * @param wavelength       m
 * @throws {RangeError} an argument not positive, mouth narrower than the start
 */
export function flareOfLength(
  { startRadius, radius }: { startRadius: number; radius: number },
  length: number,
  wavelength: number,
): Flare {
  requirePositive("flareOfLength: start radius", startRadius, "m");
  requireNumber("flareOfLength: radius", radius, { min: startRadius, unit: "m" });
  requirePositive("flareOfLength: length", length, "m");
  const angle = Math.atan((radius - startRadius) / length);
  const slant = angle === 0 ? null : radius / Math.sin(angle);
  return { startRadius, radius, length, slant, phaseError: (radius * Math.tan(angle / 2)) / wavelength };
}

/**
 * The shortest flare between two radii that keeps to a phase error s: half flare angle α with tan(α/2) = sλ/a, because the
 * path excess at the rim is slant·(1 − cos α) = a tan(α/2).
 *
 * The cone is never steeper than 30° and never shorter than its least length, λ/2 unless given (beyond, a straight guide's modes on a spherical cap no
 * longer describe the mouth), so a small mouth may keep to less than the phase error allowed. Equal radii give a straight
 * guide of the least length.
 *
 * @throws {RangeError} radii, phase error or wavelength not positive, mouth narrower than the start
 */
export function shortestFlare(
  from: { startRadius: number; radius: number },
  { phaseError, wavelength, minLength = shortestFlareWaves * wavelength }: FlareRule,
): Flare {
  requirePositive("shortestFlare: phase error", phaseError, "wavelengths");
  const angle = Math.min(widestCapAngle, 2 * Math.atan((phaseError * wavelength) / from.radius));
  const length = Math.max(minLength, (from.radius - from.startRadius) / Math.tan(angle));
  return flareOfLength(from, length, wavelength);
}

/** The slant as the aperture integrals take it: Infinity, a flat mouth, for a straight guide. */
export const capSlant = ({ slant }: Flare): number => slant ?? Number.POSITIVE_INFINITY;

/** Radius of the flare's wall at a distance from its mouth: z in m, −length…0. */
export function radiusAt(flare: Flare, z: number): number {
  return flare.radius + ((flare.radius - flare.startRadius) * z) / flare.length;
}
