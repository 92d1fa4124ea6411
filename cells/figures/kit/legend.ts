// A row of line samples with their words: no box, and it wraps.

import { ink, secondary, textSize } from "./palette.ts";
import { type Pen, text } from "./svg.ts";
import { textWidth } from "./text-width.ts";

export interface LegendEntry {
  words: string;
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
  for (const entry of entries) {
    const wide = sample + 7 + textWidth(entry.words, size);
    next(wide);
    const { color = ink, dash } = entry;
    if (entry.width > 0)
      elements.push(
        pen("path", {
          d: `M${left} ${baseline - 4}h${sample}`,
          stroke: color,
          "stroke-width": entry.width,
          "stroke-dasharray": dash,
        }),
      );
    else
      elements.push(
        pen("path", { d: `M${left + 11} ${baseline - 8}l8 8m0 -8l-8 8`, stroke: color, "stroke-width": 1.3 }),
      );
    elements.push(text(pen, left + sample + 7, baseline, entry.words, { size }));
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
