// From arrays of numbers to the points of a curve that stays inside its frame.

import type { Point } from "./panel.ts";

/**
 * Cuts a curve off below `floor`: where it falls through, it ends on the floor and begins again where it comes back up,
 * with a gap (NaN) between. Values that aren't finite make a gap too.
 */
export function aboveFloor(x: ArrayLike<number>, y: ArrayLike<number>, floor: number): Point[] {
  const points: Point[] = [];
  const crossing = (i: number): Point => {
    const [y0, y1] = [y[i - 1]!, y[i]!];
    // a zero field is −Infinity dB: the curve falls straight to the floor at that sample's neighbour
    const share = Number.isFinite(y0) && Number.isFinite(y1) ? (floor - y0) / (y1 - y0) : Number.isFinite(y0) ? 0 : 1;
    return [x[i - 1]! + share * (x[i]! - x[i - 1]!), floor];
  };
  for (let i = 0; i < x.length; i++) {
    const inside = y[i]! >= floor;
    const insideBefore = i > 0 && y[i - 1]! >= floor;
    if (inside && i > 0 && !insideBefore && !Number.isNaN(y[i - 1]!)) points.push(crossing(i));
    if (inside) points.push([x[i]!, y[i]!]);
    if (!inside && insideBefore) {
      if (!Number.isNaN(y[i]!)) points.push(crossing(i));
      points.push([x[i]!, Number.NaN]);
    }
  }
  return points;
}

/** Points of a series over x; null and what isn't finite make a gap. */
export function seriesPoints(x: readonly number[], y: readonly (number | null)[]): Point[] {
  return x.map((at, i) => {
    const value = y[i];
    return [at, typeof value === "number" && Number.isFinite(value) ? value : Number.NaN];
  });
}

/** The last point of a curve that has a value, or undefined. */
export function lastPoint(points: readonly Point[]): Point | undefined {
  return points.findLast(([, y]) => Number.isFinite(y));
}

/** About `count` of the points that have a value, first and last of them included, evenly chosen. */
export function chosenPoints(points: readonly Point[], count: number): Point[] {
  const known = points.filter(([, y]) => Number.isFinite(y));
  if (known.length <= count) return known;
  return Array.from({ length: count }, (_, i) => known[Math.round((i * (known.length - 1)) / (count - 1))]!);
}
