// The Chromium that the development packages bring: for the tests, the benchmark and the README's picture.

import { mkdirSync, rmdirSync, statSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { Browser } from "playwright-core";

/** As in package.json. The packed binary is unpacked once a version: it would silently take up another version's. */
const version = "143.0.4";

/** Longest that unpacking may take before its lock counts as left behind, ms. */
const lockAge = 120_000;

const systemHint =
  "The browser needs libnss3, libnspr4 and libexpat1 from the system (Debian: apt-get install libnss3 libnspr4 libexpat1).";

/** Where the binary is, unpacked by one process at a time. */
async function executable(packed: typeof import("@sparticuz/chromium")["default"]): Promise<string> {
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

/**
 * Starts Chromium, headless; the caller closes it. No single process, web security left on: a page is seen as a reader's
 * browser would show it.
 * @throws {Error} one sentence: the development packages are away, or the system lacks a library that it needs
 */
export async function launchBrowser(): Promise<Browser> {
  let parts: [typeof import("@sparticuz/chromium"), typeof import("playwright-core")];
  try {
    parts = await Promise.all([import("@sparticuz/chromium"), import("playwright-core")]);
  } catch (error) {
    throw new Error('the browser comes with the development packages; run "npm ci"', { cause: error });
  }
  const [{ default: packed }, { chromium }] = parts;
  const executablePath = await executable(packed);
  try {
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
    throw new Error(`Chromium didn't start. ${systemHint}`, { cause: error });
  }
}
