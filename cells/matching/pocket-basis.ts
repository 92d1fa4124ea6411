// The fields in an aperture with a pocket behind it: edge functions on the bore, the pocket's own modes on its ring.

import { ringCouplings, ringModes } from "./annular-modes.ts";
import type { Aperture, Guide } from "./chain.ts";
import type { RealMatrix } from "./couplings.ts";
import type { ModeTail } from "./edge-basis.ts";
import { guardedGammaSquared, type LineTarget, writeLine } from "./line.ts";
import type { ModeTable } from "./mode-table.ts";

/** What is left away to see what it matters: two edge functions and two modes of the pocket, which stand last. */
export const droppedWithPocket = 4;

/** Places of the edge functions and of the pocket's modes among all. */
export function places(edges: number, rings: number): { edge: number[]; ring: number[] } {
  const kept = edges - 2 + rings - 2;
  const at = (n: number, count: number, from: number, last: number): number =>
    n < count - 2 ? from + n : last + n - (count - 2);
  return {
    edge: Array.from({ length: edges }, (_, n) => at(n, edges, 0, kept)),
    ring: Array.from({ length: rings }, (_, n) => at(n, rings, edges - 2, kept + 2)),
  };
}

/** The couplings of edge functions with those of the pocket's modes put beside them: none to the guide of the bore. */
export function withPocket(
  edges: { modes: RealMatrix; tail: ModeTail },
  { ring, count }: NonNullable<Aperture["pocket"]>,
  guide: Guide,
  table: ModeTable,
): { modes: RealMatrix; tail: ModeTail } {
  const { rows, columns: edgeCount, values } = edges.modes;
  const columns = edgeCount + count;
  const at = places(edgeCount, count);
  const out = new Float64Array(rows * columns);
  const tail: ModeTail = { te: new Float64Array(columns), tm: new Float64Array(columns) };
  at.edge.forEach((to, p) => {
    for (let n = 0; n < rows; n++) out[n * columns + to] = values[n * edgeCount + p]!;
    tail.te[to] = edges.tail.te[p]!;
    tail.tm[to] = edges.tail.tm[p]!;
  });
  if (guide.radius === ring.outerRadius) {
    const couplings = ringCouplings(ring, ringModes(ring, count), rows, table).values;
    at.ring.forEach((to, i) => {
      for (let n = 0; n < rows; n++) out[n * columns + to] = couplings[n * count + i]!;
    });
  }
  return { modes: { rows, columns, values: out }, tail };
}

/** Admittances of the pocket's shorted lines at a wave number, in the order of its modes. */
export function pocketAdmittances({ ring, count }: NonNullable<Aperture["pocket"]>, k: number): Float64Array {
  const target: LineTarget = {
    self: new Float64Array(count),
    transfer: new Float64Array(count),
    selfAt: 0,
    transferAt: 0,
  };
  ringModes(ring, count).forEach(({ te, cutoffNumber }, i) => {
    writeLine(te, guardedGammaSquared(cutoffNumber, k), k, ring.depth, target, i);
  });
  return target.self;
}

/** Resonances of the pocket below a wave number with its opening shorted too. */
export function pocketResonances({ ring, count }: NonNullable<Aperture["pocket"]>, k: number): number {
  return ringModes(ring, count).reduce((sum, { te, cutoffNumber }) => {
    if (cutoffNumber >= k) return sum;
    const beta = Math.sqrt((k - cutoffNumber) * (k + cutoffNumber));
    return sum + Math.floor((beta * ring.depth) / Math.PI) + (te ? 0 : 1);
  }, 0);
}
