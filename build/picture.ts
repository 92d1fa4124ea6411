// The README's picture: the trade study as its exported file looks in Chromium, a whole page wide and two screens high.

import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { launchBrowser } from "./chromium.ts";
import { startProgress } from "./command/progress.ts";
import { projectVersion } from "./command/surroundings.ts";
import type { CommandContext } from "./command/verb.ts";
import { evaluateHeadless } from "./headless-study.ts";
import { makeExport } from "./make-export.ts";
import { findNotebook } from "./notebook-place.ts";

const PICTURE = "build/trade-study.png";

/** Makes the picture anew. */
export async function main(_: string[], context: CommandContext): Promise<number> {
  const { projectRoot } = context;
  const place = findNotebook("notebooks/trade-study.ts", projectRoot);
  const progress = startProgress();
  const folder = mkdtempSync(join(tmpdir(), "hornbook-picture-"));
  const study = await evaluateHeadless(place, projectRoot, {}, progress);
  try {
    const version = await projectVersion(context);
    const { html } = await makeExport(study, { place, projectRoot, version, now: new Date(), still: true });
    const file = join(folder, "study.html");
    writeFileSync(file, html);
    const browser = await launchBrowser();
    try {
      const page = await browser.newPage({ viewport: { width: 1440, height: 900 } });
      await page.goto(pathToFileURL(file).href);
      // from the title over the givens to the horns: what a reader of the README should see first
      const end = await page.locator("figure").nth(2).boundingBox();
      const height = Math.min(3200, Math.round((end?.y ?? 1800) - 60));
      await page.screenshot({
        path: join(projectRoot, PICTURE),
        fullPage: true,
        clip: { x: 110, y: 20, width: 1200, height },
      });
    } finally {
      await browser.close();
    }
  } finally {
    progress.end();
    await study.close();
    rmSync(folder, { recursive: true, force: true });
  }
  process.stdout.write(`${PICTURE}\n`);
  return 0;
}
