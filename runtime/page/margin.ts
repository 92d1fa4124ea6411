// Notes in the margin. A note is a float that begins where its row or figure begins and clears the note before it, so it
// stands at the right height on a screen, on paper and without a script, and two notes never overlap.

import type { MarginMark } from "../shown.ts";
import { html } from "./dom.ts";
import { failureLine } from "./failure.ts";
import type { PageContext } from "./options.ts";
import type { PlannedNote } from "./plan-entries.ts";
import { prose } from "./prose.ts";
import { rationaleParts } from "./rationale-note.ts";
import { tagProse } from "./state-mark.ts";

const words: Record<MarginMark, string> = {
  reading: "Reading",
  warning: "Warning",
  modelsDiffer: "Models differ",
  changed: "Changed",
  rationale: "Rationale",
};

/** The letter beside the thing; nothing for a note without one. */
export function letterMark(document: Document, note: PlannedNote): HTMLElement | undefined {
  if (!note.letter) return undefined;
  return html(
    document,
    "sup",
    { class: "letter", "data-mark": note.mark },
    html(document, "span", { class: "unseen" }, " note "),
    note.letter,
  );
}

/** The letters of several notes, for the end of a title, caption or label. */
export function letterMarks(document: Document, notes: readonly PlannedNote[]): HTMLElement[] {
  return notes.map((note) => letterMark(document, note)).filter((mark) => mark !== undefined);
}

/** What a note looks like now, as one string: a part with notes is made again when it changes. */
export function noteSignature(notes: readonly PlannedNote[]): string {
  return JSON.stringify(
    notes.map(({ cell, letter, mark, row, markdown, rationale }) => [
      cell.name,
      cell.state,
      letter,
      mark,
      row,
      markdown,
      rationale,
      cell.failure?.reason,
    ]),
  );
}

/** The note itself. */
export function marginNote(context: PageContext, note: PlannedNote): HTMLElement {
  const { document } = context;
  const word = note.cell.state === "failed" ? "Note failed" : (words[note.mark] ?? words.reading);
  const body = html(document, "div", { class: "saying" });
  if (note.cell.state === "failed") body.append(failureLine(document, note.cell));
  else if (note.rationale) body.append(...rationaleParts(context, note.cell.name, note.rationale));
  else body.append(...prose(document, note.markdown, 4));
  tagProse(document, body, note.cell);
  const letter = note.letter ? html(document, "span", { class: "letter" }, note.letter) : undefined;
  return html(
    document,
    "div",
    {
      class: "beside",
      role: "note",
      "data-mark": note.mark,
      "data-cell": note.cell.name,
      "data-state": note.cell.state,
    },
    html(document, "p", { class: "sort" }, letter, letter && " ", word),
    body,
  );
}
