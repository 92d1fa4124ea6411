// Types of a notebook and of the files beside it, by TypeScript's own compiler under the project's options.

import { dirname, join } from "node:path";
import ts from "typescript";
import type { Located } from "./located.ts";
import { fileLabel } from "./notebook-place.ts";

/**
 * What plain `tsc` would say of these files, each place once, in order.
 * @param files absolute; what they import is read but not reported: it belongs to others
 */
export function typeProblems(files: readonly string[], projectRoot: string): Located[] {
  try {
    return diagnosed(files, projectRoot);
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    // the compiler descends with the source, until the stack ends
    return [{ file: fileLabel(files[0]!, projectRoot), line: 0, text: "is nested too deeply for TypeScript to check" }];
  }
}

function diagnosed(files: readonly string[], projectRoot: string): Located[] {
  const config = ts.readConfigFile(join(projectRoot, "tsconfig.json"), (path) => ts.sys.readFile(path));
  const { compilerOptions } = (config.config ?? {}) as { compilerOptions?: Record<string, unknown> };
  const { options } = ts.convertCompilerOptionsFromJson(
    // Cells are there to be shown: one that no other reads isn't a mistake. A notebook runs in a browser: no types of Node.
    { ...compilerOptions, types: [], noUnusedLocals: false, noUnusedParameters: false, noEmit: true },
    projectRoot,
  );
  const program = ts.createProgram({ rootNames: [...files], options });
  const checker = [
    (file: ts.SourceFile) => program.getSyntacticDiagnostics(file),
    (file: ts.SourceFile) => program.getSemanticDiagnostics(file),
  ];
  const found: Located[] = [];
  for (const path of files) {
    const file = program.getSourceFile(path);
    if (!file) {
      found.push({ file: fileLabel(path, projectRoot), line: 0, text: "can't be read" });
      continue;
    }
    for (const diagnostic of checker.flatMap((check) => [...check(file)])) found.push(placed(diagnostic, projectRoot));
  }
  return found.sort((a, b) => (a.file === b.file ? a.line - b.line : 0));
}

function placed({ file, start, messageText }: ts.Diagnostic, projectRoot: string): Located {
  // Each deeper line of a chain says why the one above it holds; the first and the last tell a reader most.
  const lines = ts.flattenDiagnosticMessageText(messageText, "\n").split("\n");
  const text = lines.length > 1 ? `${lines[0]} ${lines.at(-1)!.trim()}` : lines[0]!;
  if (!file || start === undefined) return { file: "tsconfig.json", line: 0, text };
  // Paths of this machine inside a message become labels.
  const tidy = text.replaceAll(`${projectRoot}/`, "").replaceAll(`${dirname(file.fileName)}/`, "");
  return {
    file: fileLabel(file.fileName, projectRoot),
    line: file.getLineAndCharacterOfPosition(start).line + 1,
    text: tidy,
  };
}
