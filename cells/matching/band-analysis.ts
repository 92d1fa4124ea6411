// A horn's modes over a band, from its profile.

import { requireInteger, type Warning } from "../check.ts";
import { speedOfLight } from "../constants.ts";
import type { HornProfile } from "../guide/horn-profile.ts";
import { type ComplexVector, complexVector } from "../math/complex.ts";
import type { ApertureModes } from "../radiation/aperture-modes.ts";
import { type BandOptions, checkFrequencies, plannedLevels, wantedErrors } from "./band-options.ts";
import { bandWarnings } from "./band-warnings.ts";
import { hasEdges } from "./chain.ts";
import type { Convergence } from "./convergence.ts";
import type { Memory } from "./memory.ts";
import { travellingCount } from "./mode-table.ts";
import { continuedTail } from "./mouth-tail.ts";
import { isGuide, type Piece, profilePieces } from "./pieces.ts";
import { type Level, plannedSolutions, type Refined, refine, steepness, taperSteps } from "./refinement.ts";
import { bandOf, prepare, solveBand } from "./solve.ts";

/** Plain data: can be sent to and from a worker. */
export interface BandAnalysis {
  /** Hz, [frequencyCount] */
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
  const pairs = pairCount(options, pieces, frequencies);
  const attempts: Convergence["attempts"] = [];
  for (const [i, level] of plan.entries()) {
    const share = (part: number): void => progress?.((i + part) / plan.length);
    const { refined, convergence } = solvedAt({ memory, pieces, level, options, share });
    const { reflectionError, apertureError } = convergence;
    attempts.push({ level, reflectionError, apertureError });
    const reached = reflectionError <= wanted.reflection && apertureError <= wanted.aperture;
    const excess = Math.max(reflectionError / wanted.reflection, apertureError / wanted.aperture);
    if (!reached && i < plan.length - 1 && (i === 0 || excess < likelyGain)) continue;
    memory.endCall();
    progress?.(1);
    return assembled({ pieces, frequencies, pairs, refined, convergence: { ...convergence, attempts, reached } });
  }
  throw new Error("bandAnalysis: there is no level of fineness to try");
}

/** A further level lowers the error about threefold; it is not tried when that can't suffice. */
const likelyGain = 6;

interface Task {
  memory: Memory;
  pieces: Piece[];
  level: Level;
  options: BandOptions;
  share: (part: number) => void;
}

function solvedAt({ memory, pieces, level, options, share }: Task): {
  refined: Refined[];
  convergence: Omit<Convergence, "attempts" | "reached">;
} {
  const { frequencies } = options;
  const band = bandOf(frequencies);
  const byRule = taperSteps(pieces, level.stepsPerWavelength, speedOfLight / Math.max(...frequencies));
  const steps = byRule.map((n, p) => (isGuide(pieces[p]!) ? 1 : (options.taperSteps ?? n)));
  const tapers = !pieces.every(isGuide);
  const edges = hasEdges(pieces);
  const steep = steepness(pieces);
  const plan = plannedSolutions(level, { tapers, edges }, { steps, highestWaveNumber: band.high });
  const prepared = plan.map(({ fineness }) => prepare(memory, pieces, fineness, band));
  const solved = prepared.map((each, s) => solveBand(each, frequencies, (part) => share((s + part) / prepared.length)));
  const { chain, table } = prepared[0]!;
  const refined = frequencies.map((frequency, f) => {
    const k = (2 * Math.PI * frequency) / speedOfLight;
    const answers = solved.map((each) => each[f]!);
    const travelling = {
      throat: travellingCount(pieces[0]!.startRadius, k, table),
      mouth: travellingCount(pieces.at(-1)!.endRadius, k, table),
    };
    return refine(plan, answers, { travelling, steep });
  });
  const reflectionErrors = refined.map(({ reflectionError }) => reflectionError);
  const apertureError = Math.max(...refined.map((one) => one.apertureError));
  return {
    refined,
    convergence: {
      edgeFunctions: chain.apertures.reduce(
        (most, { kind, count }) => (kind === "edge" ? Math.max(most, count) : most),
        0,
      ),
      taperModes: tapers || chain.apertures.some(({ kind }) => kind === "step") ? level.taperModes : 0,
      summedModes: chain.guides.reduce((most, { modeCount }) => Math.max(most, modeCount), 0),
      taperSteps: steps.reduce((sum, n, p) => sum + (isGuide(pieces[p]!) ? 0 : n), 0),
      sections: chain.guides.length,
      reflectionError: Math.max(...reflectionErrors),
      apertureError,
      crossPolarErrorDb: 20 * Math.log10(Math.max(apertureError, 1e-15)),
      reflectionErrors,
      rule: tapers
        ? "Of what extrapolation adds to the finest solution: all for the edges of the metal, in the tapers a share that falls with the number of modes (5/N for S11, 3/N for the aperture, times 1 + slope)."
        : "What extrapolation from two functions fewer at every edge of the metal adds to the finest solution.",
    },
  };
}

/** Listed modes have a cutoff up to this multiple of the highest frequency: the next ones add below −80 dB. */
const listedBelow = { edge: 4, taper: 5.5 };

function pairCount({ modePairs }: BandOptions, pieces: Piece[], frequencies: number[]): number {
  if (modePairs !== undefined) return requireInteger("bandAnalysis: modePairs", modePairs, { min: 1, max: 200 });
  const ka = (2 * Math.PI * Math.max(...frequencies) * pieces.at(-1)!.endRadius) / speedOfLight;
  return Math.max(5, Math.ceil(((isGuide(pieces.at(-1)!) ? listedBelow.edge : listedBelow.taper) * ka) / Math.PI));
}

/** Share of a taper's modes whose amplitudes at its end, extrapolated, are good to a few percent of themselves. */
const trustedShare = 0.5;

function listedAmplitudes(outgoing: ComplexVector, last: Piece, taperModes: number, pairs: number): ComplexVector {
  const count = 2 * pairs;
  const trusted = 2 * Math.floor((trustedShare * taperModes) / 2);
  if (!isGuide(last) && trusted >= 4 && trusted < count) {
    const angle = Math.atan((last.endRadius - last.startRadius) / last.length);
    return continuedTail(outgoing, { angle, trusted, count });
  }
  const amplitudes = complexVector(count);
  amplitudes.re.set(outgoing.re.subarray(0, count));
  amplitudes.im.set(outgoing.im.subarray(0, count));
  return amplitudes;
}

interface Parts {
  pieces: Piece[];
  frequencies: number[];
  pairs: number;
  refined: Refined[];
  convergence: Convergence;
}

function assembled({ pieces, frequencies, pairs, refined, convergence }: Parts): BandAnalysis {
  const radius = pieces.at(-1)!.endRadius;
  const s11 = complexVector(frequencies.length);
  const apertureModes = refined.map(({ answer: { reflected, outgoing } }, f): ApertureModes => {
    s11.re[f] = reflected.re[0]!;
    s11.im[f] = reflected.im[0]!;
    const amplitudes = listedAmplitudes(outgoing, pieces.at(-1)!, convergence.taperModes, pairs);
    return { frequency: frequencies[f]!, radius, modePairs: pairs, amplitudes, warnings: [] };
  });
  const powerBalance = refined.map(({ answer }) => answer.powerError);
  return {
    frequencies: [...frequencies],
    s11,
    apertureModes,
    powerBalance,
    convergence,
    warnings: bandWarnings({ frequencies, powerBalance, convergence, mouthRadius: radius }),
  };
}
