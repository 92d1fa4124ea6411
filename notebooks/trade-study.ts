// Which feed horn for this dish and band: three kinds dimensioned, modelled and set side by side under the study's own limits.
// The relay, its limits and its people are invented; turn the givens to a dish of your own.
import {
  apertureFields,
  bandCurves,
  dishSection,
  hornsToScale,
  kindNames,
  lossSteps,
  patternCuts,
  performanceSteps,
  sampledField,
  sumOfFields,
  tradeSentences,
  tradeSheet,
} from "../cells/figures/index.ts";
import {
  type Candidate,
  closedFormPattern,
  corrugatedHorn,
  dish,
  dualModeHorn,
  feedRequirement,
  mouthTerms,
  overBand,
  smoothHorn,
  tradeTable,
} from "../cells/index.ts";
import { caution, figure, given, head, lead, margin, note, rationale, restsOn, show, table } from "../runtime/index.ts";

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
export const toothThickness = given("1 mm", {
  label: "Thinnest tooth",
  why: "What our lathe turns in aluminium without chatter.",
  min: "0.2 mm",
  max: "10 mm",
  step: "0.1 mm",
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
export const trade = tradeTable(bands, {
  maxCrossPolarPeakDb: crossPolarLimit,
  minTotalEfficiency: efficiencyLimit,
  maxLength,
  maxDiameter,
});

const center = requirement.bandCenter;
head({
  document: "Feed trade study",
  title: "A feed for the Marrow Hill relay",
  facts: [
    ["Dish", `${show(dishDiameter, "m", 2)}, f/D ${show(reflector.fOverD, "", 2)}`],
    ["Band", `${show(bandLow, "GHz", 3)} to ${show(bandHigh, "GHz", 3)}`],
    ["Candidates", "smooth cone, dual-mode, corrugated"],
    ["Asked", `cross-polar below ${show(crossPolarLimit, "dB", 0)}, efficiency above ${show(efficiencyLimit, "%", 0)}`],
    [
      "Model",
      `closed form, ${trade.rows.length} horns at ${smoothBand.feasible ? smoothBand.frequencies.length : 21} frequencies`,
    ],
  ],
});

lead`${tradeSentences(trade)}`;

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
limit leaves room.`;

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

note`## Over the band`;

export const overTheBand = figure(
  bandCurves(
    bands.map((band) => {
      const { kind, reason } = band;
      const label = kindNames[kind].toLowerCase();
      return band.feasible ? { label, kind, points: band.points } : { label, kind, reason };
    }),
    { bandLow, bandHigh, crossPolarLimitDb: crossPolarLimit },
  ),
  {
    caption: "The feed stays where its phase centre at band centre stands at the focus.",
    basis: "closed form, 21 frequencies",
  },
);

note`## Trade

Every limit is judged on the worst of the band, not on its centre.`;

export const tradeView = table({
  ...tradeSheet(trade),
  caption: "At band centre, with the worst over the band beneath.",
  basis: "closed form, 21 frequencies",
});

export const feedChosen = rationale(tradeView, {
  decision: "Build the corrugated horn.",
  chosen: "corrugated",
  author: "J. Pallister",
  date: "2026-11-27",
  reasons: note`It alone keeps the cross-polar below ${show(crossPolarLimit, "dB", 0)} over the whole band; the dual-mode horn
does so only near the middle of it. The slots cost a day on the lathe, which the second polarisation repays.`,
  numbers: [
    restsOn("Gain, worst", trade.rows[2]?.worst.gainDbi ?? null, { agreed: "44.71 dBi", mayMove: "0.10 dBi" }),
    restsOn("Dual-mode cross-polar, worst", trade.rows[1]?.worst.crossPolarPeakDb ?? null, {
      agreed: "-23.4 dB",
      mayMove: "1.0 dB",
    }),
    restsOn("Length", trade.rows[2]?.lengthM ?? null, { agreed: "96.6 mm", mayMove: "5 mm" }),
  ],
});

const inDoubt = bands.flatMap(({ kind, warnings }) => warnings.map(({ text }) => `**${kindNames[kind]}.** ${text}`));
margin(tradeView, { mark: "warning" })`${{ markdown: inDoubt.join("\n\n") }}`;

caution(
  "Before anyone stands in front of it",
)`A feed that transmits, and a dish that points at the sun, can injure. Keep out of the
beam and off the feed while power is on; lock the transmitter before work; cover or turn the dish away from the sun. Work on a
mast belongs to people trained and equipped for height. Limits are set by local codes and by the licensed practice that
applies to your site.`;
