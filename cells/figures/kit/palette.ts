// Colours, line styles and marks of every figure. Colour is never alone: dashes, marks or words say the same in grey.

import type { FeedKind } from "../../horn/horn-profile.ts";

export const ink = "#1f2a33";
export const secondary = "#4f5b65";
export const warning = "#8a3800";
export const control = "#8d9195";
export const hairline = "#d8d5cc";
export const tint = "#f3f1ea";
export const paper = "#fdfcf9";
/** inside a horn, behind its outline */
export const hollow = "#ffffff";
/** pale blue behind a field, laid on in layers */
export const fieldTint = "#4f87a8";

export const sansStack = "Avenir Next, Segoe UI, Helvetica Neue, Liberation Sans, Arial, sans-serif";

/** px */
export const textSize = { title: 13.5, drawing: 12.5, axis: 12, small: 11.5 } as const;

export type MarkShape = "circle" | "square" | "triangle" | "diamond" | "times" | "plus" | "hexagon";

export interface KindStyle {
  /** lines, bars and marks */
  line: string;
  /** words: the darker twin */
  words: string;
  mark: MarkShape;
}

// Okabe & Ito's palette for lines. Contrast of the words on paper is at least 6:1.
const kindStyles: Record<FeedKind, KindStyle> = {
  smooth: { line: "#D55E00", words: "#9c4400", mark: "circle" },
  dualMode: { line: "#009E73", words: "#00664a", mark: "square" },
  corrugated: { line: "#0072B2", words: "#00578a", mark: "triangle" },
  chokeRing: { line: "#CC79A7", words: "#8a4b76", mark: "diamond" },
  measured: { line: secondary, words: ink, mark: "times" },
  custom: { line: ink, words: ink, mark: "hexagon" },
};

/** The one style of a kind of feed, everywhere. */
export function kindStyle(kind: FeedKind): KindStyle {
  return kindStyles[kind];
}

/** Dash patterns of the three cuts of a pattern, widths in px. */
export const cutStroke = {
  e: { width: 1.9, dash: undefined },
  h: { width: 1.9, dash: "6 3.5" },
  cross: { width: 1.6, dash: "1.6 3" },
} as const;

/**
 * How one model's curves differ from another's of the same horn: the model a study rests on is drawn in full, a second one
 * thin and grey with long dashes, a third thin and dotted, a measurement as crosses without a line.
 */
export type LineStyle = "full" | "second" | "third" | "measured";

export const lineStroke: Record<LineStyle, { width: number; dash?: string; color?: string }> = {
  full: { width: 1.9 },
  second: { width: 1.1, dash: "9 3", color: secondary },
  third: { width: 1.1, dash: "2 2.5", color: secondary },
  measured: { width: 0, color: ink },
};
