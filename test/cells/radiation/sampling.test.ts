import { describe, expect, test } from "vitest";
import { speedOfLight } from "../../../cells/constants.ts";
import { beamwidth } from "../../../cells/pattern/cuts.ts";
import { patternInterpolant } from "../../../cells/pattern/interpolant.ts";
import { phaseCenter } from "../../../cells/pattern/phase-center.ts";
import { radiatedPower } from "../../../cells/pattern/power.ts";
import { aperturePattern } from "../../../cells/radiation/aperture-pattern.ts";
import { assertClose } from "../../assert-close.ts";

// What sampling at 0.5° costs, measured on flared horns of several widths against a ten times finer grid.
const frequency = 10e9;
const k = (2 * Math.PI * frequency) / speedOfLight;

function horn(ka: number, thetaCount: number) {
  const radius = ka / k;
  const amplitudes = { re: Float64Array.of(1, 0.3), im: Float64Array.of(0, 0.1) };
  const modes = { frequency, radius, modePairs: 1, amplitudes, warnings: [] };
  return aperturePattern(modes, { flareSlant: 4 * radius, thetaCount });
}

/** Largest error of the interpolated cuts against boresight. */
function interpolationError(ka: number, thetaCount: number): number {
  const cut = patternInterpolant(horn(ka, thetaCount));
  const exact = horn(ka, 3601);
  const boresight = Math.hypot(exact.ePlane.re[0]!, exact.ePlane.im[0]!);
  let worst = 0;
  exact.theta.forEach((theta, i) => {
    const e = cut.ePlane(theta);
    const h = cut.hPlane(theta);
    worst = Math.max(worst, Math.hypot(e.re - exact.ePlane.re[i]!, e.im - exact.ePlane.im[i]!));
    worst = Math.max(worst, Math.hypot(h.re - exact.hPlane.re[i]!, h.im - exact.hPlane.im[i]!));
  });
  return worst / boresight;
}

describe("sampling at 0.5°", () => {
  test.each([
    [10, 3e-7, 1e-8],
    [20, 4e-6, 1e-7],
    [40, 6e-5, 1e-6],
  ])("ka = %d: interpolation to %d of boresight, −10 dB width to %d rad", (ka, field, width) => {
    expect(interpolationError(ka, 361)).toBeLessThan(field);
    for (const plane of ["E", "H", "D"] as const) {
      assertClose(beamwidth(horn(ka, 361), 10, plane), beamwidth(horn(ka, 3601), 10, plane), {
        abs: width,
        because: "stated accuracy",
      });
    }
  });

  test("interpolation is of fourth order", () => {
    const ratio = interpolationError(20, 181) / interpolationError(20, 361);
    expect(ratio).toBeGreaterThan(13);
    expect(ratio).toBeLessThan(24);
  });

  test.each([6, 20, 60])("ka = %d: the power integral is exact to rounding", (ka) => {
    const coarse = radiatedPower(horn(ka, 361));
    assertClose(coarse, radiatedPower(horn(ka, 1441)), {
      rel: 1e-12,
      because: "the grid resolves every cosine of the intensity",
    });
  });

  test("the power integral shows when the grid is too coarse", () => {
    const ka = 60;
    expect(Math.abs(radiatedPower(horn(ka, 61)) / radiatedPower(horn(ka, 1441)) - 1)).toBeGreaterThan(1e-4);
  });

  test("phase center of a flared horn to a micrometre", () => {
    assertClose(phaseCenter(horn(10, 361), 0.6).z, phaseCenter(horn(10, 3601), 0.6).z, {
      abs: 1e-6,
      because: "spline at 0.5°",
    });
  });
});
