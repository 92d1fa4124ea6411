// What a notebook imports: givens, prose, figures, tables, heavy work. Each returns plain tagged data (shown.ts) or, for a given,
// its SI default, so that a notebook imported by a test or another module is just a module.
import * as declare from "./given.ts";
import { prose } from "./prose.ts";
import type {
  Caution,
  Drawing,
  Figure,
  Head,
  Lead,
  MarginMark,
  MarginNote,
  Note,
  Table,
  TableCell,
  TableRow,
} from "./shown.ts";
import { significant } from "./shown-number.ts";

export { rationale, restsOn } from "./rationale.ts";
export { show } from "./shown-number.ts";

function quantityGiven(text: string, options: declare.QuantityOptions): number {
  return declare.declareQuantity(text, options).default as number;
}

function choiceGiven<const T extends string>(options: readonly T[], details: declare.ChoiceOptions<NoInfer<T>>): T {
  return declare.declareChoice(options, details).default as T;
}

function switchGiven(on: boolean, details: declare.SwitchOptions): boolean {
  return declare.declareSwitch(on, details).default as boolean;
}

function textGiven(text: string, details: declare.TextOptions): string {
  return declare.declareText(text, details).default as string;
}

/**
 * An input of the study, alone as the value of a top-level const:
 *
 *     const dishDiameter = given("2.4 m", { label: "Dish diameter", why: "the rim we own", min: "0.3 m", max: "20 m" });
 *
 * Written and shown with its unit, an SI number to every cell that uses it (a level in dB stays in dB). `given.choice`,
 * `given.switch` and `given.text` are its other forms. The `declare` beside each is what a compiled notebook calls.
 *
 * @throws {Refusal} no label, a default that cannot be read, or one outside its own range
 */
export const given = Object.assign(quantityGiven, {
  choice: Object.assign(choiceGiven, { declare: declare.declareChoice }),
  switch: Object.assign(switchGiven, { declare: declare.declareSwitch }),
  text: Object.assign(textGiven, { declare: declare.declareText }),
  declare: declare.declareQuantity,
});

/** The memorandum's head. Facts are label and value, at most six. */
export function head(details: {
  document: string;
  title: string;
  facts: readonly (readonly [string, string | number])[];
}): Head {
  const { document, title, facts } = details;
  if (!title) throw new TypeError("head: title must be the study's title; got nothing");
  if (facts.length > 6) throw new RangeError(`head: facts must be six at most; got ${facts.length}`);
  return { shows: "head", document, title, facts: facts.map(([label, value]) => [label, plain("head", value)]) };
}

type Tag<T> = (strings: TemplateStringsArray, ...values: unknown[]) => T;

/** Prose in Markdown with live values: note`The rim is seen at ${show(dish.halfAngle, "deg", 1)}.` A note that opens with "## " begins a section. */
export const note: Tag<Note> = (strings, ...values) => ({ shows: "note", markdown: prose("note", strings, values) });

/** The opening paragraph: written after the cells it quotes, shown first. */
export const lead: Tag<Lead> = (strings, ...values) => ({ shows: "lead", markdown: prose("lead", strings, values) });

/**
 * A note in the margin beside a cell: margin(trade, { mark: "warning", row: "dualMode" })`…`. An empty text shows nothing.
 * @param beside the cell itself, by its name
 */
export function margin(beside: unknown, details: { mark?: MarginMark; row?: string } = {}): Tag<MarginNote> {
  void beside;
  const { mark = "reading", row } = details;
  return (strings, ...values) => ({
    ...{ shows: "margin", mark, markdown: prose("margin", strings, values) },
    ...(row === undefined ? {} : { row }),
  });
}

/** Where work can hurt someone: the only framed text of the page. */
export function caution(title: string): Tag<Caution> {
  return (strings, ...values) => ({ shows: "caution", title, markdown: prose("caution", strings, values) });
}

/** Text to be taken as Markdown where a note would otherwise escape it. Never hand it text that came from outside the study. */
export function markdown(text: string): { markdown: string } {
  return { markdown: text };
}

/** A drawing of cells/figures with its caption; `basis` says by which model, over how many frequencies. */
export function figure(drawing: Drawing, details: { title?: string; caption: string; basis?: string }): Figure {
  if (typeof drawing?.draw !== "function" || typeof drawing.alt !== "string" || drawing.alt.trim() === "") {
    throw new TypeError("figure: drawing must have a text alternative (alt) and a draw function");
  }
  if (!details?.caption) throw new TypeError("figure: caption must say what is drawn; got nothing");
  return { shows: "figure", ...details, drawing };
}

export interface TableDetails extends Omit<Table, "shows" | "rows" | "columns"> {
  columns: readonly (string | Table["columns"][number])[];
  rows: readonly (Omit<TableRow, "cells"> & { cells: readonly (TableCell | string | number)[] | string })[];
}

/** A table of results; cells as text (show(…) writes numbers), as numbers, or with a word and a verdict. */
export function table(details: TableDetails): Table {
  const columns = details.columns.map((column) => (typeof column === "string" ? { label: column } : column));
  const rows = details.rows.map(({ cells, ...row }): TableRow => {
    if (typeof cells === "string") return { ...row, cells };
    if (cells.length !== columns.length) {
      throw new RangeError(
        `table: row "${row.label}" must have ${columns.length} cells, one a column; got ${cells.length}`,
      );
    }
    return { ...row, cells: cells.map((cell) => (typeof cell === "object" ? cell : { text: plain("table", cell) })) };
  });
  return { ...details, shows: "table", columns, rows };
}

function plain(where: string, value: string | number): string {
  if (typeof value === "string") return value;
  if (typeof value !== "number") throw new TypeError(`${where}: value must be text or a number; got ${String(value)}`);
  if (!Number.isFinite(value)) throw new RangeError(`${where}: value must be finite; got ${value}`);
  return significant(value);
}

/** Progress of heavy work, 0..1; a function of cells/ takes it as its last parameter. */
export type Progress = (fraction: number) => void;

/** Parameters without the Progress at their end, if there is one. */
type BeforeProgress<P extends unknown[]> =
  Required<P> extends [...unknown[], infer Last]
    ? Last extends Progress
      ? Progress extends Last
        ? WithoutLast<P>
        : P
      : P
    : P;
type WithoutLast<P extends unknown[]> = P extends [...infer A, unknown] ? A : P extends [...infer A, unknown?] ? A : P;

/** All of them, optional ones included: the progress callback follows the last argument, so none may be left out. */
type AllOf<P extends unknown[]> = Unboxed<Required<Boxed<P>>>;
type Boxed<P extends unknown[]> = { [K in keyof P]: [P[K]] };
type Unboxed<P extends unknown[]> = { [K in keyof P]: P[K] extends [infer T] ? T : never };

/**
 * Heavy work, off the main thread: const sweep = await background(overBand, horn, dish). A study run by the engine reports its
 * progress and drops it as soon as an input moves; in a plain module this just calls the function.
 *
 * @param heavy a function imported from cells/, or of this notebook if it reads no given; its last parameter may be a Progress,
 *              which it then receives
 * @param args  all its other arguments (undefined for an optional one). Arguments and result travel by structured clone: plain
 *              data, no functions.
 */
export async function background<F extends (...args: never[]) => unknown>(
  heavy: F,
  ...args: AllOf<BeforeProgress<Parameters<F>>>
): Promise<Awaited<ReturnType<F>>> {
  return (await heavy(...(args as never[]))) as Awaited<ReturnType<F>>;
}
