// Where a command was given, and what version it is.

import { readFile } from "node:fs/promises";
import { join, relative } from "node:path";
import type { CommandContext } from "./verb.ts";

/** The folder the reader was in: npm runs a script in the project's folder and tells where it was called. */
export function readerFolder(projectRoot: string): string {
  const { INIT_CWD } = process.env;
  return INIT_CWD && relative(projectRoot, process.cwd()) === "" ? INIT_CWD : process.cwd();
}

/** The version in package.json. */
export async function projectVersion({ projectRoot }: CommandContext): Promise<string> {
  return JSON.parse(await readFile(join(projectRoot, "package.json"), "utf8")).version;
}
