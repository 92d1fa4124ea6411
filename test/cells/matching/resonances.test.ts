import { expect, test } from "vitest";
import { bandAnalysis } from "../../../cells/matching/index.ts";
import { profiles } from "./listed-profiles.ts";

const spread = (low: number, high: number, count: number): number[] =>
  Array.from({ length: count }, (_, i) => low + ((high - low) * i) / (count - 1));
const level = { edgeFunctions: 9 };

test("bandAnalysis: the corrugated horn's trapped resonances at its low edge are found and named", () => {
  // An independent program counted eight between 8.46 and 8.83 GHz, a few MHz wide or less, by sampling finely.
  const result = bandAnalysis(profiles.corrugated, { frequencies: spread(8.4e9, 9e9, 41), level });
  const listed = result.resonances.filter(({ frequency }) => frequency > 8.46e9 && frequency < 8.83e9);
  expect(listed.length).toBe(8);
  for (const { width, swing } of listed) {
    expect(width).toBeLessThan(4e6);
    expect(swing).toBeGreaterThan(0.1);
  }
  const told = result.warnings.find(({ text }) => text.includes("narrow resonances"));
  for (const { frequency } of listed) expect(told?.text).toContain((frequency / 1e9).toFixed(4));
  // They are where S11 says so: sampled across one, it goes through a large part of the unit disk.
  const { frequency, width } = listed[3]!;
  const across = bandAnalysis(profiles.corrugated, {
    frequencies: spread(frequency - 3 * width, frequency + 3 * width, 41),
    level,
  });
  const sizes = across.s11.re.map((re, i) => Math.hypot(re, across.s11.im[i]!));
  expect(Math.max(...sizes) - Math.min(...sizes)).toBeGreaterThan(0.5);
});

test("bandAnalysis: there are none in the corrugated horn's band, nor in a cone", () => {
  expect(bandAnalysis(profiles.corrugated, { frequencies: spread(9.2e9, 12e9, 15), level }).resonances).toEqual([]);
  const taper = { taperModes: 12, stepsPerWavelength: 8 };
  expect(bandAnalysis(profiles.smoothCone, { frequencies: spread(8.5e9, 12e9, 8), level: taper }).resonances).toEqual(
    [],
  );
});

test("bandAnalysis: sampling finer keeps the frequencies asked for and shows what they step over", () => {
  const asked = spread(8.6e9, 8.8e9, 5);
  const plain = bandAnalysis(profiles.corrugated, { frequencies: asked, level });
  const finer = bandAnalysis(profiles.corrugated, { frequencies: asked, level, sampling: "finer" });
  for (const frequency of asked) expect(finer.frequencies).toContain(frequency);
  expect([...finer.frequencies].sort((a, b) => a - b)).toEqual(finer.frequencies);
  expect(finer.frequencies.length).toBeGreaterThan(3 * asked.length);
  const largest = ({ s11 }: typeof plain): number => Math.max(...s11.re.map((re, i) => Math.hypot(re, s11.im[i]!)));
  expect(largest(finer)).toBeGreaterThan(largest(plain) + 0.3);
  expect(finer.apertureModes.length).toBe(finer.frequencies.length);
  expect(finer.powerBalance.every((error) => Math.abs(error) < 1e-9)).toBe(true);
});
