// A notebook's source into cells.
import { checkModule } from "./compile/check-cells.ts";
import { draftModule } from "./compile/draft.ts";
import { emitModule } from "./compile/emit.ts";
import type { Problem } from "./compile/parts.ts";
import { type ParsedModule, parseModule, TOO_DEEP } from "./compile/syntax.ts";
import type { CompiledCell } from "./study.ts";

export type { Problem };

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
  const parsed = parseModule(source);
  try {
    return compiled(source, file, parsed);
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    return compiled(source, file, { ...parsed, problems: [TOO_DEEP] });
  }
}

function compiled(source: string, file: string, parsed: ParsedModule): CompiledNotebook {
  const unreadable = parsed.problems.length > 0;
  const module = draftModule(source, unreadable ? { ...parsed, statements: [], redeclared: [] } : parsed);
  const checked = checkModule(file, module, parsed);
  const problems: Problem[] = unreadable
    ? parsed.problems.map(({ message, line, column }) => ({
        ...{ kind: "parse", message: `${file} can't be read: ${message}`, file, line, column },
      }))
    : checked.problems;
  const code = unreadable ? emitUnreadable(file, source) : emitModule(file, source, module, checked);
  const cells = checked.cells.map(
    ({ draft, part: _part, declareAt: _declareAt, ...info }): CellInfo => ({
      ...info,
      source: source.slice(draft.sourceStart, draft.sourceEnd),
    }),
  );
  return { code, cells, problems };
}

function emitUnreadable(file: string, source: string): string {
  const notebook = { file, source, cells: [], backgroundFunctions: {} };
  return `export const notebook = ${JSON.stringify(notebook)};\n`;
}
