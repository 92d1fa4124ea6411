// The source of what stands above, one click away.

import type { CellView } from "../study.ts";
import { html } from "./dom.ts";
import type { PageContext } from "./options.ts";

// Comments first, then whatever could hide the beginning of one. A division is never mistaken: only comments are marked.
const pieces = /\/\/[^\n]*|\/\*[\s\S]*?\*\/|"(?:\\.|[^"\\\n])*"|'(?:\\.|[^'\\\n])*'|`(?:\\[\s\S]|[^`\\])*`/g;

/** Source as text, its comments set back: the only colour that code needs here. */
export function codeNodes(document: Document, source: string): Node[] {
  const nodes: Node[] = [];
  let end = 0;
  for (const match of source.matchAll(pieces)) {
    if (!match[0].startsWith("/")) continue;
    nodes.push(document.createTextNode(source.slice(end, match.index)));
    nodes.push(html(document, "span", { class: "comment" }, match[0]));
    end = match.index + match[0].length;
  }
  nodes.push(document.createTextNode(source.slice(end)));
  return nodes;
}

/** "lines 41 to 58", or the lines of each run of cells. */
function placeOf(file: string, cells: readonly CellView[]): string {
  const lines = cells.map(({ line, endLine }) => (line === endLine ? `${line}` : `${line} to ${endLine}`));
  const one = lines.length === 1 && cells[0]!.line === cells[0]!.endLine;
  return `${file}, ${one ? "line" : "lines"} ${lines.join(", ")}`;
}

function panel(context: PageContext, cells: readonly CellView[]): HTMLElement[] {
  const { document, options, live, study } = context;
  const place = html(document, "p", { class: "place" }, placeOf(study.file, cells));
  const source = html(document, "code");
  cells.forEach((cell, index) => {
    if (index > 0) source.append("\n\n");
    source.append(...codeNodes(document, cell.source));
  });
  const parts: HTMLElement[] = [
    place,
    html(document, "pre", { tabindex: 0, role: "region", "aria-label": "code" }, source),
  ];
  const edit = options.edit;
  if (live && edit) {
    const host = html(document, "div", { class: "editor" });
    for (const cell of cells) {
      const button = html(document, "button", { type: "button" }, `edit ${cell.name}`);
      button.addEventListener("click", () => edit(cell, host));
      place.append(" ", button);
    }
    parts.push(host);
  }
  return parts;
}

/** A toggle "code" whose inside is made when it is first opened, or at once where there is no script to make it. */
export function codeToggle(
  context: PageContext,
  key: string,
): { element: HTMLElement; update(cells: readonly CellView[]): void } {
  const { document } = context;
  const summary = html(document, "summary", {}, "code");
  const inside = html(document, "div", { class: "inside" });
  const element = html(document, "details", { class: "opens code", id: `code-${key}` }, summary, inside);
  let cells: readonly CellView[] = [];
  let shown = "";
  const fill = () => {
    const now = cells.map((cell) => `${cell.line}\n${cell.source}`).join("\n\n");
    if (now === shown) return;
    shown = now;
    inside.replaceChildren(...panel(context, cells));
  };
  if (context.live) element.addEventListener("toggle", () => element.open && fill());
  return {
    element,
    update(next) {
      cells = next;
      if (!context.live || (element.open && shown)) fill();
    },
  };
}
