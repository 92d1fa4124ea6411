// The whole horn at two frequencies at once: real elimination from the throat to the mouth, then the ports.
//
// Unknowns are the fields in the apertures between guides. Each guide adds its lines' admittances, summed over its modes
// in the basis of its two apertures; the field of an aperture is eliminated before that of the next one. The travelling
// modes of throat and mouth stay outside as ports, so that everything inside is real (lossless, times jη0).

import { speedOfLight } from "../constants.ts";
import type { Guide } from "./chain.ts";
import type { RealMatrix } from "./couplings.ts";
import { guardedGammaSquared, matchedAdmittance, writeLine } from "./line.ts";
import { loadedHorn } from "./loaded-horn.ts";
import { isTE, type ModeTable } from "./mode-table.ts";
import { type Answer, answerAt } from "./outcome.ts";
import type { Prepared } from "./prepared.ts";
import { shortedResonances } from "./resonance-count.ts";
import { nodeWeights } from "./section-matrices.ts";

export interface SweepOptions {
  /** a real admittance that the ports hold inside the elimination and not outside: moves its resonances */
  portTerm?: number;
  /** index of the mode that comes in, one that travels in the throat; default 0, TE11 */
  incident?: number;
}

/**
 * Of the size of a travelling mode's admittance: without it a horn of small steps would be nearly singular inside. Not a round
 * number, so that no symmetric horn meets a resonance.
 */
const defaultPortTerm = 0.73;

/** Answers at the frequencies, in order, two at a time. */
export function sweep(prepared: Prepared, frequencies: number[], options: SweepOptions = {}): Answer[] {
  const answers: Answer[] = [];
  for (let i = 0; i < frequencies.length; i += 2) {
    const pair = [frequencies[i]!, frequencies[i + 1] ?? frequencies[i]!];
    answers.push(...sweepPair(prepared, pair, options));
  }
  return answers.slice(0, frequencies.length);
}

/** Modes that travel at the highest wave number. */
function portCount({ radius, modeCount }: Guide, highest: number, table: ModeTable): number {
  let count = 0;
  while (count < modeCount && table.chi[count]! < highest * radius) count++;
  return count;
}

const lanes = 2;

function sweepPair(
  prepared: Prepared,
  frequencies: number[],
  { portTerm = defaultPortTerm, incident = 0 }: SweepOptions,
): Answer[] {
  const { chain, bases, sections, band, table, kernel } = prepared;
  const { guides } = chain;
  const first = guides[0]!;
  const last = guides.at(-1)!;
  const inPorts = Math.max(1, portCount(first, band.high, table));
  const outPorts = portCount(last, band.high, table);
  const horn = loadedHorn(prepared, inPorts + outPorts);
  const memory = kernel.memory();
  const nodes = band.nodes.length;
  const waveNumbers = frequencies.map((f) => (2 * Math.PI * f) / speedOfLight);
  waveNumbers.forEach((k, lane) => {
    nodeWeights(band, k).forEach((weight, m) => {
      memory[horn.weights / 8 + lanes * m + lane] = weight;
    });
  });
  const cancellation = new Float64Array(lanes);
  const negativePivots = new Int32Array(lanes);
  const { columns: x, scratch } = horn;

  // The block at hand: the square `s` of its aperture's functions, its rows `stride` apart. Eliminating it leaves in `t` the
  // next aperture's block and the throat's ports, which every block still sees.
  let [s, t] = horn.squares;
  let count = bases[0]!.count;
  let stride = count;
  writeEnd(first, sections[0]!.explicit, inPorts);
  kernel.combine(s, stride, horn.sections[0]!.right, count, count, nodes, horn.weights, 1, 0);
  const begin = horn.apertures[0]!.left;
  kernel.gram(s, stride, begin, count, begin, count, sections[0]!.explicit, horn.self, 1);

  for (let a = 0; a < bases.length; a++) {
    const { right } = bases[a]!;
    const guide = guides[a + 1]!;
    const { explicit } = sections[a + 1]!;
    const here = horn.sections[a + 1]!;
    const near = horn.apertures[a]!.right;
    const next = bases[a + 1];
    const nextCount = next ? next.count : outPorts;
    const size = nextCount + inPorts;
    const firstPort = t / 8 + lanes * nextCount * size;
    if (next) {
      const far = horn.apertures[a + 1]!.left;
      writeLines(guide, explicit);
      kernel.combine(x, size, here.transfer, count, nextCount, nodes, horn.weights, 0, 0);
      kernel.gram(x, size, near, count, far, nextCount, explicit, horn.transfer, 0);
      kernel.combine(t, size, here.right, nextCount, nextCount, nodes, horn.weights, 1, 0);
      kernel.gram(t, size, far, nextCount, far, nextCount, explicit, horn.self, 1);
      memory.fill(0, firstPort, firstPort + lanes * inPorts * size);
    } else {
      writeEnd(guide, explicit, outPorts);
      writePortColumns(size, 0, right.modes, outPorts);
      memory.fill(0, t / 8, t / 8 + lanes * size * size);
    }
    kernel.combine(s, stride, here.left, count, count, nodes, horn.weights, 1, 1);
    kernel.gram(s, stride, near, count, near, count, explicit, horn.self, 1);
    if (a === 0) writePortColumns(size, nextCount, bases[0]!.left.modes, inPorts);
    else carryPorts(nextCount, size);
    const diagonal = diagonalOf();
    kernel.eliminate(s, stride, x, t, scratch, count, size);
    notePivots(diagonal);
    if (!next) {
      kernel.solveUpper(s, stride, x, count, size);
      const columns = memory.slice(x / 8, x / 8 + lanes * count * size);
      const ports = memory.slice(t / 8, t / 8 + lanes * size * size);
      return waveNumbers.map((k, lane) =>
        answerAt({
          k,
          lane,
          lanes,
          x: columns,
          t: ports,
          count,
          first,
          last,
          inPorts,
          outPorts,
          portTerm,
          incident,
          right: right.modes,
          table,
          cancellation: cancellation[lane]!,
          shorted: negativePivots[lane]! + shortedResonances(chain, k, table),
        }),
      );
    }
    [s, t] = [t, s];
    stride = size;
    count = nextCount;
  }
  throw new Error("sweep: a chain must have an aperture");

  function diagonalOf(): Float64Array {
    const out = new Float64Array(count * lanes);
    for (let p = 0; p < count; p++) {
      const from = s / 8 + lanes * p * (stride + 1);
      out[lanes * p] = memory[from]!;
      out[lanes * p + 1] = memory[from + 1]!;
    }
    return out;
  }

  /** How much larger a diagonal element was than the pivot that is left of it: so many digits are gone. And the signs. */
  function notePivots(before: Float64Array): void {
    for (let p = 0; p < count; p++) {
      for (let l = 0; l < lanes; l++) {
        const inverse = memory[s / 8 + lanes * p * (stride + 1) + l]!;
        if (inverse < 0) negativePivots[l]!++;
        const ratio = Math.abs(before[p * lanes + l]! * inverse);
        if (!(ratio <= cancellation[l]!)) cancellation[l] = ratio;
      }
    }
  }

  /** Admittances of the matched guide at one end of the horn: its explicit modes that are no ports. */
  function writeEnd(guide: Guide, explicit: number, ports: number): void {
    for (let n = 0; n < explicit; n++) {
      waveNumbers.forEach((k, lane) => {
        const gammaSquared = guardedGammaSquared(table.chi[n]! / guide.radius, k);
        memory[horn.self / 8 + lanes * n + lane] =
          n < ports ? portTerm : matchedAdmittance(isTE(n), gammaSquared, k).re;
      });
    }
  }

  function writeLines({ radius, length }: Guide, explicit: number): void {
    const out = { self: memory, transfer: memory, selfAt: horn.self / 8, transferAt: horn.transfer / 8 };
    for (let n = 0; n < explicit; n++) {
      const cutoffNumber = table.chi[n]! / radius;
      for (let l = 0; l < lanes; l++) {
        const k = waveNumbers[l]!;
        writeLine(isTE(n), guardedGammaSquared(cutoffNumber, k), k, length, out, lanes * n + l);
        memory[out.transferAt + lanes * n + l]! *= -1;
      }
    }
  }

  /** x[p, at + q] = −(function p in port mode q) */
  function writePortColumns(size: number, at: number, modes: RealMatrix, ports: number): void {
    for (let p = 0; p < modes.columns; p++) {
      for (let q = 0; q < ports; q++) {
        const to = x / 8 + lanes * (p * size + at + q);
        memory[to] = memory[to + 1] = -modes.values[q * modes.columns + p]!;
      }
    }
  }

  /** The throat's ports as the block before left them: their rows become columns of x, their own square goes on in t. */
  function carryPorts(nextCount: number, size: number): void {
    for (let q = 0; q < inPorts; q++) {
      const row = s / 8 + lanes * (count + q) * stride;
      for (let p = 0; p < count; p++) {
        const to = x / 8 + lanes * (p * size + nextCount + q);
        memory[to] = memory[row + lanes * p]!;
        memory[to + 1] = memory[row + lanes * p + 1]!;
      }
      const to = t / 8 + lanes * ((nextCount + q) * size + nextCount);
      for (let i = 0; i < lanes * (q + 1); i++) memory[to + i] = memory[row + lanes * count + i]!;
    }
  }
}
