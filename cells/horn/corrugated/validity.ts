// Between which frequencies a corrugated horn keeps to HE11 alone.

import { type CorrugatedWall, hybridMode, hybridStart } from "../../guide/hybrid.ts";
import { cutoffFrequency, TE11 } from "../../guide/mode.ts";
import { balancedFrequency, capacitiveWindow } from "../../guide/slot.ts";
import { brentRoot } from "../../math/roots.ts";
import type { Validity } from "./geometry.ts";

/**
 * Lower end: the slow wave EH11. Just below the balanced frequency the wall turns inductive and EH11 appears, at first so
 * slow that a wall of this pitch can't carry it (β·pitch > π: its stop band). It is carried, and takes power from HE11,
 * once β·pitch falls to π.
 *
 * Upper end, at the throat: EH12 begins to travel there, or the first slot reaches the half wave and shorts the wall.
 *
 * @param throat wall at the first slot
 * @param mouth  wall at the last slot
 */
export function validity(throat: CorrugatedWall, mouth: CorrugatedWall, pitch: number): Validity {
  const eh12 = hybridStart("EH12", throat);
  const halfWave = capacitiveWindow(throat).high;
  return {
    low: slowWaveStart(mouth, pitch),
    high: Math.min(eh12, halfWave),
    lowReason: "a slow wave on the slots at the mouth, too shallow there, begins to take power from HE11",
    highReason:
      eh12 < halfWave
        ? "EH12 begins to travel in the throat"
        : "the first slot is half a wave deep and shorts the wall of the throat",
  };
}

/** Highest frequency, Hz, at which the wall carries EH11 (β·pitch ≤ π); the guide's own cutoff where it never does. */
function slowWaveStart(wall: CorrugatedWall, pitch: number): number {
  const balance = balancedFrequency(wall);
  const excess = (frequency: number): number => {
    const slow = hybridMode("EH11", wall, frequency);
    // none: just below balance slower than any wall carries, far below cut off
    return slow ? Math.min(notCarried, slow.phaseConstant * pitch - Math.PI) : notCarried;
  };
  const cutoff = cutoffFrequency(TE11, wall.innerRadius + wall.depth);
  for (let below = 0.99 * balance, above = balance; below > cutoff; above = below, below -= 0.01 * balance)
    if (excess(below) < 0) return brentRoot(excess, below, above * (1 - 1e-9), { tolerance: 1e-6 * balance });
  return cutoff;
}

/** Stands for a β·pitch far beyond π. */
const notCarried = 10;
