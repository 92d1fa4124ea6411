// What a page can be told, and what its parts share.

import type { CellView, Study } from "../study.ts";
import type { Writing } from "./desk/writing.ts";

/** A quiet button among the actions of the page. */
export interface PageAction {
  label: string;
  /** may return a sentence to show beside the actions */
  act: () => unknown;
}

export interface PageOptions {
  /** name at the right of the first line */
  program?: string;
  /** last line of the page: when and where computed */
  imprint?: string;
  /** writes the givens' texts that differ into the file; gives "Keep these values" its place. May return a sentence. */
  keep?: (texts: Record<string, string>) => unknown;
  /** `createWriting` with a desk, where there is a file behind the page: values can be kept, rationales written, studies forked */
  write?: (document: Document, study: Study) => Writing;
  /** further actions below the givens, such as forking */
  actions?: PageAction[];
  /** opens a cell's source for editing in `host`, below its code; gives "edit" its place */
  edit?: (cell: CellView, host: HTMLElement) => void;
  /** the address carries the givens; false where the page has no address of its own. Default true. */
  address?: boolean;
}

/** What every part of a page needs. */
export interface PageContext {
  readonly document: Document;
  readonly study: Study;
  readonly options: PageOptions;
  /** what the page can write, where it has a desk */
  readonly writing?: Writing;
  /** true: a script is behind the page; false: paper, or the first paint of a file */
  readonly live: boolean;
  /** givens as text, not as controls */
  readonly still: boolean;
  /** px for a drawing in the report column */
  width(): number;
  /** enters a given, once a frame */
  enter(name: string, text: string): void;
  /** content painted before the script woke, by cell: stands in until the cell has a value */
  readonly painted: ReadonlyMap<string, Element>;
}

/** One thing in the report column that keeps itself up to date. */
export interface Block<Entry> {
  readonly element: HTMLElement;
  update(entry: Entry): void;
}
