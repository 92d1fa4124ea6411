// Which cell of a new version is which of the former one.
import { cyclesOf } from "../graph.ts";
import type { CompiledCell } from "../study.ts";
import type { CellRecord } from "./cell-record.ts";

const isAnonymous = (name: string): boolean => name.startsWith("line ");

/** Named cells by name; anonymous ones, whose name is a line that moves, by their text in order. */
export function matchCells(
  records: ReadonlyMap<string, CellRecord>,
  cells: readonly CompiledCell[],
): Map<CompiledCell, CellRecord> {
  const anonymous = new Map<string, CellRecord[]>();
  for (const record of records.values()) {
    if (!isAnonymous(record.info.name)) continue;
    const same = anonymous.get(record.info.source) ?? [];
    anonymous.set(record.info.source, same);
    same.push(record);
  }
  const matched = new Map<CompiledCell, CellRecord>();
  for (const cell of cells) {
    const record = isAnonymous(cell.name) ? anonymous.get(cell.source)?.shift() : records.get(cell.name);
    if (record) matched.set(cell, record);
  }
  return matched;
}

/** True if nothing that could change the cell's value differs; its place in the file may. */
export function sameCell(former: CompiledCell, cell: CompiledCell, importsMoved: boolean): boolean {
  return (
    former.source === cell.source &&
    former.role === cell.role &&
    former.background === cell.background &&
    former.problem === cell.problem &&
    former.beside === cell.beside &&
    former.inputs.length === cell.inputs.length &&
    former.inputs.every((input, i) => input === cell.inputs[i]) &&
    !(importsMoved && (cell.imports?.length ?? 0) > 0)
  );
}

/** The compiler marks cells on a cycle; a module from elsewhere must not bring one in either. */
export function withoutCycles(cells: readonly CompiledCell[]): CompiledCell[] {
  const graph = new Map(cells.map((cell) => [cell.name, cell.problem === undefined ? cell.inputs : []]));
  const problems = new Map<string, string>();
  for (const cycle of cyclesOf(graph)) {
    for (const name of cycle) problems.set(name, `${cycle[0]} needs its own value: ${cycle.join(" → ")}`);
  }
  return cells.map((cell) =>
    problems.has(cell.name) ? { ...cell, problem: problems.get(cell.name) as string } : cell,
  );
}
