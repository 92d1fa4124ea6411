// Puts an exported file in its place: whole or not at all, and never over a file that isn't an export.

import { randomBytes } from "node:crypto";
import { open, readdir, rename, rm, stat } from "node:fs/promises";
import { basename, dirname, join } from "node:path";
import { Failure, systemWords } from "./command/failure.ts";
import { looksExported } from "./export-record.ts";

/**
 * Checks, before anything is computed, that the file may be written.
 * @throws {Failure} the folder is away, the path is a folder, or the file there isn't an export and `force` isn't set
 */
export async function requireWritable(path: string, shownAs: string, force: boolean): Promise<void> {
  const folder = await stat(dirname(path)).catch(() => undefined);
  if (!folder?.isDirectory()) throw new Failure(`can't write ${shownAs}: there is no folder to hold it.`);
  const facts = await stat(path).catch(() => undefined);
  if (!facts) return;
  if (facts.isDirectory()) throw new Failure(`can't write ${shownAs}: it is a folder; name a file.`);
  if (force) return;
  if (!looksExported(await beginning(path, shownAs))) {
    throw new Failure(`${shownAs} is there already and isn't an exported study; --force overwrites it.`);
  }
}

async function beginning(path: string, shownAs: string): Promise<string> {
  try {
    const file = await open(path);
    try {
      const { buffer, bytesRead } = await file.read(Buffer.alloc(4096), 0, 4096, 0);
      return buffer.toString("utf8", 0, bytesRead);
    } finally {
      await file.close();
    }
  } catch (error) {
    throw new Failure(`can't read ${shownAs}, which is there already: ${systemWords(error)}.`);
  }
}

/**
 * Writes beside the file, then renames: at every moment the file is the former or the new one, whole. Keeps its permissions.
 * @param last called just before the new file takes its place; may throw to leave the former one there
 * @throws {Failure} the system refuses; what was there before is still there
 */
export async function writeWhole(
  path: string,
  shownAs: string,
  text: string,
  last: () => Promise<void> = async () => {},
): Promise<void> {
  const fresh = join(dirname(path), `.${basename(path)}.${randomBytes(6).toString("hex")}`);
  try {
    const mode = (await stat(path).catch(() => undefined))?.mode;
    const file = await open(fresh, "wx");
    try {
      if (mode !== undefined) await file.chmod(mode & 0o777);
      await file.writeFile(text, "utf8");
      await file.sync();
    } finally {
      await file.close();
    }
    await last();
    await rename(fresh, path);
  } catch (error) {
    await rm(fresh, { force: true });
    if (error instanceof Failure) throw error;
    throw new Failure(`can't write ${shownAs}: ${systemWords(error)}.`);
  }
}

/** A write takes moments; what is older was left by a program that was killed meanwhile. */
const LEFT_AFTER_MS = 60_000;

/** Removes what killed writes of a file left beside it. Never throws: it is only tidiness. */
export async function sweepLeftovers(path: string): Promise<void> {
  const start = `.${basename(path)}.`;
  const names = await readdir(dirname(path)).catch(() => []);
  for (const name of names.filter((one) => one.startsWith(start) && /^[0-9a-f]{12}$/.test(one.slice(start.length)))) {
    const left = join(dirname(path), name);
    const facts = await stat(left).catch(() => undefined);
    if (facts?.isFile() && Date.now() - facts.mtimeMs > LEFT_AFTER_MS) await rm(left, { force: true }).catch(() => {});
  }
}
