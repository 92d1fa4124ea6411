// What dimensioning a kind of horn gives: a horn that can be built, or a sentence that says why there is none.

import type { Warning } from "../check.ts";
import type { FeedKind, HornProfile } from "./horn-profile.ts";

/** One dimension as a drawing or a table lists it. */
export interface Dimension {
  label: string;
  /** SI: m or rad, or a plain count */
  value: number;
  unit: "m" | "rad" | "1";
}

/** A horn that can be built. Plain data: can be sent to a worker. `geometry` is the kind's own and only its folder reads it. */
export interface RealizableHorn {
  feasible: true;
  kind: FeedKind;
  /** what meets the wanted values and at what cost, one sentence */
  reason: string;
  profile: HornProfile;
  /** m */
  throatRadius: number;
  /** m */
  apertureRadius: number;
  /** m, throat plane to mouth */
  length: number;
  /** m, outside diameter, walls included */
  outerDiameter: number;
  dimensions: Dimension[];
  geometry: unknown;
  warnings: Warning[];
}

/** No such horn: the reason is a full sentence with the numbers that forbid it. */
export interface UnrealizableHorn {
  feasible: false;
  kind: FeedKind;
  reason: string;
  warnings: Warning[];
}

export type Candidate = RealizableHorn | UnrealizableHorn;
