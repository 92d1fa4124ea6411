// Prose in the column, a caution in its frame, and the line where a value that nothing shows has failed.

import type { Caution, Lead, Note } from "../shown.ts";
import type { CellView } from "../study.ts";
import { holdChildren, html, setAttribute } from "./dom.ts";
import { failureLine } from "./failure.ts";
import { placeId } from "./frame.ts";
import { headingInSource } from "./kind.ts";
import { letterMarks, marginNote, noteSignature } from "./margin.ts";
import type { Block, PageContext } from "./options.ts";
import type { FailureEntry, PlannedNote, ShownEntry } from "./plan-entries.ts";
import { phrase, prose } from "./prose.ts";
import { tagProse } from "./state-mark.ts";

interface Told {
  cell: CellView;
  notes: readonly PlannedNote[];
}

/** A block of words made anew whenever what it says, or the state of that, changes. */
function wordsBlock<Entry extends Told>(
  context: PageContext,
  first: Entry,
  className: string,
  say: (entry: Entry) => Node[],
): Block<Entry> {
  const { document } = context;
  const body = html(document, "div", { class: "said" });
  const element = html(document, "div", {
    class: `block ${className}`,
    id: placeId(first.cell.name),
    "data-cell": first.cell.name,
  });
  let shown: { value: unknown; rest: string } | undefined;
  return {
    element,
    update(entry) {
      const { cell, notes } = entry;
      const rest = JSON.stringify([cell.state, cell.progress, cell.failure, noteSignature(notes)]);
      setAttribute(element, "data-state", cell.state);
      if (shown && shown.value === cell.value && shown.rest === rest) return;
      shown = { value: cell.value, rest };
      body.replaceChildren(...say(entry));
      (body.lastElementChild ?? body).append(...letterMarks(document, notes));
      tagProse(document, body, cell);
      holdChildren(element, [...notes.map((note) => marginNote(context, note)), body]);
    },
  };
}

/** What stands for words that aren't there. */
function missing(context: PageContext, cell: CellView, firstHeading: 2 | 3 | 4): Node[] {
  const { document } = context;
  const heading = headingInSource(cell);
  const line = cell.state === "failed" ? failureLine(document, cell) : html(document, "p", { class: "pending" });
  return heading === undefined ? [line] : [html(document, `h${firstHeading}`, {}, heading), line];
}

export function noteBlock(context: PageContext, first: ShownEntry): Block<ShownEntry> {
  return wordsBlock(context, first, "prose", ({ cell }) => {
    const note = cell.state === "failed" ? undefined : (cell.value as Note | undefined);
    return note ? prose(context.document, note.markdown) : missing(context, cell, 2);
  });
}

export function leadBlock(context: PageContext, first: Told): Block<Told> {
  return wordsBlock(context, first, "lead", ({ cell }) => {
    const lead = cell.state === "failed" ? undefined : (cell.value as Lead | undefined);
    return lead ? prose(context.document, lead.markdown) : missing(context, cell, 2);
  });
}

/** "Caution: sun on the dish", also where the notebook left the word out. */
function cautionTitle(title: string): string {
  if (/^caution\b/i.test(title)) return title;
  const lower = /^[A-Z][a-z]/.test(title) ? title.charAt(0).toLowerCase() + title.slice(1) : title;
  return `Caution: ${lower}`;
}

export function cautionBlock(context: PageContext, first: ShownEntry, titleLevel: () => 2 | 3): Block<ShownEntry> {
  const { document } = context;
  return wordsBlock(context, first, "caution", ({ cell }) => {
    const caution = cell.state === "failed" ? undefined : (cell.value as Caution | undefined);
    if (!caution) return missing(context, cell, 3);
    const title = html(
      document,
      titleLevel() === 2 ? "h2" : "h3",
      { class: "title" },
      ...phrase(document, cautionTitle(caution.title)),
    );
    return [title, ...prose(document, caution.markdown, 4)];
  });
}

export function failureBlock(context: PageContext, first: FailureEntry): Block<FailureEntry> {
  return wordsBlock(context, first, "lost", ({ cell }) => [failureLine(context.document, cell)]);
}
