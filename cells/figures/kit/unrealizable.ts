// The place of a candidate that can't be built: it stays, with its reason in words.

import { secondary, textSize } from "./palette.ts";
import { type Pen, text, textBlock } from "./svg.ts";
import { wrapText } from "./text-width.ts";

const leading = 17;

/** Words under the candidate's title; y is the first baseline. */
export function unrealizable(
  pen: Pen,
  x: number,
  y: number,
  width: number,
  reason: string,
): { element: Element; bottom: number } {
  const lines = wrapText(reason, width, textSize.drawing);
  const element = pen(
    "g",
    {},
    text(pen, x, y, "not realisable", { bold: true, fill: secondary }),
    textBlock(pen, x, y + 20, lines, { leading, fill: secondary }),
  );
  return { element, bottom: y + 20 + (lines.length - 1) * leading };
}
