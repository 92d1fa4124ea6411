import { describe, expect, test } from "vitest";
import { disagreements, modelsSheet } from "../../../cells/figures/index.ts";
import {
  corrugatedHorn,
  dish,
  dualModeHorn,
  feedRequirement,
  matchedOverBand,
  overBand,
  smoothHorn,
  tradeTable,
} from "../../../cells/index.ts";
import { assertClose } from "../../assert-close.ts";

const reflector = dish({ diameter: 2.4, fOverD: 0.8 });
const band = { bandLow: 7.9e9, bandHigh: 8.4e9 };
const requirement = feedRequirement({ dish: reflector, ...band, edgeTaperDb: 11 });
const horns = [smoothHorn(requirement), dualModeHorn(requirement), corrugatedHorn(requirement)];
const matched = horns.map((horn) => matchedOverBand(horn, reflector, band));
const closed = horns.map((horn) => overBand(horn, reflector, band));

describe("matchedOverBand", () => {
  test("41 frequencies, band centre among them, power in balance, the error known", () => {
    for (const result of matched) {
      if (!result.feasible) throw new Error(result.reason);
      const spaced = Array.from({ length: 41 }, (_, i) => 7.9e9 + (0.5e9 * i) / 40);
      for (const wanted of spaced) expect(result.frequencies.some((f) => Math.abs(f - wanted) < 1)).toBe(true);
      expect(result.center).toBe(result.points[result.frequencies.indexOf(8.15e9)]);
      expect(result.powerBalance).toBeLessThan(1e-9);
      expect(result.convergence.reflectionError).toBeLessThan(1e-3);
      expect(result.points.every(({ returnLossDb }) => returnLossDb! > 10)).toBe(true);
      assertClose(result.points[7]!.returnLossDb!, -20 * Math.log10(Math.hypot(result.s11[7]!.re, result.s11[7]!.im)), {
        ...{ rel: 1e-12, because: "the same S11" },
      });
    }
  });

  test("a plain cone's pattern is the closed form's: its flare raises little else than TE11", () => {
    // METHODS of both differ only by the higher modes that the flare's own phase front stands for
    const [smooth] = matched;
    const [plain] = closed;
    if (!smooth?.feasible || !plain?.feasible) throw new Error("no cone");
    assertClose(smooth.center.gainDbi, plain.center.gainDbi, { abs: 0.1, because: "closed form of a shallow flare" });
    assertClose(smooth.center.crossPolarPeakDb, plain.center.crossPolarPeakDb, { abs: 1, because: "the same TE11" });
  });

  test("an even count becomes odd; what can't be built passes through with its reason", () => {
    const one = matchedOverBand(horns[2]!, reflector, { ...band, count: 30 });
    expect(one.feasible && one.frequencies.length).toBeGreaterThanOrEqual(31);
    expect(one.feasible && one.frequencies.includes(8.15e9)).toBe(true);
    const deep = dish({ diameter: 2.4, fOverD: 0.35 });
    const none = dualModeHorn(feedRequirement({ dish: deep, ...band, edgeTaperDb: 11 }));
    expect(matchedOverBand(none, deep, band)).toMatchObject({
      feasible: false,
      reason: none.reason,
      model: "mode matching",
    });
  });

  test("travels to a worker and back", () => {
    expect(structuredClone(matched[2])).toEqual(matched[2]);
  });

  test("two models side by side: a row a quantity, and a sentence where they differ", () => {
    const [first, second] = [tradeTable(closed), tradeTable(matched)];
    const sheet = modelsSheet(first, second, { first: "closed form" });
    expect(sheet.columns).toHaveLength(3);
    const match = sheet.rows.find(({ key }) => key === "returnLossDb")!;
    for (const cell of match.cells as { text: string; word: string }[]) {
      expect(Number(cell.text)).toBeGreaterThan(10);
      expect(cell.word).toBe("closed form: not known");
    }
    for (const { text } of disagreements(first, second)) expect(text).toMatch(/^On the .* the models differ in .*\.$/);
    expect(disagreements(first, first)).toEqual([]);
  });
});
