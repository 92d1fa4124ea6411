// What every shown thing has around it: title, notes beside it, the thing itself, its caption and its foot line.

import type { CellView } from "../study.ts";
import { holdChildren, html, nameId, setAttribute } from "./dom.ts";
import { failureLine } from "./failure.ts";
import { type FootEntry, footLine } from "./foot.ts";
import { letterMarks, marginNote, noteSignature } from "./margin.ts";
import type { PageContext } from "./options.ts";
import type { PlannedNote, ShownEntry } from "./plan-entries.ts";
import { phrase } from "./prose.ts";

export interface Framed {
  title?: string;
  caption?: string;
  foot: Omit<FootEntry, "cell" | "code">;
}

export interface Frame {
  readonly element: HTMLElement;
  /** holds the drawing or table; its height is kept while nothing is in it */
  readonly content: HTMLElement;
  /** notes that stand beside the whole thing get a letter after the title, or after the caption */
  update(entry: ShownEntry, framed: Framed, notes: readonly PlannedNote[], titleLevel: 2 | 3): void;
}

/** The anchor of a cell's place on the page. */
export function placeId(name: string): string {
  return `at-${nameId(name)}`;
}

export function frame(context: PageContext, cell: CellView, kind: "figure" | "table"): Frame {
  const { document } = context;
  const content = html(document, "div", { class: "content" });
  const caption = html(document, kind === "figure" ? "figcaption" : "p", { class: "caption" });
  const body =
    kind === "figure"
      ? html(document, "figure", {}, content, caption)
      : html(document, "div", { class: "body" }, content, caption);
  const foot = footLine(context, cell.name);
  const element = html(document, "div", { class: `block ${kind}`, id: placeId(cell.name), "data-cell": cell.name });
  let title: HTMLElement | undefined;
  let notesNow: HTMLElement[] = [];
  let signature = "";

  return {
    element,
    content,
    update(entry, framed, notes, titleLevel) {
      const next = JSON.stringify([framed.title, framed.caption, titleLevel, noteSignature(notes)]);
      if (next !== signature) {
        signature = next;
        const tag = titleLevel === 2 ? "h2" : "h3";
        title =
          framed.title === undefined
            ? undefined
            : html(document, tag, { class: "title" }, ...phrase(document, framed.title));
        caption.replaceChildren(...phrase(document, framed.caption ?? ""));
        (title ?? caption).append(...letterMarks(document, notes));
        notesNow = notes.map((note) => marginNote(context, note));
      }
      setAttribute(element, "data-state", entry.cell.state);
      foot.update({ ...framed.foot, cell: entry.cell, code: entry.code });
      const hasCaption = caption.childNodes.length > 0;
      holdChildren(body, hasCaption ? [content, caption] : [content]);
      holdChildren(element, [...(title ? [title] : []), ...notesNow, body, foot.element]);
    },
  };
}

/** What stands in a frame that has no value: why it failed, what the file showed before its script woke, or a word. */
export function emptyContent(context: PageContext, cell: CellView): Node {
  const { document } = context;
  if (cell.state === "failed") return failureLine(document, cell, false);
  const painted = context.painted.get(cell.name);
  if (painted) return painted;
  return html(document, "p", { class: "pending" }, "Not computed yet.");
}
