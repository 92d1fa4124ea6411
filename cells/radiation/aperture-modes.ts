// What stands at a horn's mouth: the modes and their complex amplitudes.

import type { Warning } from "../check.ts";
import type { ComplexVector } from "../math/complex.ts";

/**
 * Modes TE1n and TM1n travelling outward at a circular aperture. Each mode's profile has E_x > 0 on the axis.
 * Amplitudes are power waves (|a|² is watts for a travelling mode; below cutoff √Z-normalized with the principal root,
 * not a power). Order: TE11, TM11, TE12, TM12, …
 */
export interface ApertureModes {
  /** Hz */
  frequency: number;
  /** m */
  radius: number;
  /** number of TE1n = number of TM1n carried; amplitudes hold 2·modePairs entries in the order above */
  modePairs: number;
  amplitudes: ComplexVector;
  warnings: Warning[];
}
