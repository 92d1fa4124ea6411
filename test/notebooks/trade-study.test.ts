// The trade study as a reader turns it: what it says of a long and of a deep dish, what a given moves, and that nothing stale,
// missing or beyond numbers is ever shown as current.

import { expect, test } from "vitest";
import type { Trade, TradeRow } from "../../cells/index.ts";
import { createStudy } from "../../runtime/engine.ts";
import { nonFinitePath } from "../../runtime/non-finite.ts";
import { studyValues } from "../../runtime/plain-values.ts";
import type { GivenView, NotebookModule, Study } from "../../runtime/study.ts";
import { seededRandom } from "../assert-close.ts";
import { notebook } from "./load.ts";

const module: NotebookModule = await notebook("trade-study");

/** Names of the cells that read a given, directly or through others. */
function downstream(study: Study, given: string): Set<string> {
  const found = new Set([given]);
  for (const { name, inputs } of study.cells) if (inputs.some((input) => found.has(input))) found.add(name);
  return found;
}

const inWords = ({ perUnit = 1, unit }: GivenView, value: number): string => `${value / perUnit} ${unit}`;

const rowsOf = (study: Study): TradeRow[] => (study.cell("trade").value as Trade).rows;
const rowOf = (study: Study, kind: string): TradeRow => rowsOf(study).find((row) => row.kind === kind)!;

test("trade study: as a plain module it is its values", async () => {
  const plain = await import("../../notebooks/trade-study.ts");
  const study = createStudy(module);
  await study.settled();
  expect(plain.dishDiameter).toBe(2.4);
  expect(plain.trade.rows).toEqual(rowsOf(study));
  study.dispose();
});

test("trade study: f/D 0.8 gives all three kinds, the dual-mode narrower than 55°, the cone worst in cross-polar", async () => {
  const study = createStudy(module, { givens: { fOverD: "0.8" } });
  await study.settled();
  const [smooth, dualMode, corrugated] = ["smooth", "dualMode", "corrugated"].map((kind) => rowOf(study, kind));
  expect(rowsOf(study).map(({ feasible }) => feasible)).toEqual([true, true, true]);
  // Common practice: a dual-mode horn's half-power beamwidth stays below about 55°.
  expect(dualMode!.halfPowerBeamwidthDeg).toBeLessThan(55);
  expect(smooth!.crossPolarPeakDb!).toBeGreaterThan(dualMode!.crossPolarPeakDb!);
  expect(smooth!.crossPolarPeakDb!).toBeGreaterThan(corrugated!.crossPolarPeakDb!);
  study.dispose();
});

test("trade study: f/D 0.35 is too deep for TM11; the row says so and has no numbers", async () => {
  const study = createStudy(module, { givens: { fOverD: "0.35" } });
  await study.settled();
  const { feasible, reason, gainDbi, crossPolarPeakDb } = rowOf(study, "dualMode");
  expect(feasible).toBe(false);
  expect(reason).toMatch(/TM11/);
  expect([gainDbi, crossPolarPeakDb]).toEqual([null, null]);
  expect(study.cells.filter(({ state }) => state === "failed")).toEqual([]);
  study.dispose();
});

test.each(["dishDiameter", "fOverD", "bandLow", "edgeTaper", "surfaceError", "crossPolarLimit", "toothThickness"])(
  "trade study: %s recomputes its downstream, once, and nothing else",
  async (name) => {
    const study = createStudy(module);
    await study.settled();
    expect(study.cells.every(({ evaluations }) => evaluations === 1)).toBe(true);
    const given = study.givens.find((one) => one.name === name)!;
    // half a step of the slider up: a value that no cell has seen
    expect(study.set(name, inWords(given, (given.value as number) + given.step! / 2))).toEqual({ ok: true });
    await study.settled();
    const moved = downstream(study, name);
    expect(moved.size).toBeGreaterThan(3);
    expect(moved.size).toBeLessThan(study.cells.length);
    for (const cell of study.cells) expect(cell.evaluations, cell.name).toBe(moved.has(cell.name) ? 2 : 1);
    study.dispose();
  },
);

const absurd = [
  "",
  "NaN",
  "Infinity m",
  "-3 m",
  "1e999 GHz",
  "2,4 m",
  "null",
  "8.4 parsec",
  "__proto__",
  "💥",
  "0x10",
  "1 m 2",
];

test("trade study: 2,000 random changes never show a stale value or no number as current, and end as a fresh evaluation", async () => {
  const random = seededRandom(20261201);
  const pick = <T>(list: readonly T[]): T => list[Math.floor(random() * list.length)]!;
  const study = createStudy(module);
  await study.settled();
  let refused = 0;
  let failures = 0;
  let looked = 0;
  const found = new Set<string>();
  const look = () => {
    looked++;
    for (const { name, state, value, inputs } of study.cells) {
      if (state === "failed") failures++;
      if (state !== "current") continue;
      const lost = nonFinitePath(value);
      if (lost !== undefined) found.add(`${name}: ${lost}`);
      for (const input of inputs)
        if (study.cell(input).state !== "current") found.add(`${name} is current, but not ${input}, which it reads`);
    }
  };
  study.subscribe(look);
  for (let change = 0; change < 2000; ) {
    const burst = 1 + Math.floor(random() * 40);
    for (let i = 0; i < burst; i++, change++) {
      const given = pick(study.givens);
      const kind = random();
      if (kind < 0.25) refused += study.set(given.name, pick(absurd)).ok ? 0 : 1;
      else if (kind < 0.3) study.reset();
      else {
        // mostly near the default, sometimes anywhere in the range, its ends included
        const { min, max, step } = given;
        const near = study.givens.find(({ name }) => name === given.name)!.value as number;
        const wild = random();
        const value =
          wild < 0.1
            ? min!
            : wild < 0.2
              ? max!
              : wild < 0.4
                ? min! + random() * (max! - min!)
                : near + (random() - 0.5) * 8 * step!;
        refused += study.set(given.name, inWords(given, value)).ok ? 0 : 1;
      }
    }
    await study.settled();
  }
  expect([...found]).toEqual([]);
  expect(refused).toBeGreaterThan(300);
  expect(looked).toBeGreaterThan(80);
  expect(failures).toBeGreaterThan(0);
  const fresh = createStudy(module, {
    givens: Object.fromEntries(study.givens.map(({ name, text }) => [name, text])),
  });
  await fresh.settled();
  expect(studyValues(study)).toEqual(studyValues(fresh));
  expect(study.cells.filter(({ state }) => state !== "current" && state !== "failed")).toEqual([]);
  study.dispose();
  fresh.dispose();
}, 400_000);
