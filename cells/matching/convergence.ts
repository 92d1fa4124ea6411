// What a result says of its own error.

import type { LevelSolution } from "./level-solution.ts";
import type { Level, Refined } from "./refinement.ts";

export interface Convergence {
  /** most functions at an edge of the metal; 0 where there is none */
  edgeFunctions: number;
  /** modes in tapers and at shallow steps */
  taperModes: number;
  /** most modes summed in a guide */
  summedModes: number;
  /** steps of all tapers together */
  taperSteps: number;
  /** uniform guides in all */
  sections: number;
  /** estimated largest error of S11 over the frequencies asked for, beside no narrow resonance; absolute */
  reflectionError: number;
  /** estimated largest error of the amplitudes at the mouth (root of the sum of squares), √W for 1 W */
  apertureError: number;
  /** the latter as a level, dB: cross-polar lobes above it by 20 dB are good to 1 dB */
  crossPolarErrorDb: number;
  /** estimates at each frequency, [frequencyCount] */
  reflectionErrors: number[];
  /** how the error was estimated, in a sentence */
  rule: string;
  /** every level tried, the last one kept */
  attempts: { level: Level; reflectionError: number; apertureError: number }[];
  /** whether both wanted errors were reached */
  reached: boolean;
}

/** What a solution and its refined answers say of the error. */
export function convergenceOf(
  { finest: { chain }, taperModes, taperSteps, tapers }: LevelSolution,
  refined: Refined[],
  judged: Pick<Convergence, "reflectionError" | "apertureError" | "attempts" | "reached">,
): Convergence {
  const atEdges = chain.apertures.filter(({ kind }) => kind === "edge").map(({ count }) => count);
  return {
    edgeFunctions: Math.max(0, ...atEdges),
    taperModes,
    summedModes: Math.max(...chain.guides.map(({ modeCount }) => modeCount)),
    taperSteps,
    sections: chain.guides.length,
    ...judged,
    crossPolarErrorDb: 20 * Math.log10(Math.max(judged.apertureError, 1e-15)),
    reflectionErrors: refined.map(({ reflectionError }) => reflectionError),
    rule: tapers
      ? "Of what extrapolation adds to the finest solution: all for the edges of the metal, in the tapers a share that falls with the number of modes (5/N for S11, 3/N for the aperture, times 1 + slope)."
      : "What extrapolation from two functions fewer at every edge of the metal adds to the finest solution.",
  };
}
