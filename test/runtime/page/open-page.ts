// The sample page in a file of its own, opened in a real browser from file://.

import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { build } from "esbuild";
import { parseHTML } from "linkedom";
import type { Browser, Page } from "playwright-core";
import { renderStudy } from "../../../runtime/page/render.ts";
import { launchBrowser } from "../../browser.ts";
import { sampleStudy } from "./sample-study.ts";

export interface SamplePages {
  /** a new page; what went wrong in it is gathered in `errors` */
  open(options?: {
    width?: number;
    height?: number;
    hash?: string;
    painted?: boolean;
    /** false: the painted page without its script */
    wake?: boolean;
    scripts?: boolean;
  }): Promise<Page>;
  readonly errors: string[];
  /** file that mounts the sample, for a page opened with `wake: false` */
  readonly script: string;
  /** what the page's own code weighs, minified, bytes: script and style */
  readonly weight: { script: number; style: number };
  close(): Promise<void>;
}

async function bundled(entry: string, minify: boolean): Promise<string> {
  const result = await build({
    entryPoints: [entry],
    bundle: true,
    write: false,
    format: "iife",
    target: "es2022",
    minify,
  });
  return result.outputFiles[0]!.text;
}

export async function samplePages(): Promise<SamplePages> {
  const here = import.meta.dirname;
  const page = join(here, "../../../runtime/page");
  const [script, style, mount] = await Promise.all([
    bundled(join(here, "sample-page.ts"), false),
    bundled(join(page, "page.css"), true),
    bundled(join(page, "mount.ts"), true),
  ]);
  const { document } = parseHTML("<!doctype html><html><body></body></html>");
  const painted = renderStudy(sampleStudy(), { document: document as unknown as Document });
  const folder = mkdtempSync(join(tmpdir(), "hornbook-page-"));
  const file = (name: string, body: string, code: string) => {
    const policy = "default-src 'none'; script-src 'unsafe-inline'; style-src-elem 'unsafe-inline'; img-src data:";
    const head = `<meta charset="utf-8"><meta http-equiv="Content-Security-Policy" content="${policy}"><meta name="viewport" content="width=device-width, initial-scale=1"><title>Sample</title><style>${style}</style>`;
    writeFileSync(
      join(folder, name),
      `<!doctype html><html lang="en"><head>${head}</head><body><div id="study">${body}</div><script>${code.replaceAll("</script", "<\\/script")}</script></body></html>`,
    );
    return pathToFileURL(join(folder, name)).href;
  };
  const scriptFile = join(folder, "sample.js");
  writeFileSync(scriptFile, script);
  const empty = file("live.html", "", script);
  const full = file("painted.html", painted, script);
  const asleep = file("asleep.html", painted, "");
  const browser: Browser = await launchBrowser();
  const errors: string[] = [];
  return {
    errors,
    script: scriptFile,
    weight: { script: Buffer.byteLength(mount), style: Buffer.byteLength(style) },
    async open({ width = 1440, height = 1000, hash = "", painted = false, wake = true, scripts = true } = {}) {
      const context = await browser.newContext({
        viewport: { width, height },
        javaScriptEnabled: scripts,
        offline: true,
      });
      const opened = await context.newPage();
      opened.on("pageerror", (error) => errors.push(String(error)));
      opened.on("console", (message) => message.type() === "error" && errors.push(message.text()));
      await opened.goto((painted ? (wake ? full : asleep) : empty) + hash);
      return opened;
    },
    async close() {
      await browser.close();
      rmSync(folder, { recursive: true });
    },
  };
}

/** Two frames: what was entered has been evaluated and shown. */
export const frames = (page: Page): Promise<unknown> =>
  page.evaluate(() => new Promise((resolve) => requestAnimationFrame(() => requestAnimationFrame(resolve))));

/** What the page has asked of the study so far. */
export const calls = (page: Page): Promise<string[]> => page.evaluate(() => window.sample.calls);
