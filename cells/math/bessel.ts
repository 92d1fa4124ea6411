// Bessel functions of real argument and whole order. IEEE arithmetic: out of domain is NaN, nothing throws.

import stdlibJ0 from "@stdlib/math-base-special-besselj0";
import stdlibJ1 from "@stdlib/math-base-special-besselj1";
import stdlibY0 from "@stdlib/math-base-special-bessely0";
import stdlibY1 from "@stdlib/math-base-special-bessely1";

/** J0(x), any real x. @accuracy 8e-16 of the envelope min(1, √(2/πx)) for |x| ≤ 200 (test/cells/math/bessel) */
export const besselJ0: (x: number) => number = stdlibJ0;

/** J1(x), any real x. @accuracy as `besselJ0` */
export const besselJ1: (x: number) => number = stdlibJ1;

/** Y0(x), x > 0; −Infinity at 0, NaN below. @accuracy as `besselJ0`, relative to the envelope */
export const besselY0: (x: number) => number = stdlibY0;

/** Y1(x), x > 0; −Infinity at 0, NaN below. @accuracy as `besselY0` */
export const besselY1: (x: number) => number = stdlibY1;

/**
 * J2(x), any real x: the recurrence 2 J1(x)/x − J0(x), and the power series where that would cancel (|x| < 1).
 * @accuracy 2e-15 absolute; 1e-15 relative for |x| < 1
 * @source   Abramowitz & Stegun 1964, 9.1.27 (recurrence), 9.1.10 (series)
 */
export function besselJ2(x: number): number {
  if (Math.abs(x) >= 1) return (2 * besselJ1(x)) / x - besselJ0(x);
  const q = -(x * x) / 4;
  // Terms of 9.1.10 for ν = 2 by Horner's rule, denominators k(k + 2): the ninth is below 1e-18 of the first at |x| = 1.
  let sum = 1;
  for (let k = 8; k >= 1; k--) sum = 1 + (q / (k * (k + 2))) * sum;
  return ((x * x) / 8) * sum;
}

/** J1′(x) = J0(x) − J1(x)/x; ½ at 0. @source Abramowitz & Stegun 1964, 9.1.27 */
export function besselJPrime1(x: number): number {
  return x === 0 ? 0.5 : besselJ0(x) - besselJ1(x) / x;
}

/** Y1′(x) = Y0(x) − Y1(x)/x, x > 0. @source Abramowitz & Stegun 1964, 9.1.27 */
export function besselYPrime1(x: number): number {
  return besselY0(x) - besselY1(x) / x;
}

/**
 * J_n(x), whole order n ≥ 0, any real x: upward recurrence while n ≤ |x|, Miller's downward recurrence beyond,
 * where upward would grow the second solution.
 * @param order whole number ≥ 0; anything else gives NaN
 * @accuracy    3e-15 of the envelope for n ≤ 60, |x| ≤ 200
 * @source      Abramowitz & Stegun 1964, 9.1.27 and 9.12 (example 1)
 */
export function besselJ(order: number, x: number): number {
  if (!Number.isInteger(order) || order < 0 || Number.isNaN(x)) return Number.NaN;
  if (order === 0) return besselJ0(x);
  if (order === 1) return besselJ1(x);
  if (order === 2) return besselJ2(x);
  const ax = Math.abs(x);
  if (ax === 0 || ax === Number.POSITIVE_INFINITY) return 0;
  const magnitude = order <= ax ? upward(order, ax) : downward(order, ax);
  return x < 0 && order % 2 === 1 ? -magnitude : magnitude;
}

/** J_n′(x) = (J_{n−1} − J_{n+1})/2. @source Abramowitz & Stegun 1964, 9.1.27 */
export function besselJPrime(order: number, x: number): number {
  if (order === 0) return -besselJ1(x);
  return (besselJ(order - 1, x) - besselJ(order + 1, x)) / 2;
}

function upward(order: number, x: number): number {
  let before = besselJ0(x);
  let here = besselJ1(x);
  for (let n = 1; n < order; n++) {
    const next = ((2 * n) / x) * here - before;
    before = here;
    here = next;
  }
  return here;
}

function downward(order: number, x: number): number {
  // Starting order from which the dominated solution has lost more than 1e-17 when order is reached.
  let start = order + 20 + Math.ceil(Math.sqrt(60 * order));
  start += start % 2; // even, so that the sum below meets J0 last
  let above = 0;
  let here = 1e-300;
  let wanted = 0;
  let norm = 0; // 1 = J0 + 2 Σ J_{2k}, A&S 9.1.46
  for (let n = start; n > 0; n--) {
    const below = ((2 * n) / x) * here - above;
    above = here;
    here = below;
    if (Math.abs(here) > 1e250) {
      here *= 1e-250;
      above *= 1e-250;
      wanted *= 1e-250;
      norm *= 1e-250;
    }
    if (n - 1 === order) wanted = here;
    if ((n - 1) % 2 === 0) norm += n - 1 === 0 ? here : 2 * here;
  }
  return wanted / norm;
}

/**
 * Ratio I_n(x)/I_{n−1}(x) of modified Bessel functions, any real x (odd in x), n ≥ 1: Gauss's continued fraction
 * 1/(2n/x + 1/(2(n+1)/x + …)), evaluated from its far end; nothing overflows for large x.
 * @accuracy 2e-15 relative
 * @source   Abramowitz & Stegun 1964, 9.1.73 with imaginary argument
 */
export function besselIRatio(x: number, order = 1): number {
  if (!Number.isInteger(order) || order < 1 || Number.isNaN(x)) return Number.NaN;
  if (x === 0) return x;
  const ax = Math.abs(x);
  let tail = 0;
  for (let n = Math.ceil(ax / 2 + 2 * Math.sqrt(ax)) + 20 + order; n >= order; n--) tail = 1 / ((2 * n) / ax + tail);
  return Math.sign(x) * tail;
}
