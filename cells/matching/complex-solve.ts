// Small dense complex systems.

import { type ComplexVector, complexVector } from "../math/complex.ts";

/** M⁻¹·B by elimination with row pivoting. M is [n × n], B [n × columns]; both are kept. */
export function solveComplex(matrix: ComplexVector, right: ComplexVector, n: number, columns: number): ComplexVector {
  const width = n + columns;
  const { re, im } = complexVector(n * width);
  for (let i = 0; i < n; i++) {
    re.set(matrix.re.subarray(i * n, (i + 1) * n), i * width);
    im.set(matrix.im.subarray(i * n, (i + 1) * n), i * width);
    re.set(right.re.subarray(i * columns, (i + 1) * columns), i * width + n);
    im.set(right.im.subarray(i * columns, (i + 1) * columns), i * width + n);
  }
  for (let k = 0; k < n; k++) {
    let pivot = k;
    let largest = -1;
    for (let i = k; i < n; i++) {
      const size = Math.abs(re[i * width + k]!) + Math.abs(im[i * width + k]!);
      if (size > largest) [largest, pivot] = [size, i];
    }
    if (pivot !== k) {
      for (const part of [re, im]) {
        const row = part.slice(k * width, (k + 1) * width);
        part.copyWithin(k * width, pivot * width, (pivot + 1) * width);
        part.set(row, pivot * width);
      }
    }
    const [dr, di] = [re[k * width + k]!, im[k * width + k]!];
    const size = dr * dr + di * di;
    for (let j = k; j < width; j++) {
      const [x, y] = [re[k * width + j]!, im[k * width + j]!];
      re[k * width + j] = (x * dr + y * di) / size;
      im[k * width + j] = (y * dr - x * di) / size;
    }
    for (let i = 0; i < n; i++) {
      if (i === k) continue;
      const [fr, fi] = [re[i * width + k]!, im[i * width + k]!];
      if (fr === 0 && fi === 0) continue;
      for (let j = k; j < width; j++) {
        const [x, y] = [re[k * width + j]!, im[k * width + j]!];
        re[i * width + j]! -= fr * x - fi * y;
        im[i * width + j]! -= fr * y + fi * x;
      }
    }
  }
  const out = complexVector(n * columns);
  for (let i = 0; i < n; i++) {
    out.re.set(re.subarray(i * width + n, (i + 1) * width), i * columns);
    out.im.set(im.subarray(i * width + n, (i + 1) * width), i * columns);
  }
  return out;
}
