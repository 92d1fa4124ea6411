// A horn's matrices in the kernel's arena, and the work space beside them.

import type { Kernel } from "../math/kernel/kernel.ts";
import type { RealMatrix } from "./couplings.ts";
import type { Prepared } from "./prepared.ts";

/** Addresses of one aperture's explicit couplings and of the sums over high modes of the guide after it. */
export interface LoadedAperture {
  /** functions in the explicit modes of the guide before and after */
  left: number;
  right: number;
}

export interface LoadedSection {
  left: number;
  right: number;
  transfer: number;
}

export interface LoadedHorn {
  apertures: LoadedAperture[];
  sections: LoadedSection[];
  /** work space: two squares taken in turn, columns, their copy, line admittances of explicit modes, node weights */
  squares: [number, number];
  columns: number;
  scratch: number;
  self: number;
  transfer: number;
  weights: number;
}

/** Which horn each kernel holds. */
const holders = new WeakMap<Kernel, { prepared: Prepared; loaded: LoadedHorn }>();

/** The horn in its kernel's arena; loaded when another one was there. @param ports of throat and mouth together */
export function loadedHorn(prepared: Prepared, ports: number): LoadedHorn {
  const { kernel, bases, sections, band } = prepared;
  const held = holders.get(kernel);
  if (held?.prepared === prepared) return held.loaded;
  kernel.reset();
  const placed = new Map<Float64Array, number>();
  const place = (values: Float64Array | undefined): number => {
    if (!values) return 0;
    const before = placed.get(values);
    if (before !== undefined) return before;
    const address = kernel.alloc(values.length);
    kernel.memory().set(values, address / 8);
    placed.set(values, address);
    return address;
  };
  const explicit = sections.reduce((most, section) => Math.max(most, section.explicit), 0);
  // Guides of one cross-section share a matrix, of which each takes as many rows as it has explicit modes.
  const leading = new Map<RealMatrix, Float64Array>();
  const placeRows = (matrix: RealMatrix): number => {
    const kept = leading.get(matrix) ?? matrix.values.subarray(0, Math.min(explicit, matrix.rows) * matrix.columns);
    leading.set(matrix, kept);
    return place(kept);
  };
  const largest = bases.reduce((most, { count }) => Math.max(most, count), 0) + ports;
  const pairs = (count: number): number => kernel.alloc(2 * count);
  const loaded: LoadedHorn = {
    apertures: bases.map(({ left, right }) => ({ left: placeRows(left.modes), right: placeRows(right.modes) })),
    sections: sections.map(({ left, right, transfer }) => ({
      left: place(left),
      right: place(right),
      transfer: place(transfer),
    })),
    squares: [pairs(largest * largest), pairs(largest * largest)],
    columns: pairs(largest * largest),
    scratch: pairs(largest * largest),
    self: pairs(explicit),
    transfer: pairs(explicit),
    weights: pairs(band.nodes.length),
  };
  holders.set(kernel, { prepared, loaded });
  return loaded;
}
