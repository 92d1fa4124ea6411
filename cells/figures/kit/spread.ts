// Labels at the ends of lines that lie close together.

/**
 * Moves positions apart so that neighbours are at least `gap` apart and all lie in [low, high], with the least sum of
 * squared moves among arrangements that keep the order (equal ones keep theirs in the list). Where they don't all fit,
 * the gap shrinks.
 * @returns new positions in the order given
 */
export function spread(wanted: readonly number[], gap: number, low: number, high: number): number[] {
  const count = wanted.length;
  if (count === 0) return [];
  const room = count > 1 ? Math.min(gap, (high - low) / (count - 1)) : gap;
  const order = wanted.map((_, i) => i).sort((a, b) => wanted[a]! - wanted[b]! || a - b);
  // With i·room taken off, "apart by room" becomes "never falling": pool adjacent violators, then the bounds by clamping.
  const blocks: { sum: number; size: number }[] = [];
  order.forEach((index, i) => {
    blocks.push({ sum: wanted[index]! - i * room, size: 1 });
    for (let last = blocks.length - 1; last > 0; last--) {
      const [before, after] = [blocks[last - 1]!, blocks[last]!];
      if (before.sum / before.size <= after.sum / after.size) break;
      blocks.splice(last - 1, 2, { sum: before.sum + after.sum, size: before.size + after.size });
    }
  });
  const placed = new Array<number>(count);
  let i = 0;
  for (const { sum, size } of blocks) {
    const start = Math.min(Math.max(sum / size, low), high - (count - 1) * room);
    for (let k = 0; k < size; k++, i++) placed[order[i]!] = start + i * room;
  }
  return placed;
}
