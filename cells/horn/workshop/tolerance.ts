// How far each dimension may be off: what the wave notices, as a part of a wavelength, rounded down to a figure a drawing uses.

import { requirePositive } from "../../check.ts";
import { speedOfLight } from "../../constants.ts";

/** What a dimension does for the wave. */
export type ToleranceClass = "guide bore" | "bore" | "axial" | "slot" | "outside";

export interface Tolerance {
  /** m, either way */
  plusMinus: number;
  /** where it comes from, in words */
  basis: string;
}

interface Rule {
  /** m, before rounding */
  allowed: (size: number, wavelength: number) => number;
  basis: string;
}

/**
 * Fractions: common practice, each with what it costs. Cutoff goes with 1/D; a slot of λ/4 that is λ/500 off in depth moves
 * its balance by 0.8 %; λ/200 in the diameter of a mouth two wavelengths across moves its beamwidth by 0.25 %; λ/100 along
 * the axis is 3.6° of phase, all modes alike, but a few tenths of a degree between them.
 */
const rules: Record<ToleranceClass, Rule> = {
  "guide bore": {
    allowed: (diameter) => diameter / 1000,
    basis: "D/1000: cutoff within 0.1 %; as standard circular guides are specified (IEC 60153-4)",
  },
  bore: {
    allowed: (_, wavelength) => wavelength / 200,
    basis: "λ/200: beamwidth and mode ratio within half a percent",
  },
  axial: { allowed: (_, wavelength) => wavelength / 100, basis: "λ/100: 3.6° of phase" },
  slot: { allowed: (_, wavelength) => wavelength / 500, basis: "λ/500: balance of a slot within 0.8 %" },
  outside: { allowed: (size) => generalTolerance(size), basis: "ISO 2768-m: general tolerance" },
};

const series = [1, 1.5, 2, 3, 4, 5, 6, 8];

/** Down to the next figure of 1, 1.5, 2, 3, 4, 5, 6, 8 times a power of ten. */
export function roundedDown(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value) + 1e-9);
  const mantissa = value / power + 1e-9;
  const figure = series.findLast((one) => one <= mantissa)!;
  // As a quotient of whole numbers where the power is negative, so that 0.02 mm is not 0.020000000000000004.
  return power < 1 ? figure / Math.round(1 / power) : figure * power;
}

/** ISO 2768-1, class m, by size: m. */
function generalTolerance(size: number): number {
  const steps: readonly (readonly [upTo: number, plusMinus: number])[] = [
    [6e-3, 0.1e-3],
    [30e-3, 0.2e-3],
    [120e-3, 0.3e-3],
    [400e-3, 0.5e-3],
    [1, 0.8e-3],
    [2, 1.2e-3],
    [4, 2e-3],
  ];
  return (steps.find(([upTo]) => size <= upTo) ?? steps.at(-1)!)[1];
}

/**
 * Tolerance of a dimension by what it does.
 * @param size             m, the dimension itself (a diameter for a bore)
 * @param highestFrequency Hz: its wavelength is the shortest and asks most
 * @throws {RangeError} size or frequency not positive
 * @source common practice, see the rules above; no standard prescribes them for horns. IEC 60153-4 and ISO 2768-1 from memory
 */
export function toleranceOf(what: ToleranceClass, size: number, highestFrequency: number): Tolerance {
  requirePositive("toleranceOf: size", size, "m");
  requirePositive("toleranceOf: highest frequency", highestFrequency, "Hz");
  const { allowed, basis } = rules[what];
  return { plusMinus: roundedDown(allowed(size, speedOfLight / highestFrequency)), basis };
}
