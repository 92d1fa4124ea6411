// The horns of test/references/mode-matching.json as profiles.

import type { HornProfile } from "../../../cells/guide/horn-profile.ts";
import { readReference } from "../../references/read.ts";

export interface ListedAnalysis {
  f_GHz: number;
  S11: [number, number];
  aperture_modes: { mode: string; re: number; im: number; propagating: boolean }[];
  D_int_dBi: number;
  D_pow_dBi: number;
  theta_deg: number[];
  E_dB: number[];
  H_dB: number[];
  co45_dB: number[];
  cx45_dB: number[];
  E_ph: number[];
  H_ph: number[];
  xp45_peak_dB: number;
}

/** From lengths and radii in mm, throat first; the mouth is put at z = 0. */
export function profileOf(points: [lengthMm: number, radiusMm: number][]): HornProfile {
  const total = points.reduce((sum, [length]) => sum + length, 0);
  let along = -total;
  return {
    z: points.map(([length], i) => (i === points.length - 1 ? 0 : (along += length)) / 1e3),
    radius: points.map(([, radius]) => radius / 1e3),
  };
}

function corrugated(): HornProfile {
  const points: [number, number][] = [
    [0, 12],
    [20, 12],
  ];
  for (let n = 0; n < 36; n++) {
    const inner = 12 + (26 * (n + 1)) / 36;
    const outer = inner + (n < 8 ? 13.5 - 0.7 * n : 7.9);
    points.push([0, outer], [3, outer], [0, inner], [1, inner]);
  }
  return profileOf(points);
}

export const profiles: Record<"smoothCone" | "dualMode" | "corrugated", HornProfile> = {
  smoothCone: profileOf([
    [0, 11],
    [20, 11],
    [100, 36],
  ]),
  dualMode: profileOf([
    [0, 15],
    [20, 15],
    [0, 19.6],
    [21, 19.6],
    [90, 42],
  ]),
  corrugated: corrugated(),
};

const listed = JSON.parse(readReference("mode-matching.json")) as Record<string, Record<string, ListedAnalysis>>;

export const listedAnalyses = (["smoothCone", "dualMode", "corrugated"] as const).map((horn) => ({
  horn,
  profile: profiles[horn],
  cases: Object.values(listed[horn]!),
}));
