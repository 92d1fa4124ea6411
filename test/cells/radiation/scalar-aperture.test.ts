import { describe, expect, test } from "vitest";
import { brentMinimum, brentRoot } from "../../../cells/math/roots.ts";
import { halfPowerDb } from "../../../cells/pattern/cuts.ts";
import {
  type ApertureTaper,
  dualModeTaper,
  edgeNullRatio,
  gaussianCoupling,
  gaussianTaper,
  he11Taper,
  mixedTaper,
  scalarApertureEfficiency,
  scalarApertureField,
  scalarWidth,
  taperCoupling,
  te11Taper,
  tm11Taper,
  uniformTaper,
} from "../../../cells/radiation/scalar-aperture.ts";
import { assertClose } from "../../assert-close.ts";

const degreesWavelengthPerDiameter = (u: number): number => ((2 * u) / Math.PI) * (180 / Math.PI);
const lossDb = (taper: ApertureTaper, s: number): number => -10 * Math.log10(scalarApertureEfficiency(taper, s));

/** Highest level beyond a plane's first null, dB. */
function firstSideLobeDb(taper: ApertureTaper, plane: "ePlane" | "hPlane", from: number, to: number): number {
  const power = (u: number): number => {
    const { re, im } = scalarApertureField(taper, { u })[plane];
    return re * re + im * im;
  };
  return 10 * Math.log10(-brentMinimum((u) => -power(u), from, to).value / power(0));
}

describe("TE11 over a wide aperture", () => {
  test("efficiency 2/(j'11² − 1) = 0.836835 (Silver 1949; Balanis ch. 12–13; computed)", () => {
    assertClose(scalarApertureEfficiency(te11Taper), 0.836835, { abs: 1e-6, because: "6 printed digits" });
    assertClose(scalarApertureEfficiency(te11Taper), 2 / (1.841183781340659 ** 2 - 1), {
      rel: 1e-13,
      because: "closed form",
    });
  });

  // Half power is meant by "−3 dB". Balanis prints 58.4 and 74.0 deg·λ/D, rounded, ±1 % (from memory). Computed.
  test.each([
    ["E", halfPowerDb, 1.6163, 58.96],
    ["H", halfPowerDb, 2.0376, 74.32],
    ["E", 10, 2.7314, 99.63],
    ["H", 10, 3.5189, 128.35],
  ] as const)("%s-plane, −%d dB: u = %d, %d deg·λ/D", (plane, levelDb, u, width) => {
    const found = scalarWidth(te11Taper, { levelDb, plane });
    assertClose(found, u, { rel: 1e-4, because: "5 printed digits" });
    assertClose(degreesWavelengthPerDiameter(found), width, { rel: 1e-3, because: "0.1 % of the printed width" });
  });

  test("first side lobes −17.57 dB (E), −26.10 dB (H); books −17.6, −26.2 (computed)", () => {
    assertClose(firstSideLobeDb(te11Taper, "ePlane", 4, 6), -17.57, { abs: 0.02, because: "2 printed decimals" });
    assertClose(firstSideLobeDb(te11Taper, "hPlane", 5.4, 8.4), -26.1, { abs: 0.02, because: "2 printed decimals" });
  });
});

describe("conical horn: quadratic phase on TE11", () => {
  // Scalar integral. Computed.
  test.each([
    [0, 0.7736],
    [0.1, 0.9053],
    [0.2, 1.3042],
    [0.3, 1.9829],
    [0.375, 2.6884],
    [0.4, 2.9634],
    [0.5, 4.2803],
  ])("s = %d: loss %d dB", (s, expected) => {
    assertClose(lossDb(te11Taper, s), expected, { abs: 1e-4, because: "4 printed decimals" });
  });

  // Gray & Schelkunoff's curve as fitted in Balanis eq. 13-58 to 13-60 and measured by King 1950 (from memory): the fit
  // is up to 0.22 dB off the integral near the optimum, so it cannot be used more tightly than 0.25 dB.
  test.each([0, 0.1, 0.2, 0.3, 0.375, 0.4, 0.5])(
    "s = %d: L(s) = 0.8 − 1.71s + 26.25s² − 17.79s³ within 0.25 dB",
    (s) => {
      const fit = 0.8 - 1.71 * s + 26.25 * s * s - 17.79 * s ** 3;
      assertClose(lossDb(te11Taper, s), fit, { abs: 0.25, because: "the fit's own error" });
    },
  );

  test("optimum for a fixed slant: s = 0.3908, efficiency 0.5176, d² = 3.127 l·λ (computed; King 1950: 3/8, 51–52 %)", () => {
    // Directivity goes as d²·e(s) and s = d²/(8 l λ), so s·e(s) is greatest.
    const optimum = brentMinimum((s) => -s * scalarApertureEfficiency(te11Taper, s), 0.2, 0.6).x;
    assertClose(optimum, 0.3908, { abs: 1e-4, because: "4 printed digits" });
    assertClose(8 * optimum, 3.127, { abs: 1e-3, because: "4 printed digits" });
    const efficiency = scalarApertureEfficiency(te11Taper, optimum);
    assertClose(efficiency, 0.5176, { abs: 1e-4, because: "4 printed digits" });
    assertClose(optimum, 3 / 8, { abs: 0.03, because: "the rule of thumb" });
    assertClose(efficiency, 0.518, { abs: 0.02, because: "the rule of thumb" });
  });
});

describe("dual mode (Potter 1963)", () => {
  test("α = 1 where TE11 + TM11 has no radial field at the rim: axis-field ratio 0.784657 (closed form; computed)", () => {
    assertClose(edgeNullRatio, 0.784657, { abs: 1e-6, because: "6 printed digits" });
    const taper = dualModeTaper(1);
    // E_ρ at φ = 0 is (sum + difference)/2.
    assertClose(taper.sum(1) + taper.difference(1), 0, { abs: 1e-14, because: "definition" });
  });

  test("TM to TE power is α²/(j'11² − 1) = 0.41842 α² at equal impedances (closed form; computed)", () => {
    const power = (taper: ApertureTaper): number =>
      scalarApertureField(taper, { u: 0 }).ePlane.re ** 2 / scalarApertureEfficiency(taper);
    // TM11 has no mean field, so its power is what it adds to TE11's: the two are orthogonal.
    const added = power(
      mixedTaper([
        { taper: te11Taper, weight: 1 },
        { taper: tm11Taper, weight: edgeNullRatio },
      ]),
    );
    assertClose(added / power(te11Taper) - 1, 0.41842, { rel: 1e-5, because: "5 printed digits" });
  });

  test("E-plane factor 1 − α/(1 − (j11/u)²) on that of TE11", () => {
    for (const u of [0.7, 2.9, 6, 11]) {
      const factor = 1 - 0.65 / (1 - (3.831705970207512 / u) ** 2);
      const te = scalarApertureField(te11Taper, { u }).ePlane.re;
      assertClose(scalarApertureField(dualModeTaper(0.65), { u }).ePlane.re, factor * te, {
        abs: 1e-13,
        because: "closed form",
      });
    }
  });

  // Equal E and H widths: Potter gives about 0.65 (from memory, ±3 %); values computed.
  test.each([
    [halfPowerDb, 0.6468, -7.57, 74.32],
    [10, 0.6124, -8.04, 128.35],
  ])("equal widths at −%d dB: α = %d, TM/TE power %d dB, %d deg·λ/D", (levelDb, alpha, powerDb, width) => {
    const difference = (a: number): number =>
      scalarWidth(dualModeTaper(a), { levelDb, plane: "E" }) - scalarWidth(dualModeTaper(a), { levelDb, plane: "H" });
    const found = brentRoot(difference, 0.4, 0.8, { tolerance: 1e-8 });
    assertClose(found, alpha, { rel: 5e-3, because: "0.5 % of the printed ratio" });
    assertClose(found, alpha, { abs: 1e-4, because: "4 printed digits" });
    // Potter's own figure is for half power.
    if (levelDb === halfPowerDb) assertClose(found, 0.65, { rel: 0.03, because: "3 % of Potter's 0.65" });
    assertClose(10 * Math.log10((found * found) / (1.841183781340659 ** 2 - 1)), powerDb, {
      abs: 0.01,
      because: "2 decimals",
    });
    const u = scalarWidth(dualModeTaper(found), { levelDb, plane: "H" });
    assertClose(degreesWavelengthPerDiameter(u), width, { rel: 5e-3, because: "0.5 % of the printed width" });
  });

  test("likeness to HE11: TE11 84.50 %, TM11 14.61 %, together 99.10 % (recalled as 85/15; computed)", () => {
    const te = taperCoupling(he11Taper, te11Taper);
    const tm = taperCoupling(he11Taper, tm11Taper);
    assertClose(te, 0.845, { abs: 1e-3, because: "printed to 1e-4, recalled to 1e-3" });
    assertClose(tm, 0.1461, { abs: 1e-3, because: "printed to 1e-4, recalled to 1e-3" });
    assertClose(te + tm, 0.991, { abs: 1e-4, because: "4 printed digits" });
    assertClose(10 * Math.log10(tm / te), -7.62, { abs: 0.01, because: "2 printed decimals" });
    // In phase on the axis: both inner products with J0 are positive.
    const alpha = Math.sqrt((tm / te) * (1.841183781340659 ** 2 - 1));
    assertClose(taperCoupling(he11Taper, dualModeTaper(alpha)), te + tm, {
      abs: 1e-12,
      because: "the best mixture reaches the sum",
    });
  });

  test("aperture efficiency at α = 0.65: 0.8368/(1 + 0.177) = 0.711 (computed)", () => {
    assertClose(scalarApertureEfficiency(dualModeTaper(0.65)), 0.711, { abs: 5e-4, because: "3 printed digits" });
  });
});

describe("balanced HE11 (Clarricoats & Olver 1984)", () => {
  test("efficiency 4/j01² = 0.691660 (closed form; computed)", () => {
    assertClose(scalarApertureEfficiency(he11Taper), 0.69166, { abs: 1e-6, because: "6 printed digits" });
    assertClose(scalarApertureEfficiency(he11Taper), 4 / 2.404825557695773 ** 2, {
      rel: 1e-13,
      because: "closed form",
    });
  });

  test.each([
    [halfPowerDb, 75.79],
    [10, 131.23],
  ])("−%d dB width %d deg·λ/D, E and H alike (closed form; computed)", (levelDb, width) => {
    for (const plane of ["E", "H"] as const) {
      const u = scalarWidth(he11Taper, { levelDb, plane });
      assertClose(degreesWavelengthPerDiameter(u), width, { rel: 1e-4, because: "4 printed digits, 0.1 % asked" });
    }
  });

  test("first side lobe −27.50 dB (closed form; computed)", () => {
    assertClose(firstSideLobeDb(he11Taper, "ePlane", 5.6, 8.5), -27.5, { abs: 0.01, because: "2 printed decimals" });
  });

  test("closed form of the pattern: 1/(1 − (u/j01)²)·J0(u) by way of Lommel", () => {
    const u = 3.3;
    const j0 = -0.3442962603988846; // J0(3.3), mpmath 1.3.0
    const expected = j0 / (1 - (u / 2.404825557695773) ** 2);
    const { re } = scalarApertureField(he11Taper, { u }).ePlane;
    assertClose(re / scalarApertureField(he11Taper, { u: 0 }).ePlane.re, expected, {
      abs: 1e-13,
      because: "closed form",
    });
  });

  // Scalar integral with quadratic phase, taper loss included. Computed.
  test.each([
    [0, 1.6011],
    [0.1, 1.69],
    [0.2, 1.9577],
    [0.3, 2.4059],
    [0.4, 3.0375],
    [0.5, 3.8551],
  ])("s = %d: loss %d dB", (s, expected) => {
    assertClose(lossDb(he11Taper, s), expected, { abs: 1e-3, because: "asked to 1e-3 dB" });
  });

  test("greatest directivity for a fixed length at s = 0.488 (computed)", () => {
    const optimum = brentMinimum((s) => -s * scalarApertureEfficiency(he11Taper, s), 0.3, 0.8).x;
    assertClose(optimum, 0.488, { abs: 5e-4, because: "3 printed digits" });
  });
});

describe("coupling to a Gaussian beam", () => {
  const best = (taper: ApertureTaper) => {
    const { x, value } = brentMinimum((w) => -gaussianCoupling(taper, w), 0.3, 1.2);
    return { waistRatio: x, coupling: -value };
  };

  test("HE11: 0.980751 at w/a = 0.643562 (Wylde 1984; Goldsmith 1998: 98.1 %, 0.644; recalled and computed)", () => {
    const { waistRatio, coupling } = best(he11Taper);
    assertClose(coupling, 0.980751, { abs: 1e-5, because: "6 printed digits" });
    assertClose(waistRatio, 0.643562, { abs: 1e-5, because: "6 printed digits" });
  });

  test("TE11: 0.8666 at w/a = 0.768 (Goldsmith 1998 table: 0.87, 0.76; recalled and computed)", () => {
    const { waistRatio, coupling } = best(te11Taper);
    assertClose(coupling, 0.8666, { abs: 1e-4, because: "4 printed digits, 1e-3 asked" });
    assertClose(waistRatio, 0.768, { abs: 1e-3, because: "3 printed digits" });
  });

  test("a Gaussian's own coupling is what the rim lets through", () => {
    assertClose(gaussianCoupling(gaussianTaper(0.5), 0.5), 1 - Math.exp(-2 / 0.25), {
      rel: 1e-12,
      because: "closed form",
    });
  });
});

describe("limits and refusals", () => {
  test("uniform aperture: efficiency 1, pattern 2 J1(u)/u; quadratic phase loses sinc²(s)", () => {
    assertClose(scalarApertureEfficiency(uniformTaper), 1, { rel: 1e-14, because: "definition" });
    const { re } = scalarApertureField(uniformTaper, { u: 2 }).ePlane;
    assertClose(re, 0.5767248077568734, { rel: 1e-14, because: "J1(2), mpmath 1.3.0" });
    const sinc = Math.sin(Math.PI * 0.4) / (Math.PI * 0.4);
    assertClose(scalarApertureEfficiency(uniformTaper, 0.4), sinc * sinc, { rel: 1e-12, because: "closed form" });
  });

  test("a level never reached, and bad numbers", () => {
    expect(() => scalarWidth(te11Taper, { levelDb: 400, plane: "H" })).toThrow(/fall by 400 dB before u = 20/);
    expect(() => scalarApertureField(te11Taper, { u: -1 })).toThrow(/u must be .*at least 0; got -1/);
    expect(() => scalarApertureEfficiency(te11Taper, Number.NaN)).toThrow(/phaseError/);
    expect(() => gaussianCoupling(te11Taper, 0)).toThrow(/waistRatio/);
  });
});
