// Why a cell has no value: where it began, and the way from there.
import type { CellFailure, CompiledCell } from "./study.ts";

/** A failed cell as an error: for the command line, a test, a log. */
export class CellError extends Error {
  override name = "CellError";
  readonly cell: string;
  readonly file: string;
  readonly line: number;
  /** names from the cell where it began to the one that asked */
  readonly path: readonly string[];

  constructor(failure: CellFailure) {
    super(failureSentence(failure), { cause: failure.cause });
    this.cell = failure.cell;
    this.file = failure.file;
    this.line = failure.line;
    this.path = failure.path;
  }
}

/** "dualMode (notebooks/trade-study.ts, line 41): step radius must be …; needed by trade → note". */
export function failureSentence({ cell, file, line, reason, path }: CellFailure): string {
  const needed = path.length > 1 ? `; needed by ${path.slice(1).join(" → ")}` : "";
  const at = cell === `line ${line}` ? `${file}, line ${line}` : `${cell} (${file}, line ${line})`;
  return `${at}: ${reason}${needed}`;
}

/** The failure of a cell whose own code threw `error`. */
export function failureOf(cell: CompiledCell, file: string, error: unknown): CellFailure {
  return {
    ...{ reason: reasonOf(error), cell: cell.name, file, path: [cell.name], cause: error },
    line: cell.problem === undefined ? (lineInStack(error, cell, file) ?? cell.line) : cell.line,
  };
}

/** The same failure, one cell further on. */
export const passedOn = (failure: CellFailure, name: string): CellFailure => ({
  ...failure,
  path: [...failure.path, name],
});

/** Whatever was thrown: one that can't even be looked at has a reason all the same. */
function reasonOf(error: unknown): string {
  try {
    return wordsOf(error);
  } catch {
    return "threw something that can't be read";
  }
}

function wordsOf(error: unknown): string {
  if (!(error instanceof Error)) {
    const message = (error as { message?: unknown } | null | undefined)?.message;
    return typeof message === "string" && message !== "" ? message : `threw ${String(error)}`;
  }
  const message = String(error.message);
  return message === "" ? String(error.name) : message.replace(/\s*\n\s*/g, " ");
}

function stackOf(error: unknown): unknown {
  try {
    return (error as { stack?: unknown } | null | undefined)?.stack;
  } catch {
    return undefined;
  }
}

/** The first line of this cell in the stack; there is one where the stack is mapped back to the notebook (Node with source maps). */
function lineInStack(error: unknown, { line, endLine }: CompiledCell, file: string): number | undefined {
  const stack = stackOf(error);
  if (typeof stack !== "string") return undefined;
  for (const [, path, at] of stack.matchAll(/([^\s()]+):(\d+):\d+/g)) {
    const found = Number(at);
    if (path?.replace(/\?.*$/, "").endsWith(file) && found >= line && found <= endLine) return found;
  }
  return undefined;
}
