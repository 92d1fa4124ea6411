// The ports of a horn closed by their matched guides: a small complex system at each frequency.

import { type Complex, type ComplexVector, complexVector } from "../math/complex.ts";

/**
 * v = Z·i inside, i = drive − y·v outside: solved for a TE11 wave of unit voltage coming in at port `driven`.
 * @param impedance [n × n] real, as the elimination leaves it
 * @param loads     jη0·Y of each port's matched guide
 * @param inside    the real admittance that the elimination already holds at every port
 */
export function solvePorts(
  impedance: Float64Array,
  loads: Complex[],
  driven: number,
  inside: number,
): { voltage: ComplexVector; current: ComplexVector } {
  const n = loads.length;
  // (1 + Z·y)·v = 2·Z·y_driven
  const width = n + 1;
  const re = new Float64Array(n * width);
  const im = new Float64Array(n * width);
  for (let p = 0; p < n; p++) {
    for (let q = 0; q < n; q++) {
      const z = impedance[p * n + q]!;
      re[p * width + q] = z * (loads[q]!.re - inside) + (p === q ? 1 : 0);
      im[p * width + q] = z * loads[q]!.im;
    }
    re[p * width + n] = 2 * impedance[p * n + driven]! * loads[driven]!.re;
    im[p * width + n] = 2 * impedance[p * n + driven]! * loads[driven]!.im;
  }
  gaussJordan(re, im, n);
  const voltage = complexVector(n);
  const current = complexVector(n);
  for (let p = 0; p < n; p++) {
    const vr = re[p * width + n]!;
    const vi = im[p * width + n]!;
    voltage.re[p] = vr;
    voltage.im[p] = vi;
    const source = p === driven ? 2 : 0;
    const yr = loads[p]!.re;
    const yi = loads[p]!.im;
    current.re[p] = source * yr - ((yr - inside) * vr - yi * vi);
    current.im[p] = source * yi - ((yr - inside) * vi + yi * vr);
  }
  return { voltage, current };
}

/** Complex elimination with partial pivoting of [n × (n + 1)]; the solution is left in the last column. */
function gaussJordan(re: Float64Array, im: Float64Array, n: number): void {
  const width = n + 1;
  for (let k = 0; k < n; k++) {
    let pivot = k;
    let largest = -1;
    for (let i = k; i < n; i++) {
      const size = Math.abs(re[i * width + k]!) + Math.abs(im[i * width + k]!);
      if (size > largest) {
        largest = size;
        pivot = i;
      }
    }
    if (pivot !== k) {
      for (let j = 0; j < width; j++) {
        const a = k * width + j;
        const b = pivot * width + j;
        [re[a], re[b]] = [re[b]!, re[a]!];
        [im[a], im[b]] = [im[b]!, im[a]!];
      }
    }
    const dr = re[k * width + k]!;
    const di = im[k * width + k]!;
    const size = dr * dr + di * di;
    for (let j = k; j < width; j++) {
      const x = re[k * width + j]!;
      const y = im[k * width + j]!;
      re[k * width + j] = (x * dr + y * di) / size;
      im[k * width + j] = (y * dr - x * di) / size;
    }
    for (let i = 0; i < n; i++) {
      if (i === k) continue;
      const fr = re[i * width + k]!;
      const fi = im[i * width + k]!;
      if (fr === 0 && fi === 0) continue;
      for (let j = k; j < width; j++) {
        const x = re[k * width + j]!;
        const y = im[k * width + j]!;
        re[i * width + j]! -= fr * x - fi * y;
        im[i * width + j]! -= fr * y + fi * x;
      }
    }
  }
}
