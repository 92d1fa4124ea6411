// The fields in which each aperture of a chain is expanded, and their couplings to the modes of the guides on both sides:
// all that the geometry gives, once for the whole band.

import type { Aperture, Chain, Guide } from "./chain.ts";
import { couplings, type RealMatrix } from "./couplings.ts";
import { edgeCouplings, type ModeTail } from "./edge-basis.ts";
import type { ModeTable } from "./mode-table.ts";
import { taperCouplings, taperGenerator } from "./taper-couplings.ts";

/** One side of an aperture. */
export interface Side {
  /** basis functions in the guide's modes, [modeCount × count] */
  modes: RealMatrix;
  /** what the guide's further modes add, for edge functions; with the aperture's radius, m */
  tail?: ModeTail & { radius: number };
}

export interface ApertureBasis {
  count: number;
  left: Side;
  right: Side;
}

/** Makes the basis of an aperture; keeps what tapers share. */
export function basisMaker(table: ModeTable): (aperture: Aperture, left: Guide, right: Guide) => ApertureBasis {
  const exponentials = new Map<string, RealMatrix>();
  const edges = new Map<string, ReturnType<typeof edgeCouplings>>();
  return (aperture, left, right) => {
    const small = Math.min(left.radius, right.radius);
    return { count: aperture.count, left: side(aperture, left, small), right: side(aperture, right, small) };
  };

  function side({ kind, count }: Aperture, guide: Guide, radius: number): Side {
    const ratio = radius / guide.radius;
    if (kind === "edge") {
      // Teeth share one radius ratio, 1; slots of one shape share theirs.
      const key = `${ratio} ${count} ${guide.modeCount}`;
      let made = edges.get(key);
      if (!made) {
        made = edgeCouplings(ratio, count, guide.modeCount, table);
        edges.set(key, made);
      }
      return { modes: made.modes, tail: { ...made.tail, radius } };
    }
    const counts = { smallCount: count, largeCount: guide.modeCount };
    if (kind === "step" || ratio === 1) return { modes: couplings(ratio, counts, table) };
    return { modes: smoothCouplings(-Math.log(ratio), count, guide.modeCount) };
  }

  /** exp(T·logRatio) between `count` modes; further modes of the guide are not reached. */
  function smoothCouplings(logRatio: number, count: number, rows: number): RealMatrix {
    const key = `${logRatio.toPrecision(10)} ${count} ${rows}`;
    let matrix = exponentials.get(key);
    if (!matrix) {
      const full = taperCouplings(taperGenerator(count, table), logRatio);
      const values = new Float64Array(rows * count);
      values.set(full.values.subarray(0, Math.min(rows, count) * count));
      matrix = { rows, columns: count, values };
      exponentials.set(key, matrix);
    }
    return matrix;
  }
}

export function chainBases({ guides, apertures }: Chain, table: ModeTable): ApertureBasis[] {
  const make = basisMaker(table);
  return apertures.map((aperture, i) => make(aperture, guides[i]!, guides[i + 1]!));
}
