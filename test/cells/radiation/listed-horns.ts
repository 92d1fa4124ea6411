// Mode amplitudes and patterns of three horns by an independent mode-matching program: test/references/aperture-mode-patterns.json.

import type { Complex } from "../../../cells/math/complex.ts";
import type { FeedPattern } from "../../../cells/pattern/feed-pattern.ts";
import { patternInterpolant } from "../../../cells/pattern/interpolant.ts";
import type { ApertureModes } from "../../../cells/radiation/aperture-modes.ts";
import { readReference } from "../../references/read.ts";

export interface ListedHorn {
  horn: "smoothCone" | "dualMode" | "corrugated";
  frequency: number;
  radius: number;
  amplitudes: [string, number, number][];
  D_int_dBi: number;
  D_pow_dBi: number;
  xp45_peak_dB: number;
  theta_deg: number[];
  E_dB: number[];
  H_dB: number[];
  co45_dB: number[];
  cx45_dB: number[];
  E_ph: number[];
  H_ph: number[];
}

export const listedHorns = (JSON.parse(readReference("aperture-mode-patterns.json")) as { cases: ListedHorn[] }).cases;

export function listedModes({ frequency, radius, amplitudes }: ListedHorn): ApertureModes {
  return {
    frequency,
    radius,
    modePairs: amplitudes.length / 2,
    amplitudes: {
      re: Float64Array.from(amplitudes, ([, re]) => re),
      im: Float64Array.from(amplitudes, ([, , im]) => im),
    },
    warnings: [],
  };
}

export const divided = (p: Complex, q: Complex): Complex => {
  const size = q.re * q.re + q.im * q.im;
  return { re: (p.re * q.re + p.im * q.im) / size, im: (p.im * q.re - p.re * q.im) / size };
};

const polar = (levelDb: number, phaseDeg: number): Complex => {
  const size = 10 ** (levelDb / 20);
  const phase = (phaseDeg * Math.PI) / 180;
  return { re: size * Math.cos(phase), im: size * Math.sin(phase) };
};

/** The listed cut as complex field against boresight. */
export function listedCut(horn: ListedHorn, plane: "E" | "H"): Complex[] {
  const [levels, phases] = plane === "E" ? [horn.E_dB, horn.E_ph] : [horn.H_dB, horn.H_ph];
  return levels.map((level, i) => polar(level, phases[i]!));
}

/** Largest differences from the listed pattern, 0–90°, against boresight: complex in E and H, magnitude in the 45° plane. */
export function differences(pattern: FeedPattern, horn: ListedHorn) {
  const cut = patternInterpolant(pattern);
  const boresight = cut.copolar45(0);
  const e = listedCut(horn, "E");
  const h = listedCut(horn, "H");
  const worst = { e: 0, h: 0, eMagnitude: 0, hMagnitude: 0, copolar: 0, crossPolar: 0 };
  horn.theta_deg.forEach((thetaDeg, i) => {
    const theta = (thetaDeg * Math.PI) / 180;
    const at = (field: (theta: number) => Complex): Complex => divided(field(theta), boresight);
    const apart = (p: Complex, q: Complex): number => Math.hypot(p.re - q.re, p.im - q.im);
    const size = ({ re, im }: Complex): number => Math.hypot(re, im);
    const off = (p: Complex, levelDb: number): number => Math.abs(size(p) - 10 ** (levelDb / 20));
    worst.e = Math.max(worst.e, apart(at(cut.ePlane), e[i]!));
    worst.h = Math.max(worst.h, apart(at(cut.hPlane), h[i]!));
    worst.eMagnitude = Math.max(worst.eMagnitude, off(at(cut.ePlane), horn.E_dB[i]!));
    worst.hMagnitude = Math.max(worst.hMagnitude, off(at(cut.hPlane), horn.H_dB[i]!));
    worst.copolar = Math.max(worst.copolar, off(at(cut.copolar45), horn.co45_dB[i]!));
    worst.crossPolar = Math.max(worst.crossPolar, off(at(cut.crossPolar45), horn.cx45_dB[i]!));
  });
  return worst;
}
