// The four states as a small mark and a word; and the quiet tag that prose carries while it is not current.

import type { CellView } from "../study.ts";
import { html, svg } from "./dom.ts";

/** Filled, half, open, cross: told apart without colour, drawn so that they print. */
export function stateMark(document: Document, state: CellView["state"]): SVGElement {
  const ring = () =>
    svg(document, "circle", { cx: 5, cy: 5, r: 3.6, fill: "none", stroke: "currentColor", "stroke-width": 1.4 });
  const shape = {
    current: () => [svg(document, "circle", { cx: 5, cy: 5, r: 4.3, fill: "currentColor" })],
    working: () => [ring(), svg(document, "path", { d: "M5 1.4a3.6 3.6 0 0 0 0 7.2z", fill: "currentColor" })],
    behind: () => [ring()],
    failed: () => [
      svg(document, "path", { d: "M1.5 1.5l7 7m0-7l-7 7", stroke: "currentColor", "stroke-width": 1.7, fill: "none" }),
    ],
  }[state]();
  return svg(
    document,
    "svg",
    { class: "mark", viewBox: "0 0 10 10", width: 10, height: 10, "aria-hidden": "true" },
    ...shape,
  );
}

/** "current", "working, 62 %", "behind", "failed". */
export function stateWords(state: CellView["state"], progress?: number): string {
  return state === "working" && progress !== undefined ? `working, ${Math.floor(progress * 100)}\u00a0%` : state;
}

/** A state as mark and words. */
export function stateTag(document: Document, state: CellView["state"], progress?: number): HTMLElement {
  return html(
    document,
    "span",
    { class: "state", "data-state": state },
    stateMark(document, state),
    stateWords(state, progress),
  );
}

/** Puts the state at the end of the last line of prose when it isn't current: words that hold live numbers say so too. */
export function tagProse(document: Document, element: HTMLElement, cell: CellView): void {
  if (cell.state === "current" || cell.state === "failed") return;
  const last = element.lastElementChild;
  const line = last && /^(?:P|H\d)$/.test(last.tagName) ? last : element;
  line.append(" ", stateTag(document, cell.state, cell.progress));
}
