// How fast the hybrid modes of a corrugated wall travel, over frequency.

import { requireInteger, requirePositive } from "../check.ts";
import { speedOfLight } from "../constants.ts";
import { type CorrugatedWall, type HybridName, hybridMode, hybridStart } from "./hybrid.ts";
import { balancedFrequency } from "./slot.ts";

export interface HybridDispersion {
  curves: {
    label: HybridName;
    /** Hz, rising, the same for all */
    frequency: number[];
    /** β/k; null where the mode doesn't travel, above 1 where it is slow */
    phaseConstantRatio: (number | null)[];
  }[];
  /** Hz: HE11 is linearly polarized over the mouth; below it the wall is inductive and guides the slow EH11 */
  balanced: number;
  /** Hz: EH12 begins to travel, and with it cross-polar */
  eh12Start: number;
}

const names: readonly HybridName[] = ["EH11", "HE11", "EH12", "HE12"];

/**
 * β/k of the modes of azimuthal order one on a corrugated wall, from the exact radial slot, at equally spaced frequencies.
 * Modes that don't travel anywhere in the range are left out.
 *
 * @param range.low   Hz
 * @param range.high  Hz, above low
 * @param range.count frequencies, both ends included; default 161
 * @throws {RangeError} a length or frequency not positive, ends out of order, slotFill outside (0, 1]
 * @source Clarricoats & Olver, Corrugated Horns for Microwave Antennas, 1984, chapter 3; valid as `hybridMode`
 */
export function hybridDispersion(
  wall: CorrugatedWall,
  range: { low: number; high: number; count?: number },
): HybridDispersion {
  const { low, high } = range;
  requirePositive("hybridDispersion: lowest frequency", low, "Hz");
  requirePositive("hybridDispersion: highest frequency", high, "Hz");
  if (!(low < high))
    throw new RangeError(`hybridDispersion: the lowest frequency must be below the highest; got ${low} and ${high} Hz`);
  const count = requireInteger("hybridDispersion: count", range.count ?? 161, { min: 2 });
  const frequency = Array.from({ length: count }, (_, i) => low + ((high - low) * i) / (count - 1));
  const curves = names.map((label) => ({
    label,
    frequency,
    phaseConstantRatio: frequency.map((f) => {
      const mode = hybridMode(label, wall, f);
      return mode && (mode.phaseConstant * speedOfLight) / (2 * Math.PI * f);
    }),
  }));
  return {
    curves: curves.filter(({ phaseConstantRatio }) => phaseConstantRatio.some((ratio) => ratio !== null)),
    balanced: balancedFrequency(wall),
    eh12Start: hybridStart("EH12", wall),
  };
}
