// A table of results. Rows are lines of cells rather than table boxes, so that a note in the margin can float from its row;
// the roles say what the boxes no longer do.

import type { Table, TableCell, TableRow } from "../shown.ts";
import { html, idPart } from "./dom.ts";
import { emptyContent, frame } from "./frame.ts";
import { letterMarks, marginNote, noteSignature } from "./margin.ts";
import type { Block, PageContext } from "./options.ts";
import type { PlannedNote, ShownEntry } from "./plan-entries.ts";
import { phrase } from "./prose.ts";
import { csvText, saveText } from "./save.ts";
import { typeset } from "./typography.ts";

const kinds = new Set(["smooth", "dualMode", "corrugated", "chokeRing", "measured", "custom"]);

/** A kind of feed that has a colour, or undefined. */
function kindName(kind: string | undefined): string | undefined {
  return kind !== undefined && kinds.has(kind) ? kind : undefined;
}

/** The cell of a row that holds the notes beside it, a float in the margin. */
export function notesCell(context: PageContext, notes: readonly PlannedNote[]): HTMLElement {
  const { document } = context;
  return html(document, "td", { class: "notes", role: "cell" }, ...notes.map((note) => marginNote(context, note)));
}

function valueCell(document: Document, cell: TableCell, column: Table["columns"][number] | undefined): HTMLElement {
  return html(
    document,
    "td",
    { role: "cell", "data-label": column ? typeset(column.label) : undefined, "data-kind": kindName(column?.kind) },
    html(document, "span", { class: "number" }, typeset(cell.text)),
    cell.word
      ? html(document, "span", { class: "verdict", "data-verdict": cell.verdict }, typeset(cell.word))
      : undefined,
  );
}

function tableRow(context: PageContext, table: Table, row: TableRow, notes: readonly PlannedNote[]): HTMLElement {
  const { document } = context;
  const label = html(
    document,
    "th",
    { scope: "row", role: "rowheader" },
    ...phrase(document, row.label),
    ...letterMarks(document, notes),
    row.under ? html(document, "span", { class: "under" }, typeset(row.under)) : undefined,
  );
  const cells =
    typeof row.cells === "string"
      ? [
          html(
            document,
            "td",
            { role: "cell", class: "sentence", colspan: table.columns.length },
            ...phrase(document, row.cells),
          ),
        ]
      : row.cells.map((cell, index) => valueCell(document, cell, table.columns[index]));
  return html(
    document,
    "tr",
    { role: "row", class: row.total ? "total" : undefined, "data-row": row.key },
    notes.length > 0 ? notesCell(context, notes) : undefined,
    label,
    ...cells,
  );
}

function tableElement(context: PageContext, table: Table, notes: readonly PlannedNote[]): HTMLElement {
  const { document } = context;
  const besideRow = (row: TableRow) => notes.filter((note) => note.row !== undefined && note.row === row.key);
  const columns = table.columns.map((column) =>
    html(
      document,
      "th",
      { scope: "col", role: "columnheader", "data-kind": kindName(column.kind) },
      ...phrase(document, column.label),
    ),
  );
  const corner = html(
    document,
    "th",
    { scope: "col", role: "columnheader" },
    html(document, "span", { class: "unseen" }, "Quantity"),
  );
  return html(
    document,
    "table",
    { role: "table", class: "results", "data-columns": table.columns.length },
    html(document, "thead", { role: "rowgroup" }, html(document, "tr", { role: "row" }, corner, ...columns)),
    html(
      document,
      "tbody",
      { role: "rowgroup" },
      ...table.rows.map((row) => tableRow(context, table, row, besideRow(row))),
    ),
  );
}

export function tableBlock(context: PageContext, first: ShownEntry, titleLevel: () => 2 | 3): Block<ShownEntry> {
  const { document, live } = context;
  const parts = frame(context, first.cell, "table");
  const { content } = parts;
  let shown: { value: unknown; notes: string; failed: boolean } | undefined;

  return {
    element: parts.element,
    update(entry) {
      const { cell } = entry;
      const failed = cell.state === "failed";
      const table = failed ? undefined : (cell.value as Table | undefined);
      const rowNotes = entry.notes.filter((note) => note.row !== undefined);
      const notes = noteSignature(rowNotes);
      if (!shown || shown.value !== cell.value || shown.notes !== notes || shown.failed !== failed || failed) {
        if (live) content.style.minHeight = table ? "" : `${content.offsetHeight}px`;
        content.replaceChildren(table ? tableElement(context, table, rowNotes) : emptyContent(context, cell));
        shown = { value: cell.value, notes, failed };
      }
      const data = table?.data;
      const save = () => data && saveText(document, `${idPart(cell.name)}.csv`, "text/csv", csvText(data));
      parts.update(
        entry,
        {
          title: table?.title,
          caption: table?.caption,
          foot: {
            basis: table?.basis,
            saves: data ? [{ label: "numbers", describes: "save the numbers as CSV", save }] : [],
          },
        },
        entry.notes.filter((note) => note.row === undefined),
        titleLevel(),
      );
    },
  };
}
