// A compiled notebook, running. @observablehq/runtime decides what is evaluated and in which order; this file decides what may
// be called current. A cell is current only while its outcome was computed from the latest outcomes of all its inputs: an
// evaluation that was overtaken is dropped, whatever it returns, and the newest begins at once. The ways in which a cell changes
// its state are kept together here, so that they can be read against one another.
import { type Module, Runtime } from "@observablehq/runtime";
import { startHere } from "./background/here.ts";
import type { BackgroundPool } from "./background/pool.ts";
import { failureOf, passedOn } from "./cell-error.ts";
import { backgroundCalls, type Heavy, nameOfHeavy, type Progress } from "./engine/background-calls.ts";
import { CellRecord, isLatest, type Outcome, OVERTAKEN, type Passed, type Run } from "./engine/cell-record.ts";
import { GivenDesk } from "./engine/given-desk.ts";
import { Listeners } from "./engine/listeners.ts";
import { matchCells, sameCell, withoutCycles } from "./engine/match-cells.ts";
import { nextTurn } from "./engine/next-turn.ts";
import { deepFreeze } from "./freeze.ts";
import { Refusal } from "./given.ts";
import { requireShowable } from "./shown-shape.ts";
import type { CellView, GivenView, NotebookModule, Study } from "./study.ts";

export interface StudyOptions {
  /** texts of givens to begin with (an address, a command line); refused ones are kept as the given's refusal, unknown names ignored */
  givens?: Readonly<Record<string, string>>;
  /** workers for background(), owned by the study from here on; without it heavy functions run on this thread */
  background?: BackgroundPool;
  /** freeze plain objects and arrays before another cell sees them, so that a cell which changes what it received fails */
  frozen?: boolean;
}

/** Starts a study; its cells are evaluated from the next frame on. */
export function createStudy(notebook: NotebookModule, options: StudyOptions = {}): Study {
  return new RunningStudy(notebook, options);
}

class RunningStudy implements Study {
  private notebook: NotebookModule;
  private pool: BackgroundPool | undefined;
  private readonly frozen: boolean;
  private readonly runtime: Runtime;
  private readonly module: Module;
  /** in source order */
  private records = new Map<string, CellRecord>();
  private readonly desk = new GivenDesk();
  private readonly listeners = new Listeners();
  private waiting: (() => void)[] = [];
  private nextId = 1;
  private disposed = false;

  constructor(notebook: NotebookModule, options: StudyOptions) {
    this.notebook = notebook;
    this.pool = options.background;
    this.frozen = options.frozen ?? false;
    this.runtime = new Runtime(undefined, (name) => {
      throw new Error(`${name} is not defined`);
    });
    // The library waits for an animation frame, which never comes while a page is hidden.
    this.runtime._computeSoon = () => nextTurn().then(() => (this.disposed ? undefined : this.runtime._computeNow()));
    this.module = this.runtime.module();
    this.adopt(notebook);
    for (const [name, text] of Object.entries(options.givens ?? {})) {
      if (this.desk.has(name)) this.set(name, text);
    }
  }

  get file(): string {
    return this.notebook.file;
  }

  get source(): string {
    return this.notebook.source;
  }

  get cells(): readonly CellView[] {
    return [...this.records.values()].map((record) => record.view);
  }

  get givens(): readonly GivenView[] {
    return [...this.records.keys()].flatMap((name) => this.desk.view(name) ?? []);
  }

  cell(name: string): CellView {
    return this.record(name).view;
  }

  set(name: string, text: string): { ok: true } | { ok: false; message: string } {
    const answer = this.setAll({ [name]: text });
    return answer.ok ? answer : { ok: false, message: answer.message };
  }

  setAll(texts: Readonly<Record<string, string>>): { ok: true } | { ok: false; name: string; message: string } {
    const readings: [string, ReturnType<GivenDesk["read"]>][] = [];
    for (const [name, text] of Object.entries(texts)) {
      try {
        readings.push([name, this.desk.read(name, text)]);
      } catch (error) {
        const message = (error as Error).message;
        if (error instanceof Refusal) {
          this.desk.refuse(name, text, message);
          this.noteChange(this.record(name));
        }
        return { ok: false, name, message };
      }
    }
    const moved: CellRecord[] = [];
    for (const [name, reading] of readings) {
      const record = this.record(name);
      if (this.desk.enter(name, reading)) moved.push(record);
      this.listeners.note(record.view);
    }
    this.moveGivens(moved);
    this.afterEvent();
    return { ok: true };
  }

  reset(): void {
    this.setAll(this.desk.defaults());
  }

  stop(name: string): void {
    const record = this.record(name);
    if (!record.run) return;
    record.stopped = true;
    this.dropRun(record);
    this.noteChange(record);
  }

  again(name: string): void {
    const wanted = new Set([this.record(name)]);
    for (const record of wanted) {
      for (const input of record.inputs) if (!input.fresh) wanted.add(input);
    }
    const begin = [...wanted].filter((record) => record.info.name === name || record.stopped);
    this.evaluateAgain(begin.filter((record) => record.info.role === "value"));
  }

  settled(): Promise<void> {
    return new Promise((resolve) => {
      this.waiting.push(resolve);
      this.afterEvent();
    });
  }

  subscribe(listener: (changed: readonly CellView[]) => void): () => void {
    return this.listeners.add(listener);
  }

  redefine(module: NotebookModule, background?: BackgroundPool): void {
    const replaced = background !== undefined && background !== this.pool;
    if (replaced) {
      this.pool?.dispose();
      this.pool = background;
    }
    this.adopt(module, replaced);
  }

  dispose(): void {
    if (this.disposed) return;
    this.disposed = true;
    for (const record of this.records.values()) this.dropRun(record);
    this.runtime.dispose();
    this.pool?.dispose();
    this.listeners.clear();
    for (const resolve of this.waiting.splice(0)) resolve();
  }

  private record(name: string): CellRecord {
    const record = this.records.get(name);
    if (!record) throw new RangeError(`there is no cell ${JSON.stringify(name)} in ${this.file}`);
    return record;
  }

  /** Takes a version of the notebook: new cells, changed cells, cells that are gone. The first version changes all. */
  private adopt(module: NotebookModule, poolReplaced = false): void {
    const former = this.notebook;
    const importsMoved = former.importsDigest !== module.importsDigest;
    const cells = withoutCycles(module.cells);
    const matched = matchCells(this.records, cells);
    const gone = new Set(this.records.values());
    this.notebook = module;
    const changed: CellRecord[] = [];
    this.records = new Map();
    for (const info of cells) {
      const known = matched.get(info);
      const record = known ?? new CellRecord(`#${this.nextId++}`, info);
      const wasGiven = known?.info.role === "given";
      if (wasGiven && info.role !== "given") this.desk.forget(known.info.name);
      if (!known || !sameCell(known.info, info, importsMoved)) changed.push(record);
      // Work that waits for the former workers would wait in vain.
      else if (record.run && poolReplaced) changed.push(record);
      gone.delete(record);
      record.info = info;
      this.records.set(info.name, record);
    }
    for (const record of gone) this.remove(record);
    for (const record of this.records.values()) {
      record.inputs = record.info.problem === undefined ? record.info.inputs.map((name) => this.record(name)) : [];
    }
    const moved = new Set<CellRecord>();
    for (const record of changed) if (this.define(record)) moved.add(record);
    this.invalidate(moved);
    for (const record of this.records.values()) this.listeners.note(record.view);
    this.afterEvent();
  }

  private remove(record: CellRecord): void {
    this.dropRun(record);
    record.variable?.delete();
    if (record.info.role === "given" && this.records.get(record.info.name)?.info.role !== "given") {
      this.desk.forget(record.info.name);
    }
  }

  /** Tells the library about a cell. @returns false for a given whose value stays what it was */
  private define(record: CellRecord): boolean {
    record.variable ??= this.module.variable({});
    if (record.info.role !== "given") {
      const inputs = record.inputs.map((input) => input.id);
      record.variable.define(record.id, inputs, (...passed: never[]) => this.evaluate(record, passed));
      return true;
    }
    const former = record.fresh ? record.outcome : undefined;
    let outcome: Outcome;
    try {
      this.desk.declare(record.info);
      outcome = { record, value: this.desk.value(record.info.name) };
    } catch (error) {
      outcome = { record, failure: failureOf(record.info, this.file, error) };
    }
    if (former && !former.failure && !outcome.failure && Object.is(former.value, outcome.value)) return false;
    this.passGiven(record, outcome);
    return true;
  }

  private passGiven(record: CellRecord, outcome: Outcome): void {
    this.dropRun(record);
    record.outcome = outcome;
    record.fresh = true;
    record.evaluations++;
    record.variable?.define(record.id, [], () => outcome);
  }

  private moveGivens(moved: readonly CellRecord[]): void {
    if (moved.length === 0) return;
    for (const record of moved) this.passGiven(record, { record, value: this.desk.value(record.info.name) });
    this.invalidate(new Set(moved));
  }

  private evaluateAgain(records: readonly CellRecord[]): void {
    for (const record of records) this.define(record);
    this.invalidate(new Set(records));
  }

  /** From here on `moved` and all that depends on them is behind; work under way for the former inputs is dropped. */
  private invalidate(moved: ReadonlySet<CellRecord>): void {
    const behind = new Set(moved);
    const readers = this.readers();
    for (const record of behind) for (const reader of readers.get(record) ?? []) behind.add(reader);
    for (const record of behind) {
      this.listeners.note(record.view);
      if (record.info.role === "given") continue;
      record.fresh = false;
      record.stopped = false;
      this.dropRun(record);
    }
  }

  private readers(): Map<CellRecord, CellRecord[]> {
    const readers = new Map<CellRecord, CellRecord[]>();
    for (const record of this.records.values()) {
      for (const input of record.inputs) {
        const list = readers.get(input);
        if (list) list.push(record);
        else readers.set(input, [record]);
      }
    }
    return readers;
  }

  private dropRun(record: CellRecord): void {
    const { run } = record;
    record.run = undefined;
    record.progress = undefined;
    for (const job of record.jobs) job.cancel();
    record.jobs.clear();
    run?.drop();
  }

  /** Called by the library when the inputs of a cell are there. */
  private evaluate(record: CellRecord, passed: readonly Passed[]): Passed | Promise<Passed> {
    if (!isLatest(passed)) return OVERTAKEN;
    const failed = passed.find((input) => input.failure !== undefined)?.failure;
    if (failed) return this.accept(record, passed, { record, failure: passedOn(failed, record.info.name) });
    const { info } = record;
    if (info.problem !== undefined) return this.accept(record, passed, this.failed(record, new Error(info.problem)));
    record.evaluations++;
    const run: Run = { drop: () => {} };
    record.jobs = new Set();
    let result: unknown;
    let later: PromiseLike<unknown> | undefined;
    try {
      const values = passed.map((input) => input.value);
      const extra = info.background ? [this.backgroundFor(record, run)] : [];
      result = info.define(...([...values, ...extra] as never[]));
      later = isThenable(result) ? result : undefined;
    } catch (error) {
      return this.accept(record, passed, this.failed(record, error));
    }
    if (!later) return this.accept(record, passed, { record, value: result });
    return this.awaitResult(record, run, passed, later);
  }

  private awaitResult(
    record: CellRecord,
    run: Run,
    passed: readonly Outcome[],
    result: PromiseLike<unknown>,
  ): Promise<Passed> {
    record.run = run;
    this.noteChange(record);
    return new Promise<Passed>((resolve) => {
      run.drop = () => resolve(OVERTAKEN);
      const end = (outcome: Outcome) => {
        if (record.run !== run) return;
        record.run = undefined;
        record.progress = undefined;
        resolve(this.accept(record, passed, outcome));
      };
      try {
        result.then(
          (value) => end({ record, value }),
          (error) => end(this.failed(record, error)),
        );
      } catch (error) {
        end(this.failed(record, error));
      }
    });
  }

  private failed(record: CellRecord, error: unknown): Outcome {
    return { record, failure: failureOf(record.info, this.file, error) };
  }

  private accept(record: CellRecord, passed: readonly Passed[], outcome: Outcome): Passed {
    if (!isLatest(passed)) return OVERTAKEN;
    record.outcome = outcome.failure ? outcome : this.looked(record, outcome);
    record.fresh = true;
    this.noteChange(record);
    return record.outcome;
  }

  /** A value that throws when it is looked at, or that can't be shown though it says so, is a failure of its cell alone. */
  private looked(record: CellRecord, outcome: Outcome): Outcome {
    try {
      requireShowable(outcome.value);
      if (this.frozen) deepFreeze(outcome.value);
      return outcome;
    } catch (error) {
      return this.failed(record, error);
    }
  }

  /** What a cell receives as `background`. */
  private backgroundFor(record: CellRecord, run: Run) {
    return backgroundCalls(
      record.jobs,
      (heavy, args, onProgress) => this.startJob(heavy, args, onProgress),
      (fraction) => {
        if (record.run !== run) return;
        record.progress = fraction;
        this.noteChange(record);
      },
    );
  }

  private startJob(heavy: Heavy, args: readonly unknown[], onProgress: Progress) {
    if (!this.pool) return startHere(heavy, args, onProgress);
    const cellValue = (name: string) => this.records.get(name)?.outcome?.value;
    return this.pool.start(nameOfHeavy(heavy, this.notebook.backgroundFunctions, cellValue), args, onProgress);
  }

  private noteChange(record: CellRecord): void {
    this.listeners.note(record.view);
    this.afterEvent();
  }

  /** Tells listeners once nothing is left that could be evaluated at once, and whoever waits once nothing is under way either. */
  private afterEvent(): void {
    if (this.anyDue()) return;
    this.listeners.tellSoon(() => !this.anyDue());
    if (this.waiting.length === 0 || this.some((record) => record.run !== undefined)) return;
    for (const resolve of this.waiting.splice(0)) resolve();
  }

  private anyDue = (): boolean => this.some((record) => record.due);

  private some(test: (record: CellRecord) => boolean): boolean {
    for (const record of this.records.values()) if (test(record)) return true;
    return false;
  }
}

function isThenable(value: unknown): value is PromiseLike<unknown> {
  return typeof value === "object" && value !== null && typeof (value as { then?: unknown }).then === "function";
}
