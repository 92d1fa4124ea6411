// Modes of order one in the ring between two radii: a pocket of a ring-loaded slot, closed at its end.

import { besselJ1, besselJPrime1, besselY1, besselYPrime1 } from "../math/bessel.ts";
import { brentRoot } from "../math/roots.ts";
import type { RealMatrix } from "./couplings.ts";
import { isTE, type ModeTable, wallValues } from "./mode-table.ts";

/** m */
export interface Ring {
  innerRadius: number;
  outerRadius: number;
}

/** Modes of a ring by rising cutoff, of unit field energy ∫|e|² dS = 1. The order-one TEM mode does not exist. */
export interface RingMode {
  te: boolean;
  /** 1/m */
  cutoffNumber: number;
  /** ψ (TE) or ∂ψ/∂ρ (TM) at the inner radius, ψ the potential whose gradient the field is */
  atInner: number;
}

/**
 * The first `count` modes. TE: Z1′ = 0 at both radii, TM: Z1 = 0, Z1 = J1(kρ)Y(kb) − Y1(kρ)J(kb).
 * @source Marcuvitz 1951, section 2.4
 */
export function ringModes(ring: Ring, count: number): RingMode[] {
  const modes = [...familyModes(ring, count, true), ...familyModes(ring, count, false)];
  return modes.sort((a, b) => a.cutoffNumber - b.cutoffNumber).slice(0, count);
}

function familyModes({ innerRadius: c, outerRadius: b }: Ring, count: number, te: boolean): RingMode[] {
  // Zero at the outer radius by construction, of the slope for TE, of the value for TM.
  const value = (k: number, r: number): number =>
    te
      ? besselJ1(k * r) * besselYPrime1(k * b) - besselY1(k * r) * besselJPrime1(k * b)
      : besselJ1(k * r) * besselY1(k * b) - besselY1(k * r) * besselJ1(k * b);
  const slope = (k: number, r: number): number =>
    te
      ? k * (besselJPrime1(k * r) * besselYPrime1(k * b) - besselYPrime1(k * r) * besselJPrime1(k * b))
      : k * (besselJPrime1(k * r) * besselY1(k * b) - besselYPrime1(k * r) * besselJ1(k * b));
  const condition = (k: number): number => (te ? slope(k, c) : value(k, c));
  // Roots lie about π/(b − c) apart; the first TE one near the mean circumference, 2/(b + c).
  const step = Math.PI / (b - c) / 24;
  const modes: RingMode[] = [];
  let low = te ? 0.5 / b : 0.2 * step;
  let atLow = condition(low);
  while (modes.length < count) {
    const high = low + Math.min(step, te && modes.length === 0 ? 0.1 / b : step);
    const atHigh = condition(high);
    if (atLow * atHigh < 0) {
      const k = brentRoot(condition, low, high);
      modes.push(normalized(k, te));
    }
    low = high;
    atLow = atHigh;
  }
  return modes;

  /** ∫|∇ψ|² = k²∫ψ² over the ring by the closed form ∫Z² r dr = ½[(r² − 1/k²)Z² + r²Z′²/k²]. */
  function normalized(k: number, isTe: boolean): RingMode {
    const primitive = (r: number): number => {
      const z = value(k, r);
      const d = slope(k, r) / k;
      return 0.5 * ((r * r - 1 / (k * k)) * z * z + r * r * d * d);
    };
    const scale = 1 / Math.sqrt(Math.PI * k * k * (primitive(b) - primitive(c)));
    return { te: isTe, cutoffNumber: k, atInner: scale * (isTe ? value(k, c) : slope(k, c)) };
  }
}

/**
 * Couplings ∫ e_i·E_j dS over the ring, e_i its modes, E_j those of the guide of its outer radius, [modeCount × ring modes].
 * Green's theorem leaves terms at the inner radius alone.
 */
export function ringCouplings(ring: Ring, modes: RingMode[], modeCount: number, table: ModeTable): RealMatrix {
  const { innerRadius: c, outerRadius: b } = ring;
  const columns = modes.length;
  const values = new Float64Array(modeCount * columns);
  for (let j = 0; j < modeCount; j++) {
    const q = table.chi[j]! / b;
    const { value, slope } = wallValues(q * c);
    // The guide's potential with |∇ψ| as its unit field: scale·J1(qρ)/(q·b).
    const size = table.scale[j]! / (q * b);
    const psi = size * value;
    const psiSlope = size * q * slope;
    modes.forEach(({ te, cutoffNumber: k, atInner }, i) => {
      let coupling = 0;
      if (te && isTE(j)) coupling = (-Math.PI * c * k * k * atInner * psiSlope) / (k * k - q * q);
      else if (!te && !isTE(j)) coupling = (-Math.PI * c * q * q * psi * atInner) / (q * q - k * k);
      else if (te && !isTE(j)) coupling = -Math.PI * atInner * psi;
      values[j * columns + i] = coupling;
    });
  }
  return { rows: modeCount, columns, values };
}
