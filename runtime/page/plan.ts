// Where everything stands: the study's cells, in source order, as a memorandum of sections with notes beside their things.

import type { MarginNote, Note, Rationale } from "../shown.ts";
import type { CellView, Study } from "../study.ts";
import { idPart } from "./dom.ts";
import { headingInSource, shownKind } from "./kind.ts";
import type { Entry, GivensEntry, Plan, Section } from "./plan-entries.ts";
import { placeNotes } from "./plan-notes.ts";
import { openingHeading } from "./prose.ts";
import { descendants } from "./readers.ts";

/** The title of the section that a note begins, or undefined when it begins none. */
function sectionTitle(cell: CellView): string | undefined {
  const note = cell.value as Note | undefined;
  return note ? openingHeading(note.markdown) : headingInSource(cell);
}

function failsUnseen(cells: readonly CellView[], cell: CellView): boolean {
  if (cell.state !== "failed" || cell.failure?.cell !== cell.name) return false;
  const readers = descendants(cells, cell.name);
  return !cells.some((reader) => readers.has(reader.name) && shownKind(reader));
}

export function planStudy(study: Study): Plan {
  const plan: Plan = { leadNotes: [], sections: [] };
  const givens = new Map(study.givens.map((given) => [given.name, given]));
  const ids = new Map<string, number>();
  const margins: { cell: CellView; note: MarginNote; rationale?: Rationale; after?: Entry }[] = [];
  let built: CellView[] = [];
  let lastGivens: GivensEntry | undefined;
  let last: Entry | undefined;

  const begin = (key: string, title?: string, ownHeading = false): Section => {
    const slug = title ? idPart(title) : "opening";
    const count = (ids.get(slug) ?? 0) + 1;
    ids.set(slug, count);
    const section = { key, id: count > 1 ? `${slug}-${count}` : slug, title, ownHeading, entries: [] };
    plan.sections.push(section);
    return section;
  };
  const put = (entry: Entry): void => {
    const section = plan.sections.at(-1) ?? begin(`section ${entry.key}`);
    section.entries.push(entry);
    last = entry;
  };

  for (const cell of study.cells) {
    const given = givens.get(cell.name);
    if (given) {
      if (last?.kind === "givens") last.givens.push(given);
      else {
        if (!plan.sections.at(-1)?.title) begin("section given", "Given", true);
        lastGivens = { kind: "givens", key: `givens ${cell.name}`, givens: [given], last: false, notes: [] };
        put(lastGivens);
      }
      continue;
    }
    const kind = shownKind(cell);
    if (kind === undefined) {
      built.push(cell);
      if (failsUnseen(study.cells, cell)) put({ kind: "failure", key: `failure ${cell.name}`, cell, notes: [] });
    } else if (kind === "head") plan.head ??= cell;
    else if (kind === "lead") plan.lead ??= cell;
    else if (kind === "margin") {
      const note = cell.value as MarginNote | undefined;
      if (cell.state === "failed" || note?.markdown.trim())
        margins.push({ cell, note: note ?? { shows: "margin", mark: "warning", markdown: "" }, after: last });
    } else if (kind === "rationale") {
      const rationale = cell.value as Rationale | undefined;
      const markdown = rationale?.markdown ?? "";
      if (rationale || cell.state === "failed")
        margins.push({ cell, note: { shows: "margin", mark: "rationale", markdown }, rationale, after: last });
    } else {
      const title = kind === "note" ? sectionTitle(cell) : undefined;
      if (title !== undefined) begin(`section ${cell.name}`, title);
      const code = kind === "note" || kind === "caution" ? [cell] : [...built, cell];
      if (kind === "figure" || kind === "table") built = [];
      put({ kind, key: `shown ${cell.name}`, cell, code, notes: [] });
    }
  }
  if (lastGivens) lastGivens.last = true;
  placeNotes(study, plan, margins);
  return plan;
}
