// The whole horn at two frequencies at once: real elimination from the throat to the mouth, then the ports.
//
// Unknowns are the fields in the apertures between guides. Each guide adds its lines' admittances, summed over its modes
// in the basis of its two apertures; the field of an aperture is eliminated before that of the next one. The travelling
// modes of throat and mouth stay outside as ports, so that everything inside is real (lossless, times jη0).

import { speedOfLight } from "../constants.ts";
import type { Side } from "./aperture-basis.ts";
import type { Aperture, Guide } from "./chain.ts";
import type { RealMatrix } from "./couplings.ts";
import { guardedGammaSquared, matchedAdmittance, writeLine } from "./line.ts";
import { isTE, type ModeTable } from "./mode-table.ts";
import { type Answer, answerAt } from "./outcome.ts";
import { droppedWithPocket, places, pocketAdmittances } from "./pocket-basis.ts";
import type { Prepared } from "./prepared.ts";
import { shortedResonances } from "./resonance-count.ts";
import { nodePairs, nodeWeights, type SectionMatrices, type WaveBand } from "./section-matrices.ts";

export interface SweepOptions {
  /** a real admittance that the ports hold inside the elimination and not outside: moves its resonances */
  portTerm?: number;
  /** two functions fewer at every edge, fewer modes at shallow steps; default no */
  fewer?: boolean;
  /** the mouth stands in an infinite flange; default no: its guide goes on, matched */
  flange?: boolean;
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

/** Modes of an end guide that travel at the highest wave number of the band. */
export function portCount({ radius, modeCount }: Guide, { high }: WaveBand, table: ModeTable): number {
  let count = 0;
  while (count < modeCount && table.chi[count]! < high * radius) count++;
  return count;
}

/** Functions of an aperture that are used: all, or fewer to see what the last ones matter. */
function usedCount({ kind, count, pocket }: Aperture, fewer: boolean): number {
  if (!fewer || kind === "smooth") return count;
  if (pocket) return count - droppedWithPocket;
  return kind === "edge" ? count - 2 : Math.max(1, 2 * Math.round(0.35 * count));
}

const lanes = 2;

function sweepPair(
  prepared: Prepared,
  frequencies: number[],
  { portTerm = defaultPortTerm, incident = 0, fewer = false, flange = false }: SweepOptions,
): Answer[] {
  const { chain, bases, sections, band, table, kernel, work } = prepared;
  const { guides } = chain;
  const counts = chain.apertures.map((aperture) => usedCount(aperture, fewer));
  const first = guides[0]!;
  const last = guides.at(-1)!;
  const inPorts = Math.max(1, portCount(first, band, table));
  const outPorts = portCount(last, band, table);
  const memory = kernel.memory();
  const nodes = 2 * nodePairs(band);
  const waveNumbers = frequencies.map((f) => (2 * Math.PI * f) / speedOfLight);
  memory.fill(0, work.weights / 8, work.weights / 8 + lanes * nodes);
  waveNumbers.forEach((k, lane) => {
    nodeWeights(band, k).forEach((weight, m) => {
      memory[work.weights / 8 + lanes * m + lane] = weight;
    });
  });
  const cancellation = new Float64Array(lanes);
  const negativePivots = new Int32Array(lanes);
  const { columns: x, scratch } = work;

  // The block at hand: the square `s` of its aperture's functions, its rows `stride` apart. Eliminating it leaves in `t` the
  // next aperture's block and the throat's ports, which every block still sees.
  let [s, t] = work.squares;
  let count = counts[0]!;
  let stride = count;
  writeEnd(first, sections[0]!.explicit, inPorts);
  memory.fill(0, s / 8, s / 8 + lanes * count * count);
  addSquare(s, stride, bases[0]!.left, sections[0]!.right, sections[0]!.explicit, count);

  for (let a = 0; a < bases.length; a++) {
    const near = bases[a]!.right;
    const guide = guides[a + 1]!;
    const section = sections[a + 1]!;
    const far = bases[a + 1]?.left;
    const nextCount = far ? counts[a + 1]! : outPorts;
    const size = nextCount + inPorts;
    if (far) {
      writeLines(guide, section.explicit);
      writeTransfer(near, far, section, nextCount, size);
      // What high modes set needs no clearing: only the rows of the ports.
      const clear = section.right ? nextCount : 0;
      memory.fill(0, t / 8 + lanes * clear * size, t / 8 + lanes * size * size);
      addSquare(t, size, far, section.right, section.explicit, nextCount, 0);
    } else {
      writeEnd(guide, section.explicit, outPorts);
      memory.fill(0, t / 8, t / 8 + lanes * size * size);
      writePortColumns(size, 0, near.modes, outPorts);
    }
    if (far?.id === near.id && nextCount === count) kernel.addLower(s, stride, t, size, count);
    else addSquare(s, stride, near, section.left, section.explicit, count);
    if (a === 0) writePortColumns(size, nextCount, bases[0]!.left.modes, inPorts);
    else carryPorts(nextCount, size);
    addPocket(a);
    const diagonal = diagonalOf();
    kernel.eliminate(s, stride, x, t, scratch, count, size);
    notePivots(diagonal);
    if (!far) {
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
          right: near.modes,
          table,
          cancellation: cancellation[lane]!,
          flange,
          shorted: negativePivots[lane]! + shortedResonances(chain, k, table),
        }),
      );
    }
    [s, t] = [t, s];
    stride = size;
    count = nextCount;
  }
  throw new Error("sweep: a chain must have an aperture");

  /**
   * Adds a guide's own admittance at one of its apertures: high modes interpolated, explicit ones from `work.self`. Where not
   * `add`, the sum over high modes, if there is one, is what the square begins with.
   */
  function addSquare(
    to: number,
    stride: number,
    side: Side,
    high: number,
    explicit: number,
    count: number,
    add: 0 | 1 = 1,
  ): void {
    const { address, form } = side;
    const { columns } = side.modes;
    if (high) kernel.combine(to, stride, high, columns, count, count, nodes, work.weights, 1, add);
    if (form === "unit") {
      for (let p = 0; p < Math.min(count, explicit); p++) {
        const diagonal = to / 8 + lanes * p * (stride + 1);
        memory[diagonal]! += memory[work.self / 8 + lanes * p]!;
        memory[diagonal + 1]! += memory[work.self / 8 + lanes * p + 1]!;
      }
    } else if (form === "dense") {
      kernel.denseGram(to, stride, address, columns, count, explicit, work.self, scratch);
    } else {
      kernel.gram(to, stride, address, columns, count, address, columns, count, explicit, work.self, 1, 1);
    }
  }

  /** x[p, q] for the next aperture's functions: what a guide carries from one of its apertures to the other. */
  function writeTransfer(near: Side, far: Side, section: SectionMatrices, nextCount: number, size: number): void {
    const [p, q] = [near.modes.columns, far.modes.columns];
    const { explicit } = section;
    if (!section.transfer && far.form === "unit" && nextCount <= explicit) {
      kernel.scaled(x, size, near.address, p, count, nextCount, work.transfer, 1);
      return;
    }
    if (!section.transfer && near.form === "unit" && count <= explicit) {
      kernel.scaled(x, size, far.address, q, count, nextCount, work.transfer, 0);
      return;
    }
    if (section.transfer) kernel.combine(x, size, section.transfer, q, count, nextCount, nodes, work.weights, 0, 0);
    else memory.fill(0, x / 8, x / 8 + lanes * count * size);
    kernel.gram(x, size, near.address, p, count, far.address, q, nextCount, explicit, work.transfer, 1, 0);
  }

  /** A pocket's modes see its shorted lines behind them. */
  function addPocket(a: number): void {
    const { pocket, count: all } = chain.apertures[a]!;
    if (!pocket) return;
    const { ring } = places(all - pocket.count, pocket.count);
    waveNumbers.forEach((k, lane) => {
      pocketAdmittances(pocket, k).forEach((admittance, i) => {
        const p = ring[i]!;
        if (p < count) memory[s / 8 + lanes * p * (stride + 1) + lane]! += admittance;
      });
    });
  }

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
        memory[work.self / 8 + lanes * n + lane] =
          n < ports ? portTerm : matchedAdmittance(isTE(n), gammaSquared, k).re;
      });
    }
  }

  function writeLines({ radius, length }: Guide, explicit: number): void {
    const out = { self: memory, transfer: memory, selfAt: work.self / 8, transferAt: work.transfer / 8 };
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
    for (let p = 0; p < count; p++) {
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
