// Comma-separated text (RFC 4180) as a table of texts that know their line, and its numbers.

import { csvParseRows } from "d3-dsv";

/** Text that can't be read; the message names the file, the line, the column and what was expected. */
export class CsvError extends Error {
  override name = "CsvError";
  readonly line: number;
  /** name of the column, or "" for a fault of the whole line */
  readonly column: string;
  constructor(file: string, line: number, column: string, message: string) {
    super(`${file}, line ${line}${column === "" ? "" : `, column ${column}`}: ${message}`);
    this.line = line;
    this.column = column;
  }
}

export interface CsvTable {
  file: string;
  /** as written in the first row, without surrounding space */
  columns: string[];
  rows: { line: number; cells: string[] }[];
}

/** Most characters and rows taken: more is no profile and no pattern cut. */
const longestText = 20_000_000;
const mostRows = 200_000;

/**
 * Reads a table with a header row. Empty lines are left out; line ends may be CR, LF or CRLF, a byte order mark is dropped.
 * @param file what messages call it
 * @throws {CsvError} no header, a column named twice or not at all, a row of another length, a quote that is never closed or
 *         stands inside a field, too much text
 * @source RFC 4180, 2005
 */
export function readCsvTable(text: string, file: string): CsvTable {
  if (text.length > longestText)
    throw new CsvError(file, 1, "", `at most ${longestText} characters are read; got ${text.length}`);
  const plain = text.replace(/^\uFEFF/, "").replace(/\r\n?/g, "\n");
  const lines = recordLines(plain, file);
  const records = csvParseRows(plain);
  const filled = records
    .map((cells, i) => ({ line: lines[i] ?? i + 1, cells: cells.map((cell) => cell.trim()) }))
    .filter(({ cells }) => cells.some((cell) => cell !== ""));
  const [head, ...rows] = filled;
  if (!head) throw new CsvError(file, 1, "", "a header row with the names of the columns is expected; got nothing");
  head.cells.forEach((name, i) => {
    if (name === "") throw new CsvError(file, head.line, `${i + 1}`, "every column needs a name; this one has none");
    if (head.cells.indexOf(name) !== i)
      throw new CsvError(file, head.line, name, "each column needs a name of its own; this one stands twice");
  });
  if (rows.length > mostRows) throw new CsvError(file, rows[mostRows]!.line, "", `at most ${mostRows} rows are read`);
  for (const { line, cells } of rows)
    if (cells.length !== head.cells.length)
      throw new CsvError(
        file,
        line,
        "",
        `${head.cells.length} fields are expected, one a column; got ${cells.length}${cells.length === 1 ? " (is the separator a comma?)" : ""}`,
      );
  return { file, columns: head.cells, rows };
}

/** The line on which each record begins; checks the quotes on the way, which the parser takes as they come. */
function recordLines(text: string, file: string): number[] {
  const starts: number[] = [];
  let line = 1;
  let column = 0;
  let field = "start" as "start" | "plain" | "quoted" | "closed";
  let opened = 1;
  let fresh = true;
  for (let i = 0; i < text.length; i++) {
    const letter = text[i];
    if (fresh) {
      starts.push(line);
      fresh = false;
      column = 0;
    }
    if (field === "quoted") {
      if (letter === "\n") line++;
      if (letter !== '"') continue;
      if (text[i + 1] === '"') i++;
      else field = "closed";
      continue;
    }
    if (letter === "\n") {
      line++;
      field = "start";
      fresh = true;
    } else if (letter === ",") {
      column++;
      field = "start";
    } else if (letter === '"') {
      if (field !== "start")
        throw new CsvError(
          file,
          line,
          `${column + 1}`,
          "a quote may only stand at the ends of a field, or doubled in it",
        );
      field = "quoted";
      opened = line;
    } else if (field === "closed") {
      throw new CsvError(file, line, `${column + 1}`, "a comma is expected after the closing quote");
    } else field = "plain";
  }
  if (field === "quoted") throw new CsvError(file, opened, `${column + 1}`, "the quote opened here is never closed");
  return starts;
}

const decimal = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;

/**
 * The numbers of a column.
 * @throws {CsvError} no such column, a field that is no finite decimal number
 */
export function numberColumn(table: CsvTable, name: string): number[] {
  const at = table.columns.indexOf(name);
  if (at < 0)
    throw new CsvError(table.file, 1, "", `a column ${name} is expected; the columns are ${table.columns.join(", ")}`);
  return table.rows.map(({ line, cells }) => {
    const text = cells[at]!.replace(/^[−–]/, "-");
    const value = decimal.test(text) ? Number(text) : Number.NaN;
    if (Number.isFinite(value)) return value;
    const got = text === "" ? "nothing" : text.length > 40 ? `${text.slice(0, 40)}…` : text;
    const hint = /^[+-]?\d+,\d+$/.test(text) ? "; write a decimal point" : "";
    throw new CsvError(table.file, line, name, `a number is expected; got ${got}${hint}`);
  });
}
