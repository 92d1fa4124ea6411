// The step between esbuild and the notebook compiler: the notebook goes through the compiler, its imports are bundled as they are.

import { readFile, realpath } from "node:fs/promises";
import { dirname } from "node:path";
import type { Plugin } from "esbuild";
import { compileNotebook, type Problem } from "../runtime/compile.ts";
import type { NotebookPlace } from "./notebook-place.ts";

/** The name under which an entry imports the notebook. */
export const NOTEBOOK_IMPORT = "hornbook:notebook";

/** What the compiler said of the notebook in the build that ran last. */
export interface CompileReport {
  problems: Problem[];
  source: string;
}

/**
 * Resolves `hornbook:notebook` to the compiled notebook. A file that doesn't parse stops the build with its problems; any other
 * problem is a cell that fails, and stands in the report.
 */
export function notebookPlugin(place: NotebookPlace, report: (report: CompileReport) => void): Plugin {
  return {
    name: "notebook",
    setup(build) {
      build.onResolve({ filter: new RegExp(`^${NOTEBOOK_IMPORT}$`) }, async () => ({
        path: await realpath(place.path),
        namespace: "notebook",
      }));
      build.onLoad({ filter: /.*/, namespace: "notebook" }, async ({ path }) => {
        const source = await readFile(path, "utf8");
        const { code, cells, problems } = compileNotebook(source, place.label);
        report({ problems, source });
        const unreadable = problems.filter(({ kind }) => kind === "parse");
        if (unreadable.length > 0 && cells.length === 0) {
          return {
            errors: unreadable.map(({ message, file, line, column }) => ({
              text: message,
              location: { file, line, column: Math.max(0, column - 1), namespace: "notebook" },
            })),
            watchFiles: [path],
          };
        }
        return { contents: code, loader: "ts", resolveDir: dirname(path), watchFiles: [path] };
      });
    },
  };
}
