// Laws that hold for any profile, on seeded random ones, nasty ones among them.

import { expect, test } from "vitest";
import type { HornProfile } from "../../../cells/guide/horn-profile.ts";
import { cutoffFrequency, TE11 } from "../../../cells/guide/mode.ts";
import { bandAnalysis } from "../../../cells/matching/index.ts";
import { aperturePower } from "../../../cells/radiation/aperture-pattern.ts";
import { assertClose, assertComplexClose, seededRandom } from "../../assert-close.ts";

type Draw = (low: number, high: number) => number;
type Wall = { radius: number; step(radius: number): void; along(length: number, radius: number): void };

/** What one piece of wall may look like; m. */
const kinds: Record<string, (wall: Wall, draw: Draw) => void> = {
  "steps, some below cutoff": (wall, draw) => {
    wall.step(draw(0.003, 0.04));
    wall.along(draw(0.0005, 0.02), wall.radius);
  },
  tapers: (wall, draw) => wall.along(draw(0.02, 0.05), draw(0.01, 0.03)),
  "thick and thin teeth": (wall, draw) => {
    const inner = wall.radius;
    wall.step(inner + draw(0.003, 0.015));
    wall.along(draw(0.0003, 0.004), wall.radius);
    wall.step(inner + draw(-0.001, 0.002));
    wall.along(draw(0.00003, 0.003), wall.radius);
  },
  "steps of a micrometre": (wall, draw) => {
    wall.step(wall.radius + draw(-1e-6, 2e-6));
    wall.along(draw(1e-6, 0.01), wall.radius);
  },
  "zero lengths and equal radii": (wall, draw) => {
    wall.step(draw(0.01, 0.03));
    wall.along(draw(0, 1) < 0.5 ? 0 : draw(0, 2e-8), wall.radius);
    wall.step(wall.radius);
    wall.along(draw(0, 0.01), wall.radius);
    wall.step(wall.radius);
  },
};

function randomProfile(kind: string, seed: number): { profile: HornProfile; frequencies: number[] } {
  const random = seededRandom(seed);
  const draw: Draw = (low, high) => low + (high - low) * random();
  const z = [0];
  const radius = [draw(0.0095, 0.014)];
  const wall: Wall = {
    get radius() {
      return radius.at(-1)!;
    },
    step: (to) => {
      z.push(z.at(-1)!);
      radius.push(to);
    },
    along: (length, to) => {
      z.push(z.at(-1)! + length);
      radius.push(to);
    },
  };
  wall.along(draw(0.001, 0.02), wall.radius);
  for (let i = 0; i < draw(2, 8); i++) kinds[kind]!(wall, draw);
  const end = z.at(-1)!;
  const lowest = Math.max(8e9, 1.02 * cutoffFrequency(TE11, radius[0]!));
  return {
    profile: { z: z.map((at) => at - end), radius },
    frequencies: [draw(lowest, 13e9), draw(lowest, 13e9), draw(lowest, 13e9)],
  };
}

for (const kind of Object.keys(kinds)) {
  test(`bandAnalysis: ${kind}, finite and keeping power`, () => {
    for (let seed = 1; seed <= 8; seed++) {
      const { profile, frequencies } = randomProfile(kind, seed);
      const level = { edgeFunctions: 9, taperModes: 14, stepsPerWavelength: 10 };
      const result = bandAnalysis(profile, { frequencies, level });
      const because = `${kind}, seed ${seed}`;
      frequencies.forEach((frequency, f) => {
        const modes = result.apertureModes[f]!;
        expect([...modes.amplitudes.re, ...modes.amplitudes.im].every(Number.isFinite), because).toBe(true);
        assertClose(result.powerBalance[f]!, 0, { abs: 1e-9, because });
        // One mode travels in these throats below the cutoff of TM11: all power is in S11 and at the mouth.
        if (frequency < 2.08 * cutoffFrequency(TE11, profile.radius[0]!)) {
          const carried = result.s11.re[f]! ** 2 + result.s11.im[f]! ** 2 + aperturePower(modes);
          assertClose(carried, 1, { abs: 1e-9, because });
        }
      });
      expect(Number.isFinite(result.convergence.reflectionError), because).toBe(true);
    }
  });
}

test("bandAnalysis: turned round, a horn between guides of one mode passes TE11 alike", () => {
  const frequencies = [9e9, 10.3e9];
  for (let seed = 1; seed <= 5; seed++) {
    const draw = seededRandom(seed);
    const radii = [0.0115, 0.016 + 0.01 * draw(), 0.011 + 0.004 * draw(), 0.02 + 0.01 * draw(), 0.0125];
    const lengths = radii.map(() => 0.002 + 0.02 * draw());
    const profileOf = (order: number[]): HornProfile => {
      const z: number[] = [];
      const radius: number[] = [];
      let at = -order.reduce((sum, i) => sum + lengths[i]!, 0);
      for (const i of order) {
        z.push(at, (at += lengths[i]!));
        radius.push(radii[i]!, radii[i]!);
      }
      z[z.length - 1] = 0;
      return { z, radius };
    };
    const forth = bandAnalysis(profileOf([0, 1, 2, 3, 4]), { frequencies });
    const back = bandAnalysis(profileOf([4, 3, 2, 1, 0]), { frequencies });
    frequencies.forEach((_, f) => {
      const te11 = ({ apertureModes }: typeof forth) => {
        const { re, im } = apertureModes[f]!.amplitudes;
        return { re: re[0]!, im: im[0]! };
      };
      const because = `reciprocity, seed ${seed}; 1e-6 is the error that extrapolation leaves on either way`;
      assertComplexClose(te11(forth), te11(back), { abs: 1e-6, because });
      const size = ({ s11 }: typeof forth): number => Math.hypot(s11.re[f]!, s11.im[f]!);
      assertClose(size(forth), size(back), { abs: 1e-6, because });
    });
  }
});

test("bandAnalysis: 400 sections", () => {
  const z: number[] = [];
  const radius: number[] = [];
  for (let i = 0; i < 400; i++) {
    const r = 0.012 + 0.026 * (i / 399) + 0.0015 * (i % 2);
    z.push(-0.2 + 0.0005 * i, i === 399 ? 0 : -0.2 + 0.0005 * (i + 1));
    radius.push(r, r);
  }
  const { powerBalance, convergence, s11 } = bandAnalysis(
    { z, radius },
    { frequencies: [9.7e9, 11.1e9], level: { edgeFunctions: 7 } },
  );
  expect(convergence.sections).toBe(400);
  for (const error of powerBalance) assertClose(error, 0, { abs: 1e-9, because: "400 lossless sections" });
  expect(s11.re.every(Number.isFinite)).toBe(true);
});

test("bandAnalysis: z that falls by rounding is an abrupt step", () => {
  const options = { frequencies: [10e9] };
  const exact = bandAnalysis({ z: [-0.03, -0.02, -0.02, 0], radius: [0.012, 0.012, 0.018, 0.018] }, options);
  const rounded = bandAnalysis({ z: [-0.03, -0.02, -0.02 - 1e-12, 0], radius: [0.012, 0.012, 0.018, 0.018] }, options);
  assertClose(rounded.s11.re[0]!, exact.s11.re[0]!, { abs: 1e-9, because: "1e-12 m" });
});
