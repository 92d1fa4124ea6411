// Bessel functions of order 2/3, 5/3, 8/3, …: the Hankel transforms of fields with the edge behaviour of a right-angled metal edge.

/** Γ(2/3), A&S 1964, 6.1.13 */
const gammaTwoThirds = 1.3541179394264005;

/** Beyond this, and beyond the highest order, Hankel's expansion of the two lowest orders holds to rounding. */
const asymptoticFrom = 25;

/**
 * J_{2/3+m}(x) for m = 0 … count − 1, written to `out` from index `at`.
 *
 * Large x: Hankel's expansion for the two lowest orders, then upward recurrence (stable while the order is below x).
 * Otherwise Miller's downward recurrence, normalized by (x/2)^ν = Σ (ν + 2k)Γ(ν + k)/k!·J_{ν+2k}(x).
 *
 * @param x > 0
 * @accuracy 2e-14 of the envelope √(2/πx), x ≤ 1000, m ≤ 60 (test/cells/math/bessel-thirds)
 * @source   Abramowitz & Stegun 1964, 9.2.5, 9.2.9–10 (Hankel), 9.1.27 (recurrence), 9.1.87 (normalization)
 */
export function writeBesselThirds(x: number, count: number, out: Float64Array, at = 0): void {
  if (x > asymptoticFrom && x > count + 2) {
    out[at] = hankelExpansion(2 / 3, x);
    if (count > 1) out[at + 1] = hankelExpansion(5 / 3, x);
    for (let m = 1; m + 1 < count; m++) out[at + m + 1] = ((2 * (2 / 3 + m)) / x) * out[at + m]! - out[at + m - 1]!;
    return;
  }
  // Start where J has fallen by more than 1e-17 below its value at the highest order wanted or at x.
  let start = Math.ceil(Math.max(count, x) + 14 + 6 * Math.cbrt(Math.max(count, x)));
  start += start % 2;
  let above = 0;
  let here = 1e-200;
  let sum = 0;
  // (ν + 2k)Γ(ν + k)/k! with ν = 2/3, started at 2k = start and carried down by its ratio.
  let weight = gammaTwoThirds;
  for (let k = 1; k <= start / 2; k++) weight *= (2 / 3 + k - 1) / k;
  for (let m = start; m >= 0; m--) {
    if (m < count) out[at + m] = here;
    if (m % 2 === 0) {
      const k = m / 2;
      sum += (2 / 3 + m) * weight * here;
      if (k > 0) weight *= k / (2 / 3 + k - 1);
    }
    const below = ((2 * (2 / 3 + m)) / x) * here - above;
    above = here;
    here = below;
    if (Math.abs(here) > 1e200) {
      here *= 1e-200;
      above *= 1e-200;
      sum *= 1e-200;
      for (let i = m; i < count; i++) out[at + i]! *= 1e-200;
    }
  }
  const factor = (x / 2) ** (2 / 3) / sum;
  for (let m = 0; m < count; m++) out[at + m]! *= factor;
}

function hankelExpansion(order: number, x: number): number {
  const mu = 4 * order * order;
  let p = 1;
  let q = 0;
  let term = 1;
  for (let k = 1; k <= 30; k++) {
    const next = (term * (mu - (2 * k - 1) ** 2)) / (k * 8 * x);
    if (Math.abs(next) >= Math.abs(term)) break;
    term = next;
    if (k % 2 === 1) q += k % 4 === 1 ? term : -term;
    else p += k % 4 === 0 ? term : -term;
    if (Math.abs(term) < 1e-17) break;
  }
  const phase = x - (order / 2 + 0.25) * Math.PI;
  return Math.sqrt(2 / (Math.PI * x)) * (p * Math.cos(phase) - q * Math.sin(phase));
}
