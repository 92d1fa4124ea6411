// The kinds of horn, and their inner wall.

export type { HornProfile } from "../guide/horn-profile.ts";

/** The kinds of feed that a study can set side by side. */
export type FeedKind = "smooth" | "dualMode" | "corrugated" | "chokeRing" | "measured" | "custom";
