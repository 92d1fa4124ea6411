// What people may stand in: reference levels of power density, by standard and by who stands there.

import { requireNumber } from "../check.ts";

/** One reference level. The code that holds where the antenna stands goes before all of these. */
export interface ExposureLimit {
  /** "ICNIRP 2020", "FCC 47 CFR 1.1310" */
  standard: string;
  /** the public at large, or people trained for the place and aware of the field */
  who: "public" | "occupational";
  /** averaged over the whole body, or over a small patch of skin */
  over: "whole body" | "local";
  /** W/m², incident plane-wave power density */
  density: number;
  /** s, over which it is averaged */
  averagingTime: number;
}

/** ICNIRP's levels are taken from above 2 GHz, the FCC's end at 100 GHz. */
const icnirp = { above: 2e9, max: 300e9 };
const fcc = { min: 1.5e9, max: 100e9 };
const minutes = 60;

/**
 * Reference levels that hold at a frequency, strictest standard first as listed: ICNIRP 2020 above 2 GHz up to 300 GHz
 * (whole body 10 and 50 W/m²; local 40 and 200 W/m² up to 6 GHz, 55 and 275 f^−0.177 W/m² beyond, f in GHz, 20 and 100 W/m²
 * at 300 GHz), FCC from 1.5 to 100 GHz (10 and 50 W/m²).
 *
 * Reference levels, not basic restrictions: near an antenna they are a screen, and a place that fails them has to be
 * assessed by someone licensed to do so.
 *
 * @param frequency Hz, 1.5…300 GHz
 * @throws {RangeError} frequency out of range
 * @source ICNIRP, Health Phys. 118(5), 483–524, 2020, tables 5 and 6 (secondary transcription); 47 CFR 1.1310, table 1 (b)
 */
export function exposureLimits(frequency: number): ExposureLimit[] {
  requireNumber("exposureLimits: frequency", frequency, { min: fcc.min, max: icnirp.max, unit: "Hz" });
  const limits: ExposureLimit[] = [];
  if (frequency > icnirp.above) {
    const standard = "ICNIRP 2020";
    const wholeBody = { standard, over: "whole body", averagingTime: 30 * minutes } as const;
    const local = { standard, over: "local", averagingTime: 6 * minutes } as const;
    const patch = localDensity(frequency);
    limits.push(
      { ...wholeBody, who: "public", density: 10 },
      { ...wholeBody, who: "occupational", density: 50 },
      { ...local, who: "public", density: patch },
      { ...local, who: "occupational", density: 5 * patch },
    );
  }
  if (frequency <= fcc.max) {
    const federal = { standard: "FCC 47 CFR 1.1310", over: "whole body" } as const;
    limits.push(
      { ...federal, who: "public", density: 10, averagingTime: 30 * minutes },
      { ...federal, who: "occupational", density: 50, averagingTime: 6 * minutes },
    );
  }
  return limits;
}

/** ICNIRP's local level for the public, W/m². */
function localDensity(frequency: number): number {
  if (frequency <= 6e9) return 40;
  if (frequency >= icnirp.max) return 20;
  return 55 * (frequency / 1e9) ** -0.177;
}
