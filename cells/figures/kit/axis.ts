// Axes with round numbers.

import { decimal } from "./words.ts";

export interface Axis {
  domain: [low: number, high: number];
  ticks: number[];
  format: (value: number) => string;
}

/** Smallest of 1, 2, 5 × 10^n that is at least `rough`. */
export function roundStep(rough: number): number {
  const decade = 10 ** Math.floor(Math.log10(rough));
  const lead = rough / decade;
  // 1e-9: a step that is 2 up to rounding is 2
  return decade * (lead <= 1 + 1e-9 ? 1 : lead <= 2 + 1e-9 ? 2 : lead <= 5 + 1e-9 ? 5 : 10);
}

/**
 * An axis that holds all finite values between round ticks.
 * @param values    at least one finite, or the axis runs from 0 to 1
 * @param options.count   about how many intervals, default 5
 * @param options.leastSpan an axis of nearly equal values is opened to this, so that noise isn't shown as a trend
 */
export function roundAxis(values: Iterable<number>, options: { count?: number; leastSpan?: number } = {}): Axis {
  const { count = 5, leastSpan = 0 } = options;
  let low = Infinity;
  let high = -Infinity;
  for (const value of values) {
    if (!Number.isFinite(value)) continue;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  if (low > high) [low, high] = [0, 1];
  const span = Math.max(high - low, leastSpan, 1e-9 * Math.max(Math.abs(low), Math.abs(high)), 1e-12);
  const middle = (low + high) / 2;
  const step = roundStep(span / count);
  const first = Math.floor(Math.min(low, middle - span / 2) / step + 1e-6);
  const last = Math.max(first + 1, Math.ceil(Math.max(high, middle + span / 2) / step - 1e-6));
  const ticks = Array.from({ length: last - first + 1 }, (_, i) => (first + i) * step);
  const digits = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  return { domain: [ticks[0]!, ticks.at(-1)!], ticks, format: (value) => decimal(value, digits) };
}
