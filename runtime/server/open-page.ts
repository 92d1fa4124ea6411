// The script of the page that `open` serves: shows the notebook, takes up every saved version under the running study.

import { browserSpawn } from "../background/browser.ts";
import { createBackgroundPool } from "../background/pool.ts";
import { createStudy } from "../engine.ts";
import { type MountedStudy, mountStudy } from "../page/mount.ts";
import { studyValues } from "../plain-values.ts";
import type { NotebookModule, Study } from "../study.ts";
import { followServer } from "./follow-server.ts";
import type { OpenState } from "./open-state.ts";
import { problemPanel } from "./problems.ts";
import { type SwitchingPool, switchingPool } from "./switching-pool.ts";

interface Running {
  study: Study;
  pool: SwitchingPool;
  mounted: MountedStudy;
  notebook: string;
  imports: string | undefined;
}

const root = document.getElementById("study")!;
const first = JSON.parse(document.getElementById("hornbook-open")!.textContent!) as OpenState & { token: string };
const panel = problemPanel(document, root);
let running: Running | undefined;
let wanted: OpenState = first;
let taking: Promise<void> = Promise.resolve();

const poolOf = (url: string) => createBackgroundPool({ spawn: browserSpawn({ url }) });

/** Texts of the givens that differ from what the file said, for a study that begins anew. */
function turned(study: Study): Record<string, string> {
  return Object.fromEntries(
    study.givens.filter(({ text, defaultText }) => text !== defaultText).map(({ name, text }) => [name, text]),
  );
}

function begin(notebook: NotebookModule, url: string, imports: string | undefined, givens: Record<string, string>): void {
  const pool = switchingPool(poolOf(url));
  const study = createStudy(notebook, { givens, background: pool });
  const mounted = mountStudy(root, study, { program: "Hornbook" });
  running = { study, pool, mounted, notebook: url, imports };
}

async function take(state: OpenState): Promise<void> {
  // The program itself was changed: the page begins again, with the givens in its address.
  if (state.page !== first.page) return location.reload();
  panel.show(state.problems, running !== undefined);
  const { notebook: url, imports } = state;
  if (url === undefined || url === running?.notebook) return;
  try {
    const { notebook } = (await import(url)) as { notebook: NotebookModule };
    if (wanted !== state) return;
    if (!running) begin(notebook, url, imports, {});
    else if (running.imports === imports) {
      // Same imports: only the cells whose text changed are evaluated again.
      running.pool.switchTo(poolOf(url));
      running.study.redefine(notebook);
      Object.assign(running, { notebook: url });
    } else {
      const givens = turned(running.study);
      running.mounted.dispose();
      running.study.dispose();
      running.pool.dispose();
      begin(notebook, url, imports, givens);
    }
  } catch (error) {
    const text = error instanceof Error ? error.message : String(error);
    panel.show([{ file: state.label, line: 0, text: `could not be taken up: ${text}` }], running !== undefined);
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
      return running?.study;
    },
    values: async () => {
      await taking;
      await running?.study.settled();
      return running && studyValues(running.study);
    },
  },
});
