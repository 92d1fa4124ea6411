// What a matcher keeps between calls: couplings that depend on the geometry alone, and sums that depend on band and geometry.
// Only what a changed profile needs anew is computed.

import type { Kernel } from "../math/kernel/kernel.ts";
import type { ApertureBasis, Side } from "./aperture-basis.ts";
import type { Aperture, Chain, Guide } from "./chain.ts";
import { couplings, type RealMatrix } from "./couplings.ts";
import { edgeCouplings, edgeTail } from "./edge-basis.ts";
import { type ModeTable, modeTable } from "./mode-table.ts";
import { withPocket } from "./pocket-basis.ts";
import { type SectionMatrices, sectionMatrices, type WaveBand } from "./section-matrices.ts";
import { taperCouplings, taperGenerator } from "./taper-couplings.ts";
import { type WorkSpace, workSpace } from "./work-space.ts";

export interface Memory {
  kernel: Kernel;
  /** the kernel's work space for horns up to these sizes */
  work(largest: number, explicit: number, nodePairs: number): WorkSpace;
  /** at least so many modes */
  table(count: number): ModeTable;
  bases(chain: Chain): ApertureBasis[];
  sections(chain: Chain, bases: ApertureBasis[], band: WaveBand): SectionMatrices[];
  /** forgets what the last few calls had no use for */
  endCall(): void;
}

/** The kernel's arena is emptied when it holds more: what has been forgotten stays in it until then. */
const mostBytes = 64e6;

/** A kept entry that so many calls had no use for is forgotten. */
const keptCalls = 6;

/** @param kernel its own, empty */
export function createMemory(kernel: Kernel): Memory {
  let work: WorkSpace | undefined;
  let table = modeTable(64);
  let call = 0;
  let nextId = 0;
  const matrices = createStore<RealMatrix>();
  const sides = createStore<Side>();
  const sections = createStore<SectionMatrices>();
  const stores = [matrices, sides, sections];
  let addresses = new WeakMap<ArrayBufferLike, number>();

  return {
    kernel,
    work(largest, explicit, pairs) {
      if (!work || largest > work.largest || explicit > work.explicit || pairs > work.pairs) {
        work = workSpace(kernel, {
          largest: Math.max(largest, work?.largest ?? 0),
          explicit: Math.max(explicit, work?.explicit ?? 0),
          pairs: Math.max(pairs, work?.pairs ?? 0),
        });
      }
      return work;
    },
    table: tableOf,
    bases({ guides, apertures }) {
      return apertures.map((aperture, i) => {
        const left = guides[i]!;
        const right = guides[i + 1]!;
        const small = Math.min(left.radius, right.radius);
        return { count: aperture.count, left: sideOf(aperture, left, small), right: sideOf(aperture, right, small) };
      });
    },
    sections({ guides }, bases, band) {
      const inBand = band.nodes.join(" ") + ` ${band.high}`;
      return guides.map((guide, i) => {
        const left = bases[i - 1]?.right;
        const right = bases[i]?.left;
        const { radius, length, modeCount } = guide;
        // A guide matched at one end has no length in its admittance.
        const shape = left && right ? `${radius} ${length} ${modeCount}` : `${radius} ${modeCount}`;
        return sections.get(`${shape} ${left?.id} ${right?.id} ${inBand}`, () =>
          sectionMatrices(guide, { left, right }, band, { kernel, table: tableOf(modeCount) }),
        );
      });
    },
    endCall() {
      const full = kernel.used() > mostBytes;
      for (const store of stores) store.forget(full ? call + 1 : call - keptCalls);
      if (full) {
        kernel.reset();
        work = undefined;
        addresses = new WeakMap();
      }
      call++;
    },
  };

  function tableOf(count: number): ModeTable {
    if (count > table.count) table = modeTable(Math.max(count, 2 * table.count));
    return table;
  }

  function sideOf({ kind, count, pocket }: Aperture, guide: Guide, radius: number): Side {
    const { modeCount } = guide;
    const behind = pocket ? `${pocket.ring.innerRadius} ${pocket.ring.outerRadius} ${pocket.count}` : "";
    return sides.get(`${kind} ${count} ${radius} ${guide.radius} ${modeCount} ${behind}`, () => {
      const id = nextId++;
      const placed = (modes: RealMatrix, form: Side["form"]): Side => ({
        id,
        modes,
        form,
        address: place(modes.values),
      });
      const ratio = radius / guide.radius;
      if (pocket) {
        const edges = count - pocket.count;
        const tail = edgeTail(ratio, edges, modeCount, tableOf(modeCount));
        const modes = edgeMatrix(ratio, edges, modeCount);
        const side = withPocket({ modes, tail }, pocket, guide, tableOf(modeCount));
        return { ...placed(side.modes, "sparse"), tail: { ...side.tail, radius } };
      }
      if (kind === "edge") {
        const tail = { ...edgeTail(ratio, count, modeCount, tableOf(modeCount)), radius };
        return { ...placed(edgeMatrix(ratio, count, modeCount), "sparse"), tail };
      }
      const counts = { smallCount: count, largeCount: modeCount };
      if (kind === "step" || ratio === 1) {
        return placed(couplings(ratio, counts, tableOf(Math.max(count, modeCount))), ratio === 1 ? "unit" : "dense");
      }
      return placed(smoothMatrix(-Math.log(ratio), count, modeCount), "dense");
    });
  }

  /** In the kernel; once for all that share a buffer, which are leading rows of one matrix. */
  function place(values: Float64Array): number {
    const held = addresses.get(values.buffer);
    if (held !== undefined) return held;
    const whole = new Float64Array(values.buffer);
    const address = kernel.alloc(whole.length);
    kernel.memory().set(whole, address / 8);
    addresses.set(values.buffer, address);
    return address;
  }

  /** The first rows of a matrix kept for its ratio: all teeth share the ratio 1. */
  function edgeMatrix(ratio: number, count: number, rows: number): RealMatrix {
    const make = (): RealMatrix => edgeCouplings(ratio, count, rows, tableOf(rows));
    const key = `edge ${ratio} ${count}`;
    const kept = matrices.get(key, make);
    const whole = kept.rows >= rows ? kept : matrices.replace(key, make());
    return whole.rows === rows ? whole : { ...whole, rows, values: whole.values.subarray(0, rows * count) };
  }

  /** exp(T·logRatio) between `count` modes; further modes of the guide are not reached. */
  function smoothMatrix(logRatio: number, count: number, rows: number): RealMatrix {
    const square = matrices.get(`smooth ${logRatio.toPrecision(10)} ${count}`, () =>
      taperCouplings(taperGenerator(count, tableOf(count)), logRatio),
    );
    if (rows === count) return square;
    const values = new Float64Array(rows * count);
    values.set(square.values.subarray(0, Math.min(rows, count) * count));
    return { rows, columns: count, values };
  }

  function createStore<T>() {
    const kept = new Map<string, { value: T; call: number }>();
    return {
      get(key: string, make: () => T): T {
        const found = kept.get(key);
        if (found) {
          found.call = call;
          return found.value;
        }
        const value = make();
        kept.set(key, { value, call });
        return value;
      },
      replace(key: string, value: T): T {
        kept.set(key, { value, call });
        return value;
      },
      forget(before: number): void {
        for (const [key, entry] of kept) if (entry.call < before) kept.delete(key);
      },
    };
  }
}
