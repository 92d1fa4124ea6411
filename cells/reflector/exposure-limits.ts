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

/** Below 400 MHz other rows of the tables hold, and other quantities; the FCC's rows end at 100 GHz. */
const known = { min: 0.4e9, max: 300e9 };
const fccEnd = 100e9;
const minutes = 60;

/**
 * Reference levels that hold at a frequency. ICNIRP 2020, whole body: f/200 and f/40 W/m² up to 2 GHz (f in MHz), 10 and 50
 * beyond; local: 0.058 and 0.29 f^0.86 up to 2 GHz (f in MHz), 40 and 200 up to 6 GHz, 55 and 275 f^−0.177 beyond (f in GHz),
 * 20 and 100 at 300 GHz. FCC: f/150 and f/30 W/m² up to 1.5 GHz (f in MHz), 10 and 50 from there to 100 GHz.
 *
 * Reference levels, not basic restrictions: near an antenna they are a screen, and a place that fails them has to be
 * assessed by someone licensed to do so.
 *
 * @param frequency Hz, 0.4…300 GHz
 * @throws {RangeError} frequency out of range
 * @source ICNIRP, Health Phys. 118(5), 483–524, 2020, tables 5 and 6 (secondary copy; up to 2 GHz from memory);
 *   47 CFR 1.1310, table 1 (below 1.5 GHz from memory)
 */
export function exposureLimits(frequency: number): ExposureLimit[] {
  requireNumber("exposureLimits: frequency", frequency, { ...known, unit: "Hz" });
  const fMHz = frequency / 1e6;
  const standard = "ICNIRP 2020";
  const wholeBody = { standard, over: "whole body", averagingTime: 30 * minutes } as const;
  const local = { standard, over: "local", averagingTime: 6 * minutes } as const;
  const [body, bodyAtWork] = frequency <= 2e9 ? [fMHz / 200, fMHz / 40] : [10, 50];
  const [patch, patchAtWork] = localDensities(frequency);
  const limits: ExposureLimit[] = [
    { ...wholeBody, who: "public", density: body },
    { ...wholeBody, who: "occupational", density: bodyAtWork },
    { ...local, who: "public", density: patch },
    { ...local, who: "occupational", density: patchAtWork },
  ];
  if (frequency > fccEnd) return limits;
  const federal = { standard: "FCC 47 CFR 1.1310", over: "whole body" } as const;
  const [open, controlled] = frequency <= 1.5e9 ? [fMHz / 150, fMHz / 30] : [10, 50];
  return [
    ...limits,
    { ...federal, who: "public", density: open, averagingTime: 30 * minutes },
    { ...federal, who: "occupational", density: controlled, averagingTime: 6 * minutes },
  ];
}

/** ICNIRP's local levels, W/m²: public, occupational. */
function localDensities(frequency: number): [number, number] {
  if (frequency >= known.max) return [20, 100];
  if (frequency > 6e9) {
    const shape = (frequency / 1e9) ** -0.177;
    return [55 * shape, 275 * shape];
  }
  if (frequency > 2e9) return [40, 200];
  const shape = (frequency / 1e6) ** 0.86;
  return [0.058 * shape, 0.29 * shape];
}
