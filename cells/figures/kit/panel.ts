// One set of axes with curves in it: the plot library draws, this fits it into a drawing of several panels.

import { axisX, axisY, dot, gridY, line, type Markish, plot, rect, ruleX, ruleY } from "@observablehq/plot";
import type { Axis } from "./axis.ts";
import { control, hairline, ink, type MarkShape, paper, secondary, textSize, tint, warning } from "./palette.ts";
import { coordinate, type Pen } from "./svg.ts";

export type Point = readonly [x: number, y: number];

/** Where a panel's frame (the box of its data, without tick labels) stands in the drawing, px. */
export interface Frame {
  left: number;
  top: number;
  width: number;
  height: number;
}

export interface Panel {
  element: Element;
  /** px in the drawing */
  xAt: (value: number) => number;
  yAt: (value: number) => number;
}

/** Room for tick labels around the frame, px. */
export const panelRoom = { left: 46, right: 14, top: 8, bottom: 24 };

/** Axes in a frame, with marks under the grid and over it, each list in the order in which they cover each other. */
export function panel(
  pen: Pen,
  frame: Frame,
  axes: { x: Axis; y: Axis },
  marks: { under?: Markish[]; over: Markish[] },
): Panel {
  const { x, y } = axes;
  const words = { fill: secondary, fontSize: textSize.axis, label: null };
  const element = plot({
    document: pen.document,
    width: frame.width + panelRoom.left + panelRoom.right,
    height: frame.height + panelRoom.top + panelRoom.bottom,
    marginLeft: panelRoom.left,
    marginRight: panelRoom.right,
    marginTop: panelRoom.top,
    marginBottom: panelRoom.bottom,
    x: { type: "linear", domain: x.domain },
    y: { type: "linear", domain: y.domain },
    marks: [
      ...(marks.under ?? []),
      gridY(y.ticks, { stroke: hairline, strokeOpacity: 1 }),
      axisY(y.ticks, { ...words, tickFormat: y.format, tickSize: 0, tickPadding: 8 }),
      axisX(x.ticks, { ...words, tickFormat: x.format, tickSize: 4, stroke: control }),
      ruleY([y.domain[0]], { stroke: control }),
      ...marks.over,
    ],
  });
  becomePart(element, frame.left - panelRoom.left, frame.top - panelRoom.top);
  const [xLow, xHigh] = x.domain;
  const [yLow, yHigh] = y.domain;
  return {
    element,
    xAt: (value) => frame.left + (frame.width * (value - xLow)) / (xHigh - xLow),
    yAt: (value) => frame.top + (frame.height * (yHigh - value)) / (yHigh - yLow),
  };
}

const coordinates = ["d", "x", "y", "cx", "cy", "x1", "x2", "y1", "y2", "width", "height", "transform"] as const;
const longNumber = /\.\d\d/;
const longNumbers = /-?\d+\.\d\d+(?:e-\d+)?/g;
/** Tenths of a px: half of one is finer than any line, and a file of figures is a third smaller. */
const shortened = (text: string): string => String(Math.round(Number(text) * 10) / 10 + 0);

/** Takes off what a part of a larger drawing can't carry (style element, class, labels of its own) and places it. */
function becomePart(element: Element, left: number, top: number): void {
  for (const style of element.querySelectorAll("style")) style.remove();
  for (const name of ["class", "fill", "font-family", "font-size"]) element.removeAttribute(name);
  for (const part of element.querySelectorAll("[aria-label]")) part.removeAttribute("aria-label");
  for (const part of element.querySelectorAll("[aria-hidden]")) part.removeAttribute("aria-hidden");
  for (const part of element.querySelectorAll("[d], [cx], [x], [x1], [transform]"))
    for (const name of coordinates) {
      const text = part.getAttribute(name);
      if (text !== null && longNumber.test(text)) part.setAttribute(name, text.replace(longNumbers, shortened));
    }
  element.setAttribute("x", coordinate(left));
  element.setAttribute("y", coordinate(top));
  element.setAttribute("overflow", "visible");
}

export interface Stroke {
  color: string;
  width: number;
  dash?: string;
}

/** A curve; it is broken where y is NaN. */
export function curve(points: readonly Point[], { color, width, dash }: Stroke): Markish {
  return line(points, {
    x: "0",
    y: "1",
    stroke: color,
    strokeWidth: width,
    strokeDasharray: dash,
    strokeLinejoin: "round",
    strokeLinecap: dash ? "butt" : "round",
  });
}

/** Open marks on a curve; a cross or a plus has no inside. */
export function marks(points: readonly Point[], shape: MarkShape, color: string, radius = 3): Markish {
  return dot(points, {
    x: "0",
    y: "1",
    symbol: shape,
    r: radius,
    fill: shape === "times" || shape === "plus" ? "none" : paper,
    stroke: color,
    strokeWidth: 1.3,
  });
}

/** A band of pale tint from x1 to x2 over the whole height. */
export function band(x1: number, x2: number): Markish {
  return rect([0], { x1, x2, fill: tint });
}

/** Ink uprights over the whole height. */
export const uprights = (at: readonly number[]): Markish => ruleX(at, { stroke: ink, strokeWidth: 1 });

/** What is asked: a line in the colour of a warning. Its words stand in the drawing. */
export const limitLine = (at: number): Markish => ruleY([at], { stroke: warning, strokeWidth: 1.2 });

/** A value to hold curves against, not a limit. */
export const referenceLine = (at: number): Markish => ruleY([at], { stroke: secondary, strokeWidth: 1 });
