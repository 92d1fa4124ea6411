// The quiet line under a result: its state, its basis, and what can be opened or saved.

import type { CellView } from "../study.ts";
import { codeToggle } from "./code.ts";
import type { Writing } from "./desk/writing.ts";
import { html, nameId, setAttribute, showWhen } from "./dom.ts";
import type { PageContext } from "./options.ts";
import { rootsInState } from "./readers.ts";
import { stateMark, stateWords } from "./state-mark.ts";
import { typeset } from "./typography.ts";

export interface FootEntry {
  cell: CellView;
  code: CellView[];
  basis?: string;
  /** a drawing told in words */
  words?: string;
  /** quiet links that hand a file to the reader */
  saves?: { label: string; describes: string; save: () => void }[];
}

function button(document: Document, act: () => void): HTMLButtonElement {
  const element = html(document, "button", { type: "button", hidden: true });
  element.addEventListener("click", act);
  return element;
}

/** What can be written beside a result: a note after it, a rationale in its margin. */
function writeButtons(context: PageContext, writing: Writing, cell: () => CellView | undefined): HTMLElement {
  const { document } = context;
  const one = (label: string, act: (of: CellView) => void) => {
    const element = html(document, "button", { type: "button" }, label);
    element.addEventListener("click", () => {
      const of = cell();
      if (of) act(of);
    });
    return element;
  };
  const note = one("add a note", writing.addNote);
  // a cell without a name of its own has nothing for a rationale to stand beside
  const named = /^[A-Za-z_$]/.test(cell()?.name ?? "") && !(cell()?.name ?? "").includes(" ");
  return html(
    document,
    "p",
    { class: "write" },
    note,
    named && " ",
    named && one("write a rationale", writing.addRationale),
  );
}

export function footLine(context: PageContext, key: string): { element: HTMLElement; update(entry: FootEntry): void } {
  const { document, study, live, still } = context;
  const id = nameId(key);
  let now: FootEntry | undefined;
  let savesShown = "";
  const state = html(document, "span", { class: "state" });
  const basis = html(document, "span", { class: "basis" });
  const bar = html(document, "progress", { max: 1, value: 0, "aria-label": "done so far", hidden: true });
  const roots = (of: CellView["state"]) => (now ? rootsInState(study.cells, now.cell, of) : []);
  const stop = button(document, () => {
    for (const cell of roots("working")) study.stop(cell.name);
  });
  const again = button(document, () => {
    for (const cell of roots("behind")) study.again(cell.name);
  });
  // before the script wakes they take their room already, unseen, so that nothing moves when it does
  if (!live) for (const each of [stop, again]) each.setAttribute("data-asleep", "");
  const saves = html(document, "span", { class: "saves", "data-asleep": !live });
  const line = html(document, "div", { class: "line" }, bar, state, basis, !still && stop, !still && again, saves);
  const told = html(document, "p");
  const words = html(
    document,
    "details",
    { class: "opens words", id: `words-${id}` },
    html(document, "summary", {}, "in words"),
    told,
  );
  const code = codeToggle(context, id);
  let write: HTMLElement | undefined;
  const element = html(document, "div", { class: "foot" }, line, words, code.element);

  return {
    element,
    update(entry) {
      now = entry;
      const working = roots("working");
      const progress = working.map((cell) => cell.progress).filter((share) => share !== undefined);
      const share = progress.length > 0 ? Math.min(...progress) : undefined;
      setAttribute(state, "data-state", entry.cell.state);
      const said = stateWords(entry.cell.state, share);
      if (state.textContent !== said) state.replaceChildren(stateMark(document, entry.cell.state), said);
      const { value } = entry.cell;
      const late = entry.cell.state === "behind" || (entry.cell.state === "working" && value !== undefined);
      const painted = entry.cell.state === "working" && value === undefined && context.painted.has(entry.cell.name);
      const parts = [entry.basis, late && "computed for earlier values", painted && "shown as the file holds it"];
      basis.textContent = typeset(parts.filter(Boolean).join(", "));
      showWhen(bar, share !== undefined);
      if (share !== undefined) bar.setAttribute("value", String(share));
      const behind = entry.cell.state === "behind" && working.length === 0;
      showWhen(stop, entry.cell.state === "working");
      showWhen(again, behind);
      stop.textContent = "stop";
      again.textContent = "compute";
      showWhen(words, Boolean(entry.words));
      told.textContent = typeset(entry.words ?? "");
      code.update(entry.code);
      if (context.writing && !write) {
        write = writeButtons(context, context.writing, () => now?.cell);
        element.append(write, context.writing.hostFor(entry.cell));
      }
      const offered = still ? [] : (entry.saves ?? []);
      const labels = offered.map((save) => save.describes).join("|");
      if (labels !== savesShown) {
        savesShown = labels;
        saves.replaceChildren(
          ...offered.map((save, index) => {
            const link = html(document, "button", { type: "button", title: save.describes }, save.label);
            link.addEventListener("click", () => now?.saves?.[index]?.save());
            return link;
          }),
        );
      }
    },
  };
}
