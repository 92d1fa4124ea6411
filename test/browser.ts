// A real browser for tests: the Chromium that `npm ci` brought, with its own folder and our own launch arguments.

import { mkdirSync, rmdirSync, statSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import packed from "@sparticuz/chromium";
import { type Browser, chromium } from "playwright-core";

/** As in package.json. The packed binary is unpacked once a version: it would silently take up another version's. */
const version = "143.0.4";

/** Longest that unpacking may take before its lock counts as left behind, ms. */
const lockAge = 120_000;

const systemHint =
  "The browser needs libnss3, libnspr4 and libexpat1 from the system (Debian: apt-get install libnss3 libnspr4 libexpat1).";

/** Where the binary is, unpacked by one process at a time. */
async function executable(): Promise<string> {
  const folder = join(tmpdir(), `hornbook-chromium-${version}-${process.getuid?.() ?? 0}`);
  const lock = `${folder}.lock`;
  mkdirSync(folder, { recursive: true });
  for (;;) {
    try {
      mkdirSync(lock);
      break;
    } catch {
      try {
        if (Date.now() - statSync(lock).mtimeMs > lockAge) rmdirSync(lock);
      } catch {
        // the other process has just finished
      }
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
  }
  const outside = process.env.TMPDIR;
  try {
    process.env.TMPDIR = folder;
    return await packed.executablePath();
  } finally {
    if (outside === undefined) delete process.env.TMPDIR;
    else process.env.TMPDIR = outside;
    rmdirSync(lock);
  }
}

/** Starts Chromium, headless; the caller closes it. */
export async function launchBrowser(): Promise<Browser> {
  const executablePath = await executable();
  try {
    // No single process, web security left on: the page is tested as a reader's browser would show it.
    return await chromium.launch({
      executablePath,
      args: [
        "--headless=new",
        "--no-sandbox",
        "--disable-gpu",
        "--disable-dev-shm-usage",
        "--font-render-hinting=none",
      ],
    });
  } catch (error) {
    throw new Error(`launchBrowser: Chromium must start; it did not. ${systemHint}`, { cause: error });
  }
}
