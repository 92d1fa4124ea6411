// The whole horn at a few frequencies at once: real elimination from the throat to the mouth, then the ports.
//
// Unknowns are the fields in the apertures between guides. Each guide adds its lines' admittances, summed over its modes
// in the basis of its two apertures; the field of an aperture is eliminated before that of the next one. The travelling
// modes of throat and mouth stay outside as ports, so that everything inside is real (lossless, times jη0).

import { speedOfLight } from "../constants.ts";
import type { ApertureBasis } from "./aperture-basis.ts";
import type { Chain, Guide } from "./chain.ts";
import type { RealMatrix } from "./couplings.ts";
import { addGram, addGramLower, addScaled, eliminate, solveUpper } from "./elimination.ts";
import { guardedGammaSquared, matchedAdmittance, writeLine } from "./line.ts";
import { isTE, type ModeTable } from "./mode-table.ts";
import { type Answer, answerAt } from "./outcome.ts";
import { shortedResonances } from "./resonance-count.ts";
import { nodeWeights, type SectionMatrices, type WaveBand } from "./section-matrices.ts";

/** A horn ready for any frequency of its band. */
export interface Prepared {
  chain: Chain;
  bases: ApertureBasis[];
  sections: SectionMatrices[];
  band: WaveBand;
  table: ModeTable;
}

/**
 * Of the size of a travelling mode's admittance: without it a horn of small steps would be nearly singular inside. Not a round
 * number, so that no symmetric horn meets a resonance.
 */
const defaultPortTerm = 0.73;

/** Modes that travel at the highest wave number. */
export function portCount({ radius, modeCount }: Guide, highest: number, table: ModeTable): number {
  let count = 0;
  while (count < modeCount && table.chi[count]! < highest * radius) count++;
  return count;
}

export interface SweepOptions {
  /** a real admittance that the ports hold inside the elimination and not outside: moves its resonances */
  portTerm?: number;
  /** index of the mode that comes in, one that travels in the throat; default 0, TE11 */
  incident?: number;
}

export function sweep(
  prepared: Prepared,
  frequencies: number[],
  { portTerm = defaultPortTerm, incident = 0 }: SweepOptions = {},
): Answer[] {
  const { chain, bases, sections, band, table } = prepared;
  const { guides } = chain;
  const lanes = frequencies.length;
  const waveNumbers = frequencies.map((f) => (2 * Math.PI * f) / speedOfLight);
  const weights = nodeWeightLanes();
  const first = guides[0]!;
  const last = guides.at(-1)!;
  const inPorts = Math.max(1, portCount(first, band.high, table));
  const outPorts = portCount(last, band.high, table);

  const cancellation = new Float64Array(lanes);
  const negativePivots = new Int32Array(lanes);

  // Unknowns of the block at hand: its aperture's functions. `t` holds what eliminating it leaves: the next aperture's
  // block, then the throat's ports, which every block still sees.
  let count = bases[0]!.count;
  let s = new Float64Array(count * count * lanes);
  addEnd(s, count, sections[0]!.right!, bases[0]!.left.modes, first, inPorts);
  let before: { t: Float64Array; size: number } | undefined;

  for (let a = 0; a < bases.length; a++) {
    const { right } = bases[a]!;
    const guide = guides[a + 1]!;
    const section = sections[a + 1]!;
    const next = bases[a + 1];
    const nextCount = next ? next.count : outPorts;
    const size = nextCount + inPorts;
    const x = new Float64Array(count * size * lanes);
    const t = new Float64Array(size * size * lanes);
    if (next) {
      const line = explicitLines(guide, section.explicit);
      section.left!.forEach((matrix, m) => {
        addScaled({ out: s, columns: count }, { values: matrix, rows: count, columns: count }, weights[m]!, true);
        const transfer = { values: section.transfer![m]!, rows: count, columns: nextCount };
        addScaled({ out: x, columns: size }, transfer, weights[m]!, false, -1);
        const onward = { values: section.right![m]!, rows: nextCount, columns: nextCount };
        addScaled({ out: t, columns: size }, onward, weights[m]!, true);
      });
      addGramLower({ out: s, columns: count }, right.modes, line.self, section.explicit, lanes);
      addGram({ out: x, columns: size }, right.modes, next.left.modes, line.transfer, section.explicit, lanes, -1);
      addGramLower({ out: t, columns: size }, next.left.modes, line.self, section.explicit, lanes);
    } else {
      addEnd(s, count, section.left!, right.modes, guide, outPorts);
      setPortColumns(x, size, 0, right.modes, outPorts);
    }
    if (before) carryPorts(before, count, x, t, nextCount, size);
    else setPortColumns(x, size, nextCount, bases[0]!.left.modes, inPorts);
    const diagonal = diagonalOf(s, count);
    eliminate(s, x, t, count, size, lanes);
    notePivots(diagonal, s, count);
    if (!next) {
      solveUpper(s, x, count, size, lanes);
      return waveNumbers.map((k, lane) =>
        answerAt({
          k,
          lane,
          lanes,
          x,
          t,
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
    s = new Float64Array(nextCount * nextCount * lanes);
    for (let p = 0; p < nextCount; p++) {
      const from = p * size * lanes;
      s.set(t.subarray(from, from + (p + 1) * lanes), p * nextCount * lanes);
    }
    before = { t, size };
    count = nextCount;
  }
  throw new Error("sweep: a chain must have an aperture");

  function diagonalOf(s: Float64Array, count: number): Float64Array {
    const out = new Float64Array(count * lanes);
    for (let p = 0; p < count; p++) {
      const from = (p * count + p) * lanes;
      out.set(s.subarray(from, from + lanes), p * lanes);
    }
    return out;
  }

  /** How much larger a diagonal element was than the pivot that is left of it: so many digits are gone. And the signs. */
  function notePivots(before: Float64Array, s: Float64Array, count: number): void {
    for (let p = 0; p < count; p++) {
      for (let l = 0; l < lanes; l++) {
        const inverse = s[(p * count + p) * lanes + l]!;
        if (inverse < 0) negativePivots[l]!++;
        const ratio = Math.abs(before[p * lanes + l]! * inverse);
        if (!(ratio <= cancellation[l]!)) cancellation[l] = ratio;
      }
    }
  }

  function nodeWeightLanes(): Float64Array[] {
    const perLane = waveNumbers.map((k) => nodeWeights(band, k));
    return Array.from(band.nodes, (_, m) => Float64Array.from(perLane, (w) => w[m]!));
  }

  /** The matched guide at one end of the horn: its modes that are no ports. */
  function addEnd(
    out: Float64Array,
    columns: number,
    high: Float64Array[],
    modes: RealMatrix,
    guide: Guide,
    ports: number,
  ): void {
    const explicit = guide === first ? sections[0]!.explicit : sections.at(-1)!.explicit;
    const loads = new Float64Array(explicit * lanes);
    for (let n = 0; n < explicit; n++) {
      for (let l = 0; l < lanes; l++) {
        const k = waveNumbers[l]!;
        loads[n * lanes + l] =
          n < ports ? portTerm : matchedAdmittance(isTE(n), guardedGammaSquared(table.chi[n]! / guide.radius, k), k).re;
      }
    }
    high.forEach((values, m) => {
      addScaled({ out, columns }, { values, rows: columns, columns }, weights[m]!, true);
    });
    addGramLower({ out, columns }, modes, loads, explicit, lanes);
  }

  function explicitLines({ radius, length }: Guide, explicit: number): { self: Float64Array; transfer: Float64Array } {
    const out = { self: new Float64Array(explicit * lanes), transfer: new Float64Array(explicit * lanes) };
    for (let n = 0; n < explicit; n++) {
      const cutoffNumber = table.chi[n]! / radius;
      for (let l = 0; l < lanes; l++) {
        const k = waveNumbers[l]!;
        writeLine(isTE(n), guardedGammaSquared(cutoffNumber, k), { k, length }, out, n * lanes + l);
      }
    }
    return out;
  }

  /** x[p, at + q] = −(function p in port mode q) */
  function setPortColumns(x: Float64Array, size: number, at: number, modes: RealMatrix, ports: number): void {
    for (let p = 0; p < modes.columns; p++) {
      for (let q = 0; q < ports; q++) {
        const from = (p * size + at + q) * lanes;
        x.fill(-modes.values[q * modes.columns + p]!, from, from + lanes);
      }
    }
  }

  /** The throat's ports as the block before left them: their rows become columns of x, their own square goes on in t. */
  function carryPorts(
    from: { t: Float64Array; size: number },
    count: number,
    x: Float64Array,
    t: Float64Array,
    nextCount: number,
    size: number,
  ): void {
    for (let q = 0; q < inPorts; q++) {
      const row = (count + q) * from.size;
      for (let p = 0; p < count; p++) {
        const at = (row + p) * lanes;
        x.set(from.t.subarray(at, at + lanes), (p * size + nextCount + q) * lanes);
      }
      const at = (row + count) * lanes;
      t.set(from.t.subarray(at, at + (q + 1) * lanes), ((nextCount + q) * size + nextCount) * lanes);
    }
  }
}
