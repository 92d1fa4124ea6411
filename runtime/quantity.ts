// Quantities as people enter them: "2.4 m", "94 in", "8.4 GHz", "35 deg", "11 dB". Text in, SI number out, and back.
import { QuantityError, type Unit, unitNamed } from "./unit.ts";

export { QuantityError, type Unit, unitNamed } from "./unit.ts";

export interface Quantity {
  /** SI; a level in decibels stays in decibels */
  value: number;
  unit: Unit;
  /** tidied text, "2.4 m": reads back to the same value */
  text: string;
}

const NUMBER = /^([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)(?![\d.])\s*(.*)$/s;

/**
 * Reads a quantity.
 *
 * @param text     a number and a unit; a number alone takes `expected`
 * @param expected the unit in which the quantity is asked; without it a number alone is a plain number
 * @throws {QuantityError} no number, a decimal comma, an unknown unit, another dimension than expected, or beyond the range of
 *                         numbers. The message is a sentence without subject: "must be a length; got 8.4 GHz, which is a frequency"
 */
export function parseQuantity(text: string, expected?: Unit): Quantity {
  const tidy = text
    .trim()
    .replace(/[\s\u00a0\u202f\u2009]+/g, " ")
    .replace(/^[−–]/, "-");
  const shown = tidy.length > 60 ? `${tidy.slice(0, 60)}…` : tidy;
  const wanted = expected ? kindWords(expected) : 'a number with its unit, like "2.4 m"';
  if (tidy === "") throw new QuantityError(`must be ${wanted}; got nothing`);
  if (/^[+-]?\d*,\d/.test(tidy)) {
    throw new QuantityError(`must be written with a decimal point and no other separator; got ${shown}`);
  }
  const match = NUMBER.exec(tidy);
  if (!match) throw new QuantityError(`must be ${wanted}; got ${shown}, which is not a number`);
  const [, digits, unitText] = match as unknown as [string, string, string];
  let unit: Unit;
  try {
    unit = unitText === "" ? (expected ?? unitNamed("")) : unitNamed(unitText);
  } catch (error) {
    throw new QuantityError(`must be ${wanted}; got ${shown}, but ${(error as Error).message}`);
  }
  if (expected && unit.dimension !== expected.dimension) {
    throw new QuantityError(`must be ${kindWords(expected)}; got ${shown}, which is ${kindWords(unit)}`);
  }
  const value = toSi(digits, unit);
  if (!Number.isFinite(value))
    throw new QuantityError(`must be ${wanted}; got ${shown}, which is beyond any number kept here`);
  return { value, unit, text: unit.text === "" ? digits : `${digits} ${unit.text}` };
}

/** Powers of ten move the decimal point of the text, so that "0.3 mm" is the double nearest to 0.0003. */
function toSi(digits: string, unit: Unit): number {
  if (unit.exponent !== undefined) return Number(pointMoved(digits, unit.exponent)) + unit.offset;
  if (unit.text === "deg") return (Number(digits) * Math.PI) / 180;
  return Number(digits) * unit.scale + unit.offset;
}

/** The number of `unit`s in an SI value. */
export function inUnit(value: number, unit: Unit): number {
  if (unit.text === "deg") return (value * 180) / Math.PI;
  const shifted = value - unit.offset;
  if (unit.exponent === undefined) return shifted / unit.scale;
  return Number.isFinite(shifted) ? Number(pointMoved(String(shifted), -unit.exponent)) : shifted;
}

/** Decimal text times a power of ten, without rounding. */
function pointMoved(digits: string, power: number): string {
  const [mantissa, exponent = "0"] = digits.toLowerCase().split("e") as [string, string?];
  return `${mantissa}e${Number(exponent) + power}`;
}

/**
 * An SI value as text in a unit, as short as reads back to the same value: 0.0003 in mm is "0.3 mm". In a unit whose factor is no
 * power of ten there may be no such text; then the nearest is given, which reads back to within two units in the last place.
 */
export function formatQuantity(value: number, unitText: string): string {
  const unit = unitNamed(unitText);
  if (!Number.isFinite(value))
    throw new QuantityError(`no quantity in ${unitText || "plain numbers"} stands for ${value}`);
  const number = inUnit(value, unit);
  const digits = candidates(value, number, unit).find((text) => toSi(text, unit) === value) ?? String(number);
  return unit.text === "" ? digits : `${digits} ${unit.text}`;
}

/** Texts for a number of units, shortest first; then its neighbours, then the value's own digits with the point moved. */
function candidates(value: number, number: number, unit: Unit): string[] {
  const texts = Array.from({ length: 17 }, (_, i) => String(Number(number.toPrecision(i + 1))));
  const step = Math.abs(number) * Number.EPSILON;
  for (const steps of [0.5, -0.5, 1, -1, 1.5, -1.5]) texts.push(String(number + steps * step));
  if (unit.exponent !== undefined && unit.offset === 0) texts.push(pointMoved(String(value), -unit.exponent));
  return texts;
}

/** "a length", "an angle", "a plain number". */
export function kindWords(unit: Unit): string {
  return `${/^[aeiou]/.test(unit.kind) ? "an" : "a"} ${unit.kind}`;
}
