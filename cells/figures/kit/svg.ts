// Building SVG elements by hand: presentation attributes only, numbers rounded, never NaN.

import { ink, sansStack, textSize } from "./palette.ts";

export type Attributes = Record<string, string | number | undefined>;
type Child = Element | string | undefined;

const namespace = "http://www.w3.org/2000/svg";

/** A coordinate as written in an attribute: hundredths of a pixel. @throws {RangeError} not finite */
export function coordinate(value: number): string {
  if (!Number.isFinite(value))
    throw new RangeError(`drawing: a coordinate must be a finite number of px; got ${value}`);
  const rounded = Math.round(value * 100) / 100;
  return String(rounded === 0 ? 0 : rounded);
}

/** Makes elements in one document. */
export interface Pen {
  readonly document: Document;
  (name: string, attributes?: Attributes, ...children: Child[]): SVGElement;
}

/** @throws {RangeError} from the pen, when an attribute is a number and not finite: names the element and the attribute */
export function svgPen(document: Document): Pen {
  const make = (name: string, attributes: Attributes = {}, ...children: Child[]): SVGElement => {
    const made = document.createElementNS(namespace, name) as SVGElement;
    for (const key in attributes) {
      const value = attributes[key];
      if (value === undefined) continue;
      if (typeof value === "number" && !Number.isFinite(value))
        throw new RangeError(`drawing: ${key} of <${name}> must be a finite number; got ${value}`);
      made.setAttribute(key, typeof value === "number" ? coordinate(value) : value);
    }
    for (const child of children) if (child !== undefined) made.append(child);
    return made;
  };
  return Object.assign(make, { document });
}

/** The outermost element of a drawing. The text alternative rides along as its description, for a file saved on its own. */
export function drawingRoot(
  pen: Pen,
  size: { width: number; height: number },
  alt: string,
  ...children: Child[]
): SVGElement {
  const height = Math.ceil(size.height);
  return pen(
    "svg",
    {
      viewBox: `0 0 ${coordinate(size.width)} ${height}`,
      width: size.width,
      height,
      fill: "none",
      "font-family": sansStack,
      "font-size": textSize.drawing,
      "font-variant": "tabular-nums",
    },
    pen("desc", {}, alt),
    ...children,
  );
}

export interface TextOptions {
  size?: number;
  fill?: string;
  bold?: boolean;
  anchor?: "start" | "middle" | "end";
  /** turned about its own point, degrees */
  turn?: number;
  /** colour of a rim around the letters, so that a line behind doesn't cross them */
  halo?: string;
}

/** Text whose baseline starts (or is centred, or ends) at x, y. */
export function text(pen: Pen, x: number, y: number, words: string, options: TextOptions = {}): SVGElement {
  const { size, fill = ink, bold, anchor, turn, halo } = options;
  return pen(
    "text",
    {
      x,
      y,
      fill,
      "font-size": size,
      "font-weight": bold ? 600 : undefined,
      "text-anchor": anchor === "start" ? undefined : anchor,
      transform: turn === undefined ? undefined : `rotate(${coordinate(turn)} ${coordinate(x)} ${coordinate(y)})`,
      ...(halo === undefined ? {} : haloAttributes(halo)),
    },
    words,
  );
}

/** What gives letters a rim; on a group, for all texts in it. */
export const haloAttributes = (halo: string) => ({
  stroke: halo,
  "stroke-width": 4,
  "stroke-linejoin": "round",
  "paint-order": "stroke",
});

/** Lines of text, one under another; y is the baseline of the first. */
export function textBlock(
  pen: Pen,
  x: number,
  y: number,
  lines: readonly string[],
  options: TextOptions & { leading?: number } = {},
): SVGElement {
  const { leading = 17, ...rest } = options;
  return pen("g", {}, ...lines.map((line, i) => text(pen, x, y + i * leading, line, rest)));
}

/** Path through points, open or closed. */
export function pathThrough(points: readonly (readonly [number, number])[], closed = false): string {
  if (points.length === 0) return "";
  let [lastX, lastY] = ["", ""];
  let path = "";
  points.forEach(([px, py], i) => {
    const [x, y] = [coordinate(px), coordinate(py)];
    // a slot's walls run along the axes: one number says where to
    if (i === 0) path += `M${x} ${y}`;
    else if (y === lastY) path += x === lastX ? "" : `H${x}`;
    else path += x === lastX ? `V${y}` : `L${x} ${y}`;
    [lastX, lastY] = [x, y];
  });
  return path + (closed ? "Z" : "");
}
