// A compiled notebook, running.
import type { BackgroundPool } from "./background/pool.ts";
import type { NotebookModule, Study } from "./study.ts";

export interface StudyOptions {
  /** texts of givens to begin with (an address, a command line); refused ones are kept as the given's refusal */
  givens?: Record<string, string>;
  /** workers for background(); without it heavy functions run on this thread */
  background?: BackgroundPool;
}

/** Starts a study; its cells are evaluated from the next frame on. */
export function createStudy(notebook: NotebookModule, options: StudyOptions = {}): Study {
  throw new Error(`createStudy: ${notebook.file}: not written yet (${Object.keys(options).length})`);
}
