// How strong the field is in front of a transmitting dish or horn, and how far away each reference level is met.

import { requireNumber, requirePositive } from "../check.ts";
import { speedOfLight } from "../constants.ts";
import { dbToPower, powerToDb } from "../units.ts";
import { type ExposureLimit, exposureLimits } from "./exposure-limits.ts";

/** A round aperture that transmits: a dish, or the horn itself with its mouth open. */
export interface Transmitter {
  /** Hz */
  frequency: number;
  /** m, of the dish or of the horn's mouth */
  diameter: number;
  /** dBi, on axis */
  gainDbi: number;
  /** W, mean, at the antenna's port; 0 for one that only receives */
  power: number;
}

/** Estimates of power density, W/m², and the distances (m, on the axis) between which each of them holds. */
export interface NearFieldEstimate {
  /** λ²G/4π over the area of the aperture; above 1 for a mouth of less than a wavelength or two */
  apertureEfficiency: number;
  /** P/A: the mean over the aperture if all the power passes through it */
  meanDensity: number;
  /** 4P/A: the most that is to be expected at the surface of the dish, or in the mouth of a horn */
  surfaceDensity: number;
  /** 16ηP/(πD²): the most on the axis within the near field */
  nearFieldDensity: number;
  /** D²/(4λ): to here the beam is a tube about as wide as the dish */
  nearFieldLength: number;
  /** 0.6 D²/λ: from here the density falls as 1/R² */
  farFieldDistance: number;
  /** a hundredth of the near field's: at least a diameter beside the beam's centre */
  besideBeamDensity: number;
}

/**
 * Density in front of a round aperture: 4P/A at its surface, 16ηP/(πD²) on the axis as far as D²/(4λ), and the two distances
 * between which it falls first as 1/R, then as 1/R².
 *
 * An estimate meant to err toward too much on the axis, for apertures of many wavelengths with the usual taper
 * (a horn's mouth is small: there it is rougher). It leaves out
 * what the ground or a wall reflects, spillover beside the dish, and leaks: these ask for a measurement.
 *
 * @throws {RangeError} frequency or diameter not positive, power negative; a gain above the normal gain of this size, (ka)² + 2ka
 * @source FCC OET Bulletin 65, edition 97-01, eq. 11–18; a hundredth beside the beam: the text after them (from memory);
 *   normal gain: Harrington, J. Res. NBS 64D, 1960 (from memory)
 */
export function nearFieldEstimate(transmitter: Transmitter): NearFieldEstimate {
  const { frequency, diameter, power, gainDbi } = checked("nearFieldEstimate", transmitter);
  const wavelength = speedOfLight / frequency;
  const area = (Math.PI * diameter ** 2) / 4;
  const apertureEfficiency = (dbToPower(gainDbi) * wavelength ** 2) / (4 * Math.PI) / area;
  const size = (Math.PI * diameter) / wavelength;
  const normalGainDbi = powerToDb(size ** 2 + 2 * size);
  if (gainDbi > normalGainDbi)
    throw new RangeError(
      `nearFieldEstimate: gain must be at most the normal gain of an aperture of ${diameter} m, ${normalGainDbi.toFixed(2)} dBi; got ${gainDbi} dBi`,
    );
  const nearFieldDensity = (16 * apertureEfficiency * power) / (Math.PI * diameter ** 2);
  return {
    apertureEfficiency,
    meanDensity: power / area,
    surfaceDensity: (4 * power) / area,
    nearFieldDensity,
    nearFieldLength: diameter ** 2 / (4 * wavelength),
    farFieldDistance: (0.6 * diameter ** 2) / wavelength,
    besideBeamDensity: nearFieldDensity / 100,
  };
}

/**
 * Density on the axis at a distance, W/m²: S_nf as far as D²/(4λ), S_nf·R_nf/R to 0.6 D²/λ, then PG/(4πR²).
 * The last two differ by 3 % where they meet (0.25/0.6·16/π against π/1.44): the estimate jumps there.
 * @param distance m, ≥ 0
 * @throws {RangeError} distance negative, and as `nearFieldEstimate`
 * @source FCC OET Bulletin 65, eq. 13, 17, 18
 */
export function densityOnAxis(transmitter: Transmitter, distance: number): number {
  const estimate = nearFieldEstimate(transmitter);
  requireNumber("densityOnAxis: distance", distance, { min: 0, unit: "m" });
  if (distance <= estimate.nearFieldLength) return estimate.nearFieldDensity;
  if (distance < estimate.farFieldDistance) return (estimate.nearFieldDensity * estimate.nearFieldLength) / distance;
  return (transmitter.power * dbToPower(transmitter.gainDbi)) / (4 * Math.PI * distance ** 2);
}

/** Where one reference level is met. */
export interface ExposureDistance extends ExposureLimit {
  /** m on the axis from the antenna, beyond which the estimate keeps to the level; 0 where it does at once */
  distance: number;
  /** in front of the surface, between feed and dish, the level may be exceeded whatever the distance on the axis says */
  exceededAtSurface: boolean;
}

/**
 * Distances on the axis at which the reference levels that hold at this frequency are met, by the estimate of
 * `densityOnAxis`. For screening: the authority's own method and a licensed assessment decide.
 * @throws {RangeError} frequency outside 0.4…300 GHz, and as `nearFieldEstimate`
 */
export function exposureDistances(transmitter: Transmitter): ExposureDistance[] {
  const estimate = nearFieldEstimate(transmitter);
  return exposureLimits(transmitter.frequency).map((limit) => ({
    ...limit,
    distance: distanceTo(limit.density, transmitter, estimate),
    exceededAtSurface: estimate.surfaceDensity > limit.density,
  }));
}

/** The greatest distance at which the estimate still exceeds a density; it may fall below it once and jump over it again. */
function distanceTo(density: number, { power, gainDbi }: Transmitter, estimate: NearFieldEstimate): number {
  const { nearFieldDensity, nearFieldLength, farFieldDistance } = estimate;
  const far = Math.sqrt((power * dbToPower(gainDbi)) / (4 * Math.PI * density));
  if (far >= farFieldDistance) return far;
  if (nearFieldDensity <= density) return 0;
  return Math.min(farFieldDistance, (nearFieldDensity * nearFieldLength) / density);
}

function checked(where: string, transmitter: Transmitter): Transmitter {
  requirePositive(`${where}: frequency`, transmitter.frequency, "Hz");
  requirePositive(`${where}: diameter`, transmitter.diameter, "m");
  requireNumber(`${where}: power`, transmitter.power, { min: 0, unit: "W" });
  requireNumber(`${where}: gain`, transmitter.gainDbi, { unit: "dBi" });
  return transmitter;
}
