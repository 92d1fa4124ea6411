// A fork as a file: the notebook's new source, the files beside it that it imports, never over anything that is there.

import { link, lstat, mkdir, open, readFile, realpath, rm, stat, writeFile } from "node:fs/promises";
import { basename, dirname, isAbsolute, join, posix, relative, resolve, sep } from "node:path";
import { RewriteRefused } from "../runtime/source/edit.ts";
import { fileNameFor, forkSource } from "../runtime/source/fork-source.ts";
import { Failure, systemWords } from "./command/failure.ts";

export interface ForkFrom {
  /** as the fork's first line names it */
  label: string;
  source: string;
  /** folder from which the source's imports lead; absolute */
  folder: string;
  /** files of its own that it imports, by their path from its folder; the fork needs them where it goes */
  beside: readonly { path: string; text: string }[];
}

export interface ForkTo {
  /** the study's name, which becomes its title and its file's name */
  name: string;
  /** an existing folder, absolute */
  folder: string;
  texts: Readonly<Record<string, string>>;
  today: string;
}

const withSlashes = (path: string): string => path.split(sep).join("/");

/** Today, as files write it. */
export const today = (): string => new Date().toISOString().slice(0, 10);

/**
 * Writes the fork.
 * @returns its path
 * @throws {Failure} a name without letters, a file that is there already, a given that isn't there, a folder that can't be written
 */
export async function writeFork(from: ForkFrom, to: ForkTo): Promise<string> {
  const stem = fileNameFor(to.name);
  if (stem === "") throw new Failure(`a fork's name needs letters or digits; got "${to.name}".`);
  const folder = await realpath(to.folder).catch(() => to.folder);
  const path = join(folder, `${stem}.ts`);
  const moved = folder === from.folder ? undefined : (specifier: string) => movedSpecifier(specifier, from, folder);
  let text: string;
  try {
    text = forkSource(from.source, basename(path), {
      name: to.name,
      from: from.label,
      today: to.today,
      texts: to.texts,
      moved,
    });
  } catch (error) {
    if (error instanceof RewriteRefused) throw new Failure(`${from.label} can't be forked: ${error.message}.`);
    throw error;
  }
  const written: string[] = [];
  try {
    if (folder !== from.folder)
      for (const file of from.beside) written.push(...(await writeBeside(join(folder, ...file.path.split("/")), file)));
    await writeNew(path, text);
  } catch (error) {
    await Promise.all(written.map((file) => rm(file, { force: true })));
    throw error;
  }
  return path;
}

/** A relative import seen from another folder. Files that go along keep their place beside the notebook. */
function movedSpecifier(specifier: string, from: ForkFrom, folder: string): string {
  const target = resolve(from.folder, specifier);
  const own = withSlashes(relative(from.folder, target));
  if (from.beside.some(({ path }) => path === own)) return specifier;
  const path = withSlashes(relative(folder, target));
  return isAbsolute(path) || path.startsWith(".") ? path : `./${path}`;
}

/** Whole or not at all, and only where nothing is: a link to a finished file fails when the name is taken. */
async function writeNew(path: string, text: string): Promise<void> {
  const fresh = join(dirname(path), `.${basename(path)}.${process.pid}.new`);
  try {
    const file = await open(fresh, "wx");
    try {
      await file.writeFile(text, "utf8");
      await file.sync();
    } finally {
      await file.close();
    }
    await link(fresh, path);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "EEXIST")
      throw new Failure(`${basename(path)} is there already; a fork never overwrites a file, so choose another name.`);
    throw new Failure(`can't write ${basename(path)}: ${systemWords(error)}.`);
  } finally {
    await rm(fresh, { force: true });
  }
}

/** A file that the notebook imports; the same one may be there already. */
async function writeBeside(path: string, { path: shownAs, text }: { path: string; text: string }): Promise<string[]> {
  if (posix.normalize(shownAs).startsWith("..")) return [];
  let above = dirname(path);
  while (!(await lstat(above).catch(() => undefined))) above = dirname(above);
  if ((await realpath(above).catch(() => undefined)) !== above)
    throw new Failure(`${shownAs}, which the study imports, would be written through a link; choose another folder.`);
  const there = await readFile(path, "utf8").catch(() => undefined);
  if (there === text) return [];
  if (there !== undefined || (await stat(path).catch(() => undefined)))
    throw new Failure(
      `${shownAs}, which the study imports, is there already with other contents; choose another folder.`,
    );
  await mkdir(dirname(path), { recursive: true });
  await writeFile(path, text, { flag: "wx" }).catch((error) => {
    throw new Failure(`can't write ${shownAs}: ${systemWords(error)}.`);
  });
  return [path];
}
