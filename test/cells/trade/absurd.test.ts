import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { Candidate, HornLimits } from "../../../cells/horn/index.ts";
import { dimensionedKinds, dimensionHorn } from "../../../cells/horn/index.ts";
import { dish } from "../../../cells/reflector/dish.ts";
import { feedRequirement } from "../../../cells/reflector/requirement.ts";
import { type BandPoint, overBand } from "../../../cells/trade/over-band.ts";
import { tradeTable } from "../../../cells/trade/trade-table.ts";

/** Path of the first number in a value that isn't finite, or null. A flare's slant is Infinity for a straight guide. */
function firstNotFinite(value: unknown, path = "value"): string | null {
  if (typeof value === "number") return Number.isFinite(value) || path.endsWith(".slant") ? null : `${path} = ${value}`;
  if (typeof value !== "object" || value === null) return null;
  for (const [key, part] of Object.entries(value)) {
    const found = firstNotFinite(part, `${path}.${key}`);
    if (found) return found;
  }
  return null;
}

function checkProfile(candidate: Candidate): void {
  if (!candidate.feasible) return;
  const { z, radius } = candidate.profile;
  expect(z.length).toBe(radius.length);
  expect(z[z.length - 1]).toBe(0);
  for (let i = 1; i < z.length; i++) expect(z[i]! >= z[i - 1]!).toBe(true);
  for (const r of radius) expect(r).toBeGreaterThan(0);
  expect(Math.abs(candidate.length + z[0]!)).toBeLessThan(1e-9);
  expect(candidate.outerDiameter / 2).toBeGreaterThan(Math.max(...radius));
}

function checkPoint(point: BandPoint): void {
  const shares = [
    point.spilloverEfficiency,
    point.polarizationEfficiency,
    point.illuminationEfficiency,
    point.phaseEfficiency,
    point.blockageEfficiency,
    point.surfaceEfficiency,
    point.radiationEfficiency,
  ];
  for (const share of shares) {
    expect(share).toBeGreaterThanOrEqual(0);
    expect(share).toBeLessThanOrEqual(1 + 1e-9);
  }
  expect(point.totalEfficiency).toBeLessThanOrEqual(point.apertureEfficiency * (1 + 1e-12));
  expect(point.apertureEfficiency).toBeLessThanOrEqual(1);
}

interface Given {
  diameter: number;
  fOverD: number;
  bandLow: number;
  bandHigh: number;
  edgeTaperDb: number;
  surfaceError: number;
  limits: HornLimits;
}

/** The whole closed-form study of one set of givens: whatever legal ones, a finite number or a reason. */
function run(given: Given) {
  const reflector = dish({ diameter: given.diameter, fOverD: given.fOverD });
  const band = { bandLow: given.bandLow, bandHigh: given.bandHigh };
  const asked = feedRequirement({ dish: reflector, ...band, edgeTaperDb: given.edgeTaperDb });
  expect(firstNotFinite(asked)).toBeNull();
  const bands = dimensionedKinds.map((kind) => {
    const candidate = dimensionHorn(kind, asked, given.limits);
    expect(candidate.reason).toMatch(/^[A-Z].*[^.]\.$/s);
    expect(candidate.reason).not.toMatch(/NaN|Infinity|undefined/);
    checkProfile(candidate);
    expect(firstNotFinite(candidate)).toBeNull();
    return overBand(candidate, reflector, { ...band, surfaceError: given.surfaceError });
  });
  for (const swept of bands) {
    if (!swept.feasible) continue;
    expect(firstNotFinite(swept)).toBeNull();
    for (const point of swept.points) checkPoint(point);
  }
  const trade = tradeTable(bands, {
    maxCrossPolarPeakDb: -25,
    minApertureEfficiency: 0.7,
    maxLength: given.limits.maxLength,
  });
  expect(firstNotFinite(trade)).toBeNull();
  for (const { edgeTaperDb } of trade.rows)
    if (edgeTaperDb !== null) expect(Math.abs(edgeTaperDb - given.edgeTaperDb)).toBeLessThan(0.01);
  return trade;
}

const plain: Given = {
  diameter: 2.4,
  fOverD: 0.8,
  bandLow: 7.9e9,
  bandHigh: 8.4e9,
  edgeTaperDb: 11,
  surfaceError: 0.3e-3,
  limits: {},
};

describe("absurd but legal givens end in a number or a reason", () => {
  test.each<[string, Partial<Given>]>([
    ["a 0.1 m dish at 1 GHz", { diameter: 0.1, bandLow: 1e9, bandHigh: 1.05e9 }],
    ["a 20 m dish of f/D 3", { diameter: 20, fOverD: 3 }],
    ["a dish of f/D 50", { fOverD: 50 }],
    ["a rim just in front of the focus", { fOverD: 0.2501 }],
    ["a band of an octave", { bandLow: 6e9, bandHigh: 12e9 }],
    ["a band of a decade", { bandLow: 2e9, bandHigh: 20e9 }],
    ["one frequency", { bandLow: 8e9, bandHigh: 8e9 }],
    [
      "a surface of 10 mm at 100 GHz",
      { surfaceError: 10e-3, bandLow: 99e9, bandHigh: 101e9, limits: { toothThickness: 0.05e-3 } },
    ],
    ["an edge taper of 1 dB", { edgeTaperDb: 1 }],
    ["an edge taper of 30 dB", { edgeTaperDb: 30 }],
    ["an edge taper of 60 dB", { edgeTaperDb: 60 }],
    ["a horn of 1 mm at most", { limits: { maxLength: 1e-3, maxDiameter: 1e-3 } }],
    ["hardly any phase error", { limits: { phaseError: 1e-3 } }],
    ["as much phase error as allowed", { limits: { phaseError: 0.3 } }],
    ["teeth of a metre", { limits: { toothThickness: 1 } }],
    [
      "an E-plane null inside the dish",
      { fOverD: 0.74, edgeTaperDb: 22.2, limits: { phaseError: 0.005, toothThickness: 1e-4 } },
    ],
    ["the narrowest guide before a step", { fOverD: 1, bandLow: 15.567918e9, bandHigh: 15.567918e9, edgeTaperDb: 8 }],
    ["kilohertz", { bandLow: 1e3, bandHigh: 1.1e3 }],
    ["terahertz", { bandLow: 1e12, bandHigh: 1.01e12, limits: { toothThickness: 1e-6 } }],
  ])("%s", (_name, change) => {
    const { rows } = run({ ...plain, ...change });
    expect(rows).toHaveLength(3);
  });

  test("150 random studies, plain to absurd", () => {
    const logarithmic = (low: number, high: number) =>
      fc.double({ min: Math.log(low), max: Math.log(high), noNaN: true }).map(Math.exp);
    const limits = fc.record(
      {
        maxLength: logarithmic(1e-3, 10),
        maxDiameter: logarithmic(1e-3, 10),
        phaseError: fc.double({ min: 0.005, max: 0.3, noNaN: true }),
        toothThickness: logarithmic(1e-5, 0.1),
        wall: logarithmic(1e-4, 0.05),
      },
      { requiredKeys: [] },
    );
    const givens = fc.record({
      diameter: logarithmic(0.1, 30),
      fOverD: fc.oneof(fc.double({ min: 0.3, max: 1.5, noNaN: true }), logarithmic(0.2501, 10)),
      bandLow: logarithmic(0.3e9, 100e9),
      width: fc.oneof(fc.double({ min: 0, max: 0.15, noNaN: true }), fc.double({ min: 0, max: 2, noNaN: true })),
      edgeTaperDb: fc.oneof(fc.double({ min: 8, max: 16, noNaN: true }), fc.double({ min: 0.1, max: 60, noNaN: true })),
      surfaceError: fc.oneof(fc.constant(0), logarithmic(1e-5, 0.02)),
      limits,
    });
    let feasibleRows = 0;
    fc.assert(
      fc.property(givens, ({ width, ...given }) => {
        const { rows } = run({ ...given, bandHigh: given.bandLow * (1 + width) });
        feasibleRows += rows.filter(({ feasible }) => feasible).length;
      }),
      { seed: 20260801, numRuns: 150 },
    );
    // the property means something only if many of the studies end in horns
    expect(feasibleRows).toBeGreaterThan(50);
  });
});
