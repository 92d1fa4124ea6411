// Numbers as the page writes them: true minus sign, a space that doesn't break before the unit, never NaN.
import { fixedPrint, trueMinus, withUnit } from "./print.ts";
import { inUnit } from "./quantity.ts";
import { unitNamed } from "./unit.ts";

/**
 * An SI number written in a unit: show(8.4e9, "GHz", 3) is "8.400 GHz", show(0.6056, "deg", 1) is "34.7°".
 *
 * @param value    SI; for a unit in decibels the level itself
 * @param unitText "mm", "GHz", "deg", "dB", "%"; "" for none
 * @param digits   after the decimal point, 0..15; four significant figures if left out
 * @throws {RangeError}    value is NaN or infinite (a page never shows one), digits out of range
 * @throws {QuantityError} unit unknown
 */
export function show(value: number, unitText = "", digits?: number): string {
  if (typeof value !== "number") throw new TypeError(`show: value must be a number; got ${typeof value}`);
  if (!Number.isFinite(value)) {
    throw new RangeError(`show: value must be finite; got ${value}${unitText ? ` for a quantity in ${unitText}` : ""}`);
  }
  if (digits !== undefined && !(Number.isInteger(digits) && digits >= 0 && digits <= 15)) {
    throw new RangeError(`show: digits must be a whole number from 0 to 15; got ${digits}`);
  }
  const unit = unitNamed(unitText);
  const number = inUnit(value, unit);
  const text = digits === undefined ? significant(number) : fixed(number, digits);
  return withUnit(text, unit.text);
}

/** Four significant figures: as many as a reader takes in; powers of ten only far from one. */
export function significant(value: number, figures = 4): string {
  if (!Number.isFinite(value)) throw new RangeError(`show: value must be finite; got ${value}`);
  if (value === 0) return "0";
  const size = Math.abs(value);
  if (size >= 1e7 || size < 1e-4) {
    const [mantissa, power] = value.toExponential(figures - 1).split("e") as [string, string];
    return trueMinus(`${trimZeros(mantissa)}×10${superscript(power.replace("+", ""))}`);
  }
  if (Number.isInteger(value)) return trueMinus(String(value));
  const decimals = Math.max(0, figures - 1 - Math.floor(Math.log10(size)));
  return trueMinus(trimZeros(value.toFixed(Math.min(decimals, 15))));
}

function fixed(value: number, digits: number): string {
  // toFixed turns to powers of ten from 1e21 on
  return /e/.test(value.toFixed(digits)) ? significant(value) : fixedPrint(value, digits);
}

const trimZeros = (text: string): string => (text.includes(".") ? text.replace(/\.?0+$/, "") : text);
const superscript = (text: string): string =>
  [...text].map((c) => (c === "-" ? "⁻" : "⁰¹²³⁴⁵⁶⁷⁸⁹"[Number(c)])).join("");
