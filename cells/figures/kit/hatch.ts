// Hatching of cut metal: lines at 45°, cut to the outline by arithmetic, so that no pattern needs an id.

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
      // every line runs at 45°: its start and how far it goes say all; tenths of a px are finer than a hatch is looked at
      const length = tenths(at[i + 1]! - at[i]!);
      if (length !== 0) path += `M${tenths(at[i]!)} ${tenths(sum - at[i]!)}l${length} ${-length}`;
    }
  }
  return path;
}

/** @throws {RangeError} not finite */
function tenths(value: number): number {
  if (!Number.isFinite(value)) throw new RangeError(`hatchPath: corners must be finite numbers of px; got ${value}`);
  return Math.round(value * 10) / 10 + 0;
}
