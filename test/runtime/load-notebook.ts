import { build } from "esbuild";
import { compileNotebook } from "../../runtime/compile.ts";
import type { NotebookModule } from "../../runtime/study.ts";

const notebooks = new URL("../../notebooks/", import.meta.url).pathname;

/** What every notebook of these tests may use. */
export const VOCABULARY =
  'import { background, caution, figure, given, head, lead, margin, markdown, note, rationale, restsOn, show, table } from "../runtime/index.ts";';

/** Bundles TypeScript that stands in notebooks/ (or another folder) as one ES module. */
export async function bundled(
  contents: string,
  sourcefile: string,
  options: { sourcemap?: boolean; from?: string } = {},
): Promise<string> {
  const result = await build({
    stdin: { contents, sourcefile, loader: "ts", resolveDir: options.from ?? notebooks },
    bundle: true,
    format: "esm",
    platform: "node",
    target: "es2022",
    write: false,
    outdir: "/",
    logLevel: "silent",
    ...(options.sourcemap ? { sourcemap: "inline", sourcesContent: true } : {}),
  });
  return result.outputFiles[0]?.text ?? "";
}

export function importText(text: string): Promise<{ notebook: NotebookModule }> {
  return import(/* @vite-ignore */ `data:text/javascript;base64,${Buffer.from(text).toString("base64")}`);
}

/** Compiles, bundles and imports a notebook given as its text. Its first line imports the vocabulary. */
export async function loadNotebook(body: string, file = "notebooks/test.ts"): Promise<NotebookModule> {
  const { code } = compileNotebook(`${VOCABULARY}\n${body}`, file);
  return (await importText(await bundled(code, file))).notebook;
}
