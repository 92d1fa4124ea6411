import { describe, expect, test } from "vitest";
import { capSlant, flareOfLength, radiusAt, shortestFlare } from "../../../cells/horn/flare.ts";
import { mouthForTaper } from "../../../cells/horn/mouth.ts";
import { rimPhaseError } from "../../../cells/radiation/flare.ts";
import { assertClose } from "../../assert-close.ts";

const wavelength = 299_792_458 / 10e9;

describe("flare", () => {
  test("flareOfLength: slant and phase error by Pythagoras", () => {
    const flare = flareOfLength({ startRadius: 11e-3, radius: 36e-3 }, 100e-3, wavelength);
    // apex to rim along the wall: the wall's own length, stretched by similar triangles
    assertClose(capSlant(flare), (Math.hypot(25e-3, 100e-3) * 36) / 25, { rel: 1e-14, because: "similar triangles" });
    const excess = capSlant(flare) - Math.sqrt(capSlant(flare) ** 2 - 36e-3 ** 2);
    assertClose(flare.phaseError, excess / wavelength, { rel: 1e-12, because: "one subtraction" });
    const radiated = rimPhaseError({ slant: capSlant(flare), radius: 36e-3, frequency: 10e9 });
    assertClose(flare.phaseError, radiated, { rel: 1e-12, because: "the same error that the pattern integrates" });
  });

  test("shortestFlare: keeps to the phase error, about d²/(8 l λ)", () => {
    // Balanis, "Antenna Theory", ch. 13: s = d²/(8 l λ), l the slant length; common practice.
    const flare = shortestFlare({ startRadius: 11e-3, radius: 60e-3 }, { phaseError: 0.1, wavelength });
    assertClose(flare.phaseError, 0.1, { rel: 1e-12, because: "tan(α/2) = sλ/a" });
    const rule = (2 * 60e-3) ** 2 / (8 * capSlant(flare) * wavelength);
    assertClose(rule, 0.1, { rel: 3e-3, because: "first order in the half flare angle of 6°" });
  });

  test("shortestFlare: never steeper than 30°, never shorter than half a wave or what is asked", () => {
    const steep = shortestFlare({ startRadius: 5e-3, radius: 60e-3 }, { phaseError: 5, wavelength });
    assertClose(Math.atan(55e-3 / steep.length), Math.PI / 6, { rel: 1e-12, because: "the limit" });
    const short = shortestFlare({ startRadius: 11e-3, radius: 12e-3 }, { phaseError: 0.1, wavelength });
    assertClose(short.length, wavelength / 2, { rel: 1e-12, because: "the limit" });
    expect(short.phaseError).toBeLessThan(0.1);
    const asked = shortestFlare(
      { startRadius: 11e-3, radius: 12e-3 },
      { phaseError: 0.1, wavelength, minLength: 0.08 },
    );
    expect(asked.length).toBe(0.08);
  });

  test("equal radii are a straight guide", () => {
    const straight = shortestFlare({ startRadius: 12e-3, radius: 12e-3 }, { phaseError: 0.1, wavelength });
    expect(straight.slant).toBeNull();
    expect(capSlant(straight)).toBe(Number.POSITIVE_INFINITY);
    expect(straight.phaseError).toBe(0);
    expect(radiusAt(straight, -straight.length)).toBe(12e-3);
  });

  test("radiusAt: from start to mouth", () => {
    const flare = flareOfLength({ startRadius: 11e-3, radius: 36e-3 }, 100e-3, wavelength);
    expect(radiusAt(flare, 0)).toBe(36e-3);
    assertClose(radiusAt(flare, -100e-3), 11e-3, { rel: 1e-14, because: "a straight line" });
  });

  test("refuses a mouth narrower than the start", () => {
    expect(() => flareOfLength({ startRadius: 12e-3, radius: 11e-3 }, 0.1, wavelength)).toThrow(/at least 0.012/);
    expect(() => shortestFlare({ startRadius: 12e-3, radius: 13e-3 }, { phaseError: 0, wavelength })).toThrow(
      RangeError,
    );
  });
});

describe("mouthForTaper", () => {
  const search = {
    wantedDb: 10,
    smallest: 10e-3,
    largest: 400e-3,
    startRadiusFor: () => 10e-3,
    wavelength,
    phaseError: 0.1,
    maxFlareLength: Number.POSITIVE_INFINITY,
  };
  /** a Gaussian beam: 3 dB at a radius of 15 mm */
  const gaussian = ({ radius }: { radius: number }): number => 3 * (radius / 15e-3) ** 2;

  test("finds the radius of a Gaussian beam", () => {
    const found = mouthForTaper({ ...search, taperOf: gaussian });
    expect(found.found).toBe(true);
    if (found.found)
      assertClose(found.flare.radius, 15e-3 * Math.sqrt(10 / 3), { rel: 2e-5, because: "tolerance of 1e-5" });
  });

  test("takes the first crossing, not one beyond the main lobe", () => {
    // falls to 20 dB at 50 mm, rises to 12 dB, falls again
    const lobes = ({ radius }: { radius: number }): number => {
      const x = radius / 50e-3;
      return x < 1 ? 20 * x * x : 20 - 8 * Math.sin((Math.PI * (x - 1)) / 2) + 5 * Math.max(0, x - 2);
    };
    const found = mouthForTaper({ ...search, taperOf: lobes, wantedDb: 18 });
    expect(found.found).toBe(true);
    if (found.found)
      assertClose(found.flare.radius, 50e-3 * Math.sqrt(0.9), { rel: 2e-5, because: "tolerance of 1e-5" });
    expect(mouthForTaper({ ...search, taperOf: lobes, wantedDb: 21 })).toMatchObject({
      found: false,
      side: "mainLobe",
    });
  });

  test("says on which side it failed", () => {
    expect(mouthForTaper({ ...search, taperOf: gaussian, wantedDb: 1 })).toMatchObject({
      found: false,
      side: "smallest",
    });
    expect(mouthForTaper({ ...search, taperOf: () => 2 })).toMatchObject({
      found: false,
      side: "largest",
      reachedDb: 2,
    });
  });

  test("a flare too long is shortened to the limit, at the cost of phase error, or refused", () => {
    const long = mouthForTaper({ ...search, taperOf: gaussian, maxFlareLength: 25e-3 });
    expect(long).toMatchObject({ found: true, shortened: true });
    if (long.found) {
      expect(long.flare.length).toBe(25e-3);
      expect(long.flare.phaseError).toBeGreaterThan(0.1);
      expect(long.flare.phaseError).toBeLessThanOrEqual(0.3);
    }
    expect(mouthForTaper({ ...search, taperOf: gaussian, maxFlareLength: 5e-3 })).toMatchObject({ side: "length" });
    expect(mouthForTaper({ ...search, taperOf: gaussian, maxFlareLength: -1 })).toMatchObject({
      side: "length",
      phaseError: null,
    });
  });
});
