// One running cell: its latest outcome, whether that still belongs to its inputs, and the work under way.
import type { Variable } from "@observablehq/runtime";
import type { BackgroundJob } from "../background/pool.ts";
import type { CellFailure, CellState, CellView, CompiledCell } from "../study.ts";

/** What an evaluation ended with. Its identity matters: a cell is current only if it was computed from its inputs' latest outcomes. */
export interface Outcome {
  record: CellRecord;
  value?: unknown;
  failure?: CellFailure;
}

/** Passed on instead of an outcome by an evaluation that was overtaken. */
export const OVERTAKEN = Symbol("overtaken");
export type Passed = Outcome | typeof OVERTAKEN;

/** An evaluation under way. */
export interface Run {
  /** Drops it: whoever waits goes on at once, with OVERTAKEN. */
  drop: () => void;
}

export class CellRecord {
  /** the library's name for it: stays while the cell is renamed or redefined */
  readonly id: string;
  info: CompiledCell;
  variable: Variable | undefined;
  inputs: CellRecord[] = [];
  outcome: Outcome | undefined;
  /** the outcome belongs to the inputs as they are */
  fresh = false;
  /** stopped by hand: waits for an input to move or for `again` */
  stopped = false;
  run: Run | undefined;
  /** background calls of the latest evaluation; a cell that is a function may go on making them when it is current */
  jobs = new Set<BackgroundJob>();
  progress: number | undefined;
  evaluations = 0;
  readonly view: CellView;

  constructor(id: string, info: CompiledCell) {
    this.id = id;
    this.info = info;
    this.view = viewOf(this);
  }

  get state(): CellState {
    if (this.fresh) return this.outcome?.failure ? "failed" : "current";
    return this.run ? "working" : "behind";
  }

  /** Could be evaluated now: neither under way nor waiting for another. */
  get due(): boolean {
    return !this.fresh && !this.run && !this.stopped && this.inputs.every((input) => input.fresh);
  }
}

function viewOf(record: CellRecord): CellView {
  return {
    get name() {
      return record.info.name;
    },
    get role() {
      return record.info.role;
    },
    get inputs() {
      return record.info.inputs;
    },
    get beside() {
      return record.info.beside;
    },
    get hidden() {
      return record.info.hidden ?? false;
    },
    get line() {
      return record.info.line;
    },
    get endLine() {
      return record.info.endLine;
    },
    get source() {
      return record.info.source;
    },
    get state() {
      return record.state;
    },
    get value() {
      return record.outcome?.value;
    },
    get failure() {
      return record.fresh ? record.outcome?.failure : undefined;
    },
    get progress() {
      return record.run ? record.progress : undefined;
    },
    get evaluations() {
      return record.evaluations;
    },
  } as CellView;
}

/** Each is still the latest outcome of its cell, which has not fallen behind since. */
export function isLatest(passed: readonly Passed[]): passed is readonly Outcome[] {
  return passed.every((outcome) => outcome !== OVERTAKEN && outcome.record.fresh && outcome.record.outcome === outcome);
}
