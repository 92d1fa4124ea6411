// Bundles a notebook with the physics, and what else runs with it, into one module: for the page, for the command line, for workers.

import { createHash } from "node:crypto";
import { isAbsolute, join, relative, resolve, sep } from "node:path";
import * as esbuild from "esbuild";
import { Failure } from "./command/failure.ts";
import { fromEsbuild, type Located, locatedText } from "./located.ts";
import { fileLabel, type NotebookPlace } from "./notebook-place.ts";
import { type CompileReport, notebookPlugin } from "./notebook-plugin.ts";

export interface Bundle {
  code: string;
  /** of the code, for names */
  hash: string;
  map?: string;
  /** absolute paths of all sources outside node_modules */
  inputs: string[];
  /** what the notebook compiler said: problems that are cells without value */
  compiled?: CompileReport;
  warnings: Located[];
  metafile: esbuild.Metafile;
}

/** A bundle that can't be made, and why: every place at once. */
export class BundleFailure extends Failure {
  override name = "BundleFailure";
  readonly places: Located[];
  constructor(places: Located[]) {
    super(places.map(locatedText).join("\n"));
    this.places = places;
  }
}

export interface BundleOptions {
  projectRoot: string;
  /** TypeScript that imports what it needs; paths from the project */
  entry: string;
  /** the notebook that the entry imports as `hornbook:notebook` */
  notebook?: NotebookPlace;
  platform: "node" | "browser";
  /** one classic script without exports, for a page that has its script inline; a module otherwise */
  classic?: boolean;
  minify?: boolean;
  sourcemap?: boolean;
  plugins?: esbuild.Plugin[];
}

export interface Bundler {
  /** Bundles again, reading only what changed. @throws {BundleFailure} */
  build(): Promise<Bundle>;
  dispose(): Promise<void>;
}

/** A bundler that can be used again at every save. */
export async function createBundler(options: BundleOptions): Promise<Bundler> {
  let compiled: CompileReport | undefined;
  const context = await esbuild.context({
    ...esbuildOptions(options),
    plugins: [
      ...(options.notebook
        ? [
            notebookPlugin(options.notebook, (report) => {
              compiled = report;
            }),
          ]
        : []),
      ...(options.plugins ?? []),
    ],
  });
  return {
    async build() {
      try {
        return fromResult(await context.rebuild(), options, compiled);
      } catch (error) {
        throw asFailure(error, options);
      }
    },
    dispose: () => context.dispose(),
  };
}

/** Bundles once. @throws {BundleFailure} */
export async function bundleOnce(options: BundleOptions): Promise<Bundle> {
  const bundler = await createBundler(options);
  try {
    return await bundler.build();
  } finally {
    await bundler.dispose();
  }
}

const REQUIRE =
  'import { createRequire as hornbookRequire } from "node:module"; const require = hornbookRequire(import.meta.url);';

function esbuildOptions({
  projectRoot,
  entry,
  platform,
  classic,
  minify,
  sourcemap,
}: BundleOptions): esbuild.BuildOptions {
  return {
    stdin: { contents: entry, resolveDir: projectRoot, sourcefile: "entry.ts", loader: "ts" },
    absWorkingDir: projectRoot,
    outdir: "out",
    bundle: true,
    write: false,
    format: classic ? "iife" : "esm",
    platform,
    target: platform === "node" ? ["node20"] : ["es2022"],
    // CommonJS packages may ask for what Node has built in.
    banner: platform === "node" ? { js: REQUIRE } : undefined,
    minify: minify ?? false,
    legalComments: "none",
    sourcemap: sourcemap ? "external" : false,
    // A stack then points to the source; paths of this machine stay out of what is sent to others.
    sourcesContent: false,
    metafile: true,
    charset: "utf8",
    logLevel: "silent",
    define: { "process.env.NODE_ENV": '"production"' },
  };
}

function fromResult(result: esbuild.BuildResult, options: BundleOptions, compiled: CompileReport | undefined): Bundle {
  const file = (ending: string) => result.outputFiles?.find(({ path }) => path.endsWith(ending))?.text;
  const code = file(".js") ?? file(".css") ?? "";
  return {
    code,
    hash: createHash("sha256").update(code).digest("hex").slice(0, 16),
    map: file(".js.map"),
    inputs: sourcesOf(result.metafile!, options.projectRoot),
    compiled,
    warnings: result.warnings.map((warning) => located(warning, options)),
    metafile: result.metafile!,
  };
}

/** Sources on disk that aren't of a package. */
function sourcesOf(metafile: esbuild.Metafile, projectRoot: string): string[] {
  return Object.keys(metafile.inputs)
    .map((name) => name.replace(/^notebook:/, ""))
    .filter((name) => !/^entry\.(ts|css)$/.test(name) && !name.startsWith("<") && !/(^|\/)node_modules\//.test(name))
    .map((name) => resolve(projectRoot, name));
}

function located(message: esbuild.Message, options: BundleOptions): Located {
  const label = (path: string) => {
    const bare = path.replace(/^notebook:/, "");
    return fileLabel(isAbsolute(bare) ? bare : join(options.projectRoot, bare), options.projectRoot);
  };
  return fromEsbuild(message, label, options.notebook?.label ?? "the page");
}

function asFailure(error: unknown, options: BundleOptions): unknown {
  const { errors } = error as Partial<esbuild.BuildFailure>;
  if (!errors) return error;
  return new BundleFailure(errors.map((message) => located(message, options)));
}

/** Style sheets and what they import, as one text; `files` from the project. */
export async function bundleStyle(files: readonly string[], projectRoot: string, minify: boolean): Promise<Bundle> {
  const options: BundleOptions = { projectRoot, entry: "", platform: "browser", minify };
  try {
    const result = await esbuild.build({
      ...esbuildOptions(options),
      stdin: {
        contents: files.map((file) => `@import "./${file}";`).join("\n"),
        resolveDir: projectRoot,
        sourcefile: "entry.css",
        loader: "css",
      },
    });
    return fromResult(result, options, undefined);
  } catch (error) {
    throw asFailure(error, options);
  }
}

/** The notebook and the files it imports that are neither of the project's rooms nor of a package, the notebook first. */
export function ownFiles(inputs: readonly string[], notebook: NotebookPlace, projectRoot: string): string[] {
  const rooms = ["cells", "runtime", "build"].map((room) => join(projectRoot, room) + sep);
  const others = inputs.filter((path) => path !== notebook.path && !rooms.some((room) => path.startsWith(room)));
  return [notebook.path, ...others.sort()];
}

/** Path of a file from the notebook's folder, with slashes. */
export function fromNotebook(path: string, notebook: NotebookPlace): string {
  return relative(join(notebook.path, ".."), path).split(sep).join("/");
}
