// Facts beside a drawing: label over value, ruled.

import { hairline, ink, secondary } from "./palette.ts";
import { type Pen, text } from "./svg.ts";

const rowHeight = 47;

/** px, of so many facts */
export const factsHeight = (count: number): number => count * rowHeight + 2;

export function facts(
  pen: Pen,
  place: { left: number; top: number; width: number },
  entries: readonly (readonly [label: string, value: string])[],
): SVGElement {
  const { left, top, width } = place;
  const rule = (y: number, stroke: string) => pen("path", { d: `M${left} ${y}h${width}`, stroke });
  return pen(
    "g",
    {},
    rule(top + 0.5, ink),
    ...entries.flatMap(([label, value], i) => {
      const y = top + i * rowHeight;
      return [
        text(pen, left, y + 20, label, { size: 12.5, fill: secondary }),
        text(pen, left, y + 38, value, { size: 14.5 }),
        rule(y + rowHeight + 0.5, hairline),
      ];
    }),
  );
}
