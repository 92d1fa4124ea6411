// A study evaluated here, without a page: bundles the notebook, runs it, waits for every cell.

import { Console } from "node:console";
import { mkdir, mkdtemp, readdir, rename, rm, stat, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { nodeSpawn } from "../runtime/background/node.ts";
import { createBackgroundPool } from "../runtime/background/pool.ts";
import { createStudy } from "../runtime/engine.ts";
import type { NotebookModule, Study } from "../runtime/study.ts";
import { type Bundle, bundleOnce } from "./bundle.ts";
import { Failure } from "./command/failure.ts";
import type { Progress } from "./command/progress.ts";
import { NODE_ENTRY } from "./entries.ts";
import { watchEvaluation } from "./evaluation-watch.ts";
import type { NotebookPlace } from "./notebook-place.ts";
import { enterGivens } from "./set-givens.ts";

export interface HeadlessStudy {
  study: Study;
  bundle: Bundle;
  /** ends its workers */
  close(): Promise<void>;
}

/**
 * Evaluates a notebook with the given texts.
 * @param before looks at the study before anything is evaluated; may throw
 * @throws {Failure} it can't be bundled or loaded; a given isn't there or refuses its text
 */
export async function evaluateHeadless(
  place: NotebookPlace,
  projectRoot: string,
  givens: Record<string, string>,
  progress: Progress,
  before: (study: Study) => void = () => {},
): Promise<HeadlessStudy> {
  progress.say(`${place.label}: bundling`);
  const bundle = await bundleOnce({ projectRoot, entry: NODE_ENTRY, notebook: place, platform: "node" });
  const files = await placeBundle(bundle, projectRoot);
  // What a notebook logs while it is tried out must not get among the numbers on standard output.
  globalThis.console = new Console(process.stderr);
  let running: Study | undefined;
  const unwatch = watchEvaluation(place.label, () => running);
  let notebook: NotebookModule;
  try {
    ({ notebook } = (await import(pathToFileURL(files.module).href)) as { notebook: NotebookModule });
  } catch (error) {
    unwatch();
    await files.remove();
    const reason = error instanceof Error ? error.message : String(error);
    throw new Failure(`${place.label}: a file that it imports can't be loaded: ${reason}`, 1, error);
  }
  const background = createBackgroundPool({ spawn: nodeSpawn(pathToFileURL(files.worker)) });
  const study = createStudy(notebook, { background });
  running = study;
  const close = async () => {
    unwatch();
    study.dispose();
    background.dispose();
    await files.remove();
  };
  try {
    before(study);
    enterGivens(study, givens);
    const leave = study.subscribe(() => progress.say(`${place.label}: ${whereItIs(study)}`));
    progress.say(`${place.label}: evaluating`);
    await study.settled();
    leave();
  } catch (error) {
    await close();
    throw error;
  }
  return { study, bundle, close };
}

/** "evaluating, 12 of 30 cells; sweep 40 %" */
function whereItIs({ cells }: Study): string {
  const done = cells.filter(({ state }) => state === "current" || state === "failed").length;
  const working = cells.filter(({ state }) => state === "working");
  const words = working.map(({ name, progress }) =>
    progress === undefined ? name : `${name} ${Math.round(100 * progress)} %`,
  );
  return `evaluating, ${done} of ${cells.length} cells${words.length > 0 ? `; ${words.slice(0, 3).join(", ")}` : ""}`;
}

/** Writes the module, and the one its workers run, where Node can import them. */
async function placeBundle({ code, hash }: Bundle, projectRoot: string) {
  const worker = [
    'import { Console } from "node:console";',
    `import { serve } from "./${hash}.mjs";`,
    "globalThis.console = new Console(process.stderr);",
    "serve();",
    "",
  ].join("\n");
  const folder = join(projectRoot, "node_modules", ".cache", "hornbook", "notebooks");
  const write = async (home: string) => {
    const files = { module: join(home, `${hash}.mjs`), worker: join(home, `${hash}-worker.mjs`) };
    await writeWhole(files.module, code);
    await writeWhole(files.worker, worker);
    return files;
  };
  try {
    await mkdir(folder, { recursive: true });
    const files = await write(folder);
    await sweep(folder);
    return { ...files, remove: async () => {} };
  } catch {
    const own = await mkdtemp(join(tmpdir(), "hornbook-"));
    return { ...(await write(own)), remove: () => rm(own, { recursive: true, force: true }) };
  }
}

/** Another run may write or read the same file at the same time: it is there whole or not at all. */
async function writeWhole(path: string, text: string): Promise<void> {
  const fresh = `${path}.${process.pid}`;
  await writeFile(fresh, text);
  await rename(fresh, path);
}

/** Removes bundles older than a week. */
async function sweep(folder: string): Promise<void> {
  const oldest = Date.now() - 7 * 86_400_000;
  for (const name of await readdir(folder)) {
    const path = join(folder, name);
    const facts = await stat(path).catch(() => undefined);
    if (facts && facts.mtimeMs < oldest) await rm(path, { force: true });
  }
}
