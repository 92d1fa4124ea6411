// What every kind of horn hands to the table in index.ts: nothing above horn asks which kind it is.

import { speedOfLight } from "../constants.ts";
import type { FeedPattern } from "../pattern/feed-pattern.ts";
import type { Candidate } from "./candidate.ts";
import type { MouthTerm } from "./mouth-field.ts";
import type { FeedRequirement, HornLimits } from "./requirement.ts";

/**
 * A kind of horn; G is the geometry that only its own folder reads. Written as methods, so that the table may hold kinds of
 * different geometries: each is only ever handed its own.
 */
export interface HornKind<G> {
  /** first dimensions; throws RangeError for illegal arguments only */
  dimension(requirement: FeedRequirement, limits?: HornLimits): Candidate;
  /** closed-form pattern for 1 W of TE11 at the throat, less what the model's own step reflects */
  pattern(geometry: G, frequency: number, thetaCount: number): FeedPattern;
  /** modes at the mouth by the same closed form */
  mouth(geometry: G, frequency: number): MouthTerm[];
  /** attenuation from throat to mouth, Np; conductivity in S/m */
  attenuation(geometry: G, frequency: number, conductivity: number): number;
}

/** Angles that resolve a mouth of this radius: 9 samples a radian of ka (spline error 1e-6 of boresight), odd. */
const countFor = (radius: number, frequency: number): number =>
  1 + 2 * Math.ceil((4.5 * 2 * Math.PI * radius * frequency) / speedOfLight);

/** Fewest angles of a pattern to hand on: 1° apart. */
const fewestAngles = 181;

/** Number of angles for a pattern to hand on: 1° apart, finer for a mouth of more than 6.4 wavelengths. */
export function thetaCountFor(radius: number, frequency: number): number {
  return Math.max(fewestAngles, countFor(radius, frequency));
}

/** Number of angles while dimensions are still searched: as few as the level at the rim needs. */
export function coarseThetaCountFor(radius: number, frequency: number): number {
  return Math.max(91, countFor(radius, frequency));
}
