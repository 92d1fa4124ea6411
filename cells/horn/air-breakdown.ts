// The peak field in a guide that carries power, against the field at which air breaks down.

import { requireNumber, requirePositive } from "../check.ts";
import { speedOfLight, vacuumImpedance } from "../constants.ts";
import { cutoffFrequency, modeField, TE11, waveImpedance } from "../guide/mode.ts";

/** V/m, peak, dry air at sea level and 15 °C. Common practice; 2.9 MV/m for the careful. */
export const seaLevelBreakdownField = 3e6;

/** Power below breakdown that is usually kept for edges, dust, moisture and a bad match, dB. Common practice: 6 to 10. */
export const usualMarginDb = 6;

/**
 * Field at which air breaks down at an altitude, V/m peak: 3 MV/m times the density of the standard atmosphere over that at
 * sea level, (1 − 2.25577e-5 h)^4.25588. Proportional to density as long as electrons collide far more often than the field
 * turns: good in the troposphere and below about 100 GHz.
 * @param altitude m, −500…11 000
 * @throws {RangeError} altitude out of range
 * @source ISO 2533:1975 (from memory); proportionality: common practice
 */
export function breakdownField(altitude = 0): number {
  requireNumber("breakdownField: altitude", altitude, { min: -500, max: 11_000, unit: "m" });
  return seaLevelBreakdownField * (1 - 2.25577e-5 * altitude) ** 4.25588;
}

/** A guide under power. */
export interface PoweredGuide {
  /** m */
  radius: number;
  /** Hz */
  frequency: number;
  /** W at the peak of a pulse or of the envelope, travelling toward the mouth */
  power: number;
  /** amplitude of what comes back over what goes out, 0…1: it stands on the field; default 0 */
  reflection?: number;
}

/**
 * Greatest electric field of TE11 in a circular guide, V/m, peak in time: on its axis, E = √(2ZP)·e(0)·(1 + |Γ|), which for
 * a matched guide is P = 1.990e-3 a² E² λ/λg.
 *
 * For a clean, smooth guide. At the edge of a tooth or a burr the field is higher, by 1.5 to 3 for the usual radii of an edge
 * (common practice), and TM11 behind a step adds to it.
 *
 * @throws {RangeError} at or below cutoff, a number out of range
 * @source fields: Marcuvitz, Waveguide Handbook, 1951, section 2.3
 */
export function te11PeakField({ radius, frequency, power, reflection = 0 }: PoweredGuide): number {
  requirePositive("te11PeakField: radius", radius, "m");
  requirePositive("te11PeakField: frequency", frequency, "Hz");
  requireNumber("te11PeakField: power", power, { min: 0, unit: "W" });
  requireNumber("te11PeakField: reflection", reflection, { min: 0, max: 1 });
  const cutoff = cutoffFrequency(TE11, radius);
  if (frequency <= cutoff)
    throw new RangeError(
      `te11PeakField: frequency must be above the TE11 cutoff of ${(cutoff / 1e9).toPrecision(6)} GHz; got ${frequency / 1e9} GHz`,
    );
  const impedance = waveImpedance(TE11, radius, frequency).re;
  const onAxis = modeField(TE11, radius, 0, 0).eRho;
  return Math.sqrt(2 * impedance * power) * onAxis * (1 + reflection);
}

/** How far a guide is from breakdown. */
export interface BreakdownMargin {
  /** V/m, peak */
  peakField: number;
  /** V/m at the altitude */
  breakdownField: number;
  /** dB of power up to breakdown; negative beyond it; null for no power, which has no margin to tell */
  marginDb: number | null;
  /** W, at which the field reaches breakdown */
  breakdownPower: number;
  /** W, less by the margin asked for */
  allowedPower: number;
  /** the power given is allowed */
  enough: boolean;
}

/**
 * TE11 in the throat (the narrowest and so the most strained part of a horn) against breakdown of air.
 * @param guide    its throat
 * @param altitude m, default 0
 * @param wantedDb dB of power to keep, default 6
 * @throws {RangeError} as `te11PeakField` and `breakdownField`; margin negative
 */
export function breakdownMargin(
  guide: PoweredGuide,
  { altitude = 0, wantedDb = usualMarginDb }: { altitude?: number; wantedDb?: number } = {},
): BreakdownMargin {
  requireNumber("breakdownMargin: margin", wantedDb, { min: 0, unit: "dB" });
  const limit = breakdownField(altitude);
  const perRootWatt = te11PeakField({ ...guide, power: 1 });
  const peakField = te11PeakField(guide);
  const breakdownPower = (limit / perRootWatt) ** 2;
  const allowedPower = breakdownPower / 10 ** (wantedDb / 10);
  return {
    peakField,
    breakdownField: limit,
    marginDb: guide.power === 0 ? null : 10 * Math.log10(breakdownPower / guide.power),
    breakdownPower,
    allowedPower,
    enough: guide.power <= allowedPower,
  };
}

/**
 * Power at which TE10 in the rectangular guide before a transition breaks down, W: P = a b E²/(4η)·√(1 − (fc/f)²).
 * @param guide m and Hz: broad wall, narrow wall, above the cutoff c/2a
 * @param field V/m, peak; default 3 MV/m
 * @throws {RangeError} at or below cutoff, an argument not positive
 * @source Pozar, Microwave Engineering, section 3.3 (fields of TE10); closed form
 */
export function te10BreakdownPower(
  guide: { width: number; height: number; frequency: number },
  field = seaLevelBreakdownField,
): number {
  const { width, height, frequency } = guide;
  requirePositive("te10BreakdownPower: width", width, "m");
  requirePositive("te10BreakdownPower: height", height, "m");
  requirePositive("te10BreakdownPower: field", field, "V/m");
  const cutoff = speedOfLight / (2 * width);
  requireNumber("te10BreakdownPower: frequency", frequency, { above: cutoff, unit: "Hz" });
  return ((width * height * field ** 2) / (4 * vacuumImpedance)) * Math.sqrt(1 - (cutoff / frequency) ** 2);
}
