// A place for words where fewest curves run.

import type { Point } from "./panel.ts";

export interface Box {
  left: number;
  top: number;
  width: number;
  height: number;
}

/**
 * The first of the boxes that the fewest px of curve cross. Curves are polylines in px; a NaN breaks them.
 * Lengths are compared in whole px, so that rounding can't change the choice.
 */
export function quietPlace(boxes: readonly Box[], curves: readonly (readonly Point[])[]): Box {
  let best = boxes[0]!;
  let least = Infinity;
  for (const box of boxes) {
    let crossed = 0;
    for (const points of curves)
      for (let i = 1; i < points.length; i++) crossed += lengthInside(points[i - 1]!, points[i]!, box);
    if (Math.round(crossed) < least) {
      least = Math.round(crossed);
      best = box;
    }
  }
  return best;
}

/** Length of a segment inside a box (Liang & Barsky's clipping). */
function lengthInside([x0, y0]: Point, [x1, y1]: Point, { left, top, width, height }: Box): number {
  const [dx, dy] = [x1 - x0, y1 - y0];
  if (!Number.isFinite(dx) || !Number.isFinite(dy)) return 0;
  let [enter, leave] = [0, 1];
  for (const [step, room] of [
    [-dx, x0 - left],
    [dx, left + width - x0],
    [-dy, y0 - top],
    [dy, top + height - y0],
  ] as const) {
    if (step === 0) {
      if (room < 0) return 0;
    } else if (step < 0) enter = Math.max(enter, room / step);
    else leave = Math.min(leave, room / step);
  }
  return leave > enter ? (leave - enter) * Math.hypot(dx, dy) : 0;
}
