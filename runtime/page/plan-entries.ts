// What a plan of the page is made of.

import type { MarginMark, Rationale } from "../shown.ts";
import type { CellView, GivenView } from "../study.ts";

export interface PlannedNote {
  cell: CellView;
  /** same beside the thing and beside the note; empty for a reading, which needs none */
  letter: string;
  mark: MarginMark;
  /** row of the table, or name of the given, that it stands beside */
  row?: string;
  markdown: string;
  rationale?: Rationale;
}

export interface ShownEntry {
  kind: "note" | "figure" | "table" | "caution";
  key: string;
  cell: CellView;
  /** the cells it is built from: itself and the plain values declared since the result before it */
  code: CellView[];
  notes: PlannedNote[];
}

export interface GivensEntry {
  kind: "givens";
  key: string;
  givens: GivenView[];
  /** the last group of givens carries the actions */
  last: boolean;
  notes: PlannedNote[];
}

/** A plain value that failed and that nothing shown depends on. */
export interface FailureEntry {
  kind: "failure";
  key: string;
  cell: CellView;
  notes: PlannedNote[];
}

export type Entry = ShownEntry | GivensEntry | FailureEntry;

export interface Section {
  key: string;
  id: string;
  /** undefined before the first heading */
  title?: string;
  /** the page gives the heading itself, no note does */
  ownHeading: boolean;
  entries: Entry[];
}

export interface Plan {
  head?: CellView;
  lead?: CellView;
  leadNotes: PlannedNote[];
  sections: Section[];
}
