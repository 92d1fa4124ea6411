// Dimension lines with slim arrows, and the chain line of an axis.

import { secondary, textSize } from "./palette.ts";
import { coordinate, type Pen, text } from "./svg.ts";

const arrowLength = 7;
const arrowHalf = 1.7;
/** Below this length, px, the arrows stand outside and point inward. */
const leastInside = 20;

export interface DimensionLine {
  /** "x": a horizontal line at y = at; "y": a vertical one at x = at */
  along: "x" | "y";
  from: number;
  to: number;
  at: number;
  /** where the two extension lines begin (on the outline), across the line; none if left out */
  extendFrom?: readonly [number, number];
  words: string;
  /** "on" (default): in the middle, above or left of the line; "after": past the end `to` */
  place?: "on" | "after";
  fill?: string;
}

function arrow(along: "x" | "y", tip: number, at: number, direction: 1 | -1): string {
  const back = tip - direction * arrowLength;
  const corners: [number, number][] = [
    [tip, at],
    [back, at - arrowHalf],
    [back, at + arrowHalf],
  ];
  const steps = corners.map(([u, v]) =>
    along === "x" ? `${coordinate(u)} ${coordinate(v)}` : `${coordinate(v)} ${coordinate(u)}`,
  );
  return `M${steps.join("L")}Z`;
}

/** A dimension: line, arrows, extension lines and its words. */
export function dimension(pen: Pen, line: DimensionLine): SVGElement {
  const { along, at, words, place = "on", fill } = line;
  const [low, high] = line.from <= line.to ? [line.from, line.to] : [line.to, line.from];
  const inside = high - low >= leastInside;
  const tail = inside ? 0 : 13;
  const point = (u: number, v: number): string =>
    along === "x" ? `${coordinate(u)} ${coordinate(v)}` : `${coordinate(v)} ${coordinate(u)}`;
  const strokes = [`M${point(low - tail, at)}L${point(high + tail, at)}`];
  line.extendFrom?.forEach((start, i) => {
    const u = i === 0 ? line.from : line.to;
    const beyond = at + 4 * Math.sign(at - start);
    strokes.push(`M${point(u, start)}L${point(u, beyond)}`);
  });
  const arrows = arrow(along, low, at, inside ? -1 : 1) + arrow(along, high, at, inside ? 1 : -1);
  const size = textSize.drawing;
  const middle = (low + high) / 2;
  const beyond = high + tail + 6;
  const label =
    place === "on"
      ? along === "x"
        ? text(pen, middle, at - 6, words, { size, fill, anchor: "middle" })
        : text(pen, at - 6, middle, words, { size, fill, anchor: "middle", turn: -90 })
      : along === "x"
        ? text(pen, beyond, at + 4, words, { size, fill })
        : text(pen, at, beyond + 8, words, { size, fill, anchor: "middle" });
  return pen(
    "g",
    {},
    pen("path", { d: strokes.join(""), stroke: secondary, "stroke-width": 0.8 }),
    pen("path", { d: arrows, fill: secondary }),
    label,
  );
}

/** The axis of a body of revolution. */
export function chainLine(pen: Pen, from: readonly [number, number], to: readonly [number, number]): SVGElement {
  return pen("path", {
    d: `M${coordinate(from[0])} ${coordinate(from[1])}L${coordinate(to[0])} ${coordinate(to[1])}`,
    stroke: secondary,
    "stroke-width": 0.8,
    "stroke-dasharray": "11 3 2 3",
  });
}
