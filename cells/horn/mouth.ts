// The search that all kinds share: the mouth, and the flare before it, whose pattern falls to the wanted level at the rim.

import { brentRoot } from "../math/roots.ts";
import { type Flare, type FlareRule, flareOfLength, shortestFlare } from "./flare.ts";
import { largestPhaseError } from "./requirement.ts";

/** Its `phaseError` is kept to unless the flare would be too long. */
export interface MouthSearch extends FlareRule {
  /** dB, positive: how far the φ-mean of the pattern behind this flare has fallen at the rim. Smooth in the flare's radius */
  taperOf: (flare: Flare) => number;
  /** dB, positive */
  wantedDb: number;
  /** m, smallest and largest mouth to try */
  smallest: number;
  largest: number;
  /** m, radius at which the flare to a mouth begins; not above the mouth's */
  startRadiusFor: (radius: number) => number;
  /** m, longest flare */
  maxFlareLength: number;
}

/** What the search ends with: a flare, or the best there is and on which side it failed. */
export type MouthFound = { found: true; flare: Flare; shortened: boolean } | MouthMissed;

export type MouthMissed =
  /** even the smallest mouth falls more than wanted */
  | { found: false; side: "smallest"; radius: number; reachedDb: number }
  /** the main lobe ends (its level rises again) before it has fallen as far */
  | { found: false; side: "mainLobe"; radius: number; reachedDb: number }
  /** the largest mouth still falls less than wanted */
  | { found: false; side: "largest"; radius: number; reachedDb: number }
  /** the flare within the length allowed would have too large a phase error, or none reaches the taper: m, wavelengths */
  | { found: false; side: "length"; wantedLength: number; phaseError: number | null };

/** Radius to this share: the level is then met to about twice this share in dB, 2e-4 dB at 10 dB. */
const radiusTolerance = 1e-5;
/** Down to this the main lobe falls without a shoulder, and steps may be long. */
const plainLobeDb = 15;

/**
 * The smallest mouth whose pattern has fallen by the wanted taper at the rim, with the shortest flare that keeps to the
 * phase error. If that flare is longer than allowed: the flare of just the length allowed, as long as its phase error stays
 * within 0.3 wavelengths.
 */
export function mouthForTaper(search: MouthSearch): MouthFound {
  const { startRadiusFor, wavelength, maxFlareLength } = search;
  const ends = (radius: number) => ({ startRadius: startRadiusFor(radius), radius });
  const wanted = crossing(search, (radius) => shortestFlare(ends(radius), search));
  if (!wanted.found || wanted.flare.length <= maxFlareLength) return wanted;
  const missed = { found: false, side: "length", wantedLength: wanted.flare.length } as const;
  if (!(maxFlareLength > 0)) return { ...missed, phaseError: null };
  const limited = crossing(search, (radius) => flareOfLength(ends(radius), maxFlareLength, wavelength));
  if (!limited.found) return { ...missed, phaseError: null };
  if (limited.flare.phaseError > largestPhaseError) return { ...missed, phaseError: limited.flare.phaseError };
  return { ...limited, shortened: true };
}

/**
 * Follows the main lobe outward from the smallest mouth, its fall in dB growing about as the square of the radius, until the
 * wanted taper is bracketed; Brent's method on the pattern itself closes it.
 */
function crossing(search: MouthSearch, flareFor: (radius: number) => Flare): MouthFound {
  const { taperOf, wantedDb, smallest, largest } = search;
  const taperAt = (radius: number): number => taperOf(flareFor(radius));
  let low = smallest;
  let lowDb = taperAt(low);
  if (lowDb > wantedDb) return { found: false, side: "smallest", radius: low, reachedDb: lowDb };
  while (low < largest) {
    const longest = lowDb < plainLobeDb ? (wantedDb > plainLobeDb ? 1.25 : 1.6) : 1.06;
    const guess = lowDb > 0.5 ? Math.min(longest, Math.max(1.02, 1.01 * Math.sqrt(wantedDb / lowDb))) : longest;
    const high = Math.min(largest, low * guess);
    const highDb = taperAt(high);
    if (highDb >= wantedDb) {
      const radius = brentRoot((r) => taperAt(r) - wantedDb, low, high, { tolerance: radiusTolerance * low });
      return { found: true, flare: flareFor(radius), shortened: false };
    }
    if (lowDb > plainLobeDb && highDb < lowDb) return { found: false, side: "mainLobe", radius: low, reachedDb: lowDb };
    low = high;
    lowDb = highDb;
  }
  return { found: false, side: "largest", radius: low, reachedDb: lowDb };
}
