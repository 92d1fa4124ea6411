// The little that only a laid-out page can tell. Looks and reach change, never what is said.

/**
 * Marks the notes of rows that stand more than 2 px off their row, because the note before was long: their rule would point
 * at another row, so it keeps to the margin. And makes a drawing that is wider than its box reachable for the arrow keys.
 * Reads all places first, then writes.
 */
export function markMeasured(root: Element): void {
  const notes = [...root.querySelectorAll("td.notes > .beside")].map((note) => {
    const row = note.closest("tr");
    // The note's rule lies on the row's upper rule, one pixel above the row.
    const off = row ? note.getBoundingClientRect().top + 1 - row.getBoundingClientRect().top : 0;
    return { note, pushed: Math.abs(off) > 2 };
  });
  const boxes = [...root.querySelectorAll(".drawing")].map((box) => ({ box, wide: box.scrollWidth > box.clientWidth }));
  for (const { note, pushed } of notes) note.toggleAttribute("data-pushed", pushed);
  for (const { box, wide } of boxes) {
    if (wide) box.setAttribute("tabindex", "0");
    else box.removeAttribute("tabindex");
  }
}
