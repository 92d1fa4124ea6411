// A study without an engine: cells of given values and states, recomputed by plain functions when a given is set.
// It lets a test put any cell in any state; it claims nothing about how a real engine schedules.

import type { CellFailure, CellState, CellView, GivenView, NotebookModule, Study } from "../../../runtime/study.ts";

type Writable<T> = { -readonly [K in keyof T]: T[K] };

export interface FakeCell {
  name: string;
  source?: string;
  inputs?: string[];
  beside?: string;
  hidden?: boolean;
  state?: CellState;
  progress?: number;
  failure?: CellFailure;
  /** its value, from the givens by name */
  value?: (givens: Record<string, GivenView["value"]>) => unknown;
}

export type FakeGiven = Partial<GivenView> & { name: string; text: string };

/** Units the fake can read, with their size in SI. */
const sizes: Record<string, number> = { m: 1, mm: 1e-3, GHz: 1e9, MHz: 1e6, dB: 1, "": 1 };

export class FakeStudy implements Study {
  file = "notebooks/sample.ts";
  readonly source: string;
  readonly cells: Writable<CellView>[] = [];
  readonly givens: GivenView[] = [];
  readonly calls: string[] = [];
  readonly #functions = new Map<string, FakeCell["value"]>();
  readonly #listeners = new Set<(changed: readonly CellView[]) => void>();

  constructor(parts: readonly (FakeGiven | FakeCell)[], file?: string) {
    if (file !== undefined) this.file = file;
    let line = 1;
    for (const part of parts) {
      const source =
        "text" in part
          ? `const ${part.name} = given(${JSON.stringify(part.text)});`
          : (part.source ?? `const ${part.name} = 0;`);
      const endLine = line + source.split("\n").length - 1;
      const place = { name: part.name, line, endLine, source, hidden: false, evaluations: 1 };
      if ("text" in part) {
        this.givens.push(fakeGiven(part));
        this.cells.push({ ...place, role: "given", inputs: [], state: "current", value: undefined });
      } else {
        this.#functions.set(part.name, part.value);
        const { inputs = [], state = "current", beside, hidden = false, progress, failure } = part;
        this.cells.push({
          ...place,
          role: "value",
          inputs,
          state,
          beside,
          hidden,
          progress,
          failure,
          value: undefined,
        });
      }
      line = endLine + 2;
    }
    this.source = this.cells.map((cell) => cell.source).join("\n\n");
    for (const cell of this.cells) if (cell.state !== "failed") this.#evaluate(cell);
  }

  cell(name: string): Writable<CellView> {
    const cell = this.cells.find((candidate) => candidate.name === name);
    if (!cell) throw new Error(`no cell ${name}`);
    return cell;
  }

  given(name: string): GivenView {
    const given = this.givens.find((candidate) => candidate.name === name);
    if (!given) throw new Error(`no given ${name}`);
    return given;
  }

  /** Puts a cell in a state and tells the listeners. */
  put(name: string, change: Partial<CellView>): void {
    Object.assign(this.cell(name), change);
    this.#tell([this.cell(name)]);
  }

  set(name: string, text: string): { ok: true } | { ok: false; message: string } {
    this.calls.push(`set ${name} ${text}`);
    const given = this.given(name);
    const read = readFake(given, text);
    if (typeof read === "string") {
      given.refusal = { entered: text, message: read };
      return { ok: false, message: read };
    }
    Object.assign(given, read);
    delete given.refusal;
    this.#recompute();
    return { ok: true };
  }

  setAll(texts: Record<string, string>): { ok: true } | { ok: false; name: string; message: string } {
    for (const [name, text] of Object.entries(texts)) {
      const read = readFake(this.given(name), text);
      if (typeof read === "string") return { ok: false, name, message: read };
    }
    for (const [name, text] of Object.entries(texts)) Object.assign(this.given(name), readFake(this.given(name), text));
    this.#recompute();
    return { ok: true };
  }

  reset(): void {
    this.calls.push("reset");
    for (const given of this.givens) {
      Object.assign(given, readFake(given, given.defaultText));
      delete given.refusal;
    }
    this.#recompute();
  }

  stop(name: string): void {
    this.calls.push(`stop ${name}`);
    this.put(name, { state: "behind", progress: undefined });
  }

  again(name: string): void {
    this.calls.push(`again ${name}`);
    this.put(name, { state: "working" });
  }

  settled(): Promise<void> {
    return Promise.resolve();
  }

  subscribe(listener: (changed: readonly CellView[]) => void): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  redefine(_module: NotebookModule): void {}
  dispose(): void {}

  #evaluate(cell: Writable<CellView>): void {
    const values = Object.fromEntries(this.givens.map((given) => [given.name, given.value]));
    const next = this.#functions.get(cell.name)?.(values);
    // As an engine would: an equal value is the same value.
    if (JSON.stringify(next) !== JSON.stringify(cell.value) || cell.value === undefined) cell.value = next;
  }

  #recompute(): void {
    const changed = this.cells.filter((cell) => {
      const before = cell.value;
      if (cell.role === "value" && cell.state === "current") this.#evaluate(cell);
      return cell.value !== before || cell.role === "given";
    });
    this.#tell(changed);
  }

  #tell(changed: readonly CellView[]): void {
    for (const listener of this.#listeners) listener(changed);
  }
}

function fakeGiven(part: FakeGiven): GivenView {
  const given: GivenView = {
    form: "quantity",
    label: part.name,
    why: "",
    unit: part.text.split(" ")[1] ?? "",
    defaultText: part.text,
    value: part.text,
    ...part,
  };
  return Object.assign(given, readFake({ ...given, min: undefined, max: undefined }, part.text));
}

function readFake(given: GivenView, text: string): { text: string; value: GivenView["value"] } | string {
  if (given.form === "switch") return { text, value: text === "on" };
  if (given.form === "choice")
    return given.options?.includes(text)
      ? { text, value: text }
      : `${given.label} must be one of ${given.options}; got ${text}`;
  if (given.form === "text") return { text, value: text };
  const match = /^([-+]?[\d.]+(?:e[-+]?\d+)?)\s*(.*)$/i.exec(text);
  const size = match ? sizes[match[2]!] : undefined;
  if (!match || size === undefined) return `${given.label} must be a number with its unit; got ${text}`;
  const value = Number(match[1]) * size;
  if (given.min !== undefined && given.max !== undefined && (value < given.min || value > given.max))
    return `${given.label} must lie between ${given.min / size} and ${given.max / size} ${match[2]}; got ${text}`;
  return { text, value };
}
