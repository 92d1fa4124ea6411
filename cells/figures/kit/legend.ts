// A row of line samples with their words: no box, and it wraps.

import { ink, secondary, textSize } from "./palette.ts";
import { coordinate, type Pen, text } from "./svg.ts";
import { textWidth } from "./text-width.ts";

export interface LegendEntry {
  words: string;
  /** px; 0 for marks that the words explain */
  width: number;
  dash?: string;
  color?: string;
}

/** The row's baseline is at y; returns the elements and the baseline of the last row. `aside` stands at the right if it fits, else below. */
export function legendRow(
  pen: Pen,
  y: number,
  width: number,
  entries: readonly LegendEntry[],
  aside?: string,
): { elements: Element[]; bottom: number } {
  const size = textSize.drawing;
  const sample = 30;
  const elements: Element[] = [];
  let left = 0;
  let baseline = y;
  const next = (needed: number): void => {
    if (left === 0 || left + needed <= width) return;
    left = 0;
    baseline += 20;
  };
  for (const { words, width: stroke, dash, color = ink } of entries) {
    // an entry without a line explains marks in its words
    const indent = stroke > 0 ? sample + 7 : 0;
    const wide = indent + textWidth(words, size);
    next(wide);
    if (stroke > 0) {
      const d = `M${coordinate(left)} ${baseline - 4}h${sample}`;
      elements.push(pen("path", { d, stroke: color, "stroke-width": stroke, "stroke-dasharray": dash }));
    }
    elements.push(text(pen, left + indent, baseline, words, { size }));
    left += wide + 20;
  }
  if (aside) {
    next(textWidth(aside, size));
    const right = left > 0;
    elements.push(
      text(pen, right ? width : 0, baseline, aside, { size, fill: secondary, anchor: right ? "end" : "start" }),
    );
  }
  return { elements, bottom: baseline };
}
