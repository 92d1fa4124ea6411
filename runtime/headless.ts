// A notebook without a page: its values as JSON, with every doubt and every failure named.
import type { BackgroundPool } from "./background/pool.ts";
import { createStudy } from "./engine.ts";
import { type Json, jsonReady } from "./json-ready.ts";
import type { NotebookModule, Study } from "./study.ts";

export interface HeadlessOptions {
  /** texts of givens, as `--set name=text` hands them over */
  givens?: Readonly<Record<string, string>>;
  /** workers for background(); ended with the evaluation */
  background?: BackgroundPool;
  /** called once the study runs, for whoever reports progress */
  started?: (study: Study) => void;
  /** fail a cell that changes what it received from another */
  frozen?: boolean;
}

export interface NotebookWarning {
  cell: string;
  code: string;
  text: string;
}

export interface FailedCell {
  cell: string;
  reason: string;
  /** line where it began */
  line: number;
  /** names from the cell where it began to this one */
  path: string[];
}

export interface NotebookValues {
  /** file name */
  notebook: string;
  /** SI numbers, choices, switches, texts */
  givens: Record<string, number | string | boolean>;
  /** every cell with a value that JSON can hold, givens left out, in source order */
  cells: Record<string, Json>;
  warnings: NotebookWarning[];
  failed: FailedCell[];
}

/** A given that does not exist or refuses its text. */
export class GivenRefused extends Error {
  override name = "GivenRefused";
  readonly given: string;
  constructor(given: string, message: string) {
    super(message);
    this.given = given;
  }
}

/**
 * Evaluates a whole notebook and ends. A failed cell is listed, not thrown.
 * @throws {GivenRefused} unknown name or refused text; nothing is evaluated
 */
export async function evaluateNotebook(
  notebook: NotebookModule,
  options: HeadlessOptions = {},
): Promise<NotebookValues> {
  const { background, frozen, started } = options;
  const study = createStudy(notebook, { ...(background ? { background } : {}), ...(frozen ? { frozen } : {}) });
  try {
    const answer = study.setAll(options.givens ?? {});
    if (!answer.ok) throw new GivenRefused(answer.name, answer.message);
    started?.(study);
    await study.settled();
    return studyValues(study);
  } finally {
    study.dispose();
  }
}

/** The values of a study that has settled. */
export function studyValues(study: Study): NotebookValues {
  const values: NotebookValues = {
    ...{ notebook: study.file, cells: {}, warnings: [], failed: [] },
    givens: Object.fromEntries(study.givens.map(({ name, value }) => [name, value])),
  };
  const seen = new WeakSet<object>();
  for (const cell of study.cells) {
    const { name, state, value, failure } = cell;
    if (state === "failed" && failure && !cell.hidden) {
      values.failed.push({ cell: name, reason: failure.reason, line: failure.line, path: failure.path });
    }
    if (state !== "current" || cell.role === "given" || cell.hidden) continue;
    for (const { code, text } of warningsIn(value, seen)) values.warnings.push({ cell: name, code, text });
    const { json, notFinite } = jsonReady(value);
    if (json === undefined) continue;
    values.cells[name] = json;
    if (notFinite.length > 0) values.warnings.push({ cell: name, code: "not-finite", text: notFiniteText(notFinite) });
  }
  return values;
}

function notFiniteText(paths: readonly string[]): string {
  const more = paths.length > 1 ? `, and ${paths.length - 1} more` : "";
  return `${paths[0]}${more}; written as null`;
}

/** Every entry of a list named `warnings`, anywhere in a value; one that several cells share is reported by the first. */
function warningsIn(value: unknown, seen: WeakSet<object>): { code: string; text: string }[] {
  if (typeof value !== "object" || value === null || ArrayBuffer.isView(value) || seen.has(value)) return [];
  seen.add(value);
  const inner = value instanceof Map || value instanceof Set ? [...value.values()] : Object.values(value);
  const listed = (value as { warnings?: unknown }).warnings;
  const own = (Array.isArray(listed) ? listed : []).filter(isWarning).filter((warning) => !seen.has(warning));
  for (const warning of own) seen.add(warning);
  return [...own, ...inner.flatMap((one) => warningsIn(one, seen))];
}

function isWarning(value: unknown): value is { code: string; text: string } {
  const { code, text } = (value ?? {}) as { code?: unknown; text?: unknown };
  return typeof code === "string" && typeof text === "string";
}
