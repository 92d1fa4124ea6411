// What a dish over a band asks of its feed.

import { requireNumber, requirePositive } from "../check.ts";
import type { FeedRequirement } from "../horn/requirement.ts";
import { integrate } from "../math/quadrature.ts";
import { brentMinimum } from "../math/roots.ts";
import { powerToDb, toGHz } from "../units.ts";
import { type Dish, spaceLossDb, uniformGainDbi } from "./dish.ts";

export interface DishOverBand {
  dish: Dish;
  /** Hz, both edges included */
  bandLow: number;
  bandHigh: number;
  /** dB, positive, space loss included: 11 asks for an edge at −11 dB */
  edgeTaperDb: number;
}

/** A `FeedRequirement`, with the facts of the dish from which it follows. All dB positive. */
export interface DishRequirement extends FeedRequirement {
  dishDiameter: number;
  /** wanted at the rim, space loss included, φ-mean, at band centre */
  edgeTaperDb: number;
  /** how much of it the longer path gives */
  spaceLossDb: number;
  /** the edge taper at which a cosⁿ feed is most efficient in this dish */
  optimumEdgeTaperDb: number;
  /** spillover × illumination there, a ratio */
  optimumEfficiency: number;
  /** dBi at band centre: (πD/λ)² */
  uniformGainDbi: number;
  /** dBi, directivity of the cosⁿ feed of the wanted taper: what to expect of the feed. None if the taper is not positive */
  feedDirectivityDbi: number | null;
}

/**
 * What a dish asks: the half-angle to fill, the taper that the feed's own pattern must bring, the band.
 *
 *   feedTaperDb = edgeTaperDb − spaceLossDb(ψ)
 *
 * A wanted edge taper below the space loss is legal here: it asks for a feed stronger at the rim than on its axis, which
 * the horns then refuse with the reason.
 *
 * @throws {RangeError} band edges not positive or low above high; edge taper outside 0…60 dB
 */
export function feedRequirement({ dish, bandLow, bandHigh, edgeTaperDb }: DishOverBand): DishRequirement {
  requirePositive("feedRequirement: band, lower edge", bandLow, "Hz");
  requirePositive("feedRequirement: band, upper edge", bandHigh, "Hz");
  if (bandLow > bandHigh)
    throw new RangeError(
      `feedRequirement: the band's lower edge must not be above its upper edge; got ${toGHz(bandLow)} GHz and ${toGHz(bandHigh)} GHz`,
    );
  requireNumber("feedRequirement: edge taper", edgeTaperDb, { above: 0, max: 60, unit: "dB" });
  const { halfAngle, diameter } = dish;
  const bandCenter = (bandLow + bandHigh) / 2;
  const lossToRim = spaceLossDb(halfAngle);
  const feedTaperDb = edgeTaperDb - lossToRim;
  const optimum = optimumEdgeTaper(halfAngle);
  return {
    halfAngle,
    feedTaperDb,
    bandLow,
    bandCenter,
    bandHigh,
    dishDiameter: diameter,
    edgeTaperDb,
    spaceLossDb: lossToRim,
    optimumEdgeTaperDb: optimum.edgeTaperDb,
    optimumEfficiency: optimum.efficiency,
    uniformGainDbi: uniformGainDbi(diameter, bandCenter),
    feedDirectivityDbi: feedTaperDb > 0 ? powerToDb(2 * (cosineExponent(feedTaperDb, halfAngle) + 1)) : null,
  };
}

/** n for which cosⁿθ has fallen by `taperDb` at the half-angle. */
const cosineExponent = (taperDb: number, halfAngle: number): number => taperDb / -powerToDb(Math.cos(halfAngle));

/**
 * Spillover × illumination of a cosⁿ feed (power pattern G = 2(n+1) cosⁿθ in front, nothing behind) in a dish:
 *
 *   η = 2(n+1) cot²(ψ/2) (∫₀^ψ cos^{n/2}θ tan(θ/2) dθ)²
 *
 * @param exponent  n, > 0
 * @param halfAngle rad, 0 < ψ < π/2
 * @throws {RangeError} out of range
 * @source Silver, "Microwave Antenna Theory and Design", 1949, ch. 12; Balanis, "Antenna Theory", eq. 15-57…61
 */
export function cosineFeedEfficiency(exponent: number, halfAngle: number): number {
  requirePositive("cosineFeedEfficiency: exponent", exponent);
  requireNumber("cosineFeedEfficiency: half-angle", halfAngle, { above: 0, below: Math.PI / 2, unit: "rad" });
  const field = integrate((theta) => Math.cos(theta) ** (exponent / 2) * Math.tan(theta / 2), 0, halfAngle, 48);
  return 2 * (exponent + 1) * (field / Math.tan(halfAngle / 2)) ** 2;
}

/**
 * The edge taper (space loss included) at which a cosⁿ feed is most efficient in a dish of this half-angle, and that
 * efficiency: the balance of spillover against illumination. 10.9 dB for a shallow dish, which is where the trade's "about
 * 11 dB" comes from; 10.8 dB at a half-angle of 50°, 10.1 dB at 70°.
 *
 * @param halfAngle rad, 0 < ψ < π/2
 * @returns dB, positive, to 1e-3; and the efficiency, a ratio
 * @throws {RangeError} half-angle out of range
 */
export function optimumEdgeTaper(halfAngle: number): { edgeTaperDb: number; efficiency: number } {
  requireNumber("optimumEdgeTaper: half-angle", halfAngle, { above: 0, below: Math.PI / 2, unit: "rad" });
  const lossFor = (feedTaperDb: number): number =>
    -cosineFeedEfficiency(cosineExponent(feedTaperDb, halfAngle), halfAngle);
  const { x, value } = brentMinimum(lossFor, 0.05, 25, { tolerance: 1e-4 });
  return { edgeTaperDb: x + spaceLossDb(halfAngle), efficiency: -value };
}
