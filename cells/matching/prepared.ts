// A horn at one fineness, with all that doesn't depend on the single frequency.

import type { Kernel } from "../math/kernel/kernel.ts";
import type { ApertureBasis } from "./aperture-basis.ts";
import type { Chain } from "./chain.ts";
import type { ModeTable } from "./mode-table.ts";
import type { SectionMatrices, WaveBand } from "./section-matrices.ts";
import type { WorkSpace } from "./work-space.ts";

/** A horn ready for any frequency of its band. */
export interface Prepared {
  chain: Chain;
  bases: ApertureBasis[];
  sections: SectionMatrices[];
  band: WaveBand;
  table: ModeTable;
  kernel: Kernel;
  work: WorkSpace;
}
