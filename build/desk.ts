// The desk behind the page that `open` serves: changes to the notebook's file, one at a time, each against the version it was
// made for, whole or not at all.

import { lstat, readdir, readFile, realpath } from "node:fs/promises";
import { basename, dirname, isAbsolute, join, relative, resolve } from "node:path";
import type { DeskAnswer, RationaleDraft } from "../runtime/desk.ts";
import type { Action } from "../runtime/server/local-server.ts";
import { ActionRefused } from "../runtime/server/local-server.ts";
import { addNote, replaceCell } from "../runtime/source/cells.ts";
import { RewriteRefused } from "../runtime/source/edit.ts";
import { keepGivens } from "../runtime/source/keep-givens.ts";
import { addRationale, agreeAgain, editRationale } from "../runtime/source/rationale-source.ts";
import { Failure } from "./command/failure.ts";
import { today, writeFork } from "./fork.ts";
import type { NotebookPlace } from "./notebook-place.ts";
import { sweepLeftovers, writeWhole } from "./write-export.ts";

/** Most characters of any text that a page may send. */
const LONGEST = 1_000_000;

type Body = Record<string, unknown>;

/**
 * The writes of a page, by name: POST /do/<name>.
 * @param filesBeside files of its own that the notebook imports, for a fork into another folder
 */
export function createDesk(
  place: NotebookPlace,
  { filesBeside = async () => [] }: { filesBeside?: () => Promise<{ path: string; text: string }[]> } = {},
): Record<string, Action> {
  const file = place.label;
  let last: { before: string; after: string; what: string } | undefined;
  let queue: Promise<unknown> = sweepLeftovers(place.path);
  /** one write after the other, so that two pages never look at the same version */
  const inTurn = (action: (body: Body) => Promise<DeskAnswer>): Action => {
    return (body) => {
      const turn = queue.then(() => answered(() => action(bodyOf(body))));
      queue = turn.catch(() => undefined);
      return turn;
    };
  };

  async function onDisk(): Promise<string> {
    // a link put in the file's place later would lead the write elsewhere
    const facts = await lstat(place.path).catch(() => undefined);
    if (!facts?.isFile() || (await realpath(place.path)) !== place.path)
      throw new Failure(`${file} is no longer the plain file that was opened, so nothing is written.`);
    return readFile(place.path, "utf8");
  }

  async function write(before: string, after: string): Promise<void> {
    await writeWhole(place.path, file, after, async () => {
      if ((await onDisk()) !== before) throw new Failure(`${file} changed on disk just now; nothing was written.`);
    });
  }

  async function change(body: Body, what: string, make: (base: string) => string): Promise<DeskAnswer> {
    const base = text(body, "base");
    const after = make(base);
    const before = await onDisk();
    if (before !== base) return { ok: false, ...(await keepBoth(after)) };
    if (after === before) return { ok: true, sentence: `${file} says so already.` };
    await write(before, after);
    last = { before, after, what };
    return { ok: true, sentence: `${what} in ${file}.` };
  }

  /** The page's version beside the file, under a name that says what it is. */
  async function keepBoth(version: string): Promise<{ sentence: string; kept: string }> {
    const stem = basename(place.path).replace(/\.m?ts$/, "");
    const time = new Date().toISOString().slice(0, 19).replaceAll(":", "-");
    // two within one second are two versions
    const taken = new Set(await readdir(dirname(place.path)));
    let kept = `${stem}.kept-${time}.ts.txt`;
    for (let i = 2; taken.has(kept); i++) kept = `${stem}.kept-${time}-${i}.ts.txt`;
    await writeWhole(join(dirname(place.path), kept), kept, version);
    return {
      kept,
      sentence: `${file} changed on disk meanwhile and was left as it is. The page's version is kept beside it as ${kept}: take up the file's version and do it again, or put the two together in your editor.`,
    };
  }

  return {
    keepGivens: inTurn((body) => change(body, "Kept", (base) => keepGivens(base, file, texts(body, "texts")))),
    addNote: inTurn((body) =>
      change(body, "Note added", (base) => addNote(base, file, text(body, "after"), text(body, "markdown"))),
    ),
    addRationale: inTurn((body) => {
      const details = { beside: text(body, "beside"), draft: draftOf(body), now: numbers(body), today: today() };
      return change(body, "Rationale written", (base) => addRationale(base, file, details).source);
    }),
    editRationale: inTurn((body) => {
      const details = { cell: text(body, "cell"), draft: draftOf(body), now: numbers(body) };
      return change(body, "Rationale changed", (base) => editRationale(base, file, details));
    }),
    agreeAgain: inTurn((body) => {
      const now = record(body, "now");
      for (const [label, value] of Object.entries(now))
        if (typeof value !== "number" || !Number.isFinite(value))
          throw new RewriteRefused(`${label} has no number now`);
      const details = { cell: text(body, "cell"), author: text(body, "author"), today: today() };
      return change(body, "Agreed again", (base) =>
        agreeAgain(base, file, { ...details, now: now as Record<string, number> }),
      );
    }),
    replaceCell: inTurn((body) =>
      change(body, "Saved", (base) => replaceCell(base, file, text(body, "cell"), text(body, "source"))),
    ),
    undo: inTurn(async () => {
      if (!last)
        return {
          ok: false,
          sentence: "There is nothing to take back: nothing was written since this page was opened.",
        };
      const { before, after, what } = last;
      if ((await onDisk()) !== after)
        return {
          ok: false,
          sentence: `${file} changed after the last write, so it can't be taken back; your editor's own undo can.`,
        };
      await write(after, before);
      last = undefined;
      return { ok: true, sentence: `Taken back: ${what.toLowerCase()} in ${file}.` };
    }),
    fork: inTurn(async (body) => {
      const source = await onDisk();
      const home = dirname(place.path);
      const path = await writeFork(
        { label: file, source, folder: home, beside: await filesBeside() },
        {
          name: text(body, "name"),
          folder: await folderWithin(home, body),
          texts: texts(body, "texts"),
          today: today(),
        },
      );
      const label = posixLabel(file, relative(home, path));
      return {
        ok: true,
        file: label,
        sentence: `Forked to ${label}. Open it with: npm run -s hornbook -- open ${label}`,
      };
    }),
  };
}

/** "notebooks/ridge.ts" beside "notebooks/trade-study.ts". */
const posixLabel = (file: string, name: string): string => {
  const folder = file.slice(0, file.length - file.split("/").at(-1)!.length);
  return `${folder}${name.replaceAll("\\", "/")}`;
};

/** The notebook's own folder, or one within it that is there. */
async function folderWithin(home: string, body: Body): Promise<string> {
  if (body.folder === undefined || body.folder === "") return home;
  const named = text(body, "folder");
  const folder = await realpath(resolve(home, named)).catch(() => undefined);
  if (folder === undefined) throw new Failure(`there is no folder ${named} beside the notebook.`);
  const within = relative(home, folder);
  if (within.startsWith("..") || isAbsolute(within))
    throw new Failure(`a fork made on the page stays in the notebook's folder; ${named} leads out of it.`);
  return folder;
}

/** Sentences of refusals as answers; a request of the wrong shape is the page's fault and refused as such. */
async function answered(action: () => Promise<DeskAnswer>): Promise<DeskAnswer> {
  try {
    return await action();
  } catch (error) {
    if (error instanceof RewriteRefused) {
      const sentence = /[.!?]$/.test(error.message) ? error.message : `${error.message}.`;
      return { ok: false, sentence: capital(sentence), ...(error.line === undefined ? {} : { line: error.line }) };
    }
    if (error instanceof Failure) return { ok: false, sentence: capital(error.message) };
    throw error;
  }
}

const capital = (sentence: string): string =>
  /^[a-z]+ /.test(sentence) ? sentence[0]!.toUpperCase() + sentence.slice(1) : sentence;

function bodyOf(body: unknown): Body {
  if (typeof body !== "object" || body === null || Array.isArray(body)) throw badRequest("a write must be an object");
  return body as Body;
}

const badRequest = (what: string): ActionRefused =>
  new ActionRefused(`The page sent something unexpected: ${what}.`, 400);

function text(body: Body, name: string): string {
  const value = body[name];
  if (typeof value !== "string") throw badRequest(`${name} must be text`);
  if (value.length > LONGEST * (name === "base" ? 4 : 1)) throw badRequest(`${name} is too long`);
  return value;
}

function record(body: Body, name: string): Record<string, unknown> {
  const value = body[name];
  if (typeof value !== "object" || value === null || Array.isArray(value))
    throw badRequest(`${name} must be an object`);
  return value as Record<string, unknown>;
}

function texts(body: Body, name: string): Record<string, string> {
  const found = record(body, name);
  return Object.fromEntries(Object.keys(found).map((key) => [key, text(found, key)]));
}

function numbers(body: Body): number[] {
  if (!Array.isArray(body.now)) throw badRequest("now must be a list of numbers");
  return body.now.map((value) => (typeof value === "number" ? value : Number.NaN));
}

function draftOf(body: Body): RationaleDraft {
  const draft = record(body, "draft");
  if (!Array.isArray(draft.numbers)) throw badRequest("numbers must be a list");
  const [decision, chosen, reasons, author] = ["decision", "chosen", "reasons", "author"].map((name) =>
    text(draft, name),
  );
  return {
    ...{ decision: decision!, chosen: chosen!, reasons: reasons!, author: author! },
    numbers: draft.numbers.map((number) => {
      const one = bodyOf(number);
      const [label, expression, unit, tolerance] = ["label", "expression", "unit", "tolerance"].map((name) =>
        text(one, name),
      );
      return { label: label!, expression: expression!, unit: unit!, tolerance: tolerance! };
    }),
  };
}
