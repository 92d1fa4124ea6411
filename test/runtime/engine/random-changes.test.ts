import { expect, test } from "vitest";
import { createStudy } from "../../../runtime/engine.ts";
import { nonFinitePath } from "../../../runtime/non-finite.ts";
import type { CompiledCell, NotebookModule, Study } from "../../../runtime/study.ts";
import { seededRandom } from "../../assert-close.ts";

// A synthetic study whose every value says what it was computed from: "sum(a=1,b=2)". So a value that belongs to other inputs
// shows itself, and equals a fresh evaluation only if all of its inputs do.

const random = seededRandom(20260);
const pick = <T>(list: readonly T[]): T => list[Math.floor(random() * list.length)] as T;
const GIVENS = ["a", "b", "c", "d", "e"];

const cell = (name: string, inputs: string[], define: CompiledCell["define"]): CompiledCell => ({
  ...{ name, inputs, role: "value", background: false, line: 1, endLine: 1, source: name, define },
});

const describeInputs = (name: string, inputs: string[], values: unknown[]): string =>
  `${name}(${inputs.map((input, i) => `${input}=${values[i]}`).join(",")})`;

/** Thirty cells. With delays a third of them are promises, that take now no time, now a few turns, and may fail at their end. */
function synthetic(delays: boolean): NotebookModule {
  const shape = seededRandom(7);
  const cells: CompiledCell[] = GIVENS.map((name) => {
    const defaults = { unit: "m", defaultText: "1 m", default: 1, min: 0, max: 100 };
    const declaration = { declares: "given", form: "quantity", label: name, why: "", ...defaults };
    return { ...cell(name, [], () => declaration), role: "given" as const };
  });
  for (let i = 0; i < 25; i++) {
    const known = cells.map((one) => one.name);
    const inputs = [...new Set([0, 1, 2].map(() => known[Math.floor(shape() * known.length)] as string))];
    const name = `v${i}`;
    const [slow, refusesOneIn] = [shape() < 0.35, shape() < 0.2 ? 4 : 0];
    const compute = (values: unknown[]): string => {
      const text = describeInputs(
        name,
        inputs,
        values.map((value) => digest(String(value))),
      );
      if (refusesOneIn && digest(text) % refusesOneIn === 0) throw new RangeError(`refused ${text}`);
      return text;
    };
    const later = async (values: unknown[]): Promise<string> => {
      const wait = random();
      if (wait > 0.6) await new Promise((resolve) => setTimeout(resolve, Math.floor(wait * 6)));
      else if (wait > 0.3) await new Promise((resolve) => setImmediate(resolve));
      return compute(values);
    };
    cells.push(cell(name, inputs, (...values: unknown[]) => (slow && delays ? later(values) : compute(values))));
  }
  return { file: "synthetic.ts", source: "", cells, backgroundFunctions: {} };
}

function digest(text: string): number {
  let h = 2166136261;
  for (let i = 0; i < text.length; i++) h = Math.imul(h ^ text.charCodeAt(i), 16777619);
  return h >>> 0;
}

const ABSURD = [
  "",
  "NaN",
  "Infinity m",
  "-1 m",
  "1e999 m",
  "8 GHz",
  "2,5 m",
  "null",
  "{}",
  "💥",
  "__proto__",
  "1 m 2",
  "0x10 m",
  "1e-400",
];

function snapshot(study: Study): Record<string, unknown> {
  return Object.fromEntries(
    study.cells.map(({ name, state, value, failure }) => [name, state === "failed" ? failure?.reason : value]),
  );
}

/** Every cell that calls itself current holds what its inputs, as they stand, give. */
function expectHonest(study: Study, pure: Map<string, CompiledCell>): void {
  for (const { name, role, state, inputs, value, failure } of study.cells) {
    if (role === "given" || state === "behind" || state === "working") continue;
    const read = inputs.map((input) => study.cell(input));
    if (failure) {
      const { path, reason } = failure;
      if (path.length > 1) expect(study.cell(path.at(-2) as string).failure?.reason, name).toBe(reason);
      else expect(() => pure.get(name)?.define(...(read.map((input) => input.value) as never[])), name).toThrow(reason);
      continue;
    }
    expect(
      read.every((input) => input.state === "current"),
      `${name} is current, so are its inputs`,
    ).toBe(true);
    expect(value, name).toBe(pure.get(name)?.define(...(read.map((input) => input.value) as never[])));
    expect(nonFinitePath(value)).toBeUndefined();
  }
}

test("2,000 random changes: never a stale value as current, and in the end what a fresh evaluation gives", async () => {
  const study = createStudy(synthetic(true));
  const plain = synthetic(false);
  const pure = new Map(plain.cells.map((one) => [one.name, one]));
  let told = 0;
  let failures = 0;
  study.subscribe((changed) => {
    told++;
    failures += changed.filter(({ state }) => state === "failed").length;
    expectHonest(study, pure);
  });
  let refused = 0;
  for (let change = 0; change < 2000; ) {
    const burst = 1 + Math.floor(random() * 4);
    for (let i = 0; i < burst; i++, change++) {
      const kind = random();
      if (kind < 0.2) refused += study.set(pick(GIVENS), pick(ABSURD)).ok ? 0 : 1;
      else if (kind < 0.3) {
        study.setAll({
          [pick(GIVENS)]: `${Math.floor(random() * 20)} m`,
          [pick(GIVENS)]: `${Math.floor(random() * 20)} m`,
        });
      } else if (kind < 0.33) study.again(pick(study.cells).name);
      else if (kind < 0.36) study.stop(pick(study.cells).name);
      else if (kind < 0.37) study.reset();
      else study.set(pick(GIVENS), `${Math.floor(random() * 2000)} cm`);
      expectHonest(study, pure);
    }
    const wait = random();
    if (wait < 0.3) await new Promise((resolve) => setImmediate(resolve));
    else if (wait < 0.5) await new Promise((resolve) => setTimeout(resolve, Math.floor(random() * 4)));
    else if (wait < 0.55) await study.settled();
  }
  // A cell that was stopped waits to be asked; all others have come to rest.
  for (const { name } of study.cells) study.again(name);
  await study.settled();
  expect(study.cells.filter(({ state }) => state !== "current" && state !== "failed")).toEqual([]);
  expect(refused).toBeGreaterThan(100);
  expect(told).toBeGreaterThan(500);
  expect(failures).toBeGreaterThan(100);

  const fresh = createStudy(plain, { givens: Object.fromEntries(study.givens.map(({ name, text }) => [name, text])) });
  await fresh.settled();
  expect(snapshot(study)).toEqual(snapshot(fresh));
  study.dispose();
  fresh.dispose();
});
