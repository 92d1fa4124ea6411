// Why there is no value: in which cell it began, where that stands, the reason, and the way from there to here.

import type { CellView } from "../study.ts";
import { html } from "./dom.ts";
import { stateTag } from "./state-mark.ts";
import { typeset } from "./typography.ts";
import { capital } from "./words.ts";

function sentence(text: string): string {
  const trimmed = text.trim();
  return /[.!?]$/.test(trimmed) ? trimmed : `${trimmed}.`;
}

/** The failure as a paragraph; `tagged` puts the mark before it, where no foot line carries it. */
export function failureLine(document: Document, cell: CellView, tagged = true): HTMLElement {
  const failure = cell.failure;
  const code = (text: string) => html(document, "code", {}, text);
  const line = html(document, "p", { class: "failure" }, tagged && stateTag(document, "failed"), tagged && " ");
  if (!failure) {
    line.append(tagged ? "without a reason given." : "No reason was given.");
    return line;
  }
  const began = failure.cell === cell.name ? "in cell " : "because of cell ";
  line.append(
    tagged ? began : capital(began),
    code(failure.cell),
    ", ",
    html(document, "span", { class: "place" }, `${failure.file}:${failure.line}`),
    `: ${typeset(sentence(failure.reason))}`,
  );
  const path = failure.path.length > 1 ? failure.path : [];
  if (path.length > 0) {
    const way = html(document, "span", { class: "way" }, " The way here: ");
    path.forEach((name, index) => {
      way.append(index > 0 ? " → " : "", code(name));
    });
    way.append(".");
    line.append(way);
  }
  return line;
}
