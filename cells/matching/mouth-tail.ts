// High modes at a mouth that a taper ends in.
//
// The wall bends there by the taper's angle α, from the taper into the guide that continues the mouth: the field near the
// corner goes as d^(π/(π − α) − 1) and more smoothly, so that amplitudes (√Z-normalized) fall as n^−(1/2 + π/(π − α)), with
// alternating sign. A truncated taper gets its last modes wrong; the law continues those before them.
// Source: Meixner 1972 (fields at a wedge); checked on a cone of 14° (test/cells/matching/mouth-tail).

import { type ComplexVector, complexVector } from "../math/complex.ts";
import { isTE } from "./mode-table.ts";

/** Places of the mode number by which the amplitudes fall: the zeros lie near (n + 1/4)π of TM, (n − 1/4)π of TE. */
const place = (index: number): number => (index >> 1) + (isTE(index) ? 0.75 : 1.25);

/**
 * Amplitudes of `count` modes: the first `trusted` as given, the others by the law with its next term, fitted to the last two
 * trusted of each family.
 * @param angle   rad, by which the wall opens before the mouth; negative where it closes
 * @param trusted at least 4
 */
export function continuedTail(
  amplitudes: ComplexVector,
  { angle, trusted, count }: { angle: number; trusted: number; count: number },
): ComplexVector {
  const power = 0.5 + Math.PI / (Math.PI - angle);
  const out = complexVector(count);
  for (const part of ["re", "im"] as const) {
    for (let i = 0; i < count; i++) {
      if (i < trusted) {
        out[part][i] = amplitudes[part][i]!;
        continue;
      }
      const last = i % 2 === (trusted - 1) % 2 ? trusted - 1 : trusted - 2;
      const [a, b] = [last - 2, last].map((at) => {
        const sign = (at >> 1) % 2 === 0 ? 1 : -1;
        return sign * place(at) ** power * amplitudes[part][at]!;
      }) as [number, number];
      // c0 + c1/place through both
      const [pa, pb] = [1 / place(last - 2), 1 / place(last)];
      const slope = (b - a) / (pb - pa);
      const value = b + slope * (1 / place(i) - pb);
      out[part][i] = ((i >> 1) % 2 === 0 ? 1 : -1) * value * place(i) ** -power;
    }
  }
  return out;
}
