// Figures to test, made of plain numbers: every kind of drawing, with candidates that can't be built among them.

import { parseHTML } from "linkedom";
import {
  apertureFields,
  bandCurves,
  buildDrawing,
  comparison,
  type Drawing,
  dishSection,
  dispersion,
  hornsToScale,
  lossSteps,
  patternCuts,
  sampledField,
  sumOfFields,
} from "../../../cells/figures/index.ts";
import { modeField, TE11, TM11 } from "../../../cells/guide/mode.ts";
import type { Candidate } from "../../../cells/horn/candidate.ts";
import type { FeedKind, HornProfile } from "../../../cells/horn/horn-profile.ts";
import { buildSheet } from "../../../cells/horn/workshop/build-sheet.ts";
import type { FeedPattern } from "../../../cells/pattern/feed-pattern.ts";
import { cosineFeed } from "../../../cells/pattern/ideal-feeds.ts";
import { dish } from "../../../cells/reflector/dish.ts";

export const widths = [760, 354] as const;

export const exampleDish = dish({ diameter: 2.4, fOverD: 0.8 });

/** E- and H-plane of cosine feeds of different exponents, so that there is a cross-polar. */
export function unevenFeed(nE: number, nH: number): FeedPattern {
  const e = cosineFeed(nE);
  const h = cosineFeed(nH);
  const scale = e.ePlane.re[0]! / h.hPlane.re[0]!;
  return { ...e, hPlane: { re: h.hPlane.re.map((value) => value * scale), im: h.hPlane.im } };
}

function horn(kind: FeedKind, profile: HornProfile, outerDiameter: number): Candidate {
  return {
    feasible: true,
    kind,
    reason: "",
    profile,
    throatRadius: profile.radius[0]!,
    apertureRadius: profile.radius.at(-1)!,
    length: -profile.z[0]!,
    outerDiameter,
    dimensions: [],
    geometry: null,
    warnings: [],
  };
}

export const smoothHorn = horn("smooth", { z: [-0.12, -0.1, 0], radius: [0.0095, 0.0095, 0.031] }, 0.066);
export const dualModeHorn = horn(
  "dualMode",
  { z: [-0.14, -0.12, -0.12, -0.1, 0], radius: [0.0125, 0.0125, 0.0165, 0.0165, 0.034] },
  0.072,
);

/** 36 slots of pitch 4 mm, 3 mm wide, 13.5 mm deep at the throat and 7.9 mm at the mouth; wall 2 mm. */
export const corrugatedProfile: HornProfile = (() => {
  const z = [-0.164, -0.144];
  const radius = [0.012, 0.012];
  for (let n = 0; n < 36; n++) {
    const ridge = 12 + (26 * (n + 1)) / 36;
    const depth = n < 8 ? 13.5 - 0.7 * n : 7.9;
    const start = -144 + 4 * n;
    z.push(start / 1e3, (start + 3) / 1e3, (start + 3) / 1e3, (start + 4) / 1e3);
    radius.push((ridge + depth) / 1e3, (ridge + depth) / 1e3, ridge / 1e3, ridge / 1e3);
  }
  return { z, radius };
})();
export const corrugatedHorn = horn("corrugated", corrugatedProfile, 2 * 47.9e-3);

export const reason =
  "The dish is too deep for TM11: the rim at 71.1° asks a mouth of radius 9.8 mm, and TM11 travels there only above 18.7 GHz, beyond the band that ends at 12.75 GHz.";
export const noHorn: Candidate = { feasible: false, kind: "dualMode", reason, warnings: [] };

/** What a workshop gets of an example, band up to 12 GHz. */
export const sheetOf = (candidate: Candidate) => {
  if (!candidate.feasible) throw new Error(candidate.reason);
  return buildSheet(candidate, { highestFrequency: 12e9 });
};

/** A step, a ring slot, two cones: nothing that a kind of horn would be. */
export const ownProfile = horn(
  "custom",
  {
    z: [-0.09, -0.07, -0.07, -0.055, -0.055, -0.05, -0.05, -0.03, -0.02, 0],
    radius: [0.01, 0.01, 0.013, 0.013, 0.02, 0.02, 0.013, 0.013, 0.02, 0.022],
  },
  0.048,
);

const radius = 0.034;
export const te11 = sampledField(radius, (rho, phi) => modeField(TE11, radius, rho, phi));
export const tm11 = sampledField(radius, (rho, phi) => modeField(TM11, radius, rho, phi));

const bandFrequencies = Array.from({ length: 21 }, (_, i) => 11.7e9 + i * 0.04e9);
export function bandPoints(efficiency: number, crossPolarDb: number) {
  return bandFrequencies.map((frequency, i) => ({
    frequency,
    apertureEfficiency: efficiency + 0.001 * i,
    crossPolarPeakDb: crossPolarDb - 0.2 * i,
    phaseCenterM: -0.004 + 1e-4 * i,
    edgeTaperDb: 10.5 + 0.05 * i,
  }));
}

const steps = (spillover: number) => [
  { label: "illumination", efficiency: 0.88 },
  { label: "spillover", efficiency: spillover },
  { label: "surface, 0.5 mm rms", efficiency: 0.94, common: true },
  { label: "ohmic, horn and polariser", efficiency: 0.9999 },
];

/** Every figure, made anew at each call. */
export const examples: Record<string, () => Drawing> = {
  dish: () =>
    dishSection(exampleDish, {
      feed: smoothHorn as Extract<Candidate, { feasible: true }>,
      phaseCenter: -0.018,
      facts: [
        ["Edge taper wanted", "−11 dB, of which the feed −10.2 dB"],
        ["Feed directivity near", "15.1 dBi"],
      ],
    }),
  "deep dish": () => dishSection(dish({ diameter: 0.9, fOverD: 0.3 })),
  "long dish": () => dishSection(dish({ diameter: 3, fOverD: 2 })),
  horns: () =>
    hornsToScale([
      { label: "Smooth cone", candidate: smoothHorn, phaseCenter: -0.018 },
      { label: "Dual-mode", candidate: dualModeHorn, phaseCenter: -0.019 },
      { label: "Corrugated", candidate: corrugatedHorn, phaseCenter: -0.011 },
    ]),
  "horns, one missing": () =>
    hornsToScale([
      { label: "Smooth cone", candidate: smoothHorn },
      { label: "Dual-mode", candidate: noHorn },
      { label: "Corrugated", candidate: corrugatedHorn },
    ]),
  "build, smooth": () => buildDrawing(sheetOf(smoothHorn)),
  "build, dual-mode": () => buildDrawing(sheetOf(dualModeHorn)),
  "build, corrugated": () => buildDrawing(sheetOf(corrugatedHorn)),
  "build, own profile": () => buildDrawing(sheetOf(ownProfile)),
  "build, slim": () =>
    buildDrawing(
      sheetOf(horn("custom", { z: [-1.2, -1.19, -1.19, -0.1, 0], radius: [0.012, 0.012, 0.014, 0.014, 0.03] }, 0.064)),
    ),
  fields: () =>
    apertureFields(
      [
        { label: "TE11", field: te11, powerShare: 0.84 },
        { label: "TM11", field: tm11, follows: "plus", powerShare: 0.16, phaseDeg: 8 },
        {
          label: "Dual-mode mouth",
          kind: "dualMode",
          follows: "equals",
          field: sumOfFields([
            { field: te11, amplitude: 0.92 },
            { field: tm11, amplitude: 0.4 },
          ]),
        },
        { label: "Corrugated mouth", kind: "corrugated", field: te11, under: "HE11, balanced" },
      ],
      12.1e9,
    ),
  "fields, one missing": () =>
    apertureFields([
      { label: "TE11", field: te11 },
      { label: "Dual-mode mouth", kind: "dualMode", reason },
    ]),
  cuts: () =>
    patternCuts(
      [
        { label: "Smooth cone", kind: "smooth", pattern: unevenFeed(8, 14) },
        { label: "Dual-mode", kind: "dualMode", reason },
        { label: "Corrugated", kind: "corrugated", pattern: cosineFeed(12) },
      ],
      { halfAngle: exampleDish.halfAngle, crossPolarLimitDb: -25 },
    ),
  "cuts by several models": () =>
    patternCuts(
      [
        { label: "Smooth cone", kind: "smooth", pattern: unevenFeed(8, 14), model: "mode matching" },
        { label: "Smooth cone", kind: "smooth", pattern: unevenFeed(9, 13), model: "closed form" },
        { label: "Smooth cone", kind: "smooth", pattern: unevenFeed(8.4, 14.5), model: "measured", style: "measured" },
      ],
      { halfAngle: exampleDish.halfAngle, thetaMax: Math.PI },
    ),
  losses: () =>
    lossSteps(
      [
        { label: "Smooth cone", kind: "smooth", steps: steps(0.85), result: "gain 48.02 dBi" },
        { label: "Dual-mode", kind: "dualMode", reason },
        { label: "Corrugated", kind: "corrugated", steps: steps(0.9), result: "gain 48.39 dBi" },
      ],
      "From a lossless, evenly lit 2.40 m aperture, 49.7 dBi at 12.1 GHz.",
    ),
  band: () =>
    bandCurves(
      [
        { label: "smooth", kind: "smooth", points: bandPoints(0.72, -19), model: "mode matching" },
        { label: "smooth", kind: "smooth", points: bandPoints(0.725, -18), model: "closed form", style: "second" },
        { label: "dual-mode", kind: "dualMode", reason },
        { label: "corrugated", kind: "corrugated", points: bandPoints(0.722, -300), model: "mode matching" },
      ],
      {
        bandLow: 11.7e9,
        bandHigh: 12.5e9,
        crossPolarLimitDb: -25,
        efficiencyLimit: 0.7,
        agreed: { low: 11.9e9, high: 12.4e9 },
      },
    ),
  comparison: () =>
    comparison(
      { model: "mode matching", pattern: unevenFeed(8, 14) },
      { model: "measured", pattern: unevenFeed(8.4, 14.5) },
      { label: "Smooth cone", kind: "smooth", halfAngle: exampleDish.halfAngle, style: "measured" },
    ),
  dispersion: () =>
    dispersion(
      [
        { label: "HE11", frequency: [9e9, 10e9, 12e9], phaseConstantRatio: [0.2, 0.6, 0.8] },
        { label: "EH11", frequency: [9e9, 10e9, 12e9], phaseConstantRatio: [0.9, 1.3, 40] },
        { label: "EH12", frequency: [9e9, 10e9, 12e9], phaseConstantRatio: [null, null, 0.4] },
      ],
      { bandLow: 9.5e9, bandHigh: 11e9, marks: [{ frequency: 10.2e9, words: "balanced" }] },
    ),
};

/** A document without a browser. */
export function headlessDocument(): Document {
  return parseHTML("<!doctype html><html><body></body></html>").document as unknown as Document;
}
