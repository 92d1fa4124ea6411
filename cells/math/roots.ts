// A root and a minimum of a function of one variable, both inside a bracket (Brent).

import { ConvergenceError } from "../check.ts";

export interface BrentOptions {
  /** wanted absolute error in x; default 1e-14·max(|a|, |b|) for a root, 1e-9·max(|a|, |b|) for a minimum */
  tolerance?: number;
  /** default 200 */
  maxIterations?: number;
}

/**
 * Root of f between a and b, where f changes sign: inverse quadratic interpolation, secant or bisection, whichever is safe.
 *
 * @throws {RangeError} f(a) and f(b) have one sign, or either is not a number
 * @throws {ConvergenceError} tolerance not reached
 * @source Brent, Algorithms for Minimization without Derivatives, 1973, chapter 4 (`zeroin`)
 */
export function brentRoot(f: (x: number) => number, a: number, b: number, options: BrentOptions = {}): number {
  const tolerance = options.tolerance ?? 1e-14 * Math.max(Math.abs(a), Math.abs(b));
  const maxIterations = options.maxIterations ?? 200;
  let previous = a;
  let fPrevious = f(a);
  let best = b;
  let fBest = f(b);
  if (!(fPrevious * fBest <= 0)) {
    throw new RangeError(`brentRoot: f must change sign between ${a} and ${b}; got ${fPrevious} and ${fBest}`);
  }
  let opposite = previous;
  let fOpposite = fPrevious;
  let step = best - previous;
  let lastStep = step;
  for (let pass = 0; pass < maxIterations; pass++) {
    if (fBest > 0 === fOpposite > 0) {
      opposite = previous;
      fOpposite = fPrevious;
      step = lastStep = best - previous;
    }
    if (Math.abs(fOpposite) < Math.abs(fBest)) {
      previous = best;
      best = opposite;
      opposite = previous;
      fPrevious = fBest;
      fBest = fOpposite;
      fOpposite = fPrevious;
    }
    const limit = 2 * Number.EPSILON * Math.abs(best) + tolerance / 2;
    const half = (opposite - best) / 2;
    if (Math.abs(half) <= limit || fBest === 0) return best;
    if (Math.abs(lastStep) < limit || Math.abs(fPrevious) <= Math.abs(fBest)) {
      step = lastStep = half;
    } else {
      const s = fBest / fPrevious;
      let p: number;
      let q: number;
      if (previous === opposite) {
        p = 2 * half * s;
        q = 1 - s;
      } else {
        const r = fBest / fOpposite;
        const t = fPrevious / fOpposite;
        p = s * (2 * half * t * (t - r) - (best - previous) * (r - 1));
        q = (t - 1) * (r - 1) * (s - 1);
      }
      if (p > 0) q = -q;
      else p = -p;
      const before = lastStep;
      lastStep = step;
      if (2 * p < Math.min(3 * half * q - Math.abs(limit * q), Math.abs(before * q))) {
        step = p / q;
      } else {
        step = lastStep = half;
      }
    }
    previous = best;
    fPrevious = fBest;
    best += Math.abs(step) > limit ? step : half > 0 ? limit : -limit;
    fBest = f(best);
  }
  throw new ConvergenceError(
    `brentRoot: no root to ${tolerance} in ${maxIterations} steps; best ${best}, f there ${fBest}`,
    {
      best,
      lastChange: Math.abs(step),
      limit: tolerance,
    },
  );
}

const goldenShare = (3 - Math.sqrt(5)) / 2;

/**
 * Place and value of a minimum of f between a and b (a local one when there are several): parabola or golden section.
 * The place is known only to about the square root of the precision of f.
 *
 * @throws {RangeError} f gives NaN
 * @throws {ConvergenceError} tolerance not reached
 * @source Brent, Algorithms for Minimization without Derivatives, 1973, chapter 5 (`localmin`)
 */
export function brentMinimum(
  f: (x: number) => number,
  a: number,
  b: number,
  options: BrentOptions = {},
): { x: number; value: number } {
  const tolerance = options.tolerance ?? 1e-9 * Math.max(Math.abs(a), Math.abs(b));
  const maxIterations = options.maxIterations ?? 200;
  let low = Math.min(a, b);
  let high = Math.max(a, b);
  let x = low + goldenShare * (high - low);
  let second = x;
  let third = x;
  let fx = f(x);
  let fSecond = fx;
  let fThird = fx;
  let step = 0;
  let stepBefore = 0;
  for (let pass = 0; pass < maxIterations; pass++) {
    if (Number.isNaN(fx))
      throw new RangeError(`brentMinimum: f must be a number between ${a} and ${b}; got NaN at ${x}`);
    const middle = (low + high) / 2;
    const limit = 1e-12 * Math.abs(x) + tolerance / 3;
    if (Math.abs(x - middle) <= 2 * limit - (high - low) / 2) return { x, value: fx };
    let golden = true;
    if (Math.abs(stepBefore) > limit) {
      const r = (x - second) * (fx - fThird);
      let q = (x - third) * (fx - fSecond);
      let p = (x - third) * q - (x - second) * r;
      q = 2 * (q - r);
      if (q > 0) p = -p;
      q = Math.abs(q);
      const before = stepBefore;
      stepBefore = step;
      if (Math.abs(p) < Math.abs((q * before) / 2) && p > q * (low - x) && p < q * (high - x)) {
        step = p / q;
        const u = x + step;
        if (u - low < 2 * limit || high - u < 2 * limit) step = x < middle ? limit : -limit;
        golden = false;
      }
    }
    if (golden) {
      stepBefore = x < middle ? high - x : low - x;
      step = goldenShare * stepBefore;
    }
    const u = x + (Math.abs(step) >= limit ? step : step > 0 ? limit : -limit);
    const fu = f(u);
    if (fu <= fx) {
      if (u < x) high = x;
      else low = x;
      third = second;
      fThird = fSecond;
      second = x;
      fSecond = fx;
      x = u;
      fx = fu;
    } else {
      if (u < x) low = u;
      else high = u;
      if (fu <= fSecond || second === x) {
        third = second;
        fThird = fSecond;
        second = u;
        fSecond = fu;
      } else if (fu <= fThird || third === x || third === second) {
        third = u;
        fThird = fu;
      }
    }
  }
  throw new ConvergenceError(`brentMinimum: no minimum to ${tolerance} in ${maxIterations} steps; best ${x}`, {
    best: x,
    lastChange: Math.abs(step),
    limit: tolerance,
  });
}
