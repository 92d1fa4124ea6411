// What the dish itself takes off: rough surface, and what stands in front of it.

import { requireNumber, requirePositive } from "../check.ts";
import { speedOfLight } from "../constants.ts";

/**
 * Loss by random error of the surface:  10 log₁₀ e^{(4πε/λ)²} = 685.81 (ε/λ)² dB.
 *
 * Holds for errors small against the focal length, correlated over lengths that are short against the dish and long
 * against λ, and for ε ≲ λ/16: beyond, most of the power is in the scattered field, which this leaves out.
 *
 * @param surfaceError m, rms half path-length error (for a shallow dish, the rms error normal to the surface)
 * @param frequency    Hz
 * @returns dB, positive
 * @throws {RangeError} surface error negative, frequency not positive
 * @source Ruze, "Antenna tolerance theory — a review", Proc. IEEE 54, 633–640, 1966
 */
export function surfaceLossDb(surfaceError: number, frequency: number): number {
  return (10 / Math.LN10) * ruzeExponent("surfaceLossDb", surfaceError, frequency);
}

/** The same as an efficiency, e^{−(4πε/λ)²}, 0…1; see `surfaceLossDb`. */
export function ruzeEfficiency(surfaceError: number, frequency: number): number {
  return Math.exp(-ruzeExponent("ruzeEfficiency", surfaceError, frequency));
}

function ruzeExponent(where: string, surfaceError: number, frequency: number): number {
  requireNumber(`${where}: surface error`, surfaceError, { min: 0, unit: "m" });
  requirePositive(`${where}: frequency`, frequency, "Hz");
  return ((4 * Math.PI * surfaceError * frequency) / speedOfLight) ** 2;
}

/**
 * Central blockage of an evenly lit aperture, (1 − (d/D)²)²: the shaded disc radiates nothing (null field), so the area
 * is lost once as collecting area and once as power that the feed sent there.
 * For the dish's actual illumination use `dishEfficiency`, which weights the disc with the field that falls on it.
 *
 * @param diameterRatio diameter of the shade over that of the dish, 0 ≤ ratio < 1
 * @throws {RangeError} ratio out of range
 * @source common practice (null-field hypothesis), closed form
 */
export function uniformBlockageEfficiency(diameterRatio: number): number {
  requireNumber("uniformBlockageEfficiency: diameter ratio", diameterRatio, { min: 0, below: 1 });
  return (1 - diameterRatio ** 2) ** 2;
}
