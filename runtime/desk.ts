// What a page may ask of the file that its notebook stands in. The local server answers it (server/desk-client.ts in the page,
// build/desk.ts behind it); an exported file has no desk, so whatever needs one isn't offered there.

/** Every write says which version it was made against, so that a file changed meanwhile is never overwritten. */
export interface DeskRequest {
  /** the source that the page shows (`study.source`): the desk refuses when the file on disk is another */
  base: string;
}

/** A new rationale or the new text of one. Numbers are cells' expressions: `trade.rows[2].gainDbi`. */
export interface RationaleDraft {
  decision: string;
  chosen: string;
  /** Markdown; `${expression}` is live */
  reasons: string;
  author: string;
  numbers: { label: string; expression: string; unit: string; tolerance: string }[];
}

export type DeskAnswer =
  | {
      ok: true;
      /** what was done, one sentence, for the page to show */
      sentence: string;
      /** fork: the new file beside the project, and where it can be opened */
      file?: string;
      address?: string;
    }
  | {
      ok: false;
      /** why not, one sentence */
      sentence: string;
      /** the file changed on disk meanwhile: where the page's own version was put, so that nothing is lost */
      kept?: string;
      /** an error in the source: its line in the file */
      line?: number;
    };

export interface Desk {
  /** Writes the texts of givens into their declarations. */
  keepGivens(request: DeskRequest & { texts: Record<string, string> }): Promise<DeskAnswer>;
  /** Adds a note after a cell. */
  addNote(request: DeskRequest & { after: string; markdown: string }): Promise<DeskAnswer>;
  /** Adds a rationale beside a cell; the numbers as they are now are agreed today. */
  addRationale(request: DeskRequest & { beside: string; draft: RationaleDraft; now: number[] }): Promise<DeskAnswer>;
  /** New words or numbers. A number already there keeps what was agreed; a new one is agreed as it is `now`, in the draft's order. */
  editRationale(request: DeskRequest & { cell: string; draft: RationaleDraft; now: number[] }): Promise<DeskAnswer>;
  /** Renews the agreement: the former one goes into the history; an inherited rationale is confirmed. `now` in SI, by label. */
  agreeAgain(request: DeskRequest & { cell: string; author: string; now: Record<string, number> }): Promise<DeskAnswer>;
  /** Replaces the source of one cell (with the comment that leads it). Refused when the result doesn't parse. */
  replaceCell(request: DeskRequest & { cell: string; source: string }): Promise<DeskAnswer>;
  /** Takes back the last write made through this desk, if the file still is what that write left. */
  undo(request: DeskRequest): Promise<DeskAnswer>;
  /** A new notebook beside this one; never overwrites. */
  fork(request: { name: string; folder?: string; texts: Record<string, string> }): Promise<DeskAnswer>;
}
