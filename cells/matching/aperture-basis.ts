// The fields in which an aperture between two guides is expanded, seen from both.

import type { RealMatrix } from "./couplings.ts";
import type { ModeTail } from "./edge-basis.ts";

/** One side of an aperture. */
export interface Side {
  /** stands for this content in the keys of what is kept */
  id: number;
  /** basis functions in the guide's modes, [modeCount × count] */
  modes: RealMatrix;
  /** where the kernel holds them */
  address: number;
  /** few of their elements are zero; or they are the unit matrix, the guide's own modes; or else */
  form: "dense" | "unit" | "sparse";
  /** what the guide's further modes add, for edge functions; with the aperture's radius, m */
  tail?: ModeTail & { radius: number };
}

/** The fields in which an aperture is expanded, seen from the guides on both sides. */
export interface ApertureBasis {
  count: number;
  left: Side;
  right: Side;
}
