// The built horn against the study: measured cuts and match go in as files, and are held against mode matching of its wall.
// The measurement below is invented, for the demonstration only; give your own with --set cuts=@cuts.csv --set match=@horn.s1p.
import { bandCurves, comparison } from "../cells/figures/index.ts";
import {
  dish,
  dishEfficiency,
  levelAt,
  measuredPerformance,
  ownBand,
  phaseCenterOverDish,
  readPatternCuts,
  readProfile,
  readTouchstone,
} from "../cells/index.ts";
import { background, figure, given, head, lead, markdown, note, show, table } from "../runtime/index.ts";

export const wall = given.text("z_mm,r_mm\n0,13\n20,13\n80,31\n", {
  label: "Inner wall as drawn",
  why: "A table with the columns z_mm and r_mm, throat to mouth.",
});
export const cuts = given.text(
  `theta_deg,e_db,e_phase_deg,h_db,h_phase_deg,cross45_db
-90,-27.9,41,-27.2,84,-34
-75,-24.6,35,-21.5,47,-30
-60,-21.0,52,-15.9,22,-25
-45,-14.9,20,-9.9,9,-21.3
-30,-6.5,8,-4.6,4,-21.9
-15,-1.5,2,-1.2,1,-30
0,0,0,0,0,-45
15,-1.6,2,-1.1,1,-30
30,-6.7,9,-4.5,4,-21.6
45,-15.1,21,-9.8,9,-21.1
60,-20.6,50,-15.7,21,-24.8
75,-24.9,36,-21.8,46,-30
90,-28.3,40,-27.0,82,-34
`,
  { label: "Measured cuts", why: "Invented. Columns theta_deg, e_db, h_db; phases and cross45_db where measured." },
);
export const match = given.text(
  "# GHz S DB R 50\n8.5 -24.1 140\n9 -26.0 60\n9.5 -27.8 -20\n10 -29.5 -95\n10.5 -30.8 -170\n",
  {
    label: "Measured match",
    why: "Invented. A one-port Touchstone file.",
  },
);
export const frequency = given("9.5 GHz", {
  label: "Frequency of the cuts",
  why: "Middle of the band.",
  min: "0.3 GHz",
  max: "300 GHz",
});
export const dishDiameter = given("1.8 m", {
  label: "Dish diameter",
  why: "Where it will stand.",
  min: "0.3 m",
  max: "32 m",
});
export const fOverD = given("0.6", { label: "Focal length over diameter", why: "As made.", min: 0.26, max: 2 });

export const reflector = dish({ diameter: dishDiameter, fOverD });
const readings = readPatternCuts(cuts, frequency, "cuts");
export const measured = readings.find((one) => Math.abs(one.frequency / frequency - 1) < 1e-6) ?? readings[0]!;
export const touchstone = readTouchstone(match, "match");
const band = { bandLow: touchstone.frequencies[0]!, bandHigh: touchstone.frequencies.at(-1)!, points: 21 };
export const model = await background(ownBand, readProfile(wall, "wall"), band);
const around = { bandLow: 0.999 * measured.frequency, bandHigh: 1.001 * measured.frequency, points: 3 };
export const there = await background(ownBand, readProfile(wall, "wall"), around);

export const inDish = measuredPerformance(measured, reflector);
export const modelInDish = dishEfficiency(there.centerPattern, reflector, {
  phaseCenter: phaseCenterOverDish(there.centerPattern, reflector).z,
});

head({
  document: "Measurement against model",
  title: "A built horn",
  facts: [
    [
      "Cuts",
      `at ${show(measured.frequency, "GHz", 3)}, to ${measured.thetaMaxDeg}°, ${measured.hasPhase ? "with" : "without"} phases`,
    ],
    [
      "Match",
      `${touchstone.frequencies.length} frequencies, ${show(band.bandLow, "GHz", 2)} to ${show(band.bandHigh, "GHz", 2)}`,
    ],
  ],
});
const amplitude = modelInDish.spilloverEfficiency * modelInDish.illuminationEfficiency;
lead`Spillover and illumination of the measured horn come to ${show(inDish.amplitudeEfficiency, "%", 1)} in this dish, where the model of
its wall says ${show(amplitude, "%", 1)}.`;

note`## Pattern`;

export const pattern = figure(
  comparison(
    { model: "mode matching", pattern: there.centerPattern },
    { model: "measured", pattern: measured.pattern },
    { label: "The horn", kind: "measured", halfAngle: reflector.halfAngle, style: "measured" },
  ),
  {
    caption: "Both cuts, model and measurement, with their difference beneath.",
    basis: "mode matching of the wall as drawn",
  },
);
note`${markdown([...measured.warnings.map(({ text }) => text), ...inDish.unknown].map((text) => `- ${text}`).join("\n"))}

${measured.asymmetryDb === null ? "One side was measured." : `The two sides of a cut differ by up to ${show(measured.asymmetryDb, "dB", 1)} above −30 dB; they are averaged.`}`;

note`## Match`;

const returned = (frequencies: readonly number[], s11: readonly { re: number; im: number }[]) =>
  s11.map(({ re, im }, i) => ({
    frequency: frequencies[i]!,
    returnLossDb: Math.min(100, -20 * Math.log10(Math.hypot(re, im))),
  }));
export const returnLoss = figure(
  bandCurves(
    [
      { label: "model", kind: "custom", points: returned(model.frequencyHz, model.s11), model: "mode matching" },
      {
        ...{ label: "measured", kind: "measured", points: returned(touchstone.frequencies, touchstone.s11) },
        ...{ model: "measured", style: "measured" },
      },
    ],
    {
      ...{ bandLow: band.bandLow, bandHigh: band.bandHigh },
      quantities: [
        {
          title: "Return loss, dB",
          value: (point: { returnLossDb: number }) => point.returnLossDb,
          digits: 1,
          leastSpan: 10,
        },
      ],
    },
  ),
  { caption: "Of TE11 at the throat. A transition and its flange are in the measurement, not in the model." },
);

note`## In the dish`;

const orUnknown = (value: number | null, unit: string, digits: number) =>
  value === null ? "unknown" : show(value, unit, digits);
const modelTaper = levelAt(there.centerPattern, reflector.halfAngle).meanDb;
export const efficiencies = table({
  columns: [
    { label: "Measured", kind: "measured" },
    { label: "Mode matching", kind: "custom" },
  ],
  rows: [
    {
      label: "Spillover",
      cells: [show(inDish.spilloverEfficiency, "%", 1), show(modelInDish.spilloverEfficiency, "%", 1)],
    },
    {
      label: "Illumination",
      cells: [show(inDish.illuminationEfficiency, "%", 1), show(modelInDish.illuminationEfficiency, "%", 1)],
    },
    { label: "Phase", cells: [orUnknown(inDish.phaseEfficiency, "%", 2), show(modelInDish.phaseEfficiency, "%", 2)] },
    {
      label: "Polarisation",
      cells: [orUnknown(inDish.polarizationEfficiency, "%", 2), show(modelInDish.polarizationEfficiency, "%", 2)],
    },
    {
      label: "Aperture efficiency",
      cells: [orUnknown(inDish.apertureEfficiency, "%", 1), show(modelInDish.apertureEfficiency, "%", 1)],
    },
    {
      label: "Level at the rim",
      cells: [show(levelAt(measured.pattern, reflector.halfAngle).meanDb, "dB", 1), show(modelTaper, "dB", 1)],
    },
    {
      label: "Phase centre",
      under: "from what phases refer to",
      cells: [orUnknown(inDish.phaseCenterM, "mm", 1), show(modelInDish.feedPositionZ, "mm", 1)],
    },
    {
      label: "Highest cross-polar",
      cells: [orUnknown(inDish.crossPolarPeakDb, "dB", 1), show(Math.max(...there.crossPolarPeakDb), "dB", 1)],
    },
  ],
  caption: "The same sum over both patterns; what the cuts can't tell is unknown.",
});
