// How fine a horn is divided, what coarser solutions tell of the error, and what they add to the answer.
//
// Three sources of error, each seen by solving again with less: functions at the edges of steps (they converge faster than
// any power), modes in tapers (error ∝ 1/N), steps of tapers (error ∝ h²). The known powers are used to extrapolate.

import { type ComplexVector, complexVector } from "../math/complex.ts";
import type { Fineness } from "./chain.ts";
import type { Answer } from "./outcome.ts";
import { isGuide, type Piece } from "./pieces.ts";

/** One level of fineness. */
export interface Level {
  /** functions at each edge up to three wavelengths wide; more at a wider one */
  edgeFunctions: number;
  /** modes in tapers and at shallow steps */
  taperModes: number;
  /** steps of a taper in each wavelength of the highest frequency */
  stepsPerWavelength: number;
}

/** Tried in turn until the wanted error is reached. */
export const levels: readonly Level[] = [
  { edgeFunctions: 11, taperModes: 20, stepsPerWavelength: 25 },
  { edgeFunctions: 15, taperModes: 32, stepsPerWavelength: 40 },
  { edgeFunctions: 19, taperModes: 48, stepsPerWavelength: 60 },
];

/** Steps of each piece at a level; a steep or wide-ranging taper also gets enough for its radius to change little in each. */
export function taperSteps(pieces: Piece[], stepsPerWavelength: number, wavelength: number): number[] {
  return pieces.map((piece) => {
    if (isGuide(piece)) return 1;
    const byLength = (piece.length * stepsPerWavelength) / wavelength;
    const byRadius = (Math.abs(Math.log(piece.endRadius / piece.startRadius)) * stepsPerWavelength) / 0.5;
    // Even, so that half of them is whole.
    return 2 * Math.max(1, Math.ceil(Math.max(byLength, byRadius) / 2));
  });
}

/** The solutions of one level, finest first. Without tapers there are two: all, and fewer functions. */
export function solutionsOf(
  { edgeFunctions, taperModes }: Level,
  pieces: Piece[],
  { steps, highestWaveNumber }: { steps: number[]; highestWaveNumber: number },
): Fineness[] {
  const all: Fineness = { edgeFunctions, modeCount: taperModes, sections: steps, highestWaveNumber };
  const fewerModes = { ...all, modeCount: taperModes / 2 };
  const halfSteps = steps.map((n) => Math.max(1, n / 2));
  if (pieces.every(isGuide)) return [all, { ...fewerModes, edgeFunctions: edgeFunctions - 2 }];
  return [all, fewerModes, { ...fewerModes, edgeFunctions: edgeFunctions - 2, sections: halfSteps }];
}

/** A solution and its estimated error at one frequency. */
export interface Refined {
  answer: Answer;
  /** of S11, absolute */
  reflectionError: number;
  /** of the amplitudes at the mouth, root of the sum of squares over the travelling modes */
  apertureError: number;
}

/** Number of modes that travel at one frequency. */
export interface Travelling {
  throat: number;
  mouth: number;
}

/** Corrections larger than this are no small errors, and following their power law would mislead. */
const mostExtrapolated = 0.05;

/**
 * Without tapers: the finest solution; its error estimated by the whole change from the coarser one (the true one is many
 * times less). With tapers: the finest, plus what 1/N and h² leave out; estimated by a quarter of that
 * (the true error was 0.04–0.27 of it on cones and dual-mode horns, test/cells/matching/band-analysis).
 */
export function refine(solutions: Answer[], travelling: Travelling): Refined {
  const [finest, fewer, coarsest] = solutions as [Answer, Answer, Answer | undefined];
  if (!coarsest) {
    return { answer: finest, ...difference(finest, fewer, travelling.mouth) };
  }
  const byModes = difference(finest, fewer, travelling.mouth);
  const bySteps = difference(fewer, coarsest, travelling.mouth);
  const reflectionError = (byModes.reflectionError + bySteps.reflectionError / 3) / 4;
  const apertureError = (byModes.apertureError + bySteps.apertureError / 3) / 4;
  const correction = 4 * Math.hypot(reflectionError, apertureError);
  const answer = correction < mostExtrapolated ? extrapolated(finest, fewer, coarsest, travelling) : finest;
  return { answer, reflectionError, apertureError };
}

function difference(a: Answer, b: Answer, travelling: number): { reflectionError: number; apertureError: number } {
  let sum = 0;
  for (let n = 0; n < Math.min(travelling, b.outgoing.re.length); n++) {
    sum += (a.outgoing.re[n]! - b.outgoing.re[n]!) ** 2 + (a.outgoing.im[n]! - b.outgoing.im[n]!) ** 2;
  }
  return {
    reflectionError: Math.hypot(a.reflected.re[0]! - b.reflected.re[0]!, a.reflected.im[0]! - b.reflected.im[0]!),
    apertureError: Math.sqrt(sum),
  };
}

/**
 * finest + (finest − fewer) + (fewer − coarsest)/3, mode by mode; modes that the coarser ones lack stay as they are. Then
 * scaled to the power that comes in: extrapolating amplitudes leaves it by the square of the correction.
 */
function extrapolated(finest: Answer, fewer: Answer, coarsest: Answer, { throat, mouth }: Travelling): Answer {
  const extend = (pick: (answer: Answer) => ComplexVector): ComplexVector => {
    const [a, b, c] = [pick(finest), pick(fewer), pick(coarsest)];
    const out = complexVector(a.re.length);
    const known = Math.min(b.re.length, c.re.length);
    for (const part of ["re", "im"] as const) {
      for (let n = 0; n < out.re.length; n++) {
        out[part][n] = n < known ? 2 * a[part][n]! - b[part][n]! + (b[part][n]! - c[part][n]!) / 3 : a[part][n]!;
      }
    }
    return out;
  };
  const reflected = extend((answer) => answer.reflected);
  const outgoing = extend((answer) => answer.outgoing);
  const scale = 1 / Math.sqrt(power(reflected, throat) + power(outgoing, mouth));
  for (const { re, im } of [reflected, outgoing]) {
    for (let n = 0; n < re.length; n++) {
      re[n]! *= scale;
      im[n]! *= scale;
    }
  }
  return { reflected, outgoing, powerError: finest.powerError };
}

function power({ re, im }: ComplexVector, count: number): number {
  let sum = 0;
  for (let n = 0; n < count; n++) sum += re[n]! ** 2 + im[n]! ** 2;
  return sum;
}
