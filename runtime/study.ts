// What a running study is, for all who look at one: the page, the command line, a test.
import type { BackgroundPool } from "./background/pool.ts";

/** In our words: computed from the inputs as they are; being computed; inputs moved and the old value is kept, greyed; no value. */
export type CellState = "current" | "working" | "behind" | "failed";

/** One cell of a compiled notebook. */
export interface CompiledCell {
  name: string;
  /** names of the cells it reads, each once */
  inputs: string[];
  role: "given" | "value";
  /** margin notes: the cell named as their first argument */
  beside?: string;
  /** calls background(): receives it as its last argument */
  background: boolean;
  /** hidden from the reader: the value a destructuring takes its parts from */
  hidden?: boolean;
  /** 1-based lines in the notebook */
  line: number;
  endLine: number;
  /** the cell as written, with the comment that leads it */
  source: string;
  /** line on which `source` begins; the cell's own line if left out */
  sourceLine?: number;
  /** names it takes from imports */
  imports?: string[];
  /** why it can't have a value, found by the compiler; it is never evaluated */
  problem?: string;
  define: (...inputs: never[]) => unknown;
}

/** A notebook after compilation: what the engine runs. */
export interface NotebookModule {
  /** file name beside the project, "notebooks/trade-study.ts" */
  file: string;
  /** the whole source, as written */
  source: string;
  cells: CompiledCell[];
  /**
   * Digest of everything the notebook imports, set by whoever bundles it: when it differs between two versions, `redefine`
   * evaluates the cells that use an import again. Left out on both sides, imports count as unchanged.
   */
  importsDigest?: string;
  /** functions that background() may call in a worker, by name */
  backgroundFunctions: Record<string, (...args: never[]) => unknown>;
}

/** Why a cell has no value. */
export interface CellFailure {
  /** one sentence: what went wrong, in the words of the error */
  reason: string;
  /** the cell in which it began */
  cell: string;
  file: string;
  line: number;
  /** names from the cell where it began to this one */
  path: string[];
  /** what was thrown */
  cause?: unknown;
}

export interface GivenView {
  name: string;
  form: "quantity" | "choice" | "switch" | "text";
  label: string;
  why: string;
  /** unit the reader sees, as written in the default: "m", "GHz"; empty for none */
  unit: string;
  /** what the field shows now: "2.4 m" */
  text: string;
  /** what the file says */
  defaultText: string;
  /** SI number, chosen option, true/false or text */
  value: number | string | boolean;
  /** quantity: limits and slider step, in SI */
  min?: number;
  max?: number;
  step?: number;
  /** quantity: the SI value of one `unit`, where a factor is all there is to it: 1e9 for GHz */
  perUnit?: number;
  /** choice */
  options?: string[];
  /** a sentence, when what was last entered was refused; the value above is the last good one */
  refusal?: { entered: string; message: string };
}

export interface CellView {
  readonly name: string;
  readonly role: "given" | "value";
  readonly inputs: readonly string[];
  readonly beside?: string;
  readonly hidden: boolean;
  readonly line: number;
  readonly endLine: number;
  readonly source: string;
  readonly state: CellState;
  /** kept while behind or working; undefined when there has been none */
  readonly value: unknown;
  readonly failure?: CellFailure;
  /** 0..1 while working, where the work reports it */
  readonly progress?: number;
  /** how often it was evaluated since the study began */
  readonly evaluations: number;
}

export interface Study {
  readonly file: string;
  readonly source: string;
  /** in source order */
  readonly cells: readonly CellView[];
  readonly givens: readonly GivenView[];
  cell(name: string): CellView;
  /** Enters text in a given. Refused (returned, and kept as its refusal): the study keeps its last good state. */
  set(name: string, text: string): { ok: true } | { ok: false; message: string };
  /** Several at once: one evaluation of what depends on them. All or nothing: the first refusal leaves every given as it was. */
  setAll(texts: Record<string, string>): { ok: true } | { ok: false; name: string; message: string };
  /** Back to what the file says. */
  reset(): void;
  /** Stops the background work of a cell; it stays behind until an input moves or `again` is called. */
  stop(name: string): void;
  again(name: string): void;
  /** Resolves when no cell is working or waiting. */
  settled(): Promise<void>;
  /** Called once per change of state or value, after each burst, with the cells that changed. Returns a way to leave. */
  subscribe(listener: (changed: readonly CellView[]) => void): () => void;
  /**
   * Takes a newly compiled version of the notebook: only cells whose text or inputs differ (and what depends on them) are evaluated.
   * A pool of workers that know the new version takes the former one's place, and work under way begins again in it.
   */
  redefine(module: NotebookModule, background?: BackgroundPool): void;
  dispose(): void;
}
