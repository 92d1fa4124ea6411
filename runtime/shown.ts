// The values that a page can show. Plain tagged data (no classes), so that a page, an export and `values` read them alike,
// and a study bundled separately from the page still understands them.

/** The marks a margin note can carry; each has its own rule and word in the margin. */
export type MarginMark = "reading" | "warning" | "modelsDiffer" | "changed" | "rationale";

/** The memorandum's head: the kind of document, its title and up to six facts. */
export interface Head {
  shows: "head";
  document: string;
  title: string;
  facts: [label: string, value: string][];
}

/** Prose in Markdown. A note that opens with `## ` begins a section. */
export interface Note {
  shows: "note";
  markdown: string;
}

/** The opening paragraph: written after the cells it quotes, shown first. */
export interface Lead {
  shows: "lead";
  markdown: string;
}

/** A note in the margin; the compiler records which cell (and which row of it) it stands beside. */
export interface MarginNote {
  shows: "margin";
  mark: MarginMark;
  /** key of a row of the table it stands beside */
  row?: string;
  /** an empty text shows nothing: a warning whose cause is away */
  markdown: string;
}

/** The only framed text on the page. */
export interface Caution {
  shows: "caution";
  title: string;
  markdown: string;
}

/** Where a figure is drawn: the browser's document or a headless one. */
export interface DrawingContext {
  document: Document;
  /** px available, 760 in the report column, 354 on a phone */
  width: number;
}

/** A file of its own kind that a drawing can be saved as. */
export interface DrawingFile {
  /** on its button: "DXF" */
  label: string;
  /** of its name, without the dot */
  extension: string;
  /** media type */
  type: string;
  /** made when it is asked for */
  text: () => string;
}

/** A figure as physics hands it over: a text alternative, a way to draw it, the numbers in it. */
export interface Drawing {
  /** what a reader who can't see it should know, with numbers */
  alt: string;
  draw: (context: DrawingContext) => Element;
  /** the numbers drawn, for CSV: one array of rows, first row the column names with units */
  data?: (string | number)[][];
  /** further files, beside the SVG and the CSV that the page makes itself */
  files?: DrawingFile[];
}

export interface Figure {
  shows: "figure";
  /** heading above it; none if the section's heading says it */
  title?: string;
  caption: string;
  /** words for the foot line: by which model, over how many frequencies */
  basis?: string;
  drawing: Drawing;
}

/** One cell of a table: the value with as many digits as it earns, then a word on it. */
export interface TableCell {
  text: string;
  /** second line, quiet: "passes", "misses by 1.4" */
  word?: string;
  /** how the word is meant; words before colour */
  verdict?: "passes" | "barely" | "misses";
}

export interface TableRow {
  /** for a margin note to stand beside it */
  key?: string;
  label: string;
  /** second line under the label: unit or limit */
  under?: string;
  /** one a column, or one sentence across all columns */
  cells: TableCell[] | string;
  /** the verdict row, under an ink rule */
  total?: boolean;
}

export interface Table {
  shows: "table";
  title?: string;
  /** kind colours the heading: smooth, dualMode, corrugated, chokeRing, measured */
  columns: { label: string; kind?: string }[];
  rows: TableRow[];
  caption?: string;
  basis?: string;
  /** the numbers behind it, for CSV: first row the column names with units */
  data?: (string | number)[][];
}

/** How a number that was rested on is written. */
export interface RestedUnit {
  /** as a reader sees it: "dBi", "mm", "m²"; empty for a plain ratio */
  unit: string;
  /** SI = number of `unit`s × perUnit + offset; 1 and 0 for a level in dB */
  perUnit: number;
  offset: number;
  /** decimal places of the shown value */
  digits: number;
}

/** A number that a decision rested on. Values in SI. */
export interface RestedOn extends RestedUnit {
  label: string;
  /** as agreed that day */
  agreed: number;
  /** null: there is no such number any more, the feed it belongs to can't be realized */
  now: number | null;
  /** may move by this much either way, > 0 */
  tolerance: number;
  moved: boolean;
}

/** A former agreement, kept readable. Oldest first in `Rationale.history`. */
export interface FormerAgreement {
  author: string;
  /** ISO 8601, the day */
  date: string;
  /** by the label they had then, in SI */
  agreed: ({ label: string; value: number } & RestedUnit)[];
}

/** A decision with what it rested on. Stands in the margin beside its figure or table (`CompiledCell.beside`). */
export interface Rationale {
  shows: "rationale";
  /** what was decided, one sentence */
  decision: string;
  /** the candidate chosen, in the study's own word */
  chosen: string;
  /** reasons, Markdown, with live numbers */
  markdown: string;
  author: string;
  /** ISO 8601, the day of the agreement */
  date: string;
  /** the file it was forked from, when nobody has confirmed it here yet */
  inherited?: string;
  numbers: RestedOn[];
  history: FormerAgreement[];
}

export type Shown = Head | Note | Lead | MarginNote | Caution | Figure | Table | Rationale;

/** True for a value that the page shows; anything else is a plain value of the study. */
export function isShown(value: unknown): value is Shown {
  return typeof value === "object" && value !== null && typeof (value as { shows?: unknown }).shows === "string";
}
