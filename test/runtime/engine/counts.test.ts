import { expect, test } from "vitest";
import { createStudy } from "../../../runtime/engine.ts";
import type { Study } from "../../../runtime/study.ts";
import { loadNotebook } from "../load-notebook.ts";

const counts = (study: Study): Record<string, number> =>
  Object.fromEntries(study.cells.map((cell) => [cell.name, cell.evaluations]));

const GIVENS = `
const a = given("1", { label: "A", why: "", min: -1e9, max: 1e9 });
const b = given("2 m", { label: "B", why: "", min: "0 m", max: "20 m" });`;

test("one given: recomputes its downstream once and nothing else", async () => {
  const study = createStudy(
    await loadNotebook(`${GIVENS}
const left = a + 1;
const right = a + 2;
const joined = left * right + b;
const onlyB = b * 2;
const far = joined + onlyB;
`),
  );
  await study.settled();
  expect(counts(study)).toEqual({ a: 1, b: 1, left: 1, right: 1, joined: 1, onlyB: 1, far: 1 });
  expect(study.cell("far").value).toBe(2 * 3 + 2 + 4);
  expect(study.set("a", "10")).toEqual({ ok: true });
  expect(study.cell("joined").state).toBe("behind");
  expect(study.cell("onlyB").state).toBe("current");
  await study.settled();
  expect(counts(study)).toEqual({ a: 2, b: 1, left: 2, right: 2, joined: 2, onlyB: 1, far: 2 });
  expect(study.cell("far").value).toBe(11 * 12 + 2 + 4);
  study.dispose();
});
