// Numbers of a study by the words a notebook would read them with: trade.rows[2].worst.gainDbi.

import { isShown } from "../../shown.ts";
import type { CellView, Study } from "../../study.ts";

/** Most proposals in a list: beyond, a person types. */
const most = 600;

const step = (key: string): string => (/^[A-Za-z_$][\w$]*$/.test(key) ? `.${key}` : `[${JSON.stringify(key)}]`);

function walk(path: string, value: unknown, depth: number, found: string[]): void {
  if (found.length >= most) return;
  if (typeof value === "number" && Number.isFinite(value)) found.push(path);
  else if (Array.isArray(value)) {
    // a sweep's points are no numbers that a decision rests on
    if (value.length <= 12) for (const [i, item] of value.entries()) walk(`${path}[${i}]`, item, depth - 1, found);
  } else if (typeof value === "object" && value !== null && depth > 0 && !isShown(value) && !ArrayBuffer.isView(value))
    for (const [key, item] of Object.entries(value)) walk(path + step(key), item, depth - 1, found);
}

/** Paths to numbers in the cells that a thing is made from, nearest first. */
export function numberPaths(study: Study, cell: CellView): string[] {
  const found: string[] = [];
  const seen = new Set<string>();
  let round = [cell];
  while (round.length > 0 && found.length < most) {
    const next: CellView[] = [];
    for (const one of round) {
      if (seen.has(one.name)) continue;
      seen.add(one.name);
      if (/^[A-Za-z_$][\w$]*$/.test(one.name) && !one.hidden) walk(one.name, numberSource(study, one), 5, found);
      next.push(...one.inputs.map((name) => study.cell(name)));
    }
    round = next;
  }
  return found;
}

function numberSource(study: Study, { name, role, value }: CellView): unknown {
  return role === "given" ? study.givens.find((given) => given.name === name)?.value : value;
}

/** A path read in the study as it is now; undefined when it is no path, or leads to no number. */
export function numberAt(study: Study, expression: string): number | undefined {
  const path = expression.trim();
  const pieces = path.match(/[A-Za-z_$][\w$]*|\[\d+\]|\["(?:[^"\\]|\\.)*"\]/g) ?? [];
  if (pieces.length === 0) return undefined;
  const rebuilt = pieces.map((piece, i) => (i === 0 || piece.startsWith("[") ? piece : `.${piece}`)).join("");
  if (rebuilt !== path) return undefined;
  const [root, ...rest] = pieces as [string, ...string[]];
  const cell = study.cells.find(({ name }) => name === root);
  if (!cell) return undefined;
  let value: unknown = numberSource(study, cell);
  for (const piece of rest) {
    const key = piece.startsWith("[") ? (JSON.parse(piece.slice(1, -1)) as string | number) : piece;
    if (typeof value !== "object" || value === null || !Object.hasOwn(value, key)) return undefined;
    value = (value as Record<string, unknown>)[key];
  }
  return typeof value === "number" && Number.isFinite(value) ? value : undefined;
}
