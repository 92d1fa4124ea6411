// Ohmic loss of a corrugated horn: the currents on the slots' faces and bottoms and on the tops of the teeth.

import { speedOfLight, vacuumImpedance } from "../../constants.ts";
import { type HybridMode, hybridMode } from "../../guide/hybrid.ts";
import { hybridParts } from "../../guide/hybrid-field.ts";
import { surfaceResistance, TE11, wallLoss } from "../../guide/mode.ts";
import { besselJ0, besselJ1, besselJ2, besselJPrime1, besselY1, besselYPrime1 } from "../../math/bessel.ts";
import { integrate } from "../../math/quadrature.ts";
import { type CorrugatedGeometry, type Corrugation, wallAt } from "./geometry.ts";

/** Slots behind the converter at which the attenuation is taken; between them it is nearly straight. */
const sampledSlots = 9;

/**
 * Attenuation of a horn from throat to mouth, Np: TE11 in the throat guide, then slot by slot through the converter, and by
 * Simpson's rule over nine slots of the rest.
 *
 * Power-loss method with the fields of the lossless hybrid mode at each slot; those in the slot agree to 1e-4 with what a
 * receding wall does to the mode's phase constant (test/cells/horn/corrugated/loss). The φ-directed current is taken as crowded on
 * the tops of the teeth, an upper estimate; with real roughness the whole is good to some tens of percent, of 0.01 to
 * 0.05 dB.
 */
export function corrugatedAttenuation(geometry: CorrugatedGeometry, frequency: number, conductivity: number): number {
  const { corrugations, converterCount, pitch } = geometry;
  const at = (index: number): number => lossAt(geometry, corrugations[index]!, frequency, conductivity);
  let sum = 0;
  for (let i = 0; i < converterCount; i++) sum += at(i);
  const rest = corrugations.length - converterCount;
  if (rest <= sampledSlots) {
    for (let i = converterCount; i < corrugations.length; i++) sum += at(i);
  } else {
    let weighted = 0;
    for (let j = 0; j < sampledSlots; j++) {
      const weight = j === 0 || j === sampledSlots - 1 ? 1 : j % 2 === 1 ? 4 : 2;
      weighted += weight * at(Math.round(converterCount + ((rest - 1) * j) / (sampledSlots - 1)));
    }
    sum += (rest * weighted) / (3 * (sampledSlots - 1));
  }
  return sum * pitch + geometry.throatLength * wallLoss(TE11, geometry.flare.startRadius, frequency, conductivity);
}

/** Np/m at one corrugation; TE11 of a smooth guide where HE11 isn't found (a slot at its half wave). */
function lossAt(geometry: CorrugatedGeometry, slot: Corrugation, frequency: number, conductivity: number): number {
  const { pitch, slotWidth } = geometry;
  const mode = hybridMode("HE11", wallAt(slot, slotWidth / pitch), frequency);
  if (!mode) return wallLoss(TE11, slot.innerRadius, frequency, conductivity);
  const resistance = surfaceResistance(frequency, conductivity) / vacuumImpedance ** 2;
  const { faces, bottom, tooth } = wallCurrents(mode, slot, { pitch, slotWidth });
  return ((faces + bottom + tooth) * resistance) / (2 * pitch);
}

/** ½∫|η0 H|² dS over the metal of one pitch for 1 W of the mode, V²: times Rs/η0² it is the power lost there. */
export interface WallCurrents {
  /** both faces of the slot */
  faces: number;
  bottom: number;
  /** top of the tooth */
  tooth: number;
}

/**
 * Currents on one corrugation's metal, from the lossless mode (peak phasors):
 *
 *   at the wall   E_z = A J1(Ka) cos φ,  η0 H_z = Λ A J1(Ka) sin φ,  η0 H_φ = ½(m0 J0 + m2 J2) cos φ,   A = (K/k) e0/(b + Λ)
 *   in the slot   E_z = c S(ρ) cos φ,    η0 H_φ = −j c S′ cos φ,     η0 H_ρ ∝ c S/(kρ) sin φ,           S(b) = 0
 *
 * c from E_z (a mean over a pitch, so pitch/slot times higher in the slot) and H_φ together, finite through every resonance.
 */
export function wallCurrents(
  mode: HybridMode,
  slot: Corrugation,
  wall: { pitch: number; slotWidth: number },
): WallCurrents {
  const k = (2 * Math.PI * mode.frequency) / speedOfLight;
  const { innerRadius: a, depth } = slot;
  const { pitch, slotWidth } = wall;
  const parts = hybridParts(mode);
  const x = parts.transverseNumber;
  const axial = (x / (k * a)) * (parts.electric0 / (mode.phaseConstant / k + mode.hybridFactor));
  const ez = axial * besselJ1(x);
  const hz = mode.hybridFactor * ez;
  const hPhi = (parts.magnetic0 * besselJ0(x) + parts.magnetic2 * besselJ2(x)) / 2;

  const b = a + depth;
  const [jb, yb] = [besselJ1(k * b), besselY1(k * b)];
  const electric = besselJ1(k * a) * yb - jb * besselY1(k * a);
  const magnetic = besselJPrime1(k * a) * yb - jb * besselYPrime1(k * a);
  const drive = Math.hypot((ez * pitch) / slotWidth, hPhi) / Math.hypot(electric, magnetic);
  const faces = integrate(
    (rho) => {
      const along = besselJPrime1(k * rho) * yb - jb * besselYPrime1(k * rho);
      const across = (besselJ1(k * rho) * yb - jb * besselY1(k * rho)) / (k * rho);
      return (along * along + across * across) * rho;
    },
    a,
    b,
    8,
  );
  // S′(b) by the Wronskian of J1 and Y1
  const atBottom = 2 / (Math.PI * k * b);
  const tooth = pitch - slotWidth;
  // ½ from the peak phasors, π from cos² φ and sin² φ
  const half = Math.PI / 2;
  return {
    faces: half * drive * drive * 2 * faces,
    bottom: half * drive * drive * slotWidth * b * atBottom * atBottom,
    tooth: half * a * (hPhi * hPhi * tooth + (hz * hz * pitch * pitch) / tooth),
  };
}
