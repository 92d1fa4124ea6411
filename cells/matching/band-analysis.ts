// A horn's modes over a band, from its profile.

import type { Warning } from "../check.ts";
import type { HornProfile } from "../guide/horn-profile.ts";
import { type ComplexVector, complexVector } from "../math/complex.ts";
import type { ApertureModes } from "../radiation/aperture-modes.ts";
import { type BandOptions, checkFrequencies, plannedLevels, type Wanted, wantedErrors } from "./band-options.ts";
import { bandWarnings } from "./band-warnings.ts";
import { type Convergence, convergenceOf } from "./convergence.ts";
import { type LevelSolution, solutionAt } from "./level-solution.ts";
import { listedAmplitudes, pairCount } from "./listed-modes.ts";
import type { Memory } from "./memory.ts";
import type { Answer } from "./outcome.ts";
import { type Piece, profilePieces } from "./pieces.ts";
import type { Refined } from "./refinement.ts";
import { narrowResonances, type Resonance } from "./resonances.ts";
import { acrossResonances, whereItMoves } from "./sampling.ts";
import { bandOf } from "./solve.ts";

/** Plain data: can be sent to and from a worker. */
export interface BandAnalysis {
  /** Hz, [frequencyCount]: as asked, or ascending with more between them */
  frequencies: number[];
  /** reflection of TE11 at the start of the profile, [frequencyCount] */
  s11: ComplexVector;
  /** modes at the mouth for a TE11 wave of 1 W at the start of the profile, [frequencyCount] */
  apertureModes: ApertureModes[];
  /**
   * 1 less all that travelling modes carry away, of the finest solution as computed, [frequencyCount]: tells of rounding,
   * nothing of convergence
   */
  powerBalance: number[];
  convergence: Convergence;
  /** resonances too narrow for the frequencies asked for, ascending: centre, width, and how much they move */
  resonances: Resonance[];
  warnings: Warning[];
}

/** `bandAnalysis` with what is kept from earlier calls. */
export function analyseBand(
  memory: Memory,
  profile: HornProfile,
  options: BandOptions,
  progress?: (share: number) => void,
): BandAnalysis {
  const pieces = profilePieces(profile);
  const { frequencies } = options;
  const wanted = wantedErrors(options);
  const plan = plannedLevels(options);
  checkFrequencies(frequencies, pieces[0]!.startRadius);
  const band = bandOf(frequencies);
  const mouth = pieces.at(-1)!;
  const pairs = pairCount(options.modePairs, mouth, band.high * mouth.endRadius);
  const attempts: Convergence["attempts"] = [];
  for (const [i, level] of plan.entries()) {
    const solution = solutionAt({
      memory,
      pieces,
      level,
      band,
      steps: options.taperSteps,
      flange: options.mouthAdmittance === "flange",
    });
    const { refined, finest } = solution.at(frequencies, (share) => progress?.((i + share) / plan.length));
    const { found: resonances, unsearched } = resonancesOf(solution, frequencies, finest);
    const { reflectionError, apertureError, excess } = judged(frequencies, refined, resonances, wanted);
    attempts.push({ level, reflectionError, apertureError });
    const reached = excess <= 1;
    if (!reached && i < plan.length - 1 && (i === 0 || excess < likelyGain)) continue;
    const sampled =
      options.sampling === "finer"
        ? sampledFiner(solution, frequencies, refined, resonances)
        : { frequencies: [...frequencies], refined };
    memory.endCall();
    progress?.(1);
    const convergence = convergenceOf(solution, sampled.refined, { reflectionError, apertureError, attempts, reached });
    return assembled({ ...sampled, mouth, pairs, convergence, resonances, unsearched });
  }
  throw new Error("bandAnalysis: there is no level of fineness to try");
}

/** A further level lowers the error about threefold; it is not tried when that can't suffice. */
const likelyGain = 6;

function resonancesOf(solution: LevelSolution, frequencies: number[], finest: Answer[]) {
  const order = frequencies.map((_, i) => i).sort((a, b) => frequencies[a]! - frequencies[b]!);
  return narrowResonances(
    solution.finest,
    order.map((i) => frequencies[i]!),
    order.map((i) => finest[i]!),
  );
}

/** Widths about a resonance within which its own shift from one fineness to the next is all that is seen. */
const besideResonance = 5;

/** Largest errors away from narrow resonances (or anywhere, if all is beside one) and by how much they exceed the wanted. */
function judged(frequencies: number[], refined: Refined[], resonances: Resonance[], wanted: Wanted) {
  const away = refined.filter((_, i) =>
    resonances.every(({ frequency, width }) => Math.abs(frequencies[i]! - frequency) > besideResonance * width),
  );
  const counted = away.length > 0 ? away : refined;
  const reflectionError = Math.max(...counted.map((one) => one.reflectionError));
  const apertureError = Math.max(...counted.map((one) => one.apertureError));
  const excess = Math.max(reflectionError / wanted.reflection, apertureError / wanted.aperture);
  return { reflectionError, apertureError, excess };
}

/** Rounds of putting samples where the last ones moved fast, and most samples for each asked for. */
const sampleRounds = 4;
const mostSamples = 10;

function sampledFiner(
  solution: LevelSolution,
  asked: number[],
  refined: Refined[],
  resonances: Resonance[],
): { frequencies: number[]; refined: Refined[] } {
  let samples = asked.map((frequency, i) => ({ frequency, refined: refined[i]! }));
  const low = Math.min(...asked);
  const high = Math.max(...asked);
  let further = acrossResonances(resonances, low, high);
  for (let round = 0; round <= sampleRounds; round++) {
    const solved = solution.at(further).refined;
    samples = [...samples, ...further.map((frequency, i) => ({ frequency, refined: solved[i]! }))].sort(
      (a, b) => a.frequency - b.frequency,
    );
    const frequencies = samples.map(({ frequency }) => frequency);
    further = whereItMoves(
      frequencies,
      samples.map((sample) => sample.refined),
    );
    if (further.length === 0 || samples.length + further.length > mostSamples * asked.length) break;
  }
  return { frequencies: samples.map(({ frequency }) => frequency), refined: samples.map((sample) => sample.refined) };
}

interface Parts {
  frequencies: number[];
  refined: Refined[];
  mouth: Piece;
  pairs: number;
  convergence: Convergence;
  resonances: Resonance[];
  unsearched: number;
}

function assembled({ frequencies, refined, mouth, pairs, convergence, resonances, unsearched }: Parts): BandAnalysis {
  const s11 = complexVector(frequencies.length);
  const apertureModes = refined.map(({ answer: { reflected, outgoing } }, f): ApertureModes => {
    s11.re[f] = reflected.re[0]!;
    s11.im[f] = reflected.im[0]!;
    const amplitudes = listedAmplitudes(outgoing, { mouth, taperModes: convergence.taperModes, pairs });
    return { frequency: frequencies[f]!, radius: mouth.endRadius, modePairs: pairs, amplitudes, warnings: [] };
  });
  const powerBalance = refined.map(({ answer }) => answer.powerError);
  const warnings = bandWarnings({
    frequencies,
    powerBalance,
    convergence,
    resonances,
    unsearched,
    mouthRadius: mouth.endRadius,
  });
  return { frequencies, s11, apertureModes, powerBalance, convergence, resonances, warnings };
}
