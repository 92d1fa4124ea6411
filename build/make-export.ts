// From an evaluated study to the text of its exported file.

import { readFile } from "node:fs/promises";
import { parseHTML } from "linkedom";
import { studyTitle } from "../runtime/page/head.ts";
import { renderStudy } from "../runtime/page/render.ts";
import { type Bundle, bundleOnce, bundleStyle, fromNotebook, ownFiles } from "./bundle.ts";
import { bundleWeights, packageNotices, type Weight } from "./bundle-weight.ts";
import { Failure } from "./command/failure.ts";
import { EXPORT_ENTRY } from "./entries.ts";
import { exportHtml } from "./export-html.ts";
import { makeRecord } from "./export-record.ts";
import type { HeadlessStudy } from "./headless-study.ts";
import { imprint } from "./imprint.ts";
import type { NotebookPlace } from "./notebook-place.ts";

export interface ExportOptions {
  place: NotebookPlace;
  projectRoot: string;
  version: string;
  /** when, for the record and the imprint */
  now: Date;
  /** true: no script at all */
  still: boolean;
}

export interface MadeExport {
  html: string;
  /** what the script weighs, the heaviest first; empty for a still file */
  weights: Weight[];
}

/** A document to draw in, without a browser. */
export function headlessDocument(): Document {
  return parseHTML("<!doctype html><html><head></head><body></body></html>").document as unknown as Document;
}

/** @throws {Failure} the notebook was saved anew while it was exported */
export async function makeExport({ study, bundle }: HeadlessStudy, options: ExportOptions): Promise<MadeExport> {
  const { place, projectRoot, version, now, still } = options;
  const live = still ? undefined : await liveScript(bundle, place, projectRoot);
  const style = await bundleStyle(["runtime/page/page.css"], projectRoot, true);
  const record = makeRecord({
    version,
    exported: now.toISOString(),
    notebook: place.label,
    files: await recordedFiles(bundle, place, projectRoot),
    givens: Object.fromEntries(study.givens.map(({ name, text }) => [name, text])),
  });
  const firstPaint = renderStudy(study, {
    document: headlessDocument(),
    still,
    program: "Hornbook",
    imprint: imprint(record),
  });
  const html = exportHtml({
    title: studyTitle(study),
    firstPaint,
    style: style.code.trim(),
    record,
    script: live?.code,
    notices: live ? await packageNotices(live.metafile, projectRoot) : [],
  });
  return { html, weights: live ? bundleWeights(live.metafile) : [] };
}

async function liveScript(evaluated: Bundle, place: NotebookPlace, projectRoot: string): Promise<Bundle> {
  const live = await bundleOnce({
    projectRoot,
    entry: EXPORT_ENTRY,
    notebook: place,
    platform: "browser",
    classic: true,
    minify: true,
  });
  if (live.compiled?.source !== evaluated.compiled?.source) {
    throw new Failure(`${place.label} was saved anew while it was exported; export it again.`);
  }
  return live;
}

/** The notebook as it was evaluated, and the files of its own that it imports. */
async function recordedFiles(bundle: Bundle, place: NotebookPlace, projectRoot: string) {
  const [, ...others] = ownFiles(bundle.inputs, place, projectRoot);
  return [
    { path: fromNotebook(place.path, place), text: bundle.compiled!.source },
    ...(await Promise.all(
      others.map(async (path) => ({ path: fromNotebook(path, place), text: await readFile(path, "utf8") })),
    )),
  ];
}
