// Why there is no value: in which cell it began, where that stands, the reason, and the way from there to here.

import type { CellView } from "../study.ts";
import { html } from "./dom.ts";
import { stateTag } from "./state-mark.ts";

function sentence(text: string): string {
  const trimmed = text.trim();
  return /[.!?]$/.test(trimmed) ? trimmed : `${trimmed}.`;
}

/** The failure as a paragraph. */
export function failureLine(document: Document, cell: CellView): HTMLElement {
  const failure = cell.failure;
  const code = (text: string) => html(document, "code", {}, text);
  if (!failure) return html(document, "p", { class: "failure" }, stateTag(document, "failed"), " no reason was given.");
  const path = failure.path.length > 1 ? failure.path : [];
  const line = html(
    document,
    "p",
    { class: "failure" },
    stateTag(document, "failed"),
    failure.cell === cell.name ? " in cell " : " because of cell ",
    code(failure.cell),
    ", ",
    html(document, "span", { class: "place" }, `${failure.file}:${failure.line}`),
    `: ${sentence(failure.reason)}`,
  );
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
