// Argument checks and the two ways in which a result may be doubtful: a warning that travels with it, or an error.

/** Closed list: what a warning can be about. */
export type WarningCode = "singular" | "precision-loss" | "slow" | "outside-validated-range";

/** Doubt that is not failure; it travels with the result. The text says what looked wrong, what is usually meant, and how to confirm it. */
export interface Warning {
  code: WarningCode;
  text: string;
}

/** Thrown when a tolerance was not reached: carries the best value, the last change and the limit. */
export class ConvergenceError extends Error {
  override name = "ConvergenceError";
  readonly best: unknown;
  readonly lastChange: number;
  readonly limit: number;
  constructor(message: string, detail: { best: unknown; lastChange: number; limit: number }) {
    super(message);
    this.best = detail.best;
    this.lastChange = detail.lastChange;
    this.limit = detail.limit;
  }
}

export interface Range {
  /** unit as an error message writes it, e.g. "m" */
  unit?: string;
  /** smallest allowed value, included */
  min?: number;
  /** largest allowed value, included */
  max?: number;
  /** excluded lower bound */
  above?: number;
  /** excluded upper bound */
  below?: number;
}

/** Words for a range: "above 0 and below 90 deg". */
function rangeWords({ unit, min, max, above, below }: Range): string {
  const parts: string[] = [];
  if (above !== undefined) parts.push(`above ${above}`);
  if (min !== undefined) parts.push(`at least ${min}`);
  if (below !== undefined) parts.push(`below ${below}`);
  if (max !== undefined) parts.push(`at most ${max}`);
  return `a number${parts.length ? ` ${parts.join(" and ")}` : ""}${unit ? ` ${unit}` : ""}`;
}

/**
 * Checks that `value` is a finite number in `range` and returns it.
 * @param where    the function that asks, and the quantity: "cutoffFrequency: radius"
 * @throws {TypeError}  not a number
 * @throws {RangeError} not finite or out of range; the message names value, unit and the allowed range
 */
export function requireNumber(where: string, value: unknown, range: Range = {}): number {
  const unit = range.unit ? ` ${range.unit}` : "";
  if (typeof value !== "number") throw new TypeError(`${where} must be ${rangeWords(range)}; got ${String(value)}`);
  const ok =
    Number.isFinite(value) &&
    (range.min === undefined || value >= range.min) &&
    (range.max === undefined || value <= range.max) &&
    (range.above === undefined || value > range.above) &&
    (range.below === undefined || value < range.below);
  if (!ok)
    throw new RangeError(`${where} must be ${rangeWords(range)}; got ${value}${Number.isFinite(value) ? unit : ""}`);
  return value;
}

/** `requireNumber` for a positive quantity. */
export function requirePositive(where: string, value: unknown, unit?: string): number {
  return requireNumber(where, value, { above: 0, unit });
}

/** Checks that `value` is a whole number in the range and returns it. @throws {RangeError} */
export function requireInteger(where: string, value: unknown, range: Range = {}): number {
  const n = requireNumber(where, value, range);
  if (!Number.isInteger(n)) throw new RangeError(`${where} must be a whole number; got ${n}`);
  return n;
}
