// The entrance to mode matching.

import type { HornProfile } from "../guide/horn-profile.ts";
import { createKernel, type Kernel } from "../math/kernel/kernel.ts";
import { analyseBand, type BandAnalysis } from "./band-analysis.ts";
import type { BandOptions } from "./band-options.ts";
import { createMemory } from "./memory.ts";

/**
 * Mode matching of a horn: TE11 comes in at the start of the profile, from a guide that continues it, matched; every mode
 * leaves at the mouth into a guide that continues it, matched. Refined by itself to the wanted errors.
 *
 * Valid for a closed, lossless wall of revolution. Left out: reflection at the mouth itself (unless asked for, by a flange) and
 * currents on rim and outer wall; loss; everything of another azimuthal order than TE11's.
 *
 * @param progress share done, 0…1
 * @throws {TypeError|RangeError} a profile or option that makes no sense; a frequency at which TE11 doesn't travel in the throat
 * @accuracy S11 within 2e-4, amplitudes within 1e-3 of independent solutions of a cone, a dual-mode and a corrugated horn
 *           at the default errors; steps of the metal 1e-5 (test/cells/matching)
 * @source Wexler 1967; James 1981; Olver, Clarricoats, Kishk & Shafai, Microwave Horns and Feeds, 1994, chapter 4. Edge
 *         functions: Meixner 1972 and edge-basis.ts. Tapers: staircase with Solymar's coupling, taper-couplings.ts
 */
export function bandAnalysis(
  profile: HornProfile,
  options: BandOptions,
  progress?: (share: number) => void,
): BandAnalysis {
  const kernel = spareKernels.pop() ?? createKernel();
  try {
    return analyseBand(createMemory(kernel), profile, options, progress);
  } finally {
    kernel.reset();
    spareKernels.push(kernel);
  }
}

/** A kernel's memory takes longer to get than a small horn to solve: one is handed from call to call, emptied. */
const spareKernels: Kernel[] = [];

/** Mode matching that keeps couplings and section results from call to call, while a control turns. Not plain data. */
export interface Matcher {
  /** as `bandAnalysis`, to the same digits; only what changed since the last few calls is computed */
  band(profile: HornProfile, options: BandOptions, progress?: (share: number) => void): BandAnalysis;
}

export function createMatcher(): Matcher {
  const memory = createMemory(createKernel());
  return { band: (profile, options, progress) => analyseBand(memory, profile, options, progress) };
}
