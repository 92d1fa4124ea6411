import { describe, expect, test } from "vitest";
import { densityOnAxis, exposureDistances, nearFieldEstimate } from "../../../cells/reflector/exposure.ts";
import { exposureLimits } from "../../../cells/reflector/exposure-limits.ts";
import { assertClose } from "../../assert-close.ts";

const of = (frequency: number, where: { standard: string; who: string; over: string }) =>
  exposureLimits(frequency).find(
    (limit) => limit.standard.includes(where.standard) && limit.who === where.who && limit.over === where.over,
  )?.density;

describe("reference levels", () => {
  const whole = { standard: "ICNIRP", over: "whole body" };
  const local = { standard: "ICNIRP", over: "local" };

  test("ICNIRP 2020: whole body and local", () => {
    // Health Phys. 118:483–524, tables 5 and 6 (secondary copy): 10/50 W/m²; >2–6 GHz 40/200; >6–<300 GHz
    // 55/275 f^−0.177, 36.59/182.95 at 10 GHz; 20/100 at 300 GHz.
    expect(of(10e9, { ...whole, who: "public" })).toBe(10);
    expect(of(10e9, { ...whole, who: "occupational" })).toBe(50);
    expect(of(4e9, { ...local, who: "public" })).toBe(40);
    expect(of(6e9, { ...local, who: "occupational" })).toBe(200);
    const printed = { abs: 0.005, because: "printed to two decimals" };
    assertClose(of(10e9, { ...local, who: "public" })!, 36.59, printed);
    assertClose(of(10e9, { ...local, who: "occupational" })!, 182.95, printed);
    expect(of(300e9, { ...local, who: "public" })).toBe(20);
  });

  test("FCC 1.1310: 1 and 5 mW/cm² from 1.5 to 100 GHz, over 30 and 6 minutes", () => {
    const federal = exposureLimits(14e9).filter(({ standard }) => standard.startsWith("FCC"));
    expect(federal.map(({ density, averagingTime }) => [density, averagingTime])).toEqual([
      [10, 1800],
      [50, 360],
    ]);
    expect(exposureLimits(120e9).some(({ standard }) => standard.startsWith("FCC"))).toBe(false);
  });

  test("up to 2 and 1.5 GHz the levels rise to those above them", () => {
    // ICNIRP f/200, f/40, 0.058 and 0.29 f^0.86; FCC f/1500, f/300 mW/cm², f in MHz (from memory): one value at the joint
    for (const at of [2e9, 1.5e9])
      exposureLimits(at).forEach(({ density, standard }, i) => {
        if (standard.startsWith("FCC") !== (at === 1.5e9)) return;
        assertClose(density, exposureLimits(at + 1)[i]!.density, {
          rel: 2e-3,
          because: "0.058 is printed to two figures",
        });
      });
    // 900 MHz: 4.5 and 22.5 W/m² (the public level for that band, widely quoted); FCC 0.6 mW/cm²
    expect(of(900e6, { ...whole, who: "public" })).toBe(4.5);
    expect(of(900e6, { ...whole, who: "occupational" })).toBe(22.5);
    expect(of(900e6, { standard: "FCC", over: "whole body", who: "public" })).toBe(6);
  });

  test.each([0.3e9, 301e9, Number.NaN])("no level is known at %f Hz", (frequency) => {
    expect(() => exposureLimits(frequency)).toThrow("exposureLimits: frequency must be a number at least");
  });
});

describe("field before a dish", () => {
  // A licence filing's radiation study: 14.2 GHz, 2.4 m, 49.2 dBi, 2.17 W. fcc.report 0640-EX-ST-2004/68002: surface
  // 1.92 W/m², η 0.653 (0.6521 with c = 299 792 458 m/s), near field 1.25 W/m². Its "near field 21.70 m" is wrong by 1/π:
  // D²/4λ is 68.2 m.
  const station = { frequency: 14.2e9, diameter: 2.4, gainDbi: 49.2, power: 2.17 };

  test("a station worked out by hand", () => {
    const estimate = nearFieldEstimate(station);
    const printed = { abs: 0.005, because: "printed to two decimals" };
    assertClose(estimate.surfaceDensity, 1.92, printed);
    assertClose(estimate.nearFieldDensity, 1.25, printed);
    assertClose(estimate.apertureEfficiency, 0.6521, { abs: 5e-5, because: "printed to four decimals" });
    assertClose(estimate.nearFieldLength, 68.2, { abs: 0.05, because: "printed to one decimal" });
    assertClose(estimate.surfaceDensity / estimate.meanDensity, 4, { rel: 1e-15, because: "4P/A against P/A" });
  });

  test("lengths of another filing: D²/4λ of 2.4 m at 6.1 GHz", () => {
    const estimate = nearFieldEstimate({ frequency: 6.1e9, diameter: 2.4, gainDbi: 41, power: 1 });
    // SES-LIC-20041223-01880/411115: 29.28 m (c = 3e8 there: 0.07 %)
    assertClose(estimate.nearFieldLength, 29.28, { rel: 1e-3, because: "c = 3e8 in the filing" });
    assertClose(estimate.farFieldDistance / estimate.nearFieldLength, 2.4, { rel: 1e-12, because: "0.6/0.25" });
  });

  test("evenly lit: the near field's most is 4P/A", () => {
    // On the axis of an evenly lit disc the Fresnel field swings between 0 and twice the aperture's: four times its density.
    const gainDbi = 20 * Math.log10((Math.PI * 2.4 * 14.2e9) / 299_792_458);
    const estimate = nearFieldEstimate({ ...station, gainDbi });
    assertClose(estimate.nearFieldDensity, estimate.surfaceDensity, { rel: 1e-12, because: "η = 1" });
  });

  test("on the axis: constant, 1/R, 1/R², with the 3 % at the last joint", () => {
    const { nearFieldDensity, nearFieldLength, farFieldDistance } = nearFieldEstimate(station);
    const rounding = { rel: 1e-12, because: "arithmetic" };
    assertClose(densityOnAxis(station, 0), nearFieldDensity, rounding);
    assertClose(densityOnAxis(station, nearFieldLength * (1 + 1e-14)), nearFieldDensity, rounding);
    assertClose(densityOnAxis(station, 100), (nearFieldDensity * nearFieldLength) / 100, rounding);
    const jump = densityOnAxis(station, farFieldDistance) / densityOnAxis(station, farFieldDistance * (1 - 1e-12));
    // (π/1.44)/(16/π·0.25/0.6)
    assertClose(jump, 1.0281, { abs: 5e-5, because: "closed form, printed to four decimals" });
    assertClose(densityOnAxis(station, 1000), (2.17 * 10 ** 4.92) / (4 * Math.PI * 1e6), rounding);
  });

  test("weak station: every level is met at the dish", () => {
    for (const { distance, exceededAtSurface } of exposureDistances(station)) {
      expect(distance).toBe(0);
      expect(exceededAtSurface).toBe(false);
    }
  });

  test.each([10, 20, 40, 60, 400, 4000])(
    "%f W: beyond each distance the level is kept, just before it it isn't",
    (power) => {
      const strong = { ...station, power };
      for (const { distance, density } of exposureDistances(strong)) {
        for (let i = 0; i <= 200; i++)
          expect(densityOnAxis(strong, (distance + 1e-9) * 1.05 ** i)).toBeLessThanOrEqual(density * (1 + 1e-9));
        if (distance > 0) expect(densityOnAxis(strong, distance * (1 - 1e-9))).toBeGreaterThan(density * (1 - 1e-6));
      }
    },
  );

  test("one that only receives: nothing anywhere", () => {
    const receiver = { ...station, power: 0 };
    expect(nearFieldEstimate(receiver)).toMatchObject({ surfaceDensity: 0, nearFieldDensity: 0, besideBeamDensity: 0 });
    for (const { distance, exceededAtSurface } of exposureDistances(receiver))
      expect([distance, exceededAtSurface]).toEqual([0, false]);
  });

  test("between near field and surface: met on the axis, not before the surface", () => {
    // 15 W: 4P/A = 13.3, 16ηP/πD² = 8.6 W/m² against 10
    const [wholeBody] = exposureDistances({ ...station, power: 15 });
    expect(wholeBody).toMatchObject({ density: 10, distance: 0, exceededAtSurface: true });
  });

  test("a horn with its mouth open: 5 W from 31 mm radius at 12 GHz", () => {
    // 4P/A = 4·5/(π·0.031²) W/m² = 662 mW/cm², by hand; every level is exceeded there, and met within 1.5 m
    const horn = { frequency: 12e9, diameter: 0.062, gainDbi: 16.5, power: 5 };
    assertClose(nearFieldEstimate(horn).surfaceDensity, 6624.5, { abs: 0.1, because: "by hand to five figures" });
    for (const { exceededAtSurface, distance } of exposureDistances(horn)) {
      expect(exceededAtSurface).toBe(true);
      expect(distance).toBeLessThan(1.5);
    }
    expect(nearFieldEstimate({ ...horn, diameter: 0.016, gainDbi: 8 }).apertureEfficiency).toBeGreaterThan(1);
  });

  test("bad input names what is wrong", () => {
    expect(() => nearFieldEstimate({ ...station, power: -1 })).toThrow("power must be a number at least 0 W; got -1 W");
    expect(() => nearFieldEstimate({ ...station, gainDbi: 52 })).toThrow(
      /gain must be at most the normal gain of an aperture of 2\.4 m, 51\.0[78] dBi; got 52 dBi/,
    );
    expect(() => densityOnAxis(station, -1)).toThrow("distance must be a number at least 0 m; got -1 m");
  });
});
