// The notebooks as they stand, compiled for the engine.

import { readFileSync } from "node:fs";
import { join } from "node:path";
import { compileNotebook } from "../../runtime/compile.ts";
import type { NotebookModule } from "../../runtime/study.ts";
import { projectRoot } from "../build/run-command.ts";
import { bundled, importText } from "../runtime/load-notebook.ts";

/** @param name of the file in notebooks/, without its ending */
export async function notebook(name: string): Promise<NotebookModule> {
  const file = `notebooks/${name}.ts`;
  const { code, problems } = compileNotebook(readFileSync(join(projectRoot, file), "utf8"), file);
  if (problems.length > 0) throw new Error(problems.map(({ message }) => message).join("; "));
  return (await importText(await bundled(code, file))).notebook;
}
