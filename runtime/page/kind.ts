// What a cell shows, also before it has a value or after it failed.

import { isShown, type Shown } from "../shown.ts";
import type { CellView } from "../study.ts";

export type ShownKind = Shown["shows"];

const spoken =
  /^\s*(?:export\s+)?(?:const\s+[\w$]+\s*(?::[^=]+)?=\s*)?(?:await\s+)?(head|note|lead|margin|caution|figure|table|rationale)\b/;

/**
 * The kind of thing a cell shows, or undefined for a plain value. Without a value (working for the first time, failed)
 * the cell's own words tell: it calls the vocabulary by name.
 */
export function shownKind(cell: CellView): ShownKind | undefined {
  if (cell.role === "given") return undefined;
  if (isShown(cell.value)) return cell.value.shows;
  if (cell.value !== undefined) return undefined;
  return spoken.exec(cell.source)?.[1] as ShownKind | undefined;
}

/** The heading that a note's source opens with, for a note that has no value yet. */
export function headingInSource(cell: CellView): string | undefined {
  return /`\s*##? +([^\n`$]+)/.exec(cell.source)?.[1]?.trim();
}
