// The modes that a body of revolution driven by TE11 excites, as flat arrays: TE11, TM11, TE12, TM12, … by rising cutoff.

import { profileScale, TE11, TM11, transverseNumber } from "../guide/mode.ts";
import { besselJ0, besselJ1, besselJPrime1 } from "../math/bessel.ts";

/** Order-one modes by rising cutoff. The zeros of J1′ and J1 interlace, so that even indices are TE, odd ones TM. */
export interface ModeTable {
  count: number;
  /** χ, [count] */
  chi: Float64Array;
  /** profileScale, [count] */
  scale: Float64Array;
  /** J1(χ) of TE, J1′(χ) of TM: what is left of the mode at the wall, [count] */
  wall: Float64Array;
}

export const isTE = (index: number): boolean => index % 2 === 0;

/** @param count 1… */
export function modeTable(count: number): ModeTable {
  const table: ModeTable = {
    count,
    chi: new Float64Array(count),
    scale: new Float64Array(count),
    wall: new Float64Array(count),
  };
  for (let i = 0; i < count; i++) {
    const mode = { ...(isTE(i) ? TE11 : TM11), n: 1 + (i >> 1) };
    const chi = transverseNumber(mode);
    table.chi[i] = chi;
    table.scale[i] = profileScale(mode, chi);
    table.wall[i] = isTE(i) ? besselJ1(chi) : besselJ0(chi);
  }
  return table;
}

/** J1(x) and J1′(x). */
export function wallValues(x: number): { value: number; slope: number } {
  return { value: besselJ1(x), slope: besselJPrime1(x) };
}

/** Number of modes of a guide that travel at a wave number: those with χ below k·radius. */
export function travellingCount(radius: number, k: number, { chi, count }: ModeTable): number {
  let n = 0;
  while (n < count && chi[n]! < k * radius) n++;
  return n;
}
