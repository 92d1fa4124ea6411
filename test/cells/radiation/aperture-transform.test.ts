import { describe, expect, test } from "vitest";
import { speedOfLight, vacuumImpedance } from "../../../cells/constants.ts";
import { besselJ0, besselJ2 } from "../../../cells/math/bessel.ts";
import { transformOfField } from "../../../cells/radiation/aperture-field.ts";
import { farField, transformBandlimit } from "../../../cells/radiation/aperture-transform.ts";
import { pathExcess, rimPhaseError } from "../../../cells/radiation/flare.ts";
import { assertClose } from "../../assert-close.ts";

const frequency = 10e9;
const k = (2 * Math.PI * frequency) / speedOfLight;

/** A field as demanding as TE1n's, with unequal electric and magnetic parts. */
const fieldOf = (ka: number, flareSlant: number, chi = 11.7) => ({
  frequency,
  radius: ka / k,
  flareSlant,
  fieldAt: (r: number) => ({
    electricSum: { re: besselJ0(chi * r), im: 0.2 },
    electricDifference: { re: -besselJ2(chi * r), im: 0 },
    magneticSum: { re: 1, im: -0.3 },
    magneticDifference: { re: 0.1 * r * r, im: r * r },
  }),
  highestTransverseNumber: chi,
});

describe("farField", () => {
  test.each([0.5, 2, 6, 12, 30, 60, 200, 1000])(
    "ka = %d: the cosine series against the transforms themselves",
    (ka) => {
      const transformAt = transformOfField(fieldOf(ka, Number.POSITIVE_INFINITY));
      const { theta, ePlane, hPlane } = farField({ frequency, radius: ka / k, thetaCount: 145 }, transformAt);
      const boresight = Math.hypot(ePlane.re[0]!, ePlane.im[0]!);
      const scale = k / (4 * Math.PI * Math.sqrt(2 * vacuumImpedance));
      theta.forEach((t, i) => {
        const f = transformAt(Math.min(ka, ka * Math.sin(t)));
        const c = Math.cos(t);
        const e =
          scale * (f.electricSum.re - f.electricDifference.re + c * (f.magneticSum.re - f.magneticDifference.re));
        const h =
          -scale * (c * (f.electricSum.im + f.electricDifference.im) + f.magneticSum.im + f.magneticDifference.im);
        const because = "band limit of the aperture, 1e-13 of boresight, and the rounding of the sum";
        assertClose(ePlane.im[i]!, e, { abs: 2e-13 * boresight, because });
        assertClose(hPlane.re[i]!, h, { abs: 2e-13 * boresight, because });
      });
    },
  );

  test("the band limit is needed: two thirds of it are not enough", () => {
    // Neumann's product: the coefficient of cos 2jθ of J0(ka sin θ) is 2·J_j(ka/2)².
    expect(transformBandlimit(12)).toBeLessThan(25);
    const besselOfOrderTwoThirds = 1.3e-4; // J13(6) = 1.327e-4, mpmath 1.3.0
    expect(2 * besselOfOrderTwoThirds ** 2).toBeGreaterThan(1e-9);
  });

  test("refuses what it cannot do", () => {
    const transformAt = transformOfField(fieldOf(6, Number.POSITIVE_INFINITY));
    expect(() => farField({ frequency, radius: 50, thetaCount: 361 }, transformAt)).toThrow(/k·radius .*at most 2000/);
  });
});

describe("the flare's quadrature", () => {
  test.each([2, 6, 12, 30, 60])("ka = %d: twice the points change nothing, at any flare", (ka) => {
    for (const halfAngle of [5, 15, 30, 60]) {
      const slant = ka / k / Math.sin((halfAngle * Math.PI) / 180);
      const once = transformOfField(fieldOf(ka, slant));
      const twice = transformOfField(fieldOf(ka, slant), 2);
      const boresight = once(0).magneticSum;
      const size = Math.hypot(boresight.re, boresight.im);
      for (let i = 0; i <= 30; i++) {
        const p = once((ka * i) / 30);
        const q = twice((ka * i) / 30);
        for (const part of ["electricSum", "electricDifference", "magneticSum", "magneticDifference"] as const) {
          assertClose(p[part].re, q[part].re, { abs: 1e-12 * size, because: "stated accuracy" });
          assertClose(p[part].im, q[part].im, { abs: 1e-12 * size, because: "stated accuracy" });
        }
      }
    }
  });

  test("the test above can fail: half the points are visibly too few", () => {
    const slant = 30 / k / Math.sin(Math.PI / 6);
    const half = transformOfField(fieldOf(30, slant), 0.4)(25).electricSum;
    const whole = transformOfField(fieldOf(30, slant))(25).electricSum;
    expect(Math.hypot(half.re - whole.re, half.im - whole.im)).toBeGreaterThan(1e-9 * Math.hypot(whole.re, whole.im));
  });
});

describe("pathExcess", () => {
  test("slant is the wall, apex to rim: 3-4-5 triangle", () => {
    const excess = pathExcess({ slant: 0.05, radius: 0.03 });
    expect(excess(0)).toBe(0);
    assertClose(excess(0.03), 0.01, { rel: 1e-15, because: "5 − 4" });
    assertClose(rimPhaseError({ slant: 0.05, radius: 0.03, frequency }), 0.01 / 0.0299792458, {
      rel: 1e-14,
      because: "in wavelengths",
    });
  });

  test("a narrow flare: diameter²/(8·slant·λ) (King 1950)", () => {
    const s = rimPhaseError({ slant: 1, radius: 0.05, frequency });
    assertClose(s, 0.1 ** 2 / (8 * 0.0299792458), { rel: 1e-3, because: "next term (radius/slant)²/4" });
  });

  test("infinite is flat, a slant within the radius is refused", () => {
    expect(pathExcess({ slant: Number.POSITIVE_INFINITY, radius: 1 })(0.7)).toBe(0);
    expect(() => pathExcess({ slant: 0.03, radius: 0.03 })).toThrow(
      /slant must be a number above 0\.03 m; got 0\.03 m/,
    );
  });
});
