// The rules of a notebook: drafts of cells into cells with inputs, and every breach of a rule into a problem that names its cell.
import { cyclesOf } from "../graph.ts";
import type { Draft, ModuleDraft } from "./draft.ts";
import { IMPURE_GLOBALS, KNOWN_GLOBALS, VOCABULARY } from "./known-globals.ts";
import type { CellDraft, CheckedModule, Problem, Report } from "./parts.ts";
import type { Reference } from "./scope.ts";
import { identifierName, type Node, type ParsedModule } from "./syntax.ts";
import { vocabularyUse } from "./vocabulary-use.ts";

export function checkModule(file: string, module: ModuleDraft, parsed: ParsedModule): CheckedModule {
  const problems: Problem[] = [];
  const report: Report = (kind, message, node, cell) => {
    const { line, column } = node.loc.start;
    problems.push({ kind, message, file, line, column: column + 1, ...(cell ? { cell: cell.name } : {}) });
    if (cell) cell.problem ??= message;
  };
  for (const { node, refusal } of module.refused) report("statement", refusal, node);
  const cells = module.drafts.flatMap(cellsOf);
  const byName = nameCells(cells, module, report);
  reportInnerDuplicates(parsed, cells, problems, file);
  const backgroundFunctions = { imports: new Set<string>(), cells: new Set<string>() };
  for (const cell of cells) {
    if (cell.part !== undefined) continue;
    if (cell.draft.form === "bad") report("statement", cell.draft.refusal as string, cell.draft.node, cell);
    for (const node of cell.draft.free.unerasable) {
      report(
        "statement",
        "an enum or a namespace leaves code behind; write a const object or a union of texts",
        node,
        cell,
      );
    }
    resolveReferences(cell, cells, byName, module, report);
    vocabularyUse(cell, byName, module, report, backgroundFunctions);
  }
  reportCycles(cells, report);
  refuseImpureBackground(backgroundFunctions.cells, byName, report);
  problems.sort((a, b) => a.line - b.line || a.column - b.column);
  return {
    cells,
    problems,
    backgroundFunctions: { imports: [...backgroundFunctions.imports], cells: [...backgroundFunctions.cells] },
  };
}

function cellsOf(draft: Draft): CellDraft[] {
  const { name, line, endLine, sourceLine } = draft;
  const cell: CellDraft = {
    ...{ name, inputs: [], role: "value", background: false, line, endLine, sourceLine, imports: [], draft },
  };
  if (draft.form !== "parts") return [cell];
  const parts = draft.binds.map((bound): CellDraft => {
    const part = identifierName(bound);
    return { ...cell, imports: [], name: part, part, inputs: [name], line: bound.loc.start.line };
  });
  return [{ ...cell, hidden: true }, ...parts];
}

/** Gives each name to one cell. A name defined twice belongs to neither: both definitions fail, and so does what reads it. */
function nameCells(cells: CellDraft[], module: ModuleDraft, report: Report): Map<string, CellDraft> {
  const byName = new Map<string, CellDraft>();
  for (const cell of cells) {
    const node = bindingNode(cell);
    const first = byName.get(cell.name);
    const imported = module.imports.get(cell.name);
    if (imported) {
      const line = imported.node.loc.start.line;
      report(
        "duplicate",
        `${cell.name} is imported on line ${line} and defined again on line ${cell.line}`,
        node,
        cell,
      );
    }
    if (!first) {
      byName.set(cell.name, cell);
      continue;
    }
    const message = `${cell.name} is defined twice, on lines ${first.line} and ${cell.line}`;
    first.problem ??= message;
    report("duplicate", message, node, cell);
    cell.name = `${cell.name} (line ${cell.line})`;
    while (byName.has(cell.name)) cell.name += "′";
    byName.set(cell.name, cell);
  }
  return byName;
}

const bindingNode = (cell: CellDraft): Node =>
  cell.draft.binds.find((bound) => identifierName(bound) === cell.part) ?? cell.draft.binds[0] ?? cell.draft.node;

/** A name declared twice inside a function or block spoils the cell that holds it. */
function reportInnerDuplicates(parsed: ParsedModule, cells: CellDraft[], problems: Problem[], file: string): void {
  for (const { message, line, column } of parsed.redeclared) {
    const known = problems.some(
      (problem) => problem.kind === "duplicate" && problem.line === line && problem.column === column,
    );
    if (known) continue;
    const cell = cells.find((one) => one.draft.statement.loc.start.line <= line && line <= one.endLine);
    const words = `${message.charAt(0).toLowerCase()}${message.slice(1)}`;
    problems.push({ kind: "duplicate", message: words, file, line, column, ...(cell ? { cell: cell.name } : {}) });
    if (cell) cell.problem ??= words;
  }
}

function resolveReferences(
  cell: CellDraft,
  cells: readonly CellDraft[],
  byName: ReadonlyMap<string, CellDraft>,
  module: ModuleDraft,
  report: Report,
): void {
  const own = new Set(cell.draft.binds.map(identifierName));
  const reported = new Set<string>();
  const once = (kind: Problem["kind"], name: string, message: string, node: Node) => {
    if (reported.has(`${kind} ${name}`)) return;
    reported.add(`${kind} ${name}`);
    report(kind, message, node, cell);
  };
  for (const reference of cell.draft.free.references) {
    const { name, node } = reference;
    const read = byName.get(name);
    if (reference.write && (read || module.imports.has(name))) {
      const what = read ? `the cell ${name}` : `the import ${name}`;
      once("assignment", name, `${titleOf(cell)} assigns to ${what}; only its own line gives a cell its value`, node);
    }
    if (own.has(name)) {
      const direct = !reference.deferred && cell.draft.form === "const";
      if (direct) once("cycle", name, `${name} needs its own value: ${name} → ${name}`, node);
    } else if (read) {
      if (!cell.inputs.includes(name)) cell.inputs.push(name);
      const early = readTooEarly(reference, cell, read);
      if (early) once("use-before-definition", name, early, node);
    } else if (module.imports.has(name)) {
      if (!cell.imports?.includes(name)) cell.imports?.push(name);
    } else if (!(reference.probed || module.ambient.has(name) || KNOWN_GLOBALS.has(name))) {
      const [kind, message] = unknownName(name, cells, module);
      once(kind, name, message, node);
    }
  }
}

/** What `tsc` refuses too (TS2448, TS2449): a read that runs before the definition; a function's body may refer to later cells. */
function readTooEarly(reference: Reference, cell: CellDraft, read: CellDraft): string | undefined {
  if (reference.deferred || read.draft.form === "function" || read.draft.order <= cell.draft.order) return undefined;
  return `${reference.name} is used on line ${reference.node.loc.start.line} before it is defined on line ${read.line}; move its definition up`;
}

function unknownName(name: string, cells: readonly CellDraft[], module: ModuleDraft): [Problem["kind"], string] {
  if (VOCABULARY.has(name)) {
    return ["missing-import", `${name} is not imported; add it to the import from "../runtime/index.ts"`];
  }
  if (IMPURE_GLOBALS.has(name)) {
    return [
      "unknown-name",
      `${name} is out of reach: a cell gives the same value in a page, a worker and on the command line`,
    ];
  }
  const near = nearest(name, [...cells.map((cell) => cell.name), ...module.imports.keys(), ...KNOWN_GLOBALS]);
  return ["unknown-name", `${name} is not a cell, an import or a known name${near ? `; is ${near} meant?` : ""}`];
}

function nearest(name: string, candidates: readonly string[]): string | undefined {
  const limit = Math.max(1, Math.floor(name.length / 4));
  let best: string | undefined;
  let least = limit + 1;
  for (const candidate of candidates) {
    if (Math.abs(candidate.length - name.length) >= least) continue;
    const distance = editDistance(name.toLowerCase(), candidate.toLowerCase());
    if (distance < least) [best, least] = [candidate, distance];
  }
  return best;
}

/** Letters to insert, drop, change or swap with their neighbour (optimal string alignment). */
function editDistance(a: string, b: string): number {
  const rows = [Array.from({ length: b.length + 1 }, (_, j) => j)];
  const at = (i: number, j: number): number => rows[i]?.[j] ?? 0;
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    rows.push(row);
    for (let j = 1; j <= b.length; j++) {
      const change = at(i - 1, j - 1) + (a[i - 1] === b[j - 1] ? 0 : 1);
      const swapped = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1];
      row.push(Math.min(change, at(i - 1, j) + 1, at(i, j - 1) + 1, swapped ? at(i - 2, j - 2) + 1 : change));
    }
  }
  return at(a.length, b.length);
}

function reportCycles(cells: readonly CellDraft[], report: Report): void {
  const byName = new Map(cells.map((cell) => [cell.name, cell]));
  const graph = new Map(cells.map((cell) => [cell.name, cell.inputs]));
  for (const cycle of cyclesOf(graph)) {
    // A destructuring's hidden cell is no name the reader knows.
    const named = cycle.slice(0, -1).filter((name) => !byName.get(name)?.hidden);
    const orders = named.map((name) => cells.findIndex((cell) => cell.name === name));
    const first = orders.indexOf(Math.min(...orders));
    const visible = [...named.slice(first), ...named.slice(0, first)];
    const path = [...visible, visible[0]].join(" → ");
    const message = `${visible[0]} needs its own value: ${path}; one of these must do without another`;
    const cell = byName.get(visible[0] as string) as CellDraft;
    report("cycle", message, bindingNode(cell), cell);
    for (const name of cycle) (byName.get(name) as CellDraft).problem ??= message;
  }
}

/** A worker has no givens: a function of the notebook can run there only if nothing it needs depends on one. */
function refuseImpureBackground(names: Set<string>, byName: ReadonlyMap<string, CellDraft>, report: Report): void {
  for (const name of names) {
    const needed = new Set([name]);
    for (const at of needed) for (const input of byName.get(at)?.inputs ?? []) needed.add(input);
    const obstacle = [...needed]
      .map((at) => byName.get(at) as CellDraft)
      .find((cell) => cell.role === "given" || cell.background || cell.draft.free.awaits || cell.problem !== undefined);
    if (!obstacle) continue;
    names.delete(name);
    const cell = byName.get(name) as CellDraft;
    const why = obstacle.role === "given" ? "a given" : "a cell that a worker can't evaluate";
    report(
      "background",
      `${name} is called in the background but needs ${obstacle.name}, ${why}; hand its value over as an argument`,
      bindingNode(cell),
      cell,
    );
  }
}

export const titleOf = (cell: CellDraft): string =>
  cell.name.startsWith("line ") ? `the cell on ${cell.name}` : cell.name;
