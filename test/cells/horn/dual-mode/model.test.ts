import { describe, expect, test } from "vitest";
import { propagationConstant, TE11, TM11 } from "../../../../cells/guide/mode.ts";
import type { DualModeGeometry } from "../../../../cells/horn/dual-mode/geometry.ts";
import { dualModeAperture, dualModeAttenuation, dualModePattern } from "../../../../cells/horn/dual-mode/model.ts";
import { travelToMouth } from "../../../../cells/horn/dual-mode/travel.ts";
import { flareOfLength } from "../../../../cells/horn/flare.ts";
import { crossPolarPeak, levelAt } from "../../../../cells/pattern/cuts.ts";
import { directivity } from "../../../../cells/pattern/power.ts";
import { fromDeg } from "../../../../cells/units.ts";
import { assertClose } from "../../../assert-close.ts";

/** 15.0 mm, step to 19.6 mm, straight of 21 mm, cone to 42 mm over 90 mm. */
const horn: DualModeGeometry = {
  inputRadius: 15e-3,
  inputLength: 20e-3,
  stepRadius: 19.6e-3,
  straightLength: 21e-3,
  flare: flareOfLength({ startRadius: 19.6e-3, radius: 42e-3 }, 90e-3, 299_792_458 / 10.5e9),
  wall: 1e-3,
  modeRatio: 0.4,
  turns: 1,
};

describe("travelToMouth", () => {
  /** the same integral by midpoints */
  function stepped(mode: typeof TE11, frequency: number): { phase: number; decay: number } {
    const count = 200_000;
    let [phase, decay] = [0, 0];
    for (let i = 0; i < count; i++) {
      const z = ((i + 0.5) / count) * 90e-3;
      const gamma = propagationConstant(mode, 19.6e-3 + (22.4e-3 * z) / 90e-3, frequency);
      phase += (gamma.im * 90e-3) / count;
      decay += (gamma.re * 90e-3) / count;
    }
    const straight = propagationConstant(mode, 19.6e-3, frequency);
    return { phase: phase + straight.im * 21e-3, decay: decay + straight.re * 21e-3 };
  }

  test.each([
    ["TE11 at 10.5 GHz", TE11, 10.5e9],
    ["TM11 at 10.5 GHz", TM11, 10.5e9],
    ["TM11 at 9 GHz, cut off in the straight", TM11, 9e9],
  ])("closed form against steps: %s", (_name, mode, frequency) => {
    const found = travelToMouth(mode, horn, frequency);
    const expected = stepped(mode, frequency);
    const close = { abs: 1e-5, because: "midpoints; a square root at cutoff" };
    assertClose(found.phase, expected.phase, close);
    assertClose(found.decay, expected.decay, close);
  });

  test("a cone that hardly opens is a straight guide", () => {
    const opening = (by: number) =>
      travelToMouth(
        TM11,
        { ...horn, flare: flareOfLength({ startRadius: 19.6e-3, radius: 19.6e-3 + by }, 90e-3, 0.0285) },
        10.5e9,
      );
    assertClose(opening(1e-8).phase, opening(0).phase, { rel: 1e-5, because: "ten nanometres of opening" });
  });
});

describe("dual-mode model", () => {
  // Converged mode matching by an independent program, not a measurement. 10.5 GHz is near balance.
  test("against mode matching at 10.5 GHz, near balance", () => {
    const pattern = dualModePattern(horn, 10.5e9, 361);
    assertClose(10 * Math.log10(directivity(pattern)), 17.4977, { abs: 0.02, because: "closed form near balance" });
    const level = levelAt(pattern, fromDeg(20));
    assertClose(level.ePlaneDb, -7.301, { abs: 0.2, because: "closed form: phase between the modes 25° to 32° off" });
    assertClose(level.hPlaneDb, -7.5642, { abs: 0.05, because: "TE11 alone, the closed form's best plane" });
    const { re, im } = dualModeAperture(horn, 10.5e9).amplitudes;
    assertClose(Math.atan2(im[1]!, re[1]!), fromDeg(7.91), {
      abs: fromDeg(35),
      because: "closed form: no conversion in the cone",
    });
  });

  test("far from balance, near TM11's cutoff, it is rough but on the same side", () => {
    // mode matching at 9.8 GHz: cross-polar −10.70 dB against −30.58 dB at 10.5 GHz
    expect(crossPolarPeak(dualModePattern(horn, 9.8e9, 361))).toBeGreaterThan(
      crossPolarPeak(dualModePattern(horn, 10.5e9, 361)),
    );
  });

  test("below TM11's cutoff behind the step it decays and says so", () => {
    const modes = dualModeAperture(horn, 9e9);
    expect(modes.warnings[0]?.text).toMatch(/^TM11 is cut off behind the step at 9\.000 GHz/);
    expect(Math.hypot(modes.amplitudes.re[1]!, modes.amplitudes.im[1]!)).toBeLessThan(0.3);
    expect(() => dualModeAttenuation(horn, 9e9, 3.8e7)).toThrow(/above the TM11 cutoff/);
  });

  test("attenuation lies between that of either mode alone", () => {
    const loss = dualModeAttenuation(horn, 10.5e9, 3.8e7);
    const onlyTe = dualModeAttenuation({ ...horn, inputLength: 0, straightLength: 0 }, 10.5e9, 3.8e7);
    expect(loss).toBeGreaterThan(onlyTe);
    // 0.11 m of aluminium guide of this size: a few thousandths of a decibel
    expect((20 / Math.LN10) * loss).toBeLessThan(0.02);
  });
});
