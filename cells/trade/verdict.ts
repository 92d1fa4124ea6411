// A value against a limit, in words: passes, passes barely, misses by so much.

import { requireNumber } from "../check.ts";

/** What a study asks of every feed. All optional; what isn't given isn't judged. */
export interface TradeLimits {
  /** dB against boresight copolar, negative; worst over the band */
  maxCrossPolarPeakDb?: number;
  /** ratio; worst over the band */
  minApertureEfficiency?: number;
  /** ratio, blockage, surface and ohmic loss included; worst over the band */
  minTotalEfficiency?: number;
  /** dBi; worst over the band */
  minGainDbi?: number;
  /** dB, positive; worst over the band, judged where a model knows the match */
  minReturnLossDb?: number;
  /** m, throat plane to mouth */
  maxLength?: number;
  /** m, outside, walls included */
  maxDiameter?: number;
}

/** "barely": inside the limit by less than the margin that first dimensions deserve. */
export type VerdictWord = "passes" | "barely" | "misses";

export interface Verdict {
  /** name of the row's field that is judged */
  field: string;
  label: string;
  sense: "at most" | "at least";
  limit: number;
  value: number;
  /** inside the limit by so much, in the same unit; negative: beyond it */
  margin: number;
  unit: "dB" | "dBi" | "m" | "1";
  verdict: VerdictWord;
  /** "passes", "passes, barely", "misses by 1.4 dB" */
  words: string;
}

type Rule = Pick<Verdict, "field" | "label" | "sense" | "unit"> & {
  limit: keyof TradeLimits;
  barely: (limit: number) => number;
};

/** Margins below which a pass is called bare: what the closed form can't promise. Half a decibel, one percent, 2 % of a length. */
const rules: readonly Rule[] = [
  {
    limit: "maxCrossPolarPeakDb",
    field: "crossPolarPeakDb",
    label: "cross-polar, worst",
    sense: "at most",
    unit: "dB",
    barely: () => 0.5,
  },
  {
    limit: "minApertureEfficiency",
    field: "apertureEfficiency",
    label: "aperture efficiency, worst",
    sense: "at least",
    unit: "1",
    barely: () => 0.01,
  },
  {
    limit: "minTotalEfficiency",
    field: "totalEfficiency",
    label: "total efficiency, worst",
    sense: "at least",
    unit: "1",
    barely: () => 0.01,
  },
  { limit: "minGainDbi", field: "gainDbi", label: "gain, worst", sense: "at least", unit: "dBi", barely: () => 0.1 },
  {
    limit: "minReturnLossDb",
    field: "returnLossDb",
    label: "return loss, worst",
    sense: "at least",
    unit: "dB",
    barely: () => 1,
  },
  {
    limit: "maxLength",
    field: "lengthM",
    label: "length",
    sense: "at most",
    unit: "m",
    barely: (limit) => 0.02 * limit,
  },
  {
    limit: "maxDiameter",
    field: "outerDiameterM",
    label: "outside diameter",
    sense: "at most",
    unit: "m",
    barely: (limit) => 0.02 * limit,
  },
];

/** Two values closer than this share of the limit are equal: a horn dimensioned to just a limit passes it. */
const rounding = 1e-9;

/**
 * Judges values (by field name, worst over the band) against the limits given.
 * @throws {RangeError} a limit that isn't a finite number
 */
export function verdicts(values: Record<string, number | null>, limits: TradeLimits): Verdict[] {
  return rules.flatMap(({ limit: key, field, label, sense, unit, barely }) => {
    const limit = limits[key];
    if (limit === undefined || Math.abs(limit) === Number.POSITIVE_INFINITY) return [];
    requireNumber(`verdicts: ${key}`, limit);
    const value = values[field];
    if (value === undefined || value === null) return [];
    const bare = sense === "at most" ? limit - value : value - limit;
    const margin = Math.abs(bare) <= rounding * Math.abs(limit) ? 0 : bare;
    const verdict: VerdictWord = margin < 0 ? "misses" : margin < barely(limit) ? "barely" : "passes";
    return [{ field, label, sense, limit, value, margin, unit, verdict, words: wordsFor(verdict, -margin, unit) }];
  });
}

function wordsFor(verdict: VerdictWord, miss: number, unit: Verdict["unit"]): string {
  if (verdict === "passes") return "passes";
  if (verdict === "barely") return "passes, barely";
  return `misses by ${amount(miss, unit)}`;
}

function amount(miss: number, unit: Verdict["unit"]): string {
  switch (unit) {
    case "m":
      return `${toDigits(miss * 1e3)} mm`;
    case "1":
      return `${toDigits(miss * 100)} points`;
    default:
      return `${toDigits(miss)} dB`;
  }
}

/** One decimal, or two figures where that would read zero. */
const toDigits = (value: number): string => (value < 0.05 ? value.toPrecision(2) : value.toFixed(1));
