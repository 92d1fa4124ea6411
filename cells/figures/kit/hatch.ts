// Hatching of cut metal: lines at 45°, cut to the outline by arithmetic, so that no pattern needs an id.

import { coordinate } from "./svg.ts";

/**
 * Path of parallel lines at 45° (rising to the right) inside a closed polygon (even-odd), `spacing` px apart across the
 * lines. The lines lie on one grid for all polygons of a drawing.
 */
export function hatchPath(polygon: readonly (readonly [x: number, y: number])[], spacing: number): string {
  // On a line rising to the right x + y is constant (y runs down); steps in x + y are spacing·√2.
  const step = spacing * Math.SQRT2;
  const crossings = new Map<number, number[]>();
  polygon.forEach(([x0, y0], i) => {
    const [x1, y1] = polygon[(i + 1) % polygon.length]!;
    const [s0, s1] = [(x0 + y0) / step, (x1 + y1) / step];
    // Half-open, so that a corner on a line counts once.
    const first = Math.ceil(Math.min(s0, s1));
    const last = Math.ceil(Math.max(s0, s1)) - 1;
    for (let line = first; line <= last; line++) {
      const at = x0 + ((line - s0) / (s1 - s0)) * (x1 - x0);
      const known = crossings.get(line);
      if (known) known.push(at);
      else crossings.set(line, [at]);
    }
  });
  let path = "";
  for (const [line, at] of [...crossings].sort(([a], [b]) => a - b)) {
    at.sort((a, b) => a - b);
    for (let i = 0; i + 1 < at.length; i += 2) {
      const sum = line * step;
      path += `M${coordinate(at[i]!)} ${coordinate(sum - at[i]!)}L${coordinate(at[i + 1]!)} ${coordinate(sum - at[i + 1]!)}`;
    }
  }
  return path;
}
