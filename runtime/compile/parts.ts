// What the steps of the compiler hand on: problems as they are told, drafts of cells, a checked module.

import type { CompiledCell } from "../study.ts";
import type { Draft } from "./draft.ts";
import type { Node } from "./syntax.ts";

/** What is wrong in a notebook, and where. */
export interface Problem {
  kind:
    | "parse"
    | "duplicate"
    | "unknown-name"
    | "missing-import"
    | "cycle"
    | "use-before-definition"
    | "assignment"
    | "given"
    | "background"
    | "margin"
    | "statement";
  /** one sentence */
  message: string;
  file: string;
  /** 1-based */
  line: number;
  /** 1-based */
  column: number;
  /** the cell that has no value because of it; none if the whole file cannot be read */
  cell?: string;
}

/** A cell before its code is written. */
export interface CellDraft extends Omit<CompiledCell, "define" | "source"> {
  draft: Draft;
  /** a name taken from a destructuring */
  part?: string;
  /** role given: the end of the called name, where `.declare` goes */
  declareAt?: number;
}

export interface CheckedModule {
  cells: CellDraft[];
  problems: Problem[];
  /** import names and cells whose functions background() calls */
  backgroundFunctions: { imports: string[]; cells: string[] };
}

/** Words a problem: the place is added from the node. */
export type Report = (kind: Problem["kind"], message: string, node: Node, cell?: CellDraft) => void;
