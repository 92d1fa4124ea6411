// A made-up study with every kind of thing a page shows and all four states. Its numbers are invented. Long because it is data.

import type { Drawing, Figure, Table } from "../../../runtime/shown.ts";
import { type FakeCell, type FakeGiven, FakeStudy } from "./fake-study.ts";

const svgNamespace = "http://www.w3.org/2000/svg";

/** Three curves over an axis, as wide as asked. */
export function curves(alt: string, depth: number): Drawing {
  return {
    alt,
    data: [
      ["theta, deg", "level, dB"],
      [0, 0],
      [30, -depth],
      [60, -3 * depth],
    ],
    draw({ document, width }) {
      const height = 260;
      const make = (tag: string, attributes: Record<string, string | number>, text?: string) => {
        const element = document.createElementNS(svgNamespace, tag);
        for (const [name, value] of Object.entries(attributes)) element.setAttribute(name, String(value));
        if (text !== undefined) element.textContent = text;
        return element;
      };
      const root = make("svg", { viewBox: `0 0 ${width} ${height}`, width, height });
      const left = 36;
      const bottom = height - 24;
      const x = (theta: number) => left + (theta / 90) * (width - left - 90);
      const y = (level: number) => 12 + (-level / 40) * (bottom - 12);
      root.append(make("rect", { x: x(30), y: 12, width: x(90) - x(30), height: bottom - 12, fill: "#f3f1ea" }));
      for (const level of [0, -10, -20, -30, -40]) {
        root.append(make("line", { x1: left, x2: x(90), y1: y(level), y2: y(level), stroke: "#d8d5cc" }));
        root.append(
          make(
            "text",
            { x: left - 6, y: y(level) + 4, "text-anchor": "end", "font-size": 12, fill: "#4f5b65" },
            `${level}`.replace("-", "−"),
          ),
        );
      }
      const kinds = [
        ["#D55E00", "#9c4400", "smooth", 0.9],
        ["#009E73", "#00664a", "dual-mode", 1],
        ["#0072B2", "#00578a", "corrugated", 1.12],
      ] as const;
      for (const [line, dark, name, share] of kinds) {
        const points = Array.from({ length: 46 }, (_, index) => index * 2)
          .map((theta) => `${x(theta).toFixed(1)},${y(Math.max(-40, -depth * share * (theta / 30) ** 1.7)).toFixed(1)}`)
          .join(" ");
        root.append(make("polyline", { points, fill: "none", stroke: line, "stroke-width": 1.9 }));
        root.append(
          make(
            "text",
            { x: x(90) + 6, y: y(-Math.min(40, depth * share * 3 ** 1.1 * 0.72)), "font-size": 12.5, fill: dark },
            name,
          ),
        );
      }
      root.append(make("line", { x1: x(30), x2: x(30), y1: 12, y2: bottom, stroke: "#1f2a33" }));
      root.append(make("text", { x: x(30) + 5, y: 24, "font-size": 12.5, fill: "#1f2a33" }, "rim"));
      return root;
    },
  };
}

const trade = (taper: number): Table => ({
  shows: "table",
  columns: [
    { label: "Smooth cone", kind: "smooth" },
    { label: "Dual-mode", kind: "dualMode" },
    { label: "Corrugated", kind: "corrugated" },
  ],
  rows: [
    {
      key: "crossPolar",
      label: "Cross-polar, worst",
      under: "at most -25 dB in the band",
      cells: [
        { text: "-18.6", word: "misses by 6.4", verdict: "misses" },
        { text: (-20 - taper / 3).toFixed(1), word: "misses by 1.4", verdict: "misses" },
        { text: "-41.5", word: "passes", verdict: "passes" },
      ],
    },
    {
      key: "efficiency",
      label: "Feed efficiency",
      under: "over the band",
      cells: [{ text: "71 to 72 %" }, { text: "72 to 78 %" }, { text: "80 to 81 %" }],
    },
    { key: "length", label: "Length", under: "mm", cells: [{ text: "146" }, { text: "168" }, { text: "200" }] },
    {
      key: "chokeRing",
      label: "Choke ring: not realisable for this dish",
      cells:
        "Rings can shape the beam of a single-mode bore but not narrow it this far: -2.0 dB at the rim where -10.5 dB is asked.",
    },
    {
      key: "all",
      label: "In all",
      total: true,
      cells: [
        { text: "fails two of three", verdict: "misses" },
        { text: "fails one of three", verdict: "misses" },
        { text: "passes all three", verdict: "passes" },
      ],
    },
  ],
  basis: "closed form, worst of 21 frequencies",
  data: [
    ["kind", "cross-polar, dB"],
    ["smooth", -18.6],
    ["=HYPERLINK(1)", -23.6],
  ],
});

export const sampleGivens: FakeGiven[] = [
  {
    name: "dishDiameter",
    label: "Dish diameter",
    why: "Kept from the old radio-link mast. Photogrammetry, 2 October.",
    text: "2.4 m",
    min: 0.5,
    max: 12,
    perUnit: 1,
  },
  {
    name: "bandLow",
    label: "Band, lower edge",
    why: "Second carrier, added in November.",
    text: "8.1 GHz",
    min: 7e9,
    max: 9e9,
    step: 5e6,
    perUnit: 1e9,
  },
  {
    name: "edgeTaper",
    label: "Edge taper wanted",
    why: "Flat top of the efficiency curve; space loss included.",
    text: "11 dB",
    min: 6,
    max: 20,
    perUnit: 1,
  },
  {
    name: "material",
    form: "choice",
    label: "Material",
    why: "From bar, as the shop has it.",
    text: "aluminium",
    options: ["aluminium", "brass", "copper-plated resin"],
  },
  { name: "polarizer", form: "switch", label: "With a polariser", why: "Both circular hands carry data.", text: "on" },
  { name: "site", form: "text", label: "Site", why: "Printed on the build sheet.", text: "north mast" },
  {
    name: "profile",
    form: "text",
    label: "Measured profile",
    why: "As turned, from the coordinate machine.",
    text: "z_mm,r_mm\n0,53.8\n-115.2,25.1\n-142.1,25.1\n-142.1,19.2",
  },
];

const noteSource = (markdown: string) => `note\`${markdown}\`;`;

export function sampleCells(): (FakeGiven | FakeCell)[] {
  const figure = (details: Omit<Figure, "shows">): Figure => ({ shows: "figure", ...details });
  return [
    {
      name: "line 1",
      source: 'head({ document: "Feed trade memorandum", title: "A feed for the northern mast" });',
      inputs: ["dishDiameter", "bandLow"],
      value: ({ dishDiameter, bandLow }) => ({
        shows: "head",
        document: "Feed trade memorandum",
        title: "A feed for the northern mast",
        facts: [
          ["Dish", `${(dishDiameter as number).toFixed(2)} m, *f/D* 0.80, front-fed`],
          ["Band", `${((bandLow as number) / 1e9).toFixed(3)} to 8.400 GHz, receive`],
          ["Revision", "C, working copy"],
          ["Prepared by", "antenna group"],
          ["Forked from", "north-mast-b.ts"],
          ["For", "station engineering"],
        ],
      }),
    },
    { name: "givenHeading", source: noteSource("## Given"), value: () => ({ shows: "note", markdown: "## Given" }) },
    ...sampleGivens,
    {
      name: "line 40",
      beside: "bandLow",
      inputs: ["bandLow"],
      source: "margin(bandLow, { mark: 'changed' })`…`;",
      value: ({ bandLow }) => ({
        shows: "margin",
        mark: "changed",
        markdown:
          bandLow === 8.1e9
            ? ""
            : "The lower edge moved since the file was kept. The small tick under the slider is the value in the file.",
      }),
    },
    {
      name: "line 41",
      beside: "edgeTaper",
      source: "margin(edgeTaper, { mark: 'rationale' })`…`;",
      value: () => ({
        shows: "margin",
        mark: "rationale",
        markdown:
          "Eleven decibels at the rim, space loss included, sits on the flat top of the efficiency curve for a front-fed dish.",
      }),
    },
    {
      name: "requirement",
      source:
        "// What the dish asks of a feed at its rim.\nconst requirement = feedRequirement({\n  dish,\n  edgeTaperDb: edgeTaper, // space loss included\n});",
      inputs: ["dishDiameter", "edgeTaper"],
      value: ({ edgeTaper }) => ({ halfAngle: 0.61, taper: edgeTaper }),
    },
    {
      name: "line 50",
      source: noteSource("## What the dish asks of the feed\n\nThe rim is seen at 34.7 deg."),
      inputs: ["requirement"],
      value: ({ edgeTaper }) => ({
        shows: "note",
        markdown: `## What the dish asks of the feed\n\nThe rim is seen at 34.7° from the axis, and the path to it is longer by 0.53 dB of space loss. With ${edgeTaper} dB asked at the rim, the feed itself gives -${((edgeTaper as number) - 0.5).toFixed(1)} dB there.`,
      }),
    },
    {
      name: "patterns",
      source:
        'const patterns = figure(patternCuts(smooth, dualMode, corrugated), {\n  caption: `Level below the axis at ${show(bandCenter, "GHz", 1)}.`,\n  basis: "closed form, instant",\n});',
      inputs: ["requirement", "edgeTaper"],
      value: ({ edgeTaper }) =>
        figure({
          title: "Patterns and the rim",
          caption:
            "Level below the axis in the *E*-plane, dB, at 8.25 GHz. What a horn sends into the tinted side misses the dish.",
          basis: "closed form, instant",
          drawing: curves(
            `Three pattern cuts over 0 to 90 degrees; at the rim the dual-mode horn is ${edgeTaper} dB down.`,
            edgeTaper as number,
          ),
        }),
    },
    {
      name: "line 60",
      beside: "patterns",
      source: "margin(patterns)`…`;",
      value: () => ({
        shows: "margin",
        mark: "reading",
        markdown: "The line is the rim at 34.7°. Solid is the *E*-plane.",
      }),
    },
    {
      name: "line 61",
      beside: "patterns",
      source: "margin(patterns)`…`;",
      value: () => ({
        shows: "margin",
        mark: "modelsDiffer",
        markdown:
          "Smooth cone at the rim: closed form -16.2 dB, mode matching -19.4 dB. The wall current reaches the lip and runs over it, which the closed form leaves out.",
      }),
    },
    {
      name: "line 62",
      source: noteSource("## Over the band"),
      value: () => ({ shows: "note", markdown: "## Over the band" }),
    },
    {
      name: "sweep",
      source: "const sweep = await background(overBand, dualMode, dish);",
      inputs: ["requirement"],
      state: "working",
      progress: 0.62,
      value: () => ({ rows: 21 }),
    },
    {
      name: "band",
      source: "const band = figure(overBandFigure(sweep));",
      inputs: ["sweep"],
      state: "working",
      value: () =>
        figure({
          caption: "Highest cross-polar level over the band, dB.",
          basis: "closed form, 21 frequencies",
          drawing: curves("Cross-polar over the band.", 8),
        }),
    },
    {
      name: "fine",
      source: "const fine = figure(fineFigure());",
      inputs: ["requirement"],
      state: "behind",
      value: () =>
        figure({
          caption: "The same, sampled finer.",
          basis: "closed form, 201 frequencies",
          drawing: curves("Cross-polar over the band, sampled finer.", 14),
        }),
    },
    {
      name: "rangeCuts",
      source: "const rangeCuts = readCuts(file);",
      state: "failed",
      failure: {
        reason: "the E-plane file ends at 92°; spillover needs 180°",
        cell: "rangeCuts",
        file: "notebooks/sample.ts",
        line: 71,
        path: ["rangeCuts"],
      },
    },
    {
      name: "measured",
      source: "const measured = figure(measuredFigure(rangeCuts));",
      inputs: ["rangeCuts"],
      state: "failed",
      failure: {
        reason: "the E-plane file ends at 92°; spillover needs 180°",
        cell: "rangeCuts",
        file: "notebooks/sample.ts",
        line: 71,
        path: ["rangeCuts", "measured"],
      },
    },
    {
      name: "lonely",
      source: "const lonely = 1 / zero;",
      state: "failed",
      failure: {
        reason: "zero is not a length",
        cell: "lonely",
        file: "notebooks/sample.ts",
        line: 74,
        path: ["lonely"],
      },
    },
    { name: "line 80", source: noteSource("## Trade"), value: () => ({ shows: "note", markdown: "## Trade" }) },
    {
      name: "trade",
      source: "const trade = table(tradeTable(results));",
      inputs: ["edgeTaper"],
      value: ({ edgeTaper }) => trade(edgeTaper as number),
    },
    {
      name: "line 85",
      beside: "trade",
      source: "margin(trade, { mark: 'warning', row: 'crossPolar' })`…`;",
      value: () => ({
        shows: "margin",
        mark: "warning",
        row: "crossPolar",
        markdown:
          "-23.6 dB against -25 dB, at 8.025 GHz. The two modes run at different speeds in the straight, so they meet in step at one frequency only.",
      }),
    },
    {
      name: "line 86",
      beside: "trade",
      source: "margin(trade, { mark: 'warning', row: 'efficiency' })`…`;",
      value: () => ({
        shows: "margin",
        mark: "modelsDiffer",
        row: "efficiency",
        markdown: "Mode matching finds 0.6 % less for the smooth cone.",
      }),
    },
    {
      name: "line 87",
      beside: "trade",
      source: "margin(trade, { mark: 'rationale', row: 'all' })`…`;",
      value: () => ({
        shows: "margin",
        mark: "rationale",
        row: "all",
        markdown: "The band is narrow, 3 %, which is where a stepped horn is at its best.",
      }),
    },
    {
      name: "line 90",
      source: "caution`…`;",
      inputs: ["bandLow"],
      value: () => ({
        shows: "caution",
        title: "Radio-frequency exposure",
        markdown:
          "The range transmitter puts 2 W into the horn. On axis the power density stays above the general-public level of 10 W/m² out to **0.95 m** from the mouth. Follow the local rules, and leave the assessment to those licensed for it.",
      }),
    },
    {
      name: "line 95",
      source: "lead`…`;",
      inputs: ["trade"],
      value: ({ dishDiameter }) => ({
        shows: "lead",
        markdown: `The dual-mode horn for the ${(dishDiameter as number).toFixed(2)} m dish still gives 24.9 dB/K, but it no longer holds its cross-polarisation at the lower edge: -23.6 dB, where -25 dB is asked. The corrugated horn passes everything with a further 0.1 dB, for about three times the turning.`,
      }),
    },
    {
      name: "line 96",
      beside: "line 95",
      source: "margin(lead)`…`;",
      value: () => ({ shows: "margin", mark: "reading", markdown: "" }),
    },
  ];
}

export function sampleStudy(): FakeStudy {
  return new FakeStudy(sampleCells());
}
