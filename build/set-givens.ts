// Values of givens as the command line writes them: --set name=value, --set name=@file.

import { readFile, stat } from "node:fs/promises";
import { resolve } from "node:path";
import type { Study } from "../runtime/study.ts";
import { Failure, systemWords } from "./command/failure.ts";
import { didYouMean } from "./command/near-names.ts";
import { readerFolder } from "./command/surroundings.ts";

const FILE_LIMIT = 32 * 1024 * 1024;

/** How each verb's help explains the option. */
export const SET_HELP = `  --set NAME=VALUE   a given's value with its unit: --set "dishDiameter=1.8 m"; may be repeated
  --set NAME=@FILE   a given's text from a file: --set profile=@horn.csv  (@@ begins a text with @)`;

/**
 * Reads the texts of `--set`.
 * @throws {Failure} no `=`, a name twice, a file that can't be read as UTF-8 text
 */
export async function readSets(sets: readonly string[], projectRoot: string): Promise<Record<string, string>> {
  const texts: Record<string, string> = {};
  for (const set of sets) {
    const at = set.indexOf("=");
    const name = set.slice(0, at).trim();
    if (at < 0 || name === "") throw new Failure(`--set must be name=value; got "${set}".`);
    if (Object.hasOwn(texts, name)) throw new Failure(`--set gives ${name} twice; give it once.`);
    const value = set.slice(at + 1);
    texts[name] = value.startsWith("@@")
      ? value.slice(1)
      : value.startsWith("@")
        ? await fileText(name, value.slice(1), projectRoot)
        : value;
  }
  return texts;
}

async function fileText(name: string, path: string, projectRoot: string): Promise<string> {
  const from = [readerFolder(projectRoot), process.cwd()];
  let failure: unknown;
  for (const folder of from) {
    try {
      const whole = resolve(folder, path);
      const { size } = await stat(whole);
      if (size > FILE_LIMIT)
        throw new Failure(`--set ${name}: ${path} has ${size} bytes; at most ${FILE_LIMIT} are read.`);
      const data = await readFile(whole);
      try {
        return new TextDecoder("utf-8", { fatal: true }).decode(data);
      } catch {
        throw new Failure(`--set ${name}: ${path} isn't UTF-8 text.`);
      }
    } catch (error) {
      if (error instanceof Failure) throw error;
      failure ??= error;
    }
  }
  throw new Failure(`--set ${name}: can't read ${path}: ${systemWords(failure)}.`);
}

/**
 * Enters the texts in a study before it is evaluated: all, or none.
 * @throws {Failure} a given that isn't there, a text that it refuses
 */
export function enterGivens(study: Study, texts: Record<string, string>): void {
  const names = study.givens.map(({ name }) => name);
  for (const name of Object.keys(texts)) {
    if (names.includes(name)) continue;
    const isCell = study.cells.some((cell) => cell.name === name);
    const why = isCell ? `${name} is a result, not a given` : `${study.file} has no given ${name}`;
    throw new Failure(`--set: ${why}.${didYouMean(name, names)}`);
  }
  const outcome = study.setAll(texts);
  if (!outcome.ok)
    throw new Failure(`--set ${outcome.name}: ${outcome.message}${/[.!?]$/.test(outcome.message) ? "" : "."}`);
}
