// A notebook without a page: evaluated once, its values as JSON, every doubt and every failure named.
import type { BackgroundPool } from "./background/pool.ts";
import { createStudy } from "./engine.ts";
import { type StudyValues, studyValues } from "./plain-values.ts";
import type { NotebookModule, Study } from "./study.ts";

export interface HeadlessOptions {
  /** texts of givens, as a command line hands them over */
  givens?: Readonly<Record<string, string>>;
  /** workers for background(); ended with the evaluation */
  background?: BackgroundPool;
  /** called once the study runs, for whoever reports progress */
  started?: (study: Study) => void;
  /** fail a cell that changes what it received from another */
  frozen?: boolean;
}

/** A given that does not exist or refuses its text. */
export class GivenRefused extends Error {
  override name = "GivenRefused";
  readonly given: string;
  constructor(given: string, message: string) {
    super(message);
    this.given = given;
  }
}

/**
 * Evaluates a whole notebook and ends. A failed cell is listed, not thrown.
 * @throws {GivenRefused} unknown name or refused text; nothing is evaluated
 */
export async function evaluateNotebook(notebook: NotebookModule, options: HeadlessOptions = {}): Promise<StudyValues> {
  const { background, frozen, started } = options;
  const study = createStudy(notebook, { ...(background ? { background } : {}), ...(frozen ? { frozen } : {}) });
  try {
    const answer = study.setAll(options.givens ?? {});
    if (!answer.ok) throw new GivenRefused(answer.name, answer.message);
    started?.(study);
    await study.settled();
    return studyValues(study);
  } finally {
    study.dispose();
  }
}
