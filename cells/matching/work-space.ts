// Room in the kernel for the elimination at two frequencies.

import type { Kernel } from "../math/kernel/kernel.ts";

export interface WorkSpace extends WorkSizes {
  /** addresses: two squares taken in turn, columns, their copy */
  squares: [number, number];
  columns: number;
  scratch: number;
  /** line admittances of explicit modes */
  self: number;
  transfer: number;
  /** Lagrange weights of the nodes */
  weights: number;
}

export interface WorkSizes {
  /** most functions of an aperture, and all ports */
  largest: number;
  /** most explicit modes of a guide */
  explicit: number;
  /** pairs of nodes */
  pairs: number;
}

export function workSpace(kernel: Kernel, sizes: WorkSizes): WorkSpace {
  const { largest, explicit, pairs } = sizes;
  const room = (count: number): number => kernel.alloc(2 * count);
  return {
    ...sizes,
    squares: [room(largest * largest), room(largest * largest)],
    columns: room(largest * largest),
    scratch: room(largest * Math.max(largest, explicit)),
    self: room(explicit),
    transfer: room(explicit),
    weights: room(2 * pairs),
  };
}
