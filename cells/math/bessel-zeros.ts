// Zeros of J_n and J_n′, computed on call: they fix every cutoff of a circular guide.

import { requireInteger } from "../check.ts";
import { besselJ, besselJPrime } from "./bessel.ts";

const highestOrder = 100;

/**
 * j_{n,i}: the i-th positive zero of J_n (n ≥ 0).
 *
 * McMahon's expansion starts Newton's method where it is good (large i); for small i the zeros are stepped through from
 * the first (expansion in n^{1/3}), each step started from the local half-wavelength of J_n, so that none is skipped.
 *
 * @param order whole, 0…100
 * @param index whole, from 1
 * @throws {RangeError} outside these
 * @accuracy 1e-15 relative against 40-digit arithmetic for n ≤ 6, i ≤ 6 (test/cells/math/bessel-zeros)
 * @source   Abramowitz & Stegun 1964, 9.5.12 (McMahon), 9.5.14 (first zero)
 */
export function besselZero(order: number, index: number): number {
  checkArguments("besselZero", order, index);
  const n = order;
  const firstGuess = n === 0 ? 2.404826 : n + 1.8557571 * n ** (1 / 3) + 1.03315 * n ** (-1 / 3) - 0.00397 / n;
  return nthZero({
    newtonStep: (x) => {
      const value = besselJ(n, x);
      return value / besselJPrime(n, x);
    },
    // 9.5.12, β = (i + n/2 − 1/4)π
    mcMahon: (i) => {
      const mu = 4 * n * n;
      const b = (i + n / 2 - 0.25) * Math.PI;
      const e = 8 * b;
      return b - (mu - 1) / e - (4 * (mu - 1) * (7 * mu - 31)) / (3 * e ** 3);
    },
    firstGuess,
    order: n,
    index,
  });
}

/**
 * j′_{n,i}: the i-th positive zero of J_n′ (n ≥ 0); for n = 0 the zero at the origin is not counted, so j′_{0,i} = j_{1,i}.
 *
 * @param order whole, 0…100
 * @param index whole, from 1
 * @throws {RangeError} outside these
 * @accuracy 1e-15 relative against 40-digit arithmetic for n ≤ 6, i ≤ 6 (test/cells/math/bessel-zeros)
 * @source   Abramowitz & Stegun 1964, 9.5.13 (McMahon), 9.5.16 (first zero)
 */
export function besselPrimeZero(order: number, index: number): number {
  checkArguments("besselPrimeZero", order, index);
  if (order === 0) return besselZero(1, index);
  const n = order;
  return nthZero({
    newtonStep: (x) => {
      const slope = besselJPrime(n, x);
      // Bessel's equation gives the second derivative.
      const curvature = -slope / x - (1 - (n * n) / (x * x)) * besselJ(n, x);
      return slope / curvature;
    },
    // 9.5.13, β = (i + n/2 − 3/4)π
    mcMahon: (i) => {
      const mu = 4 * n * n;
      const b = (i + n / 2 - 0.75) * Math.PI;
      const e = 8 * b;
      return b - (mu + 3) / e - (4 * (7 * mu * mu + 82 * mu - 9)) / (3 * e ** 3);
    },
    firstGuess: n + 0.8086165 * n ** (1 / 3) + 0.07249 * n ** (-1 / 3) - 0.05097 / n,
    order: n,
    index,
  });
}

interface ZeroSearch {
  newtonStep: (x: number) => number;
  mcMahon: (index: number) => number;
  firstGuess: number;
  order: number;
  index: number;
}

function nthZero({ newtonStep, mcMahon, firstGuess, order, index }: ZeroSearch): number {
  // The expansion's next term is below a hundredth of a spacing there.
  if (index > 3 + order * order) return newton(newtonStep, mcMahon(index));
  let zero = newton(newtonStep, firstGuess);
  for (let i = 2; i <= index; i++) zero = newton(newtonStep, zero + spacingAfter(zero, order));
  return zero;
}

/** Distance to the next zero from the phase slope √(1 − (n² − ¼)/x²) of J_n (WKB), at the middle of the step. */
function spacingAfter(zero: number, order: number): number {
  let step = Math.PI;
  for (let pass = 0; pass < 3; pass++) {
    const middle = zero + step / 2;
    const slope = Math.sqrt(Math.max(0.1, 1 - (order * order - 0.25) / (middle * middle)));
    step = Math.PI / slope;
  }
  return step;
}

function newton(step: (x: number) => number, guess: number): number {
  let x = guess;
  for (let pass = 0; pass < 12; pass++) {
    const change = step(x);
    x -= change;
    if (Math.abs(change) <= 1e-15 * x) break;
  }
  return x;
}

function checkArguments(where: string, order: number, index: number): void {
  requireInteger(`${where}: order`, order, { min: 0, max: highestOrder });
  requireInteger(`${where}: index`, index, { min: 1 });
}
