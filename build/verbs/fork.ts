// hornbook fork: a study of one's own from a notebook or from an exported file.

import { readFile, realpath, rm, stat } from "node:fs/promises";
import { basename, dirname, join, posix, resolve } from "node:path";
import { BundleFailure, ownFiles } from "../bundle.ts";
import { EXIT, Failure, systemWords } from "../command/failure.ts";
import { startProgress } from "../command/progress.ts";
import { readerFolder } from "../command/surroundings.ts";
import type { Verb } from "../command/verb.ts";
import { readRecord } from "../export-record.ts";
import { type ForkFrom, today, writeFork } from "../fork.ts";
import { evaluateHeadless } from "../headless-study.ts";
import { fileLabel, findNotebook } from "../notebook-place.ts";
import { readSets, SET_HELP } from "../set-givens.ts";
import { tellFailures } from "./failed-cells.ts";

/** An export over this was not made by Hornbook. */
const EXPORT_LIMIT = 64 * 1024 * 1024;

export const verb: Verb = {
  help: `hornbook fork <notebook|export.html> --name NAME [--set NAME=VALUE]… [--to FOLDER]

Writes a study of your own from another: a new notebook with the new givens in it, a first line that says what it was forked from,
and every rationale marked as inherited, not yet confirmed. An exported file gives back its notebook exactly, with the givens it
was exported with. Everything is dimensioned anew for the new givens. No file is ever overwritten.

A notebook is a program, and a fork is evaluated here once, with your rights: fork only files of people whose programs you would run.
An exported file that is only opened in a browser can't reach your files.

  --name NAME        the study's name: its title, and its file's name
${SET_HELP}
  --to FOLDER        a folder that is there; otherwise the notebook's own, for an exported file notebooks/

Exit code: 0 written, 1 written but a cell has no value, 2 the arguments can't be used and nothing was written.

  hornbook fork notebooks/trade-study.ts --name "Gorse Lane, 1.8 m" --set dishDiameter="1.8 m" --set fOverD=0.5
  hornbook fork from-a-colleague.html --name "Our own dish"
`,
  options: {
    name: { type: "string" },
    set: { type: "string", multiple: true },
    to: { type: "string" },
  },
  positionals: [{ name: "notebook|export.html" }],
  async run(args, { projectRoot }) {
    const name = args.text("name")?.trim();
    if (!name) throw new Failure('fork needs a name for the new study: --name "…".');
    const texts = await readSets(args.texts("set"), projectRoot);
    const given = args.positionals[0]!;
    const exported = /\.html?$/i.test(given);
    const { from, inherited } = exported
      ? await fromExport(given, projectRoot)
      : await fromNotebook(given, projectRoot);
    const folder = await targetFolder(
      args.text("to"),
      exported ? join(projectRoot, "notebooks") : from.folder,
      projectRoot,
    );
    const path = await writeFork(from, { name, folder, texts: { ...inherited, ...texts }, today: today() });
    return tried(path, projectRoot, Object.keys(texts));
  },
};

async function fromNotebook(
  given: string,
  projectRoot: string,
): Promise<{ from: ForkFrom; inherited: Record<string, string> }> {
  const place = findNotebook(given, projectRoot);
  const source = await readFile(place.path, "utf8");
  const home = dirname(place.path);
  const inputs = await importedFiles(place.path, projectRoot);
  const beside = await Promise.all(
    inputs.map(async (file) => ({ path: posixPath(home, file), text: await readFile(file, "utf8") })),
  );
  return { from: { label: place.label, source, folder: home, beside }, inherited: {} };
}

const posixPath = (home: string, file: string): string => file.slice(home.length + 1).replaceAll("\\", "/");

/** Files of the reader's own that a notebook imports and that stand in its folder. */
async function importedFiles(path: string, projectRoot: string): Promise<string[]> {
  const { bundleOnce } = await import("../bundle.ts");
  const { NODE_ENTRY } = await import("../entries.ts");
  const place = { path, label: fileLabel(path, projectRoot) };
  try {
    const bundle = await bundleOnce({ projectRoot, entry: NODE_ENTRY, notebook: place, platform: "node" });
    const [, ...others] = ownFiles(bundle.inputs, place, projectRoot);
    return others.filter((file) => file.startsWith(`${dirname(path)}/`));
  } catch (error) {
    // a notebook that can't be bundled can still be forked and mended in the fork
    if (error instanceof BundleFailure) return [];
    throw error;
  }
}

async function fromExport(
  given: string,
  projectRoot: string,
): Promise<{ from: ForkFrom; inherited: Record<string, string> }> {
  const candidates = [readerFolder(projectRoot), process.cwd()].map((folder) => resolve(folder, given));
  let html: string | undefined;
  let failure: unknown;
  for (const path of candidates) {
    try {
      const { size } = await stat(path);
      if (size > EXPORT_LIMIT) throw new Failure(`${given} has ${size} bytes; no export is that large.`);
      html ??= await readFile(path, "utf8");
    } catch (error) {
      if (error instanceof Failure) throw error;
      failure ??= error;
    }
  }
  if (html === undefined) throw new Failure(`can't read ${given}: ${systemWords(failure)}.`);
  const record = (() => {
    try {
      return readRecord(html);
    } catch (error) {
      throw new Failure(`${given} can't be forked: ${(error as Error).message}.`);
    }
  })();
  const [notebook, ...beside] = record.files;
  if (!isSafePath(record.notebook))
    throw new Failure(`${given} can't be forked: it doesn't say where its notebook stood.`);
  if (!beside.every(({ path }) => isSafePath(path)))
    throw new Failure(`${given} can't be forked: it carries a file that no notebook beside it would import.`);
  // imports lead from where the notebook stood: its label begins at the project
  const folder = join(projectRoot, posix.dirname(record.notebook));
  const from = { label: basename(given), source: notebook!.text, folder, beside };
  return { from, inherited: record.givens };
}

/**
 * A path that an export may carry: down from its notebook's folder, no hidden or special name on any system, and a kind of file
 * that notebooks import. Whoever made the file wrote it.
 */
function isSafePath(path: string): boolean {
  const parts = path.split("/");
  return (
    // biome-ignore lint/suspicious/noControlCharactersInRegex: exactly these must not be in a file's name
    parts.every((part) => /^[^.\\:\u0000-\u001f][^\\:\u0000-\u001f]*$/.test(part) && part !== "node_modules") &&
    /\.([cm]?[jt]s|[jt]sx|json|css|txt)$/i.test(path) &&
    !/^(package|package-lock|tsconfig)\.json$/i.test(parts.at(-1)!)
  );
}

async function targetFolder(named: string | undefined, usual: string, projectRoot: string): Promise<string> {
  if (named === undefined) return usual;
  const folder = resolve(readerFolder(projectRoot), named);
  const facts = await stat(folder).catch(() => undefined);
  if (!facts?.isDirectory()) throw new Failure(`--to ${named}: there is no such folder.`);
  return realpath(folder);
}

/** Evaluates the fork. One that refuses a given that was set is taken away again. */
async function tried(path: string, projectRoot: string, set: readonly string[]): Promise<number> {
  const place = { path, label: fileLabel(path, projectRoot) };
  const progress = startProgress();
  try {
    const { study, close } = await evaluateHeadless(place, projectRoot, {}, progress);
    try {
      progress.end();
      const refused = study.cells.find(
        ({ name, role, state }) => role === "given" && state === "failed" && set.includes(name),
      );
      if (refused) {
        await rm(path);
        const reason = refused.failure?.reason.replace(/^given: the default is refused: /, "") ?? "it can't be used";
        throw new Failure(`--set ${refused.name}: ${reason}${/[.!?]$/.test(reason) ? "" : "."}`);
      }
      const failures = tellFailures(study);
      process.stdout.write(`${place.label}\n`);
      process.stderr.write(`Open it with: npm run -s hornbook -- open ${shellWord(place.label)}\n`);
      return failures > 0 ? EXIT.found : EXIT.ok;
    } finally {
      await close();
    }
  } catch (error) {
    if (!(error instanceof BundleFailure)) throw error;
    process.stdout.write(`${place.label}\n`);
    for (const { file, line, text } of error.places) process.stderr.write(`hornbook: ${file}:${line}: ${text}\n`);
    return EXIT.found;
  } finally {
    progress.end();
  }
}

const shellWord = (text: string): string => (/^[\w./-]+$/.test(text) ? text : JSON.stringify(text));
