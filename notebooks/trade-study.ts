// Which feed horn for this dish and band: three kinds dimensioned, analysed by two models, set side by side under the study's own
// limits, decided, and handed to the workshop. The relay, its limits and its people are invented; turn the givens to a dish of
// your own. Long, because it is the whole job: each section stands on its own.
import { dxfFile } from "../cells/figures/build-dxf.ts";
import {
  apertureFields,
  type BandQuantity,
  bandCurves,
  buildDrawing,
  buildTables,
  disagreements,
  dishSection,
  dispersion,
  distanceText,
  exposureTable,
  hornsToScale,
  kindNames,
  lossSteps,
  modelsSheet,
  patternCuts,
  performanceSteps,
  sampledField,
  standardQuantities,
  sumOfFields,
  tradeSentences,
  tradeSheet,
} from "../cells/figures/index.ts";
import {
  analysedHorn,
  type BandPoint,
  breakdownMargin,
  buildSheet,
  type Candidate,
  closedFormPattern,
  corrugatedHorn,
  corrugatedWalls,
  dish,
  dualModeHorn,
  exposureDistances,
  feedRequirement,
  hybridDispersion,
  matchedInDish,
  mouthTerms,
  nearFieldEstimate,
  overBand,
  smoothHorn,
  sunFocus,
  tradeTable,
  tuneDualMode,
} from "../cells/index.ts";
import {
  background,
  caution,
  figure,
  given,
  head,
  lead,
  margin,
  markdown,
  note,
  rationale,
  restsOn,
  show,
  table,
} from "../runtime/index.ts";

export const dishDiameter = given("2.4 m", {
  label: "Dish diameter",
  why: "The rim on the mast, measured across four diameters.",
  min: "0.3 m",
  max: "32 m",
  step: "0.05 m",
});
export const fOverD = given("0.8", {
  label: "Focal length over diameter",
  why: "From depth and diameter; the maker's sheet agrees.",
  min: 0.26,
  max: 2,
  step: 0.01,
});
export const depthBy = given.choice(["f/D", "half-angle"], {
  label: "Dish depth taken from",
  why: "Some makers state the angle to the rim instead.",
});
export const rimHalfAngle = given("34.7 deg", {
  label: "Half-angle to the rim",
  why: "Read only when the depth is taken from it.",
  min: "14 deg",
  max: "87 deg",
  step: "0.1 deg",
});
export const bandLow = given("7.9 GHz", {
  label: "Band, lower edge",
  why: "First channel of the link.",
  min: "1 GHz",
  max: "60 GHz",
  step: "0.025 GHz",
});
export const bandHigh = given("8.4 GHz", {
  label: "Band, upper edge",
  why: "Last channel of the link.",
  min: "1 GHz",
  max: "60 GHz",
  step: "0.025 GHz",
});
export const edgeTaper = given("11 dB", {
  label: "Edge taper wanted, space loss included",
  why: "Near the top of the efficiency curve, a little lower at the edge for less spillover.",
  min: "3 dB",
  max: "25 dB",
  step: "0.25 dB",
});
export const surfaceError = given("0.3 mm", {
  label: "Surface error, rms",
  why: "Half path-length error of a spun dish of this size.",
  min: "0 mm",
  max: "5 mm",
  step: "0.05 mm",
});
export const strutShare = given("2 %", {
  label: "Area shaded by struts",
  why: "Three legs of 30 mm tube.",
  min: "0 %",
  max: "20 %",
  step: "0.5 %",
});
export const crossPolarLimit = given("-25 dB", {
  label: "Highest cross-polar allowed in the band",
  why: "Both polarisations carry a channel.",
  min: "-50 dB",
  max: "-10 dB",
  step: "0.5 dB",
});
export const efficiencyLimit = given("65 %", {
  label: "Least efficiency, all losses",
  why: "Fade margin of the link budget.",
  min: "20 %",
  max: "90 %",
  step: "1 %",
});
export const maxLength = given("300 mm", {
  label: "Longest horn",
  why: "Room between the focus and the radio's box.",
  min: "20 mm",
  max: "3 m",
  step: "5 mm",
});
export const maxDiameter = given("180 mm", {
  label: "Widest horn, over its walls",
  why: "The clamp ring of the struts.",
  min: "20 mm",
  max: "2 m",
  step: "5 mm",
});
export const returnLossLimit = given("20 dB", {
  label: "Least return loss in the band",
  why: "What the radio's isolator is bought for.",
  min: "10 dB",
  max: "40 dB",
  step: "0.5 dB",
});
export const toothThickness = given("1 mm", {
  label: "Thinnest tooth",
  why: "What our lathe turns in aluminium without chatter.",
  min: "0.2 mm",
  max: "10 mm",
  step: "0.1 mm",
});

export const buildKind = given.choice(["corrugated", "dualMode", "smooth"], {
  label: "Horn to build",
  why: "As decided beside the trade table.",
});
export const transmitPower = given("2 W", {
  label: "Transmit power at the feed",
  why: "Radio at full power, both polarisations.",
  min: "0 W",
  max: "20 kW",
  step: "0.5 W",
});
export const dishSurface = given.choice(["matt paint", "gloss paint", "polished"], {
  label: "Dish surface",
  why: "Painted by the maker.",
});
export const altitude = given("400 m", {
  label: "Height above the sea",
  why: "The hill.",
  min: "-400 m",
  max: "6000 m",
  step: "50 m",
});

export const reflector = dish(
  depthBy === "f/D" ? { diameter: dishDiameter, fOverD } : { diameter: dishDiameter, halfAngle: rimHalfAngle },
);
export const requirement = feedRequirement({ dish: reflector, bandLow, bandHigh, edgeTaperDb: edgeTaper });
const limits = { maxLength, maxDiameter, toothThickness };
export const smooth = smoothHorn(requirement, limits);
export const dualMode = dualModeHorn(requirement, limits);
export const corrugated = corrugatedHorn(requirement, limits);

const inBand = { bandLow, bandHigh, surfaceError, strutShare };
export const smoothBand = overBand(smooth, reflector, inBand);
export const dualModeBand = overBand(dualMode, reflector, inBand);
export const corrugatedBand = overBand(corrugated, reflector, inBand);
const bands = [smoothBand, dualModeBand, corrugatedBand];
const asked = {
  maxCrossPolarPeakDb: crossPolarLimit,
  minTotalEfficiency: efficiencyLimit,
  minReturnLossDb: returnLossLimit,
  maxLength,
  maxDiameter,
};
export const trade = tradeTable(bands, asked);

const sweep = { bandLow, bandHigh, count: 41 };
const smoothAnalysed = await background(analysedHorn, smooth, sweep);
export const dualModeTuned = await background(tuneDualMode, dualMode, requirement, limits);
const dualModeAnalysed = await background(analysedHorn, dualModeTuned, sweep);
const corrugatedAnalysed = await background(analysedHorn, corrugated, sweep);
const ofDish = { surfaceError, strutShare };
export const smoothMatched = await background(matchedInDish, smoothAnalysed, reflector, ofDish);
export const dualModeMatched = await background(matchedInDish, dualModeAnalysed, reflector, ofDish);
export const corrugatedMatched = await background(matchedInDish, corrugatedAnalysed, reflector, ofDish);
const matched = [smoothMatched, dualModeMatched, corrugatedMatched];
export const matchedTrade = tradeTable(matched, asked);
// the same three horns by closed form: the dual-mode one as it was balanced
const sameHorns = [smoothBand, overBand(dualModeTuned, reflector, inBand), corrugatedBand];
export const closedTrade = tradeTable(sameHorns, asked);

const center = requirement.bandCenter;
head({
  document: "Feed trade study",
  title: "A feed for the Marrow Hill relay",
  facts: [
    ["Dish", `${show(dishDiameter, "m", 2)}, f/D ${show(reflector.fOverD, "", 2)}`],
    ["Band", `${show(bandLow, "GHz", 3)} to ${show(bandHigh, "GHz", 3)}`],
    ["Candidates", "smooth cone, dual-mode, corrugated"],
    ["Asked", `cross-polar below ${show(crossPolarLimit, "dB", 0)}, efficiency above ${show(efficiencyLimit, "%", 0)}`],
    ["Models", "closed form; mode matching at 41 frequencies"],
  ],
});

lead`By mode matching of the actual walls: ${markdown(tradeSentences(matchedTrade))}`;

note`## What the dish asks of the feed

A feed at the focus sees the rim at ${show(reflector.halfAngle, "deg", 1)} from the axis. The path to the rim is longer than the
path to the vertex, which alone takes ${show(requirement.spaceLossDb, "dB", 2)} off the edge; the horn's own pattern has to bring the
other ${show(requirement.feedTaperDb, "dB", 2)}. A cosⁿ feed would do best in this dish with
${show(requirement.optimumEdgeTaperDb, "dB", 1)} at the edge.`;

const firstHorn = [smooth, dualMode, corrugated].find((candidate) => candidate.feasible);
export const dishFigure = figure(
  dishSection(reflector, {
    feed: firstHorn?.feasible ? firstHorn : undefined,
    facts: [
      ["Half-angle to the rim", show(reflector.halfAngle, "deg", 2)],
      [
        "Wanted at the edge",
        `−${show(edgeTaper, "dB", 1)}, of which the feed −${show(requirement.feedTaperDb, "dB", 1)}`,
      ],
      ["Evenly lit dish", show(requirement.uniformGainDbi, "dBi", 1)],
    ],
  }),
  { caption: "The dish in section, with the first horn that can be built to scale at its focus.", basis: "geometry" },
);

note`## Three horns to one scale

Dimensioned at ${show(center, "GHz", 3)} for the wanted taper at the rim; the flare as long as its phase error allows, or as the
limit leaves room. These are first dimensions; the dual-mode horn is then balanced by mode matching, step, phasing length and mouth,
and that one is analysed, judged and built below.`;

const centerOf = (band: typeof smoothBand) => (band.feasible ? band.feedPositionZ : undefined);
export const horns = figure(
  hornsToScale([
    { label: kindNames.smooth, candidate: smooth, phaseCenter: centerOf(smoothBand) },
    { label: kindNames.dualMode, candidate: dualMode, phaseCenter: centerOf(dualModeBand) },
    { label: kindNames.corrugated, candidate: corrugated, phaseCenter: centerOf(corrugatedBand) },
  ]),
  {
    caption:
      "Inner walls in section, mm; cut metal hatched. The half-filled circle is the phase centre over the dish at band centre.",
    basis: "first dimensions from closed forms",
  },
);

note`## The field at the mouth

Where the electric field ends on the wall it does so normal to it: TE11 alone bends its lines there, and radiates a cross-polar
field and unequal planes. TM11 in phase and in the right ratio straightens them, and so does a corrugated wall.`;

const plates = (candidate: Candidate) =>
  candidate.feasible
    ? mouthTerms(candidate, center).map(({ name, profile, amplitude, powerShare, phase }) => ({
        label: name,
        field: sampledField(candidate.apertureRadius, profile),
        amplitude: Math.hypot(amplitude.re, amplitude.im),
        powerShare,
        phaseDeg: (phase * 180) / Math.PI,
      }))
    : [];
const dualPlates = plates(dualMode);
const [hybridPlate] = plates(corrugated);
const [conePlate] = plates(smooth);
export const fields = figure(
  apertureFields(
    [
      ...(dualMode.feasible
        ? [
            ...dualPlates.map((plate, i) => ({ ...plate, ...(i > 0 ? { follows: "plus" as const } : {}) })),
            { label: "Dual-mode mouth", kind: "dualMode", follows: "equals", field: sumOfFields(dualPlates) } as const,
          ]
        : [
            ...(conePlate ? [conePlate] : []),
            { label: "Dual-mode mouth", kind: "dualMode", follows: "beside", reason: dualMode.reason } as const,
          ]),
      hybridPlate
        ? ({
            ...hybridPlate,
            label: "Corrugated mouth",
            under: hybridPlate.label,
            kind: "corrugated",
            follows: "beside",
          } as const)
        : ({
            label: "Corrugated mouth",
            kind: "corrugated",
            follows: "beside",
            reason: corrugated.reason,
          } as const),
    ],
    center,
  ),
  {
    caption: "Electric field over the mouth, E-plane upright, each plate to its own largest strength.",
    basis: "closed form, band centre",
  },
);

note`## Patterns and the rim`;

const cut = (candidate: Candidate) => {
  const { kind, reason } = candidate;
  const label = kindNames[kind];
  return candidate.feasible ? { label, kind, pattern: closedFormPattern(candidate, center) } : { label, kind, reason };
};
export const patterns = figure(
  patternCuts([cut(smooth), cut(dualMode), cut(corrugated)], {
    halfAngle: reflector.halfAngle,
    crossPolarLimitDb: crossPolarLimit,
  }),
  {
    caption: "Level against boresight, dB, at band centre. Power right of the rim misses the dish.",
    basis: "closed form",
  },
);

note`## Where the gain goes`;

export const losses = figure(
  lossSteps(
    bands.map((band) => {
      const { kind, reason } = band;
      const label = kindNames[kind];
      if (!band.feasible) return { label, kind, reason };
      const steps = performanceSteps(band.center, { surface: `surface, ${show(surfaceError, "mm", 2)} rms` });
      return { label, kind, steps, result: `gain ${show(band.center.gainDbi, "dBi", 2)}` };
    }),
    `From an evenly lit, lossless ${show(dishDiameter, "m", 2)} aperture: ${show(requirement.uniformGainDbi, "dBi", 2)} at ${show(center, "GHz", 3)}.`,
  ),
  {
    caption: "Losses in the order in which the field meets them; hollow where all feeds share them.",
    basis: "closed form, band centre",
  },
);

note`## Over the band

Full lines by mode matching, thin ones by closed form. The feed stays where its phase centre at band centre stands at the focus.`;

const lines = <P extends BandPoint>(
  results: readonly (
    | { feasible: true; kind: Candidate["kind"]; points: P[] }
    | { feasible: false; kind: Candidate["kind"]; reason: string }
  )[],
  model: string,
  style: "full" | "second",
) =>
  results.map((band) => {
    const { kind } = band;
    const label = kindNames[kind].toLowerCase();
    return band.feasible ? { label, kind, points: band.points, model, style } : { label, kind, reason: band.reason };
  });
const returnLoss: BandQuantity<BandPoint> = {
  title: "Return loss at the throat, dB",
  value: ({ returnLossDb }) => returnLossDb,
  digits: 1,
  leastSpan: 10,
  limit: { value: returnLossLimit, asked: "above" },
};
export const overTheBand = figure(
  bandCurves<BandPoint>(
    [
      ...lines(matched, "mode matching", "full"),
      ...lines(sameHorns, "closed form", "second").filter((line) => "points" in line),
    ],
    {
      bandLow,
      bandHigh,
      quantities: [...standardQuantities({ crossPolarLimitDb: crossPolarLimit }), returnLoss],
    },
  ),
  {
    caption: "What moves over the band. The closed form knows no match.",
    basis: "41 frequencies, more where something moves fast",
  },
);

note`## The same horns by two models

The closed form knows one mode at each mouth, as a textbook has it; mode matching follows the wall from throat to mouth. Where they
differ, the second is to be believed, and neither knows the rim and the outer wall.`;

export const models = table({
  ...modelsSheet(closedTrade, matchedTrade, { first: "closed form" }),
  caption: "By mode matching, with the closed form beneath.",
  basis: "mode matching, 41 frequencies",
});
margin(models, { mark: "modelsDiffer" })`${markdown(
  disagreements(closedTrade, matchedTrade)
    .map(({ text }) => text)
    .join("\n\n"),
)}`;
const errors = matched.flatMap((band) =>
  band.feasible ? [`${kindNames[band.kind].toLowerCase()} ${show(band.convergence.reflectionError, "", 5)}`] : [],
);
const balance = Math.max(0, ...matched.map((band) => (band.feasible ? band.powerBalance : 0)));
margin(models, { mark: "reading" })`Estimated error of S11 from refinement: ${errors}. Power is in balance to ${
  balance < 1e-9 ? "better than 10⁻⁹" : show(balance)
}.`;

note`## Modes in the corrugated wall

How fast each mode travels at the mouth's slots. Below balance the wall guides a slow wave; where EH12 begins, it can carry power away
from HE11.`;

const walls = corrugated.feasible ? corrugatedWalls(corrugated) : null;
const around = { low: 0.75 * bandLow, high: 1.5 * bandHigh };
const waves = walls && hybridDispersion(walls.mouth, around);
export const wallModes = waves
  ? figure(
      dispersion(waves.curves, {
        bandLow,
        bandHigh,
        marks: [
          { frequency: waves.balanced, words: "balanced" },
          { frequency: waves.eh12Start, words: "EH12 begins" },
        ].filter(({ frequency }) => frequency > around.low && frequency < around.high),
      }),
      {
        caption: "Phase constant against that of free space; the band is tinted.",
        basis: "exact radial slot at the mouth",
      },
    )
  : note`There is no corrugated horn for this dish: ${corrugated.reason}`;

note`## Trade

Every limit is judged on the worst of the band, by mode matching.`;

export const tradeView = table({
  ...tradeSheet(matchedTrade),
  caption: "At band centre, with the worst over the band beneath.",
  basis: "mode matching, 41 frequencies",
});

export const feedChosen = rationale(tradeView, {
  decision: "Build the corrugated horn.",
  chosen: "corrugated",
  author: "J. Pallister",
  date: "2026-11-27",
  reasons: note`The balanced dual-mode horn keeps ${show(crossPolarLimit, "dB", 0)} as well, but by less at the lower edge, where a
hundredth of a wavelength in its phasing length already shows. The slots cost a day on the lathe, which an easier night on the mast
repays.`,
  numbers: [
    restsOn("Gain, worst", matchedTrade.rows[2]?.worst.gainDbi ?? null, { agreed: "44.76 dBi", mayMove: "0.10 dBi" }),
    restsOn("Cross-polar, worst", matchedTrade.rows[2]?.worst.crossPolarPeakDb ?? null, {
      agreed: "-31.6 dB",
      mayMove: "2.0 dB",
    }),
    restsOn("Dual-mode cross-polar, worst", matchedTrade.rows[1]?.worst.crossPolarPeakDb ?? null, {
      agreed: "-28.5 dB",
      mayMove: "1.0 dB",
    }),
    restsOn("Length", matchedTrade.rows[2]?.lengthM ?? null, { agreed: "96.6 mm", mayMove: "5 mm" }),
  ],
});

const inDoubt = matched.flatMap(({ kind, warnings }) => warnings.map(({ text }) => `**${kindNames[kind]}.** ${text}`));
margin(tradeView, { mark: "warning" })`${{ markdown: inDoubt.join("\n\n") }}`;

note`## Build sheet

Read from the wall alone, datum at the mouth. Tolerances are parts of the wavelength and machining limits what a good lathe shop
usually does, both common practice: show them to the shop before ordering.`;

const chosen = { corrugated, dualMode: dualModeTuned, smooth }[buildKind];
export const sheet = chosen.feasible
  ? buildSheet(chosen, { highestFrequency: bandHigh, shop: { tooth: [toothThickness, toothThickness] } })
  : null;
const sheetTables = sheet && buildTables(sheet);
export const drawing = sheet
  ? figure(
      { ...buildDrawing(sheet), files: [dxfFile(sheet)] },
      { caption: "Full section in true proportions; every length from the mouth.", basis: "first dimensions" },
    )
  : note`There is nothing to build: ${chosen.reason}`;
export const dimensions = sheetTables ? table(sheetTables.dimensions) : null;
export const slots = sheetTables?.slots ? table(sheetTables.slots) : null;
export const machining = sheetTables ? table(sheetTables.machining) : null;
export const mass = sheetTables ? table(sheetTables.mass) : null;

note`## Cautions`;

const radiated = matched.find(({ kind }) => kind === buildKind);
export const dishTransmits = {
  frequency: center,
  diameter: dishDiameter,
  gainDbi: radiated?.feasible ? radiated.center.gainDbi : requirement.uniformGainDbi,
  power: transmitPower,
};
const farthest = Math.max(
  ...exposureDistances(dishTransmits)
    .filter(({ who }) => who === "public")
    .map(({ distance }) => distance),
);
export const exposure = table(exposureTable(dishTransmits));
const hornField = chosen.feasible
  ? nearFieldEstimate({
      ...dishTransmits,
      diameter: 2 * chosen.apertureRadius,
      gainDbi: radiated?.feasible ? radiated.center.feedDirectivityDbi : 15,
    })
  : null;
caution("Radio-frequency exposure")`At ${show(transmitPower, "W", 1)} the estimate keeps to every public reference level
listed ${farthest > 0 ? `only beyond ${distanceText(farthest)} in the beam` : "on the axis, however near the reflector"}${
  hornField ? `; in the horn's open mouth the density reaches up to ${show(hornField.surfaceDensity, "W/m^2", 0)}` : ""
}. These are figures for screening: the code in force at the site decides, and a licensed person assesses it. Switch off and lock the
transmitter before anyone enters the beam or reaches between feed and dish, and never look into a horn or guide that may carry power.`;

export const sun = sunFocus(reflector, {
  surface: ({ "matt paint": "mattPaint", "gloss paint": "glossPaint", polished: "polished" } as const)[dishSurface],
  ...(chosen.feasible ? { feedRadius: chosen.apertureRadius } : {}),
});
caution("Sun in the dish")`Pointed at the sun, this dish would gather about ${show(sun.power, "W", 0)} into an image
${show(sun.imageDiameter, "mm", 0)} wide, in its middle some ${show(sun.concentration, "", 0)} times sunlight. An estimate, good to a
factor of two at best: bright metal is a hundred times worse than matt paint. Cover a bright dish or turn it away from the sun's path
before work; keep hands, eyes and anything that burns out of the focus.`;

export const air = chosen.feasible
  ? breakdownMargin(
      { radius: chosen.throatRadius, frequency: bandLow, power: transmitPower, reflection: 0.1 },
      { altitude },
    )
  : null;
caution("High power")`${
  air
    ? `${show(transmitPower, "W", 0)} of TE11 make ${show(air.peakField, "kV/m", 1)} in the throat, with a tenth of the wave reflected;
air at ${show(altitude, "m", 0)} breaks down near ${show(air.breakdownField, "MV/m", 2)}. Kept well below that, the throat carries
${show(air.allowedPower, "kW", 0)} at most.`
    : ""
} Edges of teeth, burrs, dust and moisture raise the field. What counts is the peak of a pulse or of the sum of carriers. High power
belongs to people licensed for it.`;

caution(
  "Work at height",
)`Mounting and aligning a feed is work at height, over a curved and slippery surface that may move. Lock
the drives first. Local rules say who may climb and with what: trained people, fall arrest, tools on lanyards, nobody beneath; not in
wind, ice or lightning, and clear of power lines.`;
