// The script of an exported file: the page that was painted wakes up and its givens can be turned.

import { browserSpawn } from "../runtime/background/browser.ts";
import { createBackgroundPool } from "../runtime/background/pool.ts";
import { createStudy } from "../runtime/engine.ts";
import { fragmentOf } from "../runtime/page/address.ts";
import { mountStudy } from "../runtime/page/mount.ts";
import { studyValues } from "../runtime/plain-values.ts";
import type { NotebookModule } from "../runtime/study.ts";
import type { ExportRecord } from "./export-record.ts";
import { imprint } from "./imprint.ts";

/** Starts the study in the page that holds this script. Should that fail, what was painted stays and says so. */
export function wake(notebook: NotebookModule): void {
  const root = document.getElementById("study")!;
  try {
    const record = JSON.parse(document.getElementById("hornbook-record")!.textContent!) as ExportRecord;
    const text = document.getElementById("hornbook-live")!.textContent!;
    const background = createBackgroundPool({ spawn: browserSpawn({ text }) });
    if (notebook.cells.some((cell) => cell.background)) background.warm();
    const study = createStudy(notebook, { background, givens: record.givens });
    // The address holds the givens that differ from the file; one that says nothing means those of the export.
    const asExported = fragmentOf(study);
    if (asExported && !location.hash.includes("=")) location.replace(`#${asExported}`);
    const mounted = mountStudy(root, study, { program: "Hornbook", imprint: imprint(record) });
    // For the browser's console: the same object that `hornbook values` prints.
    const values = async () => {
      await study.settled();
      return studyValues(study);
    };
    Object.assign(globalThis, { hornbook: { study, values, ready: mounted.ready } });
  } catch (error) {
    const said = document.createElement("p");
    said.setAttribute("role", "alert");
    said.textContent = `The givens can’t be turned in this browser (${error instanceof Error ? error.message : String(error)}); the results are as exported.`;
    root.before(said);
    throw error;
  }
}
