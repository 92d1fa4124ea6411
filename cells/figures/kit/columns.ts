// Small multiples: how many stand beside each other.

export interface Columns {
  count: number;
  /** px, of one column */
  width: number;
  /** px, left edge of column i */
  left: (i: number) => number;
}

/** As many equal columns as fit with at least `least` px each, but no more than make even rows: four are two and two. */
export function columns(items: number, width: number, least: number, gap: number): Columns {
  const most = Math.max(1, Math.floor((width + gap) / (least + gap)));
  const rows = Math.max(1, Math.ceil(items / most));
  const count = Math.max(1, Math.ceil(items / rows));
  const each = (width - gap * (count - 1)) / count;
  return { count, width: each, left: (i) => (i % count) * (each + gap) };
}
