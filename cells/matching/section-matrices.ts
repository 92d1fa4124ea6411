// The admittances of a guide between its two apertures, in their basis: the lowest modes stay explicit, the sum of all
// others is smooth in frequency and is interpolated over the band.

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
const explicitBelow = 2.5;

/** Wanted relative error of the interpolated sums. */
const interpolationError = 1e-6;

/**
 * Chebyshev nodes in k²: a mode's √(kc² − k²) is smooth up to its branch point at kc ≥ 2.5·k_high, so that the error falls as
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

/** Modes kept explicit. */
export function explicitModes({ radius, modeCount }: Guide, { high }: WaveBand, table: ModeTable): number {
  let count = 0;
  while (count < modeCount && table.chi[count]! < explicitBelow * high * radius) count++;
  return count;
}

/** k·jη0·Y of the modes beyond the explicit ones, at each node of the band: innermost index the node. */
export interface SectionMatrices {
  explicit: number;
  /** [left count × left count × nodes], lower half; absent where the guide has no left aperture */
  left?: Float64Array;
  right?: Float64Array;
  /** [left count × right count × nodes], sign reversed */
  transfer?: Float64Array;
}

/**
 * @param left  side of the aperture at which the guide begins, `right` of that at which it ends; a guide that lacks one is
 *              matched there
 */
export function sectionMatrices(
  guide: Guide,
  { left, right }: { left?: Side; right?: Side },
  band: WaveBand,
  table: ModeTable,
): SectionMatrices {
  const explicit = explicitModes(guide, band, table);
  const nodes = band.nodes.length;
  const out: SectionMatrices = { explicit };
  const size = (a: Side, b: Side): Float64Array => new Float64Array(a.modes.columns * b.modes.columns * nodes);
  if (left) out.left = size(left, left);
  if (right) out.right = left?.modes === right.modes ? out.left! : size(right, right);
  if (left && right) out.transfer = size(left, right);
  const line = {
    self: new Float64Array(guide.modeCount),
    transfer: new Float64Array(guide.modeCount),
    selfAt: 0,
    transferAt: 0,
  };
  const length = left && right ? guide.length : Number.POSITIVE_INFINITY;
  band.nodes.forEach((k, node) => {
    for (let n = explicit; n < guide.modeCount; n++) {
      const gammaSquared = guardedGammaSquared(table.chi[n]! / guide.radius, k);
      writeLine(isTE(n), gammaSquared, k, length, line, n);
      line.self[n]! *= k;
      line.transfer[n]! *= -k;
    }
    const at = { node, nodes, from: explicit };
    if (left) addSelf(out.left!, left, line.self, k, at);
    if (right && out.right !== out.left) addSelf(out.right!, right, line.self, k, at);
    if (left && right) addTransfer(out.transfer!, left, right, line.transfer, at);
  });
  return out;
}

interface AtNode {
  node: number;
  nodes: number;
  /** first mode of the sum */
  from: number;
}

function addSelf(
  out: Float64Array,
  { modes, tail }: Side,
  weights: Float64Array,
  k: number,
  { node, nodes, from }: AtNode,
): void {
  const { rows, columns, values } = modes;
  for (let n = from; n < rows; n++) {
    const row = n * columns;
    const weight = weights[n]!;
    for (let p = 0; p < columns; p++) {
      const factor = values[row + p]! * weight;
      if (factor === 0) continue;
      let to = p * columns * nodes + node;
      for (let q = 0; q <= p; q++, to += nodes) out[to]! += factor * values[row + q]!;
    }
  }
  if (!tail) return;
  const forTE = 1 / tail.radius;
  const forTM = -k * k * tail.radius;
  for (let p = 0; p < columns; p++) {
    for (let q = 0; q <= p; q++) {
      out[(p * columns + q) * nodes + node]! += forTE * tail.te[p]! * tail.te[q]! + forTM * tail.tm[p]! * tail.tm[q]!;
    }
  }
}

function addTransfer(
  out: Float64Array,
  left: Side,
  right: Side,
  weights: Float64Array,
  { node, nodes, from }: AtNode,
): void {
  const P = left.modes.columns;
  const Q = right.modes.columns;
  const rows = Math.min(left.modes.rows, right.modes.rows);
  for (let n = from; n < rows; n++) {
    const weight = weights[n]!;
    // Evanescent modes that don't reach the other end.
    if (weight === 0) continue;
    for (let p = 0; p < P; p++) {
      const factor = left.modes.values[n * P + p]! * weight;
      if (factor === 0) continue;
      let to = p * Q * nodes + node;
      for (let q = 0; q < Q; q++, to += nodes) out[to]! += factor * right.modes.values[n * Q + q]!;
    }
  }
}
