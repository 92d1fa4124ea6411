// How much metal a horn is, and what it weighs in each.

import type { ZR } from "./metal.ts";

/** A metal to turn horns of. */
export interface Metal {
  name: string;
  /** kg/m³ at 20 °C */
  density: number;
}

/**
 * Densities at 20 °C: 6061 aluminium 2.70, free-cutting brass C36000 8.49, oxygen-free copper C10100 8.94 g/cm³.
 * @source ASM Handbook, volume 2, 1990 (from memory); a bar may differ by half a percent
 */
export const metals: readonly Metal[] = [
  { name: "aluminium 6061", density: 2700 },
  { name: "brass C36000", density: 8490 },
  { name: "copper C10100", density: 8940 },
];

/** Mass of one horn in one metal. */
export interface MetalMass extends Metal {
  /** kg */
  mass: number;
}

/** Volume under a polyline turned about the axis, m³: a sum of frustums, π/3·Δz·(r₀² + r₀r₁ + r₁²); exact. */
export function turnedVolume(points: readonly ZR[]): number {
  let sum = 0;
  for (let i = 1; i < points.length; i++) {
    const [z0, r0] = points[i - 1]!;
    const [z1, r1] = points[i]!;
    sum += (z1 - z0) * (r0 * r0 + r0 * r1 + r1 * r1);
  }
  return (Math.PI / 3) * sum;
}

/** Volume of metal between an inner and an outer wall from one throat plane to one mouth plane, m³. */
export function metalVolume(inner: readonly ZR[], outer: readonly ZR[]): number {
  return turnedVolume(outer) - turnedVolume(inner);
}

/** Mass in each of the metals. @param volume m³ */
export function masses(volume: number): MetalMass[] {
  return metals.map((metal) => ({ ...metal, mass: metal.density * volume }));
}
