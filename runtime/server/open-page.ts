// The script of the page that `open` serves: shows the notebook, takes up every saved version under the running study.

import { browserSpawn } from "../background/browser.ts";
import { createBackgroundPool } from "../background/pool.ts";
import { createStudy } from "../engine.ts";
import { createWriting } from "../page/desk/writing.ts";
import { mountStudy } from "../page/mount.ts";
import { studyValues } from "../plain-values.ts";
import type { CellView, NotebookModule, Study } from "../study.ts";
import { createDeskClient } from "./desk-client.ts";
import { followServer } from "./follow-server.ts";
import type { OpenState } from "./open-state.ts";
import { problemPanel } from "./problems.ts";

const root = document.getElementById("study")!;
const first = JSON.parse(document.getElementById("hornbook-open")!.textContent!) as OpenState & { token: string };
const desk = createDeskClient(first.token);
const panel = problemPanel(document, root);
let study: Study | undefined;
let taken: string | undefined;
let wanted: OpenState = first;
let taking: Promise<void> = Promise.resolve();

async function openEditor(cell: CellView, host: HTMLElement, of: Study): Promise<void> {
  const { openCellEditor } = await import("./cell-editor.ts");
  openCellEditor(host, cell, of, desk);
}

async function take(state: OpenState): Promise<void> {
  // The program itself was changed: the page begins again, with the givens in its address.
  if (state.page !== first.page) return location.reload();
  panel.show(state.problems, study !== undefined);
  const { notebook: url, imports } = state;
  if (url === undefined || url === taken) return;
  try {
    const { notebook } = (await import(url)) as { notebook: NotebookModule };
    if (wanted !== state) return;
    const background = createBackgroundPool({ spawn: browserSpawn({ url }) });
    // With the same imports only the cells whose text changed are evaluated again.
    if (notebook.cells.some((cell) => cell.background)) background.warm();
    const version = { ...notebook, importsDigest: imports };
    if (study) study.redefine(version, background);
    else {
      study = createStudy(version, { background });
      const running = study;
      mountStudy(root, running, {
        program: "Hornbook",
        write: (document, of) => createWriting(document, of, desk),
        edit: (cell, host) => void openEditor(cell, host, running),
      });
    }
    taken = url;
  } catch (error) {
    const text = error instanceof Error ? error.message : String(error);
    panel.show([{ file: state.label, line: 0, text: `could not be taken up: ${text}` }], study !== undefined);
  }
}

function hear(state: OpenState): void {
  wanted = state;
  taking = taking.then(() => (wanted === state ? take(state) : undefined));
}

hear(first);
followServer(window, hear, (away) => panel.away(away));

// For the browser's console: the same object that `hornbook values` prints.
Object.assign(globalThis, {
  hornbook: {
    get study() {
      return study;
    },
    values: async () => {
      await taking;
      await study?.settled();
      return study && studyValues(study);
    },
  },
});
