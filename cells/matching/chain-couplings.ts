// The couplings at every aperture of a chain: all that its geometry gives, once for the whole band.

import type { Chain } from "./chain.ts";
import { couplings, type RealMatrix } from "./couplings.ts";
import type { ModeTable } from "./mode-table.ts";
import { taperCouplings, taperGenerator } from "./taper-couplings.ts";

/** The aperture's basis expressed in the modes of each side, [modes × basis]; "unit" where they are the same modes. */
export interface ApertureCouplings {
  count: number;
  left: RealMatrix;
  right: RealMatrix;
}

export function chainCouplings({ guides, apertures }: Chain, table: ModeTable): ApertureCouplings[] {
  const exponentials = new Map<string, RealMatrix>();
  return apertures.map(({ count, smooth }, i) => {
    const left = guides[i]!;
    const right = guides[i + 1]!;
    const [small, large] = left.radius <= right.radius ? [left, right] : [right, left];
    const largeMatrix = smooth
      ? smoothCouplings(Math.log(large.radius / small.radius), count, large.modeCount)
      : couplings(small.radius / large.radius, { smallCount: count, largeCount: large.modeCount }, table);
    const smallMatrix = couplings(1, { smallCount: count, largeCount: small.modeCount }, table);
    return small === left
      ? { count, left: smallMatrix, right: largeMatrix }
      : { count, left: largeMatrix, right: smallMatrix };
  });

  function smoothCouplings(logRatio: number, count: number, rows: number): RealMatrix {
    if (logRatio === 0) return couplings(1, { smallCount: count, largeCount: rows }, table);
    const key = `${logRatio.toPrecision(12)} ${count} ${rows}`;
    let matrix = exponentials.get(key);
    if (!matrix) {
      const size = Math.max(count, rows);
      const full = taperCouplings(taperGenerator(size, table), logRatio);
      const values = new Float64Array(rows * count);
      for (let r = 0; r < rows; r++) {
        for (let c = 0; c < count; c++) values[r * count + c] = full.values[r * size + c]!;
      }
      matrix = { rows, columns: count, values };
      exponentials.set(key, matrix);
    }
    return matrix;
  }
}
