// Which of a solution's modes are listed at the mouth, and how the highest of them are had.

import { requireInteger } from "../check.ts";
import { type ComplexVector, complexVector } from "../math/complex.ts";
import { continuedTail } from "./mouth-tail.ts";
import { isGuide, type Piece } from "./pieces.ts";

/** Listed modes have a cutoff up to this multiple of the highest frequency: the next ones add below −80 dB to the pattern. */
const listedBelow = { edge: 4, taper: 5.5 };
const fewestPairs = 5;

/** TE1n–TM1n pairs listed at a mouth. @param ka highest wave number times the mouth's radius */
export function pairCount(asked: number | undefined, mouth: Piece, ka: number): number {
  if (asked !== undefined) return requireInteger("bandAnalysis: modePairs", asked, { min: 1, max: 200 });
  const multiple = isGuide(mouth) ? listedBelow.edge : listedBelow.taper;
  return Math.max(fewestPairs, Math.ceil((multiple * ka) / Math.PI));
}

/** Share of a taper's modes whose amplitudes at its end, extrapolated, are good to a few percent of themselves. */
const trustedShare = 0.5;

export function listedAmplitudes(
  outgoing: ComplexVector,
  { mouth, taperModes, pairs }: { mouth: Piece; taperModes: number; pairs: number },
): ComplexVector {
  const count = 2 * pairs;
  const trusted = 2 * Math.floor((trustedShare * taperModes) / 2);
  if (!isGuide(mouth) && trusted >= 4 && trusted < count) {
    const angle = Math.atan((mouth.endRadius - mouth.startRadius) / mouth.length);
    return continuedTail(outgoing, { angle, trusted, count });
  }
  const amplitudes = complexVector(count);
  amplitudes.re.set(outgoing.re.subarray(0, count));
  amplitudes.im.set(outgoing.im.subarray(0, count));
  return amplitudes;
}
