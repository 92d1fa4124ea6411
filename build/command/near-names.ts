// Names that someone may have meant.

/** Edits (insert, delete, replace, swap of neighbours) that turn `a` into `b`, letter case aside. */
function editDistance(a: string, b: string): number {
  const from = a.toLowerCase();
  const to = b.toLowerCase();
  const rows: number[][] = [Array.from({ length: to.length + 1 }, (_, j) => j)];
  for (let i = 1; i <= from.length; i++) {
    const row = [i];
    for (let j = 1; j <= to.length; j++) {
      const replace = rows[i - 1]![j - 1]! + (from[i - 1] === to[j - 1] ? 0 : 1);
      let least = Math.min(replace, rows[i - 1]![j]! + 1, row[j - 1]! + 1);
      if (i > 1 && j > 1 && from[i - 1] === to[j - 2] && from[i - 2] === to[j - 1]) {
        least = Math.min(least, rows[i - 2]![j - 2]! + 1);
      }
      row.push(least);
    }
    rows.push(row);
  }
  return rows[from.length]![to.length]!;
}

/** Up to three of `names` that resemble `name`, the nearest first. */
export function nearNames(name: string, names: readonly string[]): string[] {
  const reach = Math.max(1, Math.floor(name.length / 3));
  const lower = name.toLowerCase();
  return names
    .map((candidate) => {
      const other = candidate.toLowerCase();
      const within = lower.length > 2 && (other.includes(lower) || (other.length > 2 && lower.includes(other)));
      return { candidate, distance: within ? 1 : editDistance(name, candidate) };
    })
    .filter(({ distance }) => distance <= reach)
    .sort((a, b) => a.distance - b.distance)
    .slice(0, 3)
    .map(({ candidate }) => candidate);
}

/** A sentence's end: ` Did you mean "a" or "b"?`, or the whole list when it is short, or nothing. */
export function didYouMean(name: string, names: readonly string[]): string {
  const near = nearNames(name, names);
  if (near.length > 0) return ` Did you mean ${near.map((n) => `"${n}"`).join(" or ")}?`;
  if (names.length > 0 && names.length <= 24) return ` There is: ${names.join(", ")}.`;
  return "";
}
