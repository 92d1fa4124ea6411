// Which thing a margin note stands beside, and the letter both carry.

import type { MarginNote, Rationale, Table } from "../shown.ts";
import type { CellView, Study } from "../study.ts";
import type { Entry, Plan, PlannedNote } from "./plan-entries.ts";
import { firstShownReader } from "./readers.ts";

// i, l and o read as figures.
const alphabet = "abcdefghjkmnpqrstuvwxyz";

/** a, b … h, j, k, m, n, p … z, then aa, ab … */
export function noteLetter(index: number): string {
  const letter = alphabet.charAt(index % alphabet.length);
  return index < alphabet.length ? letter : noteLetter(Math.floor(index / alphabet.length) - 1) + letter;
}

function rowOrder(entry: Entry, row: string | undefined): number {
  if (row === undefined) return -1;
  if (entry.kind === "givens") return entry.givens.findIndex((given) => given.name === row);
  const table = entry.kind === "table" ? (entry.cell.value as Table | undefined) : undefined;
  return table ? table.rows.findIndex((candidate) => candidate.key === row) : -1;
}

/** Puts each note with the entry that shows its cell; where no entry does, where it was written. Then letters, down the page. */
export function placeNotes(
  study: Study,
  plan: Plan,
  margins: readonly { cell: CellView; note: MarginNote; rationale?: Rationale; after?: Entry }[],
): void {
  const entries = plan.sections.flatMap((section) => section.entries);
  const shows = (name: string) => entries.find((entry) => "cell" in entry && entry.cell.name === name);
  const holding = (name: string) =>
    entries.find((entry) => entry.kind === "givens" && entry.givens.some((given) => given.name === name));

  for (const { cell, note, rationale, after } of margins) {
    const beside = cell.beside;
    const planned: PlannedNote = { cell, letter: "", mark: note.mark, markdown: note.markdown, rationale };
    if (beside !== undefined && (beside === plan.lead?.name || beside === plan.head?.name)) {
      plan.leadNotes.push(planned);
      continue;
    }
    const group = beside === undefined ? undefined : holding(beside);
    if (group) {
      planned.row = beside;
      group.notes.push(planned);
      continue;
    }
    const reader = beside === undefined ? undefined : firstShownReader(study.cells, beside)?.name;
    const target = (beside && shows(beside)) || (reader && shows(reader)) || after || entries[0];
    if (target) {
      if (rowOrder(target, note.row) >= 0) planned.row = note.row;
      target.notes.push(planned);
    } else plan.leadNotes.push(planned);
  }

  let index = 0;
  const letter = (notes: PlannedNote[]) => {
    for (const note of notes) if (note.mark !== "reading") note.letter = noteLetter(index++);
  };
  letter(plan.leadNotes);
  for (const entry of entries) {
    entry.notes.sort((a, b) => rowOrder(entry, a.row) - rowOrder(entry, b.row));
    letter(entry.notes);
  }
}
