// A study's values as plain JSON data: what the command line prints and what a page hands over on request, the same in both.

import { rationaleFindings } from "./rationale-findings.ts";
import { isShown, type Shown } from "./shown.ts";
import type { CellView, Study } from "./study.ts";

export type Plain = null | boolean | number | string | Plain[] | { [name: string]: Plain };

/** Doubt that travels with a value, or a warning in the margin. */
export interface FoundWarning {
  /** the first cell, in source order, that carries it */
  cell: string;
  /**
   * the warning's own code; "margin" for a warning that is only a note; "moved" and "inherited" for a
   * rationale; "not-finite" for a number that JSON can't hold
   */
  code: string;
  text: string;
  /** true: its words stand somewhere on the page */
  shown: boolean;
}

export interface FailedCell {
  cell: string;
  reason: string;
  /** where it began */
  began: string;
  file: string;
  line: number;
  path: string[];
}

export interface StudyValues {
  notebook: string;
  /** SI numbers, chosen options, true or false, texts */
  givens: Record<string, number | string | boolean>;
  /** SI; functions aren't values, and a failed cell has none */
  cells: Record<string, Plain>;
  warnings: FoundWarning[];
  failed: FailedCell[];
}

/** The values of a settled study. A number that isn't finite is null, and a warning names its place. */
export function studyValues(study: Study): StudyValues {
  const results = study.cells.filter(({ role, hidden }) => role === "value" && !hidden);
  const walk = startWalk();
  const cells: Record<string, Plain> = {};
  for (const cell of results) {
    if (cell.state === "failed" || cell.value === undefined || typeof cell.value === "function") continue;
    const value = walk.plain(cell.name, cell.value, cell.name);
    if (value !== undefined) cells[cell.name] = value;
  }
  const page = tidy(
    results.flatMap((cell) => (cell.state !== "failed" && isShown(cell.value) ? words(cell.value) : [])).join("\n"),
  );
  return {
    notebook: study.file,
    givens: Object.fromEntries(study.givens.map(({ name, value }) => [name, value])),
    cells,
    warnings: [
      ...walk.warnings.map((warning) => ({ ...warning, shown: page.includes(tidy(warning.text)) })),
      ...marginWarnings(results, walk.warnings),
      ...rationaleWarnings(results),
    ],
    failed: study.cells.flatMap((cell) => (cell.state === "failed" ? [failedCell(study, cell)] : [])),
  };
}

function failedCell(study: Study, { name, failure, line }: CellView): FailedCell {
  if (!failure) return { cell: name, reason: "it has no value", began: name, file: study.file, line, path: [name] };
  return {
    ...{ cell: name, reason: failure.reason, began: failure.cell },
    ...{ file: failure.file, line: failure.line, path: [...failure.path] },
  };
}

/** Notes marked as warnings, unless they only repeat what a value carries. */
function marginWarnings(cells: readonly CellView[], carried: readonly { text: string }[]): FoundWarning[] {
  const texts = carried.map(({ text }) => tidy(text));
  return cells.flatMap(({ name, state, value }) => {
    if (state === "failed" || !isShown(value) || value.shows !== "margin" || value.mark !== "warning") return [];
    const text = tidy(value.markdown);
    if (text === "" || texts.some((one) => text.includes(one))) return [];
    return [{ cell: name, code: "margin", text, shown: true }];
  });
}

/** Rationales that no longer stand as agreed, or never were agreed here. */
function rationaleWarnings(cells: readonly CellView[]): FoundWarning[] {
  return cells.flatMap(({ name, state, value }) => {
    if (state === "failed" || !isShown(value) || value.shows !== "rationale") return [];
    return rationaleFindings(value).map(({ code, text }) => ({ cell: name, code, text, shown: true }));
  });
}

/** Markdown's escapes and line breaks taken away, so that a warning is found in the prose that quotes it. */
const tidy = (text: string): string =>
  text
    .replace(/\\([!-/:-@[-`{-~])/g, "$1")
    .replace(/\s+/g, " ")
    .trim();

/** All words that a page shows of a value. */
function words(value: Shown): string[] {
  switch (value.shows) {
    case "head":
      return [value.title, ...value.facts.flat()];
    case "figure":
      return [value.title ?? "", value.caption, value.basis ?? "", value.drawing.alt];
    case "table":
      return [
        ...[value.title ?? "", value.caption ?? "", value.basis ?? ""],
        ...value.rows.flatMap(({ label, under, cells }) => [
          ...[label, under ?? ""],
          ...(typeof cells === "string" ? [cells] : cells.flatMap(({ text, word }) => [text, word ?? ""])),
        ]),
      ];
    default:
      return [value.markdown];
  }
}

interface Walk {
  warnings: Omit<FoundWarning, "shown">[];
  plain(cell: string, value: unknown, path: string): Plain | undefined;
}

function startWalk(): Walk {
  const warnings: Omit<FoundWarning, "shown">[] = [];
  const told = new Set<string>();
  const tell = (cell: string, code: string, text: string) => {
    const key = `${code} ${text}`;
    if (!told.has(key)) warnings.push({ cell, code, text });
    told.add(key);
  };
  const open = new Set<object>();

  function plain(cell: string, value: unknown, path: string): Plain | undefined {
    switch (typeof value) {
      case "number":
        if (Number.isFinite(value)) return value;
        tell(cell, "not-finite", `${path} is ${value}`);
        return null;
      case "string":
      case "boolean":
        return value;
      case "bigint":
        return String(value);
      case "object":
        return value === null ? null : readable(cell, value, path);
      default:
        return undefined;
    }
  }

  /** A field that throws when it is read, or that lies too deep, has no value; the rest has. */
  function readable(cell: string, value: object, path: string): Plain | undefined {
    try {
      return inside(cell, value, path);
    } catch (error) {
      const where = path.length > 120 ? `${path.slice(0, 120)}…` : path;
      tell(cell, "not-finite", `${where} can't be read: ${error instanceof Error ? error.message : "it throws"}`);
      return null;
    }
  }

  function inside(cell: string, value: object, path: string): Plain | undefined {
    if (open.has(value)) {
      tell(cell, "not-finite", `${path} holds itself`);
      return null;
    }
    open.add(value);
    try {
      if (value instanceof Date) return Number.isNaN(value.getTime()) ? null : value.toISOString();
      if (Array.isArray(value)) return value.map((item, i) => plain(cell, item, `${path}[${i}]`) ?? null);
      if (ArrayBuffer.isView(value) && !(value instanceof DataView)) {
        return Array.from(
          value as unknown as ArrayLike<number>,
          (item, i) => plain(cell, item, `${path}[${i}]`) ?? null,
        );
      }
      if (value instanceof Set) return [...value].map((item, i) => plain(cell, item, `${path}[${i}]`) ?? null);
      const entries =
        value instanceof Map ? [...value].map(([key, item]) => [String(key), item]) : Object.entries(value);
      noteWarnings(cell, (value as { warnings?: unknown }).warnings);
      const record: { [name: string]: Plain } = {};
      for (const [name, item] of entries as [string, unknown][]) {
        const part = plain(cell, item, `${path}.${name}`);
        // A plain assignment to "__proto__" would be lost.
        if (part !== undefined) Object.defineProperty(record, name, { value: part, enumerable: true, writable: true });
      }
      return record;
    } finally {
      open.delete(value);
    }
  }

  function noteWarnings(cell: string, list: unknown): void {
    if (!Array.isArray(list)) return;
    for (const item of list as { code?: unknown; text?: unknown }[]) {
      if (typeof item?.code === "string" && typeof item.text === "string") tell(cell, item.code, item.text);
    }
  }

  return { warnings, plain };
}
