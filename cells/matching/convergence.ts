// What a result says of its own error.

import type { Level } from "./refinement.ts";

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
  /** estimated largest error of S11 over the band, absolute */
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
