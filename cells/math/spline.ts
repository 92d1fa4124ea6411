// Cubic spline through real samples.

export interface Spline {
  /** value at x; the end pieces continue outside the samples, so the caller keeps x inside */
  at(x: number): number;
  /** first derivative at x */
  slopeAt(x: number): number;
}

export type SplineEnds = "not-a-knot" | "natural";

/**
 * Cubic spline through (x[i], y[i]), x strictly ascending.
 *
 * Not-a-knot ends (the first two and the last two pieces are one cubic each) keep fourth order up to the ends; natural
 * ends (zero second derivative) drop to second order there. Two points give the line, three the parabola (not-a-knot).
 *
 * @param x [count], strictly ascending, count ≥ 2
 * @param y [count]
 * @throws {RangeError} lengths differ, fewer than two points, or x not ascending
 * @accuracy cubics reproduced to rounding (not-a-knot); error ≤ (5/384) h⁴ max|y⁗| inside
 * @source   de Boor, A Practical Guide to Splines, 1978, chapter IV
 */
export function cubicSpline(x: ArrayLike<number>, y: ArrayLike<number>, ends: SplineEnds = "not-a-knot"): Spline {
  const n = x.length;
  if (y.length !== n) throw new RangeError(`cubicSpline: x and y must have one length; got ${n} and ${y.length}`);
  if (n < 2) throw new RangeError(`cubicSpline: at least 2 points are needed; got ${n}`);
  for (let i = 1; i < n; i++) {
    if (!(x[i]! > x[i - 1]!)) {
      throw new RangeError(`cubicSpline: x must ascend; got ${x[i - 1]} then ${x[i]} at point ${i}`);
    }
  }
  const xs = new Float64Array(x);
  const ys = new Float64Array(y);
  const slopes = ends === "natural" ? naturalSlopes(xs, ys) : notAKnotSlopes(xs, ys);

  const pieceOf = (at: number): number => {
    let low = 0;
    let high = n - 1;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (xs[middle]! <= at) low = middle;
      else high = middle;
    }
    return low;
  };
  return {
    at(at) {
      const i = pieceOf(at);
      const h = xs[i + 1]! - xs[i]!;
      const t = (at - xs[i]!) / h;
      const s = 1 - t;
      return (
        s * s * ((1 + 2 * t) * ys[i]! + t * h * slopes[i]!) +
        t * t * ((3 - 2 * t) * ys[i + 1]! - s * h * slopes[i + 1]!)
      );
    },
    slopeAt(at) {
      const i = pieceOf(at);
      const h = xs[i + 1]! - xs[i]!;
      const t = (at - xs[i]!) / h;
      const chord = (ys[i + 1]! - ys[i]!) / h;
      return 6 * t * (1 - t) * chord + (1 - t) * (1 - 3 * t) * slopes[i]! + t * (3 * t - 2) * slopes[i + 1]!;
    },
  };
}

/** Inner rows: h_i s_{i−1} + 2(h_{i−1}+h_i) s_i + h_{i−1} s_{i+1} = 3(h_i d_{i−1} + h_{i−1} d_i), d the chord slopes. */
function innerRows(x: Float64Array, y: Float64Array) {
  const n = x.length;
  // plain loops: Float64Array.from with a function takes longer than the whole solution
  const h = new Float64Array(n - 1);
  const d = new Float64Array(n - 1);
  for (let i = 0; i < n - 1; i++) {
    h[i] = x[i + 1]! - x[i]!;
    d[i] = (y[i + 1]! - y[i]!) / h[i]!;
  }
  const below = new Float64Array(n);
  const main = new Float64Array(n);
  const above = new Float64Array(n);
  const right = new Float64Array(n);
  for (let i = 1; i < n - 1; i++) {
    below[i] = h[i]!;
    main[i] = 2 * (h[i - 1]! + h[i]!);
    above[i] = h[i - 1]!;
    right[i] = 3 * (h[i]! * d[i - 1]! + h[i - 1]! * d[i]!);
  }
  return { h, d, below, main, above, right };
}

function naturalSlopes(x: Float64Array, y: Float64Array): Float64Array {
  const n = x.length;
  const { d, below, main, above, right } = innerRows(x, y);
  main[0] = 2;
  above[0] = 1;
  right[0] = 3 * d[0]!;
  below[n - 1] = 1;
  main[n - 1] = 2;
  right[n - 1] = 3 * d[n - 2]!;
  return solveTridiagonal(below, main, above, right);
}

function notAKnotSlopes(x: Float64Array, y: Float64Array): Float64Array {
  const n = x.length;
  const { h, d, below, main, above, right } = innerRows(x, y);
  if (n === 2) return Float64Array.of(d[0]!, d[0]!);
  if (n === 3) {
    const bend = (d[1]! - d[0]!) / (h[0]! + h[1]!);
    return Float64Array.of(d[0]! - bend * h[0]!, d[0]! + bend * h[0]!, d[1]! + bend * h[1]!);
  }
  // Equal third derivative across the second knot, with the second slope eliminated (de Boor 1978, IV, eq. 6).
  const first = h[0]! + h[1]!;
  main[0] = h[1]!;
  above[0] = first;
  right[0] = ((h[0]! + 2 * first) * h[1]! * d[0]! + h[0]! * h[0]! * d[1]!) / first;
  const last = h[n - 2]! + h[n - 3]!;
  main[n - 1] = h[n - 3]!;
  below[n - 1] = last;
  right[n - 1] = (h[n - 2]! * h[n - 2]! * d[n - 3]! + (2 * last + h[n - 2]!) * h[n - 3]! * d[n - 2]!) / last;
  return solveTridiagonal(below, main, above, right);
}

/** Thomas's method; diagonally dominant enough here to need no pivoting. Overwrites main and right. */
function solveTridiagonal(
  below: Float64Array,
  main: Float64Array,
  above: Float64Array,
  right: Float64Array,
): Float64Array {
  const n = main.length;
  for (let i = 1; i < n; i++) {
    const factor = below[i]! / main[i - 1]!;
    main[i] = main[i]! - factor * above[i - 1]!;
    right[i] = right[i]! - factor * right[i - 1]!;
  }
  right[n - 1] = right[n - 1]! / main[n - 1]!;
  for (let i = n - 2; i >= 0; i--) right[i] = (right[i]! - above[i]! * right[i + 1]!) / main[i]!;
  return right;
}
