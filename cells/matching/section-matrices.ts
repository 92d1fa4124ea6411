// The admittances of a guide between its two apertures, in their basis: the lowest modes stay explicit, the sum of all
// others is smooth in frequency and is interpolated over the band.

import type { Kernel } from "../math/kernel/kernel.ts";
import type { Side } from "./aperture-basis.ts";
import type { Guide } from "./chain.ts";
import { guardedGammaSquared, writeLine } from "./line.ts";
import { isTE, type ModeTable } from "./mode-table.ts";

/** The band in which a horn is asked for, as wave numbers, 1/m. */
export interface WaveBand {
  low: number;
  high: number;
  /** wave numbers at which sums over high modes are taken, [nodeCount] */
  nodes: Float64Array;
}

/** Modes whose cutoff lies below this multiple of the highest frequency stay explicit. */
const explicitBelow = 1.7;

/** Wanted relative error of the interpolated sums. */
const interpolationError = 2e-5;

/**
 * Chebyshev nodes in k²: a mode's √(kc² − k²) is smooth up to its branch point at kc ≥ 1.7·k_high, so that the error falls as
 * (x + √(x² − 1))^−n, x the branch point's place with the band at −1…1 (Trefethen 2013, theorem 8.2). A few frequencies
 * are their own nodes.
 */
export function waveBand(waveNumbers: number[]): WaveBand {
  const low = Math.min(...waveNumbers);
  const high = Math.max(...waveNumbers);
  const middle = (high * high + low * low) / 2;
  const half = (high * high - low * low) / 2;
  const place = half > 0 ? ((explicitBelow * high) ** 2 - middle) / half : Number.POSITIVE_INFINITY;
  const gain = place + Math.sqrt(place * place - 1);
  const count = Math.max(1, Math.ceil(Math.log(1 / interpolationError) / Math.log(gain)));
  const distinct = [...new Set(waveNumbers)];
  if (distinct.length <= count) return { low, high, nodes: Float64Array.from(distinct) };
  const nodes = new Float64Array(count);
  for (let i = 0; i < count; i++) nodes[i] = Math.sqrt(middle + half * Math.cos(((i + 0.5) * Math.PI) / count));
  return { low, high, nodes };
}

/** Lagrange weights of the nodes at a wave number, divided by it: the sums are held as k·Y. */
export function nodeWeights({ nodes }: WaveBand, k: number): Float64Array {
  return nodes.map((node, m) => {
    let weight = 1 / k;
    for (let i = 0; i < nodes.length; i++) {
      if (i !== m) weight *= ((k - nodes[i]!) * (k + nodes[i]!)) / ((node - nodes[i]!) * (node + nodes[i]!));
    }
    return weight;
  });
}

/** A guide of so few modes keeps all of them explicit. */
const allExplicit = 24;

/** Modes kept explicit. */
export function explicitModes({ radius, modeCount }: Guide, { high }: WaveBand, table: ModeTable): number {
  if (modeCount <= allExplicit) return modeCount;
  let count = 0;
  while (count < modeCount && table.chi[count]! < explicitBelow * high * radius) count++;
  return count;
}

/** Nodes as the kernel holds them: in pairs, the last one perhaps idle. */
export const nodePairs = ({ nodes }: WaveBand): number => Math.ceil(nodes.length / 2);

/** k·jη0·Y of the modes beyond the explicit ones at each node of the band, in the kernel. Address 0: there is nothing. */
export interface SectionMatrices {
  explicit: number;
  /** [left count × left count × 2·pairs], lower half; none where the guide has no left aperture */
  left: number;
  right: number;
  /** [left count × right count × 2·pairs], sign reversed */
  transfer: number;
}

/**
 * @param left  side of the aperture at which the guide begins, `right` of that at which it ends; a guide that lacks one is
 *              matched there
 */
export function sectionMatrices(
  guide: Guide,
  { left, right }: { left?: Side; right?: Side },
  band: WaveBand,
  { kernel, table }: { kernel: Kernel; table: ModeTable },
): SectionMatrices {
  const explicit = explicitModes(guide, band, table);
  const out: SectionMatrices = { explicit, left: 0, right: 0, transfer: 0 };
  if (explicit >= guide.modeCount) return out;
  const pairs = nodePairs(band);
  const width = 2 * pairs;
  const rows = guide.modeCount - explicit;
  const square = (a: Side, b: Side): number => {
    const size = a.modes.columns * b.modes.columns * width;
    const address = kernel.alloc(size);
    kernel.memory().fill(0, address / 8, address / 8 + size);
    return address;
  };
  if (left) out.left = square(left, left);
  if (right) out.right = left?.modes === right.modes ? out.left : square(right, right);
  if (left && right) out.transfer = square(left, right);

  const line = { self: new Float64Array(1), transfer: new Float64Array(1), selfAt: 0, transferAt: 0 };
  const length = left && right ? guide.length : Number.POSITIVE_INFINITY;
  const self = kernel.alloc(rows * width);
  const transfer = kernel.alloc(rows * width);
  const memory = kernel.memory();
  memory.fill(0, self / 8, self / 8 + rows * width);
  memory.fill(0, transfer / 8, transfer / 8 + rows * width);
  // Beyond this many modes nothing reaches the guide's other end.
  let reaching = 0;
  for (let n = 0; n < rows; n++) {
    const cutoffNumber = table.chi[explicit + n]! / guide.radius;
    band.nodes.forEach((k, node) => {
      writeLine(isTE(explicit + n), guardedGammaSquared(cutoffNumber, k), k, length, line, 0);
      memory[self / 8 + n * width + node] = line.self[0]! * k;
      memory[transfer / 8 + n * width + node] = -line.transfer[0]! * k;
      if (line.transfer[0] !== 0) reaching = n + 1;
    });
  }
  const rowsOf = ({ address, modes }: Side): number => address + 8 * explicit * modes.columns;
  const addSelf = (to: number, side: Side): void => {
    const { columns } = side.modes;
    const from = rowsOf(side);
    kernel.gram(to, columns, from, columns, columns, from, columns, columns, rows, self, pairs, 1);
    addTail(memory, to / 8, side, band, width);
  };
  if (left) addSelf(out.left, left);
  if (right && out.right !== out.left) addSelf(out.right, right);
  if (left && right) {
    const [P, Q] = [left.modes.columns, right.modes.columns];
    kernel.gram(out.transfer, Q, rowsOf(left), P, P, rowsOf(right), Q, Q, reaching, transfer, pairs, 0);
  }
  return out;
}

function addTail(memory: Float64Array, to: number, { modes, tail }: Side, { nodes }: WaveBand, width: number): void {
  if (!tail) return;
  const { columns } = modes;
  nodes.forEach((k, node) => {
    const forTE = 1 / tail.radius;
    const forTM = -k * k * tail.radius;
    for (let p = 0; p < columns; p++) {
      for (let q = 0; q <= p; q++) {
        memory[to + (p * columns + q) * width + node]! +=
          forTE * tail.te[p]! * tail.te[q]! + forTM * tail.tm[p]! * tail.tm[q]!;
      }
    }
  });
}
