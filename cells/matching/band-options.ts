// What a band analysis is asked for, and its checks.

import { requireInteger, requireNumber, requirePositive } from "../check.ts";
import { cutoffFrequency, TE11 } from "../guide/mode.ts";
import { type Level, levels } from "./refinement.ts";

export interface BandOptions {
  /** Hz, [frequencyCount], in any order */
  frequencies: number[];
  /** wanted error of S11, absolute; default 1e-3 */
  reflectionError?: number;
  /** wanted error of the aperture's field, dB against the whole (negative); default −50: cross-polar is good down to there */
  crossPolarErrorDb?: number;
  /** TE1n–TM1n pairs to list at the mouth; default those that travel or nearly do, at least 5 */
  modePairs?: number;
  /**
   * "flange": the mouth stands in an infinite flat flange and reflects; "none" (default): the guide of the mouth goes on,
   * matched. The listed modes are those that come to the mouth. Evanescent modes are not coupled from the flange to the last step
   */
  mouthAdmittance?: "none" | "flange";
  /** "finer": more frequencies where S11 or the modes at the mouth move fast, and across narrow resonances; default "asked" */
  sampling?: "asked" | "finer";
  /** this fineness and no other, whatever the error; what is left out is as at the first level */
  level?: Partial<Level>;
  /** steps of every taper, even, instead of the level's rule */
  taperSteps?: number;
}

/** Wanted errors as amplitudes. */
export interface Wanted {
  reflection: number;
  aperture: number;
}

export function wantedErrors({ reflectionError = 1e-3, crossPolarErrorDb = -50 }: BandOptions): Wanted {
  requireNumber("bandAnalysis: reflectionError", reflectionError, { min: 1e-6, max: 0.1 });
  requireNumber("bandAnalysis: crossPolarErrorDb", crossPolarErrorDb, { min: -100, max: -10, unit: "dB" });
  return { reflection: reflectionError, aperture: 10 ** (crossPolarErrorDb / 20) };
}

export function plannedLevels({ level, taperSteps: steps, mouthAdmittance = "none" }: BandOptions): readonly Level[] {
  if (mouthAdmittance !== "none" && mouthAdmittance !== "flange") {
    throw new RangeError(`bandAnalysis: mouthAdmittance must be "none" or "flange"; got ${String(mouthAdmittance)}`);
  }
  if (steps !== undefined) requireInteger("bandAnalysis: taperSteps", steps, { min: 2, max: 2000 });
  if (steps !== undefined && steps % 2 !== 0) {
    throw new RangeError(`bandAnalysis: taperSteps must be even; got ${steps}`);
  }
  if (!level) return levels;
  const only = { ...levels[0]!, ...level };
  requireInteger("bandAnalysis: level.edgeFunctions", only.edgeFunctions, { min: 7, max: 31 });
  requireInteger("bandAnalysis: level.taperModes", only.taperModes, { min: 4, max: 120 });
  if (only.taperModes % 2 !== 0) {
    throw new RangeError(`bandAnalysis: level.taperModes must be even; got ${only.taperModes}`);
  }
  requireNumber("bandAnalysis: level.stepsPerWavelength", only.stepsPerWavelength, { min: 2, max: 400 });
  return [only];
}

export function checkFrequencies(frequencies: number[], throat: number): void {
  if (!Array.isArray(frequencies) || frequencies.length === 0) {
    throw new TypeError("bandAnalysis: frequencies must be an array of at least one frequency in Hz");
  }
  const cutoff = cutoffFrequency(TE11, throat);
  for (const frequency of frequencies) {
    requirePositive("bandAnalysis: frequency", frequency, "Hz");
    if (frequency <= cutoff * (1 + 1e-9)) {
      throw new RangeError(
        `bandAnalysis: frequency must be above the TE11 cutoff of the throat, ${(cutoff / 1e9).toPrecision(6)} GHz at a radius of ${throat * 1e3} mm; got ${frequency / 1e9} GHz`,
      );
    }
  }
}
