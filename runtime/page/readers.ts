// Who reads whom among the cells of a study.

import type { CellView } from "../study.ts";
import { shownKind } from "./kind.ts";

/** Names of all cells that read a cell, directly or through others. */
export function descendants(cells: readonly CellView[], name: string): Set<string> {
  const found = new Set([name]);
  // Cells stand in order of definition, so one pass meets every reader after what it reads.
  for (const cell of cells) if (cell.inputs.some((input) => found.has(input))) found.add(cell.name);
  found.delete(name);
  return found;
}

/** The first shown thing that depends on a cell, in source order. */
export function firstShownReader(cells: readonly CellView[], name: string): CellView | undefined {
  const readers = descendants(cells, name);
  return cells.find((cell) => readers.has(cell.name) && shownKind(cell) && shownKind(cell) !== "margin");
}

/** The cells a cell waits for: itself or those above it in state `state` whose own inputs are not. */
export function rootsInState(cells: readonly CellView[], cell: CellView, state: CellView["state"]): CellView[] {
  const byName = new Map(cells.map((candidate) => [candidate.name, candidate]));
  const seen = new Set<string>();
  const roots: CellView[] = [];
  const visit = (at: CellView): void => {
    if (seen.has(at.name)) return;
    seen.add(at.name);
    const above = at.inputs.map((name) => byName.get(name)).filter((input) => input?.state === state) as CellView[];
    if (above.length === 0) roots.push(at);
    else for (const input of above) visit(input);
  };
  if (cell.state === state) visit(cell);
  return roots;
}
