// The Chromium that the development packages bring, for measurements in a real page.

import { mkdirSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { Browser } from "playwright-core";

/**
 * Starts it, headless; the caller closes it.
 * @throws {Error} one sentence: the development packages are away, or the system lacks a library that it needs
 */
export async function launchChromium(): Promise<Browser> {
  let parts: [typeof import("@sparticuz/chromium"), typeof import("playwright-core")];
  try {
    parts = await Promise.all([import("@sparticuz/chromium"), import("playwright-core")]);
  } catch (error) {
    throw new Error('it needs a browser from the development packages; run "npm ci"', { cause: error });
  }
  const [{ default: packed }, { chromium }] = parts;
  // The binary unpacks itself into the temporary folder and would take up another version's found there.
  const outside = process.env.TMPDIR;
  const folder = join(tmpdir(), `hornbook-bench-chromium-${process.getuid?.() ?? 0}`);
  mkdirSync(folder, { recursive: true });
  try {
    process.env.TMPDIR = folder;
    const executablePath = await packed.executablePath();
    return await chromium.launch({
      executablePath,
      args: ["--headless=new", "--no-sandbox", "--disable-gpu", "--disable-dev-shm-usage"],
    });
  } catch (error) {
    throw new Error(
      "Chromium didn't start; it needs libnss3, libnspr4 and libexpat1 from the system (Debian: apt-get install libnss3 libnspr4 libexpat1)",
      { cause: error },
    );
  } finally {
    if (outside === undefined) delete process.env.TMPDIR;
    else process.env.TMPDIR = outside;
  }
}
