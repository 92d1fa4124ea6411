// Where the wall between bore and outside is thinnest.

import type { ZR } from "./metal.ts";

/**
 * Least distance between two walls, m, and where: at a corner of one of them, since both are made of straight runs. Where the
 * inner wall breaks through the outer one, the distance is negative: as far as it stands out.
 */
export function thinnestWall(inner: readonly ZR[], outer: readonly ZR[]): { thickness: number; z: number } {
  let best = { thickness: Number.POSITIVE_INFINITY, z: 0 };
  const scan = (corners: readonly ZR[], runs: readonly ZR[]): void => {
    let first = 1;
    for (const [z, r] of corners) {
      // Runs farther along the axis than the best found can't be nearer; both walls ascend in z.
      while (first < runs.length - 1 && runs[first]![0] < z - best.thickness) first++;
      for (let i = first; i < runs.length && runs[i - 1]![0] <= z + best.thickness; i++) {
        const thickness = distance([z, r], runs[i - 1]!, runs[i]!);
        if (thickness < best.thickness) best = { thickness, z };
      }
    }
  };
  scan(inner, outer);
  scan(outer, inner);
  let first = 1;
  for (const [z, r] of inner) {
    while (first < outer.length - 1 && outer[first]![0] < z) first++;
    const metal = radiusOver(outer, z, first) - r;
    if (metal < Math.min(0, best.thickness)) best = { thickness: metal, z };
  }
  return best;
}

/** Larger radius of a wall at a plane, m; `first` is the run that reaches it first. */
function radiusOver(wall: readonly ZR[], z: number, first: number): number {
  let largest = 0;
  for (let i = first; i < wall.length && wall[i - 1]![0] <= z; i++) {
    const [z0, r0] = wall[i - 1]!;
    const [z1, r1] = wall[i]!;
    largest = Math.max(largest, z1 === z0 ? Math.max(r0, r1) : r0 + ((r1 - r0) * (z - z0)) / (z1 - z0));
  }
  return largest;
}

function distance([z, r]: ZR, [z0, r0]: ZR, [z1, r1]: ZR): number {
  const [dz, dr] = [z1 - z0, r1 - r0];
  const squared = dz * dz + dr * dr;
  const share = squared === 0 ? 0 : Math.min(1, Math.max(0, ((z - z0) * dz + (r - r0) * dr) / squared));
  return Math.hypot(z - z0 - share * dz, r - r0 - share * dr);
}
