// A notebook's source into cells.
import type { CompiledCell } from "./study.ts";

/** What is wrong in a notebook, and where. */
export interface Problem {
  kind:
    | "parse"
    | "duplicate"
    | "unknown-name"
    | "missing-import"
    | "cycle"
    | "use-before-definition"
    | "assignment"
    | "given"
    | "background"
    | "margin"
    | "statement";
  /** one sentence */
  message: string;
  file: string;
  /** 1-based */
  line: number;
  /** 1-based */
  column: number;
  /** the cell that has no value because of it; none if the whole file cannot be read */
  cell?: string;
}

/** A cell without its code: what is known before anything runs. */
export type CellInfo = Omit<CompiledCell, "define">;

export interface CompiledNotebook {
  /** TypeScript, every line of the source on its own line; exports `notebook: NotebookModule` */
  code: string;
  cells: CellInfo[];
  problems: Problem[];
}

/**
 * Compiles a notebook. A bad cell becomes a cell that fails with the problem's sentence; the rest stays alive. Only a file that
 * does not parse has no cells at all (one problem of kind "parse").
 *
 * @param source the TypeScript module
 * @param file   its name as messages print it: "notebooks/trade-study.ts"
 */
export function compileNotebook(source: string, file: string): CompiledNotebook {
  throw new Error(`compileNotebook: ${file} (${source.length} characters): not written yet`);
}
