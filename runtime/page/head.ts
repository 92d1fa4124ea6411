// The memorandum's head: kind of document, title, facts; and what the address asked in vain.

import type { Head } from "../shown.ts";
import type { CellView, Study } from "../study.ts";
import { html, setAttribute, showWhen } from "./dom.ts";
import { failureLine } from "./failure.ts";
import type { PageContext } from "./options.ts";
import { phrase } from "./prose.ts";
import { stateTag } from "./state-mark.ts";

/** "trade-study" of "notebooks/trade-study.ts". */
export function bareName(file: string): string {
  return (file.split(/[\\/]/).at(-1) ?? file).replace(/\.[cm]?[jt]sx?$/, "");
}

function headOf(study: Study): { cell?: CellView; head?: Head } {
  const cell = study.cells.find(({ value }) => (value as Head | undefined)?.shows === "head");
  return { cell, head: cell?.value as Head | undefined };
}

/** The study's title, for the window: its head's, or the name of its file. */
export function studyTitle(study: Study): string {
  return headOf(study).head?.title ?? bareName(study.file);
}

export interface HeadPart {
  readonly element: HTMLElement;
  /** the margin begins at its height */
  readonly facts: HTMLElement;
  update(cell: CellView | undefined): void;
  /** sentences about the address; none hides them */
  say(sentences: readonly string[]): void;
}

export function headPart(context: PageContext): HeadPart {
  const { document, study, options } = context;
  const sort = html(document, "strong");
  const program = html(document, "span", {}, options.program ?? "Hornbook");
  const sortLine = html(document, "p", { class: "sort-line" }, sort, program);
  const title = html(document, "h1");
  const facts = html(document, "dl", { class: "facts" });
  const address = html(document, "div", { class: "address", role: "status", hidden: true });
  const element = html(document, "header", {}, sortLine, title, address, facts);
  let shown: { value: unknown; state?: string } | undefined;

  return {
    element,
    facts,
    update(cell) {
      if (shown && shown.value === cell?.value && shown.state === cell?.state) return;
      shown = { value: cell?.value, state: cell?.state };
      const head = cell?.state === "failed" ? undefined : (cell?.value as Head | undefined);
      sort.textContent = head?.document ?? "Notebook";
      title.textContent = head?.title ?? bareName(study.file);
      const lines = (head?.facts ?? []).map(([label, value]) =>
        html(
          document,
          "div",
          {},
          html(document, "dt", {}, label),
          html(document, "dd", {}, ...phrase(document, value)),
        ),
      );
      facts.replaceChildren(...lines);
      showWhen(facts, lines.length > 0);
      element.querySelector(".failure")?.remove();
      if (cell?.state === "failed") facts.before(failureLine(document, cell));
      const tag = cell && cell.state !== "current" && cell.state !== "failed" ? [stateTag(document, cell.state)] : [];
      program.replaceChildren(...tag, ...(tag.length > 0 ? ["  "] : []), options.program ?? "Hornbook");
      setAttribute(element, "data-state", cell?.state);
    },
    say(sentences) {
      address.replaceChildren(...sentences.map((sentence) => html(document, "p", {}, sentence)));
      showWhen(address, sentences.length > 0);
    },
  };
}
