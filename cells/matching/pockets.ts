// Ring-loaded slots: a slot wider at its bottom than at its opening reaches behind the metal beside it. Such a profile turns
// back along z; here its pockets are taken off, and what is left is a profile whose z never falls.

import type { HornProfile } from "../guide/horn-profile.ts";

/** A ring-shaped room between two radii, closed at its far end, open to the slot at its near end. m */
export interface Pocket {
  /** plane in which it opens into the slot */
  z: number;
  innerRadius: number;
  outerRadius: number;
  depth: number;
  /** whether it lies behind the slot's first wall (toward the throat) or behind its last */
  side: "start" | "end";
}

/** m: how far z may fall by rounding, and by how much a pocket's wall may be off its radius. */
const roundingTolerance = 1e-9;

/**
 * @returns the profile without its pockets, and these
 * @throws {RangeError} z falls otherwise than along the inner wall of a rectangular pocket
 */
export function withoutPockets({ z, radius }: HornProfile): { profile: HornProfile; pockets: Pocket[] } {
  const pockets: Pocket[] = [];
  const at = z.map((along, i) => ({ z: along, radius: radius[i]! }));
  for (let i = 1; i < at.length; i++) {
    const [before, here] = [at[i - 1]!, at[i]!];
    if (here.z >= before.z - roundingTolerance) continue;
    const inner = here.radius;
    const depth = before.z - here.z;
    const [earlier, later] = [at[i - 2], at[i + 1]];
    const level = Math.abs(before.radius - inner) <= roundingTolerance;
    if (level && later && Math.abs(later.z - here.z) <= roundingTolerance && later.radius > inner) {
      // Up the first wall, back under it, up to the bottom: the pocket's bottom goes on as the slot's.
      pockets.push({ z: before.z, innerRadius: inner, outerRadius: later.radius, depth, side: "start" });
      at.splice(i - 1, 3, { z: before.z, radius: inner }, { z: before.z, radius: later.radius });
    } else if (level && earlier && Math.abs(earlier.z - before.z) <= roundingTolerance && earlier.radius > inner) {
      pockets.push({ z: here.z, innerRadius: inner, outerRadius: earlier.radius, depth, side: "end" });
      at.splice(i - 2, 3, { z: here.z, radius: earlier.radius }, { z: here.z, radius: inner });
      i--;
    } else {
      throw new RangeError(
        `bandAnalysis: profile z must not fall from the throat to the mouth, unless along the inner wall of a rectangular pocket of a ring-loaded slot; got ${here.z * 1e3} mm after ${before.z * 1e3} mm at point ${i + 1}`,
      );
    }
  }
  return { profile: { z: at.map((point) => point.z), radius: at.map((point) => point.radius) }, pockets };
}
