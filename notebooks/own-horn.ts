// What a horn of one's own does: its inner wall goes in as a table of z and r, match, modes and pattern come out, by mode matching.
// The wall below is invented; give another with --set profile=@wall.csv or in the field on the page.
import { type BandQuantity, bandCurves, hornsToScale, patternCuts } from "../cells/figures/index.ts";
import { ownBand, readProfile } from "../cells/index.ts";
import { background, figure, given, head, lead, margin, markdown, note, show } from "../runtime/index.ts";

export const profile = given.text(
  `z_mm,r_mm
0,12
20,12
20,14
32,14
52,21
112,33
`,
  {
    label: "Inner wall, throat to mouth",
    why: "A table with the columns z_mm and r_mm; two rows at one z are a step. As measured on the part, or as drawn.",
  },
);
export const bandLow = given("9 GHz", {
  label: "Band, lower edge",
  why: "First channel.",
  min: "0.3 GHz",
  max: "300 GHz",
});
export const bandHigh = given("11 GHz", {
  label: "Band, upper edge",
  why: "Last channel.",
  min: "0.3 GHz",
  max: "300 GHz",
});
export const points = given("41", {
  label: "Frequencies",
  why: "Equally spaced, ends included.",
  min: 2,
  max: 2001,
  step: 1,
});
export const mouth = given.choice(["left out", "infinite flange"], {
  label: "Reflection of the mouth itself",
  why: "A mouth of a wavelength or more reflects little; a flange is the one case with a published admittance.",
});
export const halfAngle = given("35 deg", {
  label: "Half-angle to the rim",
  why: "Where the dish ends, for the figure only.",
  min: "5 deg",
  max: "85 deg",
});

export const wall = readProfile(profile);
export const analysis = await background(ownBand, wall, {
  ...{ bandLow, bandHigh, points },
  mouth: mouth === "left out" ? "none" : "flange",
});
export const {
  frequencyHz,
  s11,
  returnLossDb,
  apertureModes,
  directivityDbi,
  apertureDirectivityDbi,
  crossPolarPeakDb,
  phaseCenterM,
  pattern,
  powerBalance,
  convergence,
} = analysis;

head({
  document: "Horn analysis",
  title: "A horn by its wall",
  facts: [
    ["Band", `${show(bandLow, "GHz", 3)} to ${show(bandHigh, "GHz", 3)}`],
    ["Throat", `Ø ${show(2 * wall.radius[0]!, "mm", 2)}`],
    ["Mouth", `Ø ${show(2 * wall.radius.at(-1)!, "mm", 2)}`],
    ["Model", "mode matching"],
  ],
});

const best = (values: readonly number[]) => show(Math.max(...values), "", 1);
const least = (values: readonly number[]) => show(Math.min(...values), "", 1);
lead`Over the band the horn returns at least ${least(returnLossDb)} dB less than it is sent, has a directivity of
${least(directivityDbi)} to ${best(directivityDbi)} dBi and a cross-polar field of at most ${best(crossPolarPeakDb)} dB.`;

note`## The wall`;

export const section = figure(
  hornsToScale([
    {
      label: "Own profile",
      candidate: {
        ...{ feasible: true, kind: "custom", reason: "", profile: wall, dimensions: [], geometry: null, warnings: [] },
        throatRadius: wall.radius[0]!,
        apertureRadius: wall.radius.at(-1)!,
        length: -wall.z[0]!,
        outerDiameter: 2 * Math.max(...wall.radius) + 4e-3,
      },
    },
  ]),
  { caption: "Inner wall in section, mm; a wall of 2 mm is drawn around it.", basis: "as given" },
);

note`## Over the band`;

interface Point {
  frequency: number;
  returnLossDb: number;
  directivityDbi: number;
  crossPolarPeakDb: number;
  phaseCenterM: number;
}
const sweep = frequencyHz.map(
  (frequency, i): Point => ({
    frequency,
    returnLossDb: returnLossDb[i]!,
    directivityDbi: directivityDbi[i]!,
    crossPolarPeakDb: crossPolarPeakDb[i]!,
    phaseCenterM: phaseCenterM[i]!,
  }),
);
const quantities: BandQuantity<Point>[] = [
  { title: "Return loss at the throat, dB", value: (point) => point.returnLossDb, digits: 1, leastSpan: 10 },
  { title: "Directivity, dBi", value: (point) => point.directivityDbi, digits: 2, leastSpan: 1 },
  { title: "Highest cross-polar, dB", value: (point) => point.crossPolarPeakDb, digits: 1, leastSpan: 8, floor: -60 },
  {
    title: "Phase centre, mm from the mouth (− inside)",
    value: (point) => 1e3 * point.phaseCenterM,
    digits: 1,
    leastSpan: 4,
  },
];
export const overTheBand = figure(
  bandCurves([{ label: "own profile", kind: "custom", points: sweep }], { bandLow, bandHigh, quantities }),
  { caption: "What moves over the band.", basis: `mode matching, ${frequencyHz.length} frequencies` },
);
const balance = Math.max(...powerBalance.map(Math.abs));
margin(overTheBand, {
  mark: "reading",
})`Estimated error of S11 ${show(convergence.reflectionError, "", 5)}, of the field at the mouth
${show(convergence.crossPolarErrorDb, "dB", 0)}: ${convergence.rule} Power is in balance to ${balance < 1e-9 ? "better than 10⁻⁹" : show(balance)}.`;
margin(overTheBand, {
  mark: "modelsDiffer",
})`With the mouth's own reflection, as of an infinite flange, the return loss at band centre is
${show(analysis.mouthEffect.flangeDb, "dB", 1)}; without it ${show(analysis.mouthEffect.noneDb, "dB", 1)}.`;
margin(overTheBand, { mark: "warning" })`${markdown(analysis.warnings.map(({ text }) => text).join("\n\n"))}`;

note`## Pattern at band centre`;

export const cuts = figure(
  patternCuts([{ label: "Own profile", kind: "custom", pattern: analysis.centerPattern }], { halfAngle }),
  {
    caption: "Level against boresight, dB. The rim and the outer wall of the horn are left out.",
    basis: "mode matching",
  },
);
