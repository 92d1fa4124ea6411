// Values as CSV (RFC 4180): cells whose rows match make one table; otherwise every number gets a row of its own.

/** A plain value, as JSON has it. */
export type Plain = null | boolean | number | string | Plain[] | { [name: string]: Plain };

type Row = Map<string, string>;

/**
 * CSV text of cells. One cell that is a list of objects (or has one under `rows`, or figures' and tables' `data`) gives its rows;
 * lists and objects of lists give columns; several cells stand side by side when they have equally many rows. Cells that don't
 * fit together are written long: cell, row, quantity, value.
 * @param cells plain values by cell name, numbers in SI
 */
export function valuesCsv(cells: Record<string, Plain>): string {
  const tables = Object.entries(cells).map(([name, value]) => ({ name, rows: rowsOf(name, value) }));
  const fit = tables.length > 0 && tables.every(({ rows }) => rows.length === tables[0]!.rows.length);
  return csvText(fit ? sideBySide(tables) : long(tables));
}

function sideBySide(tables: { name: string; rows: Row[] }[]): string[][] {
  const columns: { heading: string; column: string; rows: Row[] }[] = [];
  for (const { name, rows } of tables) {
    for (const column of columnsOf(rows)) {
      columns.push({ heading: tables.length === 1 || column === name ? column : `${name}.${column}`, column, rows });
    }
  }
  const count = tables[0]!.rows.length;
  const body = Array.from({ length: count }, (_, i) => columns.map(({ column, rows }) => rows[i]!.get(column) ?? ""));
  return [columns.map(({ heading }) => heading), ...body];
}

function long(tables: { name: string; rows: Row[] }[]): string[][] {
  const body = tables.flatMap(({ name, rows }) =>
    rows.flatMap((row, i) => [...row].map(([column, value]) => [name, String(i + 1), column, value])),
  );
  return [["cell", "row", "quantity", "value"], ...body];
}

function columnsOf(rows: Row[]): string[] {
  const columns = new Set<string>();
  for (const row of rows) for (const column of row.keys()) columns.add(column);
  return [...columns];
}

const isRecord = (value: Plain | undefined): value is { [name: string]: Plain } =>
  typeof value === "object" && value !== null && !Array.isArray(value);

function rowsOf(name: string, value: Plain): Row[] {
  if (Array.isArray(value)) return value.map((item) => flatRow(name, item));
  if (!isRecord(value)) return [flatRow(name, value)];
  if (typeof value.shows === "string") return shownRows(name, value);
  if (Array.isArray(value.rows) && value.rows.every(isRecord)) return value.rows.map((item) => flatRow(name, item));
  const lists = Object.entries(value).filter((entry): entry is [string, Plain[]] => Array.isArray(entry[1]));
  const length = lists[0]?.[1].length;
  if (length !== undefined && length > 0 && lists.every(([, list]) => list.length === length)) {
    return Array.from({ length }, (_, i) => {
      const row: Row = new Map();
      for (const [column, list] of lists) addTo(row, column, list[i]!);
      return row;
    });
  }
  return [flatRow(name, value)];
}

/** What a page shows as a figure or a table carries its numbers under `data`: first row the names of the columns. */
function shownRows(name: string, value: { [name: string]: Plain }): Row[] {
  const data = value.data ?? (isRecord(value.drawing) ? value.drawing.data : undefined);
  if (Array.isArray(data) && data.length > 0 && data.every(Array.isArray)) {
    const [head, ...body] = data as Plain[][];
    return body.map((cells) => new Map(cells.map((cell, i) => [String(head![i] ?? i + 1), written(cell)])));
  }
  return typeof value.markdown === "string" ? [new Map([[name, value.markdown]])] : [];
}

function flatRow(name: string, item: Plain): Row {
  const row: Row = new Map();
  if (isRecord(item)) for (const [column, part] of Object.entries(item)) addTo(row, column, part);
  else addTo(row, name, item);
  return row;
}

/** Nested parts get dotted names: `worst.gainDbi`, `s11.re`, `path.0`. */
function addTo(row: Row, column: string, value: Plain): void {
  if (Array.isArray(value)) {
    value.forEach((part, i) => {
      addTo(row, `${column}.${i}`, part);
    });
  } else if (isRecord(value)) {
    for (const [name, part] of Object.entries(value)) addTo(row, `${column}.${name}`, part);
  } else row.set(column, written(value));
}

/** Shortest text that reads back to the same number. */
function written(value: Plain): string {
  if (value === null) return "";
  return typeof value === "object" ? JSON.stringify(value) : String(value);
}

/** RFC 4180: comma, CR LF, quotes doubled in a quoted field. */
export function csvText(rows: readonly (readonly string[])[]): string {
  const field = (text: string) => (/[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);
  return rows.map((row) => `${row.map(field).join(",")}\r\n`).join("");
}
