// One solution of a horn at one fineness, at every frequency; redone by another route where rounding has spoilt it.

import { speedOfLight } from "../constants.ts";
import type { ComplexVector } from "../math/complex.ts";
import { type Chain, chainOf, type Fineness } from "./chain.ts";
import type { Memory } from "./memory.ts";
import type { Answer } from "./outcome.ts";
import type { Piece } from "./pieces.ts";
import type { Prepared } from "./prepared.ts";
import { nodePairs, type WaveBand, waveBand } from "./section-matrices.ts";
import { portCount, sweep } from "./sweep.ts";

/** Frequencies solved between two reports of progress. */
const portion = 8;

/** Power that must not be missing, and rounding that must not be magnified more: the frequency is solved again beyond. */
const acceptedPowerError = 1e-10;
const acceptedCancellation = 1e7;

/** Real admittances given to the ports inside the elimination, tried in turn: each moves its resonances elsewhere. */
const otherPortTerms = [-1.37, 0.19, 2.9, -0.41];

/** Everything of a horn that doesn't depend on the single frequency. */
export function prepare(memory: Memory, pieces: Piece[], fineness: Fineness, band: WaveBand): Prepared {
  return prepareChain(memory, chainOf(pieces, fineness), band);
}

export function prepareChain(memory: Memory, chain: Chain, band: WaveBand): Prepared {
  const most = (values: number[]): number => values.reduce((a, b) => Math.max(a, b), 0);
  const table = memory.table(most(chain.guides.map(({ modeCount }) => modeCount)));
  const bases = memory.bases(chain);
  const sections = memory.sections(chain, bases, band);
  const [first, last] = [chain.guides[0]!, chain.guides.at(-1)!];
  const ports = Math.max(1, portCount(first, band, table)) + portCount(last, band, table);
  const work = memory.work(
    most(bases.map(({ count }) => count)) + ports,
    most(sections.map(({ explicit }) => explicit)),
    nodePairs(band),
  );
  return { chain, bases, sections, band, table, kernel: memory.kernel, work };
}

export function bandOf(frequencies: number[]): WaveBand {
  return waveBand(frequencies.map((f) => (2 * Math.PI * f) / speedOfLight));
}

export interface SolveOptions {
  /** as `sweep` */
  fewer?: boolean;
  flange?: boolean;
  progress?: (share: number) => void;
}

/**
 * Answers at the frequencies, in order. The real form loses digits near a resonance of the horn closed by its port terms;
 * the pivots show it, and another term there has none.
 */
export function solveBand(
  prepared: Prepared,
  frequencies: number[],
  { fewer = false, flange = false, progress }: SolveOptions = {},
): Answer[] {
  const answers: Answer[] = [];
  for (let i = 0; i < frequencies.length; i += portion) {
    const some = frequencies.slice(i, i + portion);
    sweep(prepared, some, { fewer, flange }).forEach((answer, lane) => {
      answers.push(isSound(answer) ? answer : soundest(prepared, some[lane]!, { fewer, flange, first: answer }));
    });
    progress?.(Math.min(1, (i + portion) / frequencies.length));
  }
  return answers;
}

const isSound = ({ powerError, cancellation, outgoing }: Answer): boolean =>
  Math.abs(powerError) <= acceptedPowerError && cancellation <= acceptedCancellation && isFiniteVector(outgoing);

const isFiniteVector = ({ re, im }: ComplexVector): boolean => re.every(Number.isFinite) && im.every(Number.isFinite);

function soundest(
  prepared: Prepared,
  frequency: number,
  { fewer, flange, first }: { fewer: boolean; flange: boolean; first: Answer },
): Answer {
  let best = first;
  for (const term of otherPortTerms) {
    const [again] = sweep(prepared, [frequency], { portTerm: term, fewer, flange });
    if (isSound(again!)) return again!;
    if (!(best.cancellation <= again!.cancellation)) best = again!;
  }
  return best;
}
