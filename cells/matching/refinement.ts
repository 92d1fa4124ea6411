// How fine a horn is divided, what coarser solutions tell of the error, and what they add to the answer.
//
// Three sources of error, each seen by solving again with less: functions at the edges of steps, modes in tapers, steps of
// tapers. How each error falls is known, and is used to extrapolate.

import type { ComplexVector } from "../math/complex.ts";
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
  { edgeFunctions: 11, taperModes: 20, stepsPerWavelength: 20 },
  { edgeFunctions: 15, taperModes: 32, stepsPerWavelength: 32 },
  { edgeFunctions: 19, taperModes: 48, stepsPerWavelength: 48 },
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

/** Solutions of one level, by what each has less of than the finest. */
export type Role = "finest" | "halfSteps" | "fewerModes" | "fewerModesHalfSteps" | "fewerFunctions";

export interface PlannedSolution {
  role: Role;
  fineness: Fineness;
  /** the same with two functions fewer at every edge, and fewer modes at shallow steps */
  fewer?: boolean;
  /** in the extrapolated answer; all together 1 */
  weight: number;
}

/** Modes of the coarser solution, as a share of the finer one's: the smaller, the cheaper, but the truer the nearer to 1. */
const fewerModesShare = 0.7;

/** Power of the number of functions with which the error at edges falls (or faster; test/cells/matching/band-analysis). */
const edgePower = 5;
/** The same for pockets of ring-loaded slots, whose fields are plain modes: measured, 5 to 22 of them. */
const pocketPower = 2;

/**
 * What to solve at one level, the finest first. Extrapolation follows three laws: steps h² (the staircase is symmetric),
 * modes 1/(N + 1) (what is left out of a taper's wall begins at a cutoff number of π(N + 1)/2), edges 1/P⁵.
 * @param has what there is of the profile that each concerns
 */
export function plannedSolutions(
  { edgeFunctions, taperModes }: Level,
  has: { tapers: boolean; edges: boolean; pockets: boolean },
  { steps, highestWaveNumber }: { steps: number[]; highestWaveNumber: number },
): PlannedSolution[] {
  const finest: Fineness = { edgeFunctions, modeCount: taperModes, sections: steps, highestWaveNumber };
  const halfSteps = steps.map((n) => Math.max(1, n / 2));
  const fewerModes = 2 * Math.round((taperModes * fewerModesShare) / 2);
  // A pocket has three functions fewer than an edge (chain.ts), and errs the more.
  const edgeWeight = has.pockets
    ? 1 / (((edgeFunctions - 3) / (edgeFunctions - 5)) ** pocketPower - 1)
    : 1 / ((edgeFunctions / (edgeFunctions - 2)) ** edgePower - 1);
  if (!has.tapers) {
    return [
      { role: "finest", fineness: finest, weight: 1 + edgeWeight },
      { role: "fewerFunctions", fineness: finest, fewer: true, weight: -edgeWeight },
    ];
  }
  const modeWeight = (fewerModes + 1) / (taperModes - fewerModes);
  const plan: PlannedSolution[] = [
    { role: "finest", fineness: finest, weight: (4 / 3) * (1 + modeWeight) },
    { role: "halfSteps", fineness: { ...finest, sections: halfSteps }, weight: (-1 / 3) * (1 + modeWeight) },
    { role: "fewerModes", fineness: { ...finest, modeCount: fewerModes }, weight: (-4 / 3) * modeWeight },
    {
      role: "fewerModesHalfSteps",
      fineness: { ...finest, modeCount: fewerModes, sections: halfSteps },
      weight: (1 / 3) * modeWeight + (has.edges ? edgeWeight : 0),
    },
  ];
  if (has.edges) {
    plan.push({
      role: "fewerFunctions",
      fineness: { ...finest, modeCount: fewerModes, sections: halfSteps },
      fewer: true,
      weight: -edgeWeight,
    });
  }
  return plan;
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
  /** the mouth sends some back */
  reflecting: boolean;
}

/** Corrections larger than this are no small errors, and following their power law would mislead. */
const mostExtrapolated = 0.05;

/**
 * Share of a taper's correction that is left as its error: so much over the number of modes, times 1 + the tangent of the
 * steepest angle. On cones of 14° to 77° and the listed horns the error was less (test/cells/matching/band-analysis).
 */
const leftOfTaper = { reflection: 5, aperture: 3 };

/** What no coarser solution shows: sums over modes cut at κ = 60 with a tail, interpolated in frequency. Measured, 72 edges. */
const leftOfSums: Change = { reflection: 1e-5, aperture: 5e-5 };

/** The steepest taper's rise over its length. */
export function steepness(pieces: Piece[]): number {
  return pieces.reduce(
    (most, { startRadius, endRadius, length }) => Math.max(most, Math.abs(endRadius - startRadius) / length),
    0,
  );
}

/**
 * The extrapolated answer at one frequency and its error: a share of what extrapolation in the tapers adds, and all of what it
 * adds for the edges. Where that is too much to be trusted, the finest solution, and all of it as its error.
 * @param steep `steepness` of the profile
 */
export function refine(
  plan: PlannedSolution[],
  solutions: Answer[],
  { travelling, steep }: { travelling: Travelling; steep: number },
): Refined {
  const finest = solutions[0]!;
  const by = (role: Role): Answer => solutions[plan.findIndex((planned) => planned.role === role)] ?? finest;
  const weightOf = (role: Role): number => Math.abs(plan.find((planned) => planned.role === role)?.weight ?? 0);
  const change = (fine: Role, coarse: Role): Change => difference(by(fine), by(coarse), travelling.mouth);
  const functions = scaled(change("fewerModesHalfSteps", "fewerFunctions"), weightOf("fewerFunctions"));
  const edges = weightOf("fewerFunctions") > 0 ? sum(functions, leftOfSums) : functions;
  const tapers = sum(
    scaled(change("finest", "fewerModes"), 0.75 * weightOf("fewerModes")),
    scaled(change("finest", "halfSteps"), 1 / 3),
  );
  const correction = sum(edges, tapers);
  if (Math.hypot(correction.reflection, correction.aperture) > mostExtrapolated) {
    return { answer: finest, reflectionError: correction.reflection, apertureError: correction.aperture };
  }
  const left = (1 + steep) / plan[0]!.fineness.modeCount;
  return {
    answer: extrapolated(plan, solutions, travelling),
    reflectionError: edges.reflection + Math.min(1, left * leftOfTaper.reflection) * tapers.reflection,
    apertureError: edges.aperture + Math.min(1, left * leftOfTaper.aperture) * tapers.aperture,
  };
}

/** By how much two answers differ, in the sense of `Refined`. */
interface Change {
  reflection: number;
  aperture: number;
}

const scaled = ({ reflection, aperture }: Change, by: number): Change => ({
  reflection: by * reflection,
  aperture: by * aperture,
});

const sum = (a: Change, b: Change): Change => ({
  reflection: a.reflection + b.reflection,
  aperture: a.aperture + b.aperture,
});

function difference(a: Answer, b: Answer, travelling: number): Change {
  let squares = 0;
  for (let n = 0; n < Math.min(travelling, b.outgoing.re.length); n++) {
    squares += (a.outgoing.re[n]! - b.outgoing.re[n]!) ** 2 + (a.outgoing.im[n]! - b.outgoing.im[n]!) ** 2;
  }
  return {
    reflection: Math.hypot(a.reflected.re[0]! - b.reflected.re[0]!, a.reflected.im[0]! - b.reflected.im[0]!),
    aperture: Math.sqrt(squares),
  };
}

/**
 * The weighted sum of the solutions, mode by mode; modes that the others lack stay as the finest has them. Then
 * scaled to the power that comes in: extrapolating amplitudes leaves it by the square of the correction.
 */
function extrapolated(plan: PlannedSolution[], solutions: Answer[], { throat, mouth, reflecting }: Travelling): Answer {
  const finest = solutions[0]!;
  const extend = (pick: (answer: Answer) => ComplexVector): ComplexVector => {
    const whole = pick(finest);
    const out: ComplexVector = { re: whole.re.slice(), im: whole.im.slice() };
    const known = Math.min(...solutions.map((answer) => pick(answer).re.length));
    for (const part of ["re", "im"] as const) {
      for (let n = 0; n < known; n++) {
        out[part][n] = solutions.reduce((sum, answer, i) => sum + plan[i]!.weight * pick(answer)[part][n]!, 0);
      }
    }
    return out;
  };
  const reflected = extend((answer) => answer.reflected);
  const outgoing = extend((answer) => answer.outgoing);
  // A mouth that reflects carries away less than what comes to it.
  const scale = reflecting ? 1 : 1 / Math.sqrt(power(reflected, throat) + power(outgoing, mouth));
  for (const { re, im } of [reflected, outgoing]) {
    for (let n = 0; n < re.length; n++) {
      re[n]! *= scale;
      im[n]! *= scale;
    }
  }
  return { ...finest, reflected, outgoing };
}

function power({ re, im }: ComplexVector, count: number): number {
  let sum = 0;
  for (let n = 0; n < count; n++) sum += re[n]! ** 2 + im[n]! ** 2;
  return sum;
}
