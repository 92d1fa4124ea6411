// Finds the notebook that an argument names, and says clearly why not.

import { existsSync, readdirSync, realpathSync, statSync } from "node:fs";
import { basename, dirname, isAbsolute, join, relative, resolve, sep } from "node:path";
import { Failure } from "./command/failure.ts";
import { didYouMean } from "./command/near-names.ts";
import { readerFolder } from "./command/surroundings.ts";

export interface NotebookPlace {
  /** absolute, links followed: imports are looked up from where the file really is */
  path: string;
  /** as reports and records write it: below the project with slashes, "notebooks/trade-study.ts"; elsewhere the bare file name */
  label: string;
}

/** A file over this is no notebook that a person wrote. */
const SIZE_LIMIT = 4 * 1024 * 1024;

/** How reports and exports name a file: never by the folders of this machine. */
export function fileLabel(path: string, projectRoot: string): string {
  const within = relative(projectRoot, path);
  return within.startsWith("..") || isAbsolute(within) ? basename(path) : within.split(sep).join("/");
}

/** The notebooks that come with the project, by label. */
export function notebooksAtHand(projectRoot: string): string[] {
  try {
    return readdirSync(join(projectRoot, "notebooks"))
      .filter((name) => name.endsWith(".ts") && !name.endsWith(".d.ts"))
      .sort()
      .map((name) => `notebooks/${name}`);
  } catch {
    return [];
  }
}

/**
 * The notebook named by `argument`: a path from where the command was given, or from the project.
 * @throws {Failure} no such file, a folder, not a .ts file, too large
 */
export function findNotebook(argument: string, projectRoot: string): NotebookPlace {
  const from = [readerFolder(projectRoot), process.cwd(), projectRoot];
  const path = from.map((folder) => resolve(folder, argument)).find((candidate) => existsSync(candidate));
  if (path === undefined) {
    const names = [...new Set([...notebooksAtHand(projectRoot), ...beside(resolve(from[0]!, argument), argument)])];
    throw new Failure(`${argument}: there is no such file.${didYouMean(argument, names)}`);
  }
  const facts = statSync(path);
  if (facts.isDirectory()) throw new Failure(`${argument} is a folder; name a notebook in it.`);
  if (/\.html?$/i.test(path)) throw new Failure(`${argument} is an HTML file; a notebook is a .ts file.`);
  if (!/\.(ts|mts)$/i.test(path)) throw new Failure(`${argument} isn't a notebook; a notebook is a .ts file.`);
  if (facts.size > SIZE_LIMIT) {
    throw new Failure(`${argument} has ${facts.size} bytes; a notebook may have at most ${SIZE_LIMIT}.`);
  }
  const real = realpathSync(path);
  return { path: real, label: fileLabel(real, projectRoot) };
}

/** Other .ts files in the folder that was meant, written as the reader wrote the path. */
function beside(path: string, argument: string): string[] {
  try {
    const folder = argument.slice(0, argument.length - basename(argument).length);
    return readdirSync(dirname(path))
      .filter((name) => name.endsWith(".ts"))
      .map((name) => folder + name);
  } catch {
    return [];
  }
}
