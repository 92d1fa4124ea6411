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
-105,-26.9,160,-36,149,-36.9
-97.5,-26.9,162,-33,149,-38.8
-90,-26.8,160,-31.4,148,-39.1
-82.5,-26.1,159,-30.9,143,-37.6
-75,-23.7,159,-30.2,137,-34.3
-67.5,-21.7,157,-29.9,122,-30.1
-60,-19.7,149,-29.6,85,-26.7
-52.5,-18.6,140,-24.6,42,-22.9
-45,-18.9,122,-18.1,20,-21.1
-37.5,-19.2,73,-12.2,9,-18.5
-30,-12.8,26,-7.7,6,-19.1
-22.5,-6.7,11,-4.3,1,-20.9
-15,-3,3,-2.1,0,-26
-7.5,-0.6,-2,-0.7,1,-37.4
0,0,0,0,0,-40.1
7.5,-1,-2,-0.4,-1,-36.7
15,-2.8,5,-1.9,1,-27
22.5,-6.7,11,-4.3,3,-21.2
30,-12.6,29,-7.7,3,-20.4
37.5,-18.7,71,-12.3,12,-19.7
45,-18.7,122,-17.9,20,-21.4
52.5,-18.5,142,-24.7,41,-22.6
60,-19.6,149,-29.3,86,-25.7
67.5,-21.8,155,-30.1,120,-30.6
75,-24,160,-30.4,136,-33.6
82.5,-25.4,162,-30.5,144,-37.5
90,-26.7,162,-31.6,148,-39.3
97.5,-27,162,-32.7,149,-38.7
105,-27.1,160,-35.6,150,-37
`,
  {
    label: "Measured cuts",
    why: "Invented: the model with small errors. Columns theta_deg, e_db, h_db; phases and cross45_db where measured.",
  },
);
export const match = given.text(
  `# GHz S RI R 50
8.5 -0.0230 -0.0225
8.7 -0.0323 -0.0151
8.9 -0.0108 -0.0004
9.1 -0.0026 -0.0051
9.3 0.0008 -0.0075
9.5 -0.0081 -0.0026
9.7 -0.0114 -0.0131
9.9 -0.0179 -0.0046
10.1 -0.0159 -0.0049
10.3 -0.0087 0.0158
10.5 -0.0012 0.0086
`,
  {
    label: "Measured match",
    why: "Invented likewise. A one-port Touchstone file.",
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

// beyond the last measured angle nothing is known, so nothing is compared
const seen = Math.min(Math.PI / 2, (measured.thetaMaxDeg * Math.PI) / 180);
export const pattern = figure(
  comparison(
    { model: "mode matching", pattern: there.centerPattern },
    { model: "measured", pattern: measured.pattern },
    { label: "The horn", kind: "measured", halfAngle: reflector.halfAngle, style: "measured", thetaMax: seen },
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
