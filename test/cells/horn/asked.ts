// Requirements for the tests of this folder.

import type { FeedRequirement } from "../../../cells/horn/index.ts";
import { dish } from "../../../cells/reflector/dish.ts";
import { feedRequirement } from "../../../cells/reflector/requirement.ts";
import { fromDeg } from "../../../cells/units.ts";

/** What a dish of 2.4 m asks over a band, with an edge of −11 dB. */
export function askedBy(fOverD: number, bandLowGHz: number, bandHighGHz: number, edgeTaperDb = 11): FeedRequirement {
  return feedRequirement({
    dish: dish({ diameter: 2.4, fOverD }),
    bandLow: bandLowGHz * 1e9,
    bandHigh: bandHighGHz * 1e9,
    edgeTaperDb,
  });
}

/** The down-link band of the default study and a Ku-band one, GHz. */
export const xBand = [7.9, 8.4] as const;
export const kuBand = [10.7, 11.7] as const;

/** A rim at 3°: the mouth is so wide that textbook formulas for large apertures hold. 10 GHz alone. */
export function largeMouth(feedTaperDb: number): FeedRequirement {
  return { halfAngle: fromDeg(3), feedTaperDb, bandLow: 10e9, bandCenter: 10e9, bandHigh: 10e9 };
}

/** Nearly flat phase over the mouth; the flare then is very long. */
export const flat = { phaseError: 1e-4 };

export const wavelengthAt10GHz = 299_792_458 / 10e9;
