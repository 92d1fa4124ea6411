import { describe, expect, test } from "vitest";
import { dimensionedKinds, dimensionHorn } from "../../../cells/horn/index.ts";
import { crossPolarPeak, levelAt } from "../../../cells/pattern/cuts.ts";
import { cosineFeed } from "../../../cells/pattern/ideal-feeds.ts";
import { dish } from "../../../cells/reflector/dish.ts";
import { feedRequirement } from "../../../cells/reflector/requirement.ts";
import { overBand, type SweptBand } from "../../../cells/trade/over-band.ts";
import { tradeTable } from "../../../cells/trade/trade-table.ts";
import { verdicts } from "../../../cells/trade/verdict.ts";
import { assertClose } from "../../assert-close.ts";

function study(fOverD: number, lowGHz: number, highGHz: number) {
  const reflector = dish({ diameter: 2.4, fOverD });
  const band = { bandLow: lowGHz * 1e9, bandHigh: highGHz * 1e9 };
  const asked = feedRequirement({ dish: reflector, ...band, edgeTaperDb: 11 });
  const candidates = dimensionedKinds.map((kind) => dimensionHorn(kind, asked));
  const bands = candidates.map((candidate) => overBand(candidate, reflector, { ...band, surfaceError: 0.3e-3 }));
  return { reflector, band, asked, candidates, bands };
}

const xStudy = study(0.8, 7.9, 8.4);

describe("trade at f/D 0.8", () => {
  test.each([
    ["X-band, 7.9 to 8.4 GHz", xStudy],
    ["Ku-band, 10.7 to 11.7 GHz", study(0.8, 10.7, 11.7)],
  ])("%s: all three, as the trade expects", (_name, { bands }) => {
    const { rows } = tradeTable(bands);
    expect(rows.map(({ kind, feasible }) => [kind, feasible])).toEqual([
      ["smooth", true],
      ["dualMode", true],
      ["corrugated", true],
    ]);
    const [smooth, dualMode, corrugated] = rows;
    // common practice: below about 55°, and far less cross-polar than a smooth cone
    expect(dualMode!.halfPowerBeamwidthDeg).toBeLessThan(55);
    expect(smooth!.crossPolarPeakDb!).toBeGreaterThan(dualMode!.crossPolarPeakDb! + 10);
    expect(smooth!.crossPolarPeakDb!).toBeGreaterThan(corrugated!.crossPolarPeakDb! + 10);
    // HE11 over the band: no more cross-polar than the dual-mode horn at its best
    expect(corrugated!.worst.crossPolarPeakDb!).toBeLessThan(dualMode!.worst.crossPolarPeakDb!);
    // a feed of the optimum taper reaches about 0.8 (cosⁿ optimum 0.8159 at this half-angle, closed form)
    for (const { apertureEfficiency } of [dualMode!, corrugated!]) {
      expect(apertureEfficiency).toBeGreaterThan(0.78);
      expect(apertureEfficiency).toBeLessThan(0.8159);
    }
  });

  test("the achieved edge taper is the wanted one at band centre", () => {
    for (const row of tradeTable(xStudy.bands).rows)
      assertClose(row.edgeTaperDb!, 11, { abs: 0.01, because: "solved on the model's own pattern" });
  });

  test("a row's numbers are those of the sweep", () => {
    const { rows } = tradeTable(xStudy.bands);
    xStudy.bands.forEach((band, i) => {
      const { points, center } = band as SweptBand;
      const row = rows[i]!;
      const four =
        row.spilloverEfficiency! * row.polarizationEfficiency! * row.illuminationEfficiency! * row.phaseEfficiency!;
      assertClose(row.apertureEfficiency!, four, { rel: 1e-14, because: "a product" });
      expect(row.gainDbi).toBe(center.gainDbi);
      expect(row.worst.gainDbi).toBe(Math.min(...points.map(({ gainDbi }) => gainDbi)));
      expect(row.worst.crossPolarPeakDb).toBe(Math.max(...points.map(({ crossPolarPeakDb }) => crossPolarPeakDb)));
      const off = points.map(({ phaseCenterM }) => Math.abs(phaseCenterM - center.phaseCenterM));
      assertClose(Math.abs(row.worst.phaseCenterM! - center.phaseCenterM), Math.max(...off), {
        abs: 0,
        because: "the farthest",
      });
    });
  });

  test("the feed stands still over the band: phase efficiency is best at its centre", () => {
    for (const band of xStudy.bands as SweptBand[]) {
      expect(band.points.every(({ feedPositionZ }) => feedPositionZ === band.feedPositionZ)).toBe(true);
      assertClose(band.feedPositionZ, band.center.phaseCenterM, {
        abs: 1e-12,
        because: "placed by its phase centre at band centre",
      });
      expect(band.feedPositionZ).toBeLessThan(0);
    }
  });

  test("gain stands below an even, lossless aperture by exactly its efficiencies", () => {
    for (const { points } of xStudy.bands as SweptBand[])
      for (const point of points) {
        const loss = point.uniformGainDbi - point.gainDbi;
        assertClose(loss, -10 * Math.log10(point.totalEfficiency), { abs: 1e-12, because: "the same in dB" });
        expect(point.totalEfficiency).toBeLessThan(point.apertureEfficiency);
      }
  });
});

describe("trade at f/D 0.35", () => {
  test("the dual-mode row says why and has no numbers", () => {
    const { rows } = tradeTable(study(0.35, 7.9, 8.4).bands);
    const row = rows.find(({ kind }) => kind === "dualMode")!;
    expect(row.feasible).toBe(false);
    expect(row.reason).toMatch(/smallest mouth, 24\.3 mm in radius/);
    expect(row.gainDbi).toBeNull();
    expect(row.apertureDiameterM).toBeNull();
    expect(row.worst.crossPolarPeakDb).toBeNull();
    expect(row.verdict).toBeNull();
  });
});

describe("overBand", () => {
  const { reflector, band, candidates } = xStudy;

  test("at least 21 frequencies, equally spaced, ends and centre included", () => {
    const swept = overBand(candidates[0]!, reflector, { ...band, count: 41 }) as SweptBand;
    expect(swept.frequencies).toHaveLength(41);
    expect(swept.frequencies[0]).toBe(7.9e9);
    expect(swept.frequencies[40]).toBe(8.4e9);
    for (let i = 1; i < 41; i++) {
      const step = swept.frequencies[i]! - swept.frequencies[i - 1]!;
      assertClose(step, 0.5e9 / 40, { rel: 1e-6, because: "rounding of sums near 8e9" });
    }
    expect(swept.points.map(({ frequency }) => frequency)).toEqual(swept.frequencies);
    expect(swept.center.frequency).toBe(8.15e9);
    expect(() => overBand(candidates[0]!, reflector, { ...band, count: 20 })).toThrow(/count must be .* at least 21/);
    expect(() => overBand(candidates[0]!, reflector, { bandLow: 8.4e9, bandHigh: 7.9e9 })).toThrow(/must not be above/);
  });

  test("takes another model of the same horn", () => {
    const patternAt = (frequency: number) => cosineFeed(8, { frequency });
    const swept = overBand(candidates[0]!, reflector, { ...band, patternAt }) as SweptBand;
    // cosⁿ at its own half-angle: spillover 1 − cos^{n+1} ψ, closed form
    const spillover = 1 - Math.cos(reflector.halfAngle) ** 9;
    for (const point of swept.points) {
      assertClose(point.spilloverEfficiency, spillover, { abs: 1e-6, because: "splines at 0.5°" });
      expect(point.crossPolarPeakDb).toBe(-300);
    }
  });

  test("edge taper and cross-polar are those of the pattern, with the space loss added", () => {
    const pattern = cosineFeed(8, { frequency: 8.15e9 });
    const { center } = overBand(candidates[0]!, reflector, { ...band, patternAt: () => pattern }) as SweptBand;
    const feedDb = levelAt(pattern, reflector.halfAngle).meanDb;
    assertClose(feedDb, 80 * Math.log10(Math.cos(reflector.halfAngle)), { abs: 1e-5, because: "cos⁸ in dB, splines" });
    // space loss at f/D 0.8: 0.809 dB (closed form, three decimals)
    assertClose(center.edgeTaperDb, 0.809 - feedDb, { abs: 6e-4, because: "three decimals printed" });
    expect(center.crossPolarPeakDb).toBe(crossPolarPeak(pattern));
  });

  test("a horn that would shade the whole dish is no feed", () => {
    const tiny = overBand(candidates[0]!, dish({ diameter: 0.06, fOverD: 0.8 }), band);
    expect(tiny).toMatchObject({ feasible: false, kind: "smooth" });
    expect(tiny.reason).toMatch(/67\.5 mm across its walls, would shade the whole dish of 60\.0 mm/);
  });

  test("a rough surface warns once for the whole band", () => {
    const swept = overBand(candidates[0]!, reflector, { ...band, surfaceError: 5e-3 });
    expect(swept.warnings.filter(({ text }) => text.includes("Ruze"))).toHaveLength(1);
  });
});

describe("verdicts", () => {
  const values = {
    crossPolarPeakDb: -23.6,
    apertureEfficiency: 0.755,
    totalEfficiency: 0.7,
    gainDbi: 44,
    lengthM: 0.15,
    outerDiameterM: 0.11,
  };
  const words = (limits: Parameters<typeof verdicts>[1]): string[] =>
    verdicts(values, limits).map((verdict) => verdict.words);

  test("passes, passes barely, misses by so much", () => {
    expect(words({ maxCrossPolarPeakDb: -20 })).toEqual(["passes"]);
    expect(words({ maxCrossPolarPeakDb: -23.5 })).toEqual(["passes, barely"]);
    expect(words({ maxCrossPolarPeakDb: -25 })).toEqual(["misses by 1.4 dB"]);
    expect(words({ minApertureEfficiency: 0.77 })).toEqual(["misses by 1.5 points"]);
    expect(words({ maxLength: 0.14 })).toEqual(["misses by 10.0 mm"]);
    expect(words({ minGainDbi: 44.01 })).toEqual(["misses by 0.010 dB"]);
  });

  test("a horn made to just its limit passes", () => {
    expect(verdicts(values, { maxLength: 0.15 * (1 - 1e-12) })[0]).toMatchObject({ verdict: "barely", margin: 0 });
  });

  test("only what is limited is judged, in one order", () => {
    expect(words({})).toEqual([]);
    const judged = verdicts(values, { maxDiameter: 0.2, minTotalEfficiency: 0.6, maxLength: Number.POSITIVE_INFINITY });
    expect(judged.map(({ field }) => field)).toEqual(["totalEfficiency", "outerDiameterM"]);
    expect(() => verdicts(values, { maxLength: Number.NaN })).toThrow(RangeError);
  });

  test("one miss decides the row", () => {
    const { rows } = tradeTable(xStudy.bands, { maxCrossPolarPeakDb: -25, minApertureEfficiency: 0.6 });
    expect(rows.map(({ verdict }) => verdict)).toEqual(["misses", "misses", "passes"]);
  });
});
