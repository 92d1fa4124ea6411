// What `open` serves: the page's script and style, the notebook as a module, made anew at every save.

import { createHash } from "node:crypto";
import { readFile } from "node:fs/promises";
import { dirname, sep } from "node:path";
import type { Asset } from "../runtime/server/local-server.ts";
import type { OpenState, ProblemPlace } from "../runtime/server/open-state.ts";
import { type FileWatch, watchFiles } from "../runtime/server/watch-files.ts";
import { type Bundle, BundleFailure, bundleStyle, createBundler, ownFiles } from "./bundle.ts";
import { NOTEBOOK_ENTRY, PAGE_ENTRY } from "./entries.ts";
import type { NotebookPlace } from "./notebook-place.ts";

export interface LiveSite {
  state(): OpenState;
  page(token: string): string;
  asset(path: string): Asset | undefined;
  /** files of its own, in its folder, that the notebook imports: path from there, text */
  filesBeside(): Promise<{ path: string; text: string }[]>;
  close(): Promise<void>;
}

const STYLES = ["runtime/page/page.css", "runtime/page/style/writing.css", "runtime/server/problems.css"];

/** Versions of a script that stay available for pages which are just loading them. */
const KEPT_VERSIONS = 8;

/**
 * Bundles page and notebook, then follows their files.
 * @param changed called after each save that changed something a page must know
 * @param said one line for a person who watches the terminal
 */
export async function createLiveSite(
  place: NotebookPlace,
  projectRoot: string,
  changed: (state: OpenState) => void,
  said: (line: string) => void,
): Promise<LiveSite> {
  const assets = new Map<string, Asset>();
  const pageBundler = await createBundler({ projectRoot, entry: PAGE_ENTRY, platform: "browser", sourcemap: true });
  const notebookBundler = await createBundler({
    ...{ projectRoot, entry: NOTEBOOK_ENTRY, notebook: place, platform: "browser", sourcemap: true },
  });
  const known = {
    page: "",
    style: "",
    notebook: undefined as string | undefined,
    imports: undefined as string | undefined,
  };
  let problems: ProblemPlace[] = [];
  let pageInputs: string[] = [];
  let notebookInputs: string[] = [place.path];

  const publish = (name: string, { code, hash, map }: Bundle): string => {
    const path = `/assets/${name}-${hash}.js`;
    assets.delete(path);
    const script = map ? `${code}//# sourceMappingURL=${name}-${hash}.js.map\n` : code;
    assets.set(path, { type: "text/javascript; charset=utf-8", body: script });
    if (map) assets.set(`${path}.map`, { type: "application/json; charset=utf-8", body: map });
    const versions = [...assets.keys()].filter((key) => key.startsWith(`/assets/${name}-`) && key.endsWith(".js"));
    for (const old of versions.slice(0, -KEPT_VERSIONS)) {
      assets.delete(old);
      assets.delete(`${old}.map`);
    }
    return path;
  };

  async function makePage(): Promise<void> {
    const [bundle, style] = await Promise.all([pageBundler.build(), bundleStyle(STYLES, projectRoot, false)]);
    known.page = publish("page", bundle);
    known.style = `/assets/page-${style.hash}.css`;
    assets.set(known.style, { type: "text/css; charset=utf-8", body: style.code });
    pageInputs = [...bundle.inputs, ...style.inputs];
  }

  async function makeNotebook(): Promise<void> {
    try {
      const bundle = await notebookBundler.build();
      notebookInputs = bundle.inputs;
      known.imports = await importsDigest(bundle.inputs.filter((path) => path !== place.path));
      known.notebook = publish("notebook", bundle);
      problems = [];
      for (const { file, line, cell, message } of bundle.compiled?.problems ?? []) {
        said(`${file}:${line}: ${cell ? `${cell}: ` : ""}${message}`);
      }
    } catch (error) {
      if (!(error instanceof BundleFailure)) throw error;
      problems = error.places;
      for (const { file, line, text } of problems) said(`${file}:${line}: ${text}`);
    }
  }

  const state = (): OpenState => ({
    label: place.label,
    page: known.page,
    notebook: known.notebook,
    imports: known.imports,
    problems,
  });

  await Promise.all([makePage(), makeNotebook()]);
  const follow = () => watch.follow([...new Set([place.path, ...notebookInputs, ...pageInputs])]);
  const watch: FileWatch = watchFiles(async (files) => {
    const before = JSON.stringify(state());
    const started = performance.now();
    const ofPage = files.some((file) => pageInputs.includes(file));
    // A failed bundle names no inputs: whatever changes may mend it.
    const ofNotebook = problems.length > 0 || files.some((file) => notebookInputs.includes(file));
    if (ofPage) await makePage().catch((error: Error) => said(error.message));
    if (ofNotebook) await makeNotebook();
    await follow();
    if (JSON.stringify(state()) === before) return;
    if (problems.length === 0) said(`${place.label} taken up again in ${Math.round(performance.now() - started)} ms`);
    changed(state());
  });
  await follow();

  return {
    state,
    asset: (path) => assets.get(path),
    page: (token) => pageHtml(place.label, known, { ...state(), token }),
    async filesBeside() {
      const home = `${dirname(place.path)}${sep}`;
      const [, ...others] = ownFiles(notebookInputs, place, projectRoot);
      const own = others.filter((path) => path.startsWith(home));
      return Promise.all(
        own.map(async (path) => ({
          path: path.slice(home.length).split(sep).join("/"),
          text: await readFile(path, "utf8"),
        })),
      );
    },
    async close() {
      watch.close();
      await Promise.all([pageBundler.dispose(), notebookBundler.dispose()]);
    },
  };
}

async function importsDigest(files: readonly string[]): Promise<string> {
  const hash = createHash("sha256");
  for (const file of files) hash.update(await readFile(file).catch(() => ""));
  return hash.digest("hex").slice(0, 16);
}

function pageHtml(
  label: string,
  { page, style }: { page: string; style: string },
  config: OpenState & { token: string },
): string {
  const json = JSON.stringify(config).replaceAll("<", "\\u003c");
  const title = label.replaceAll("&", "&amp;").replaceAll("<", "&lt;");
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${title}</title>
<link rel="icon" href="data:,">
<link rel="stylesheet" href="${style}">
<script type="application/json" id="hornbook-open">${json}</script>
<script type="module" src="${page}"></script>
</head>
<body>
<noscript><p>This page is live and needs scripts. A file made by “hornbook export” can be read without them.</p></noscript>
<div id="study"></div>
</body>
</html>
`;
}
