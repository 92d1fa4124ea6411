// The words on a limit line, where they cover no curve if that can be.

import { paper, textSize, warning } from "./palette.ts";
import type { Frame, Panel, Point } from "./panel.ts";
import { quietPlace } from "./quiet-place.ts";
import { type Pen, text } from "./svg.ts";
import { textWidth } from "./text-width.ts";

/**
 * @param curves in the units of the axes
 * @param uprights x of uprights, in the units of the axis
 */
export function limitWords(
  pen: Pen,
  words: string,
  at: number,
  inside: {
    frame: Frame;
    drawn: Panel;
    curves: readonly (readonly Point[])[];
    uprights?: readonly number[];
    fill?: string;
  },
): SVGElement {
  const { frame, drawn, curves, uprights = [], fill = warning } = inside;
  const size = textSize.small;
  const width = textWidth(words, size);
  const height = size + 3;
  const y = drawn.yAt(at);
  const [first, last] = [frame.left + 4, frame.left + frame.width - width - 4];
  const lefts = [0, 0.25, 0.5, 0.75, 1].map((share) => last + share * (first - last));
  const fits = (top: number): boolean => top >= frame.top - 4 && top + height <= frame.top + frame.height;
  const tops = [y - height - 3, y + 3].filter(fits);
  const boxes = tops.flatMap((top) => lefts.map((left) => ({ left, top, width, height })));
  const inPx = curves.map((points) => points.map(([px, py]): Point => [drawn.xAt(px), drawn.yAt(py)]));
  const lines = uprights.map((x): Point[] => [
    [drawn.xAt(x), frame.top],
    [drawn.xAt(x), frame.top + frame.height],
  ]);
  const place = quietPlace(boxes.length > 0 ? boxes : [{ left: last, top: y - height - 3, width, height }], [
    ...inPx,
    ...lines,
  ]);
  return text(pen, place.left, place.top + size, words, { size, fill, halo: paper });
}
