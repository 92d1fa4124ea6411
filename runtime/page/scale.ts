// The positions of a slider: between 200 and 1000 round values from the least to the most a given may be.

import type { GivenView } from "../study.ts";
import { plain } from "./typography.ts";

export interface Scale {
  /** positions run from 0 to this */
  last: number;
  positionOf(value: number): number;
  /** as many digits as a step earns, with the unit: "2.40 m" */
  textAt(position: number): string;
}

/** A unit as the reader sees it, and its size in SI. */
export interface Unit {
  name: string;
  factor: number;
}

const written = /^([-+]?(?:\d+\.?\d*|\.\d+)(?:e[-+]?\d+)?)\s*(.*)$/i;

/** Number and unit of a text like "8.025 GHz", or undefined. */
export function readQuantity(text: string): { number: number; unit: string } | undefined {
  const match = written.exec(plain(text));
  return match ? { number: Number(match[1]), unit: match[2]!.trim() } : undefined;
}

/** The unit in which a given is written now. Its size follows from text and value; a zero tells nothing, so `known` may stand in. */
export function unitOf(given: GivenView, known?: Unit): Unit | undefined {
  const read = readQuantity(given.text);
  if (typeof given.value !== "number" || !read) return known;
  if (given.perUnit !== undefined && read.unit === given.unit) return { name: given.unit, factor: given.perUnit };
  if (read.number === 0 || given.value === 0) {
    if (known) return known;
    return given.perUnit === undefined ? undefined : { name: given.unit, factor: given.perUnit };
  }
  const factor = Number((given.value / read.number).toPrecision(12));
  return Number.isFinite(factor) && factor > 0 ? { name: read.unit, factor } : known;
}

/** 1, 2 or 5 times a power of ten, at least `least`. */
function roundStep(least: number): number {
  const power = 10 ** Math.floor(Math.log10(least) + 1e-9);
  const step = [1, 2, 5, 10].find((multiple) => multiple * power >= least * (1 - 1e-9)) ?? 10;
  return step * power;
}

function decimalsOf(step: number): number {
  const text = Number(step.toPrecision(10)).toString();
  const [mantissa, exponent] = text.split("e");
  const decimals = (mantissa!.split(".")[1]?.length ?? 0) - Number(exponent ?? 0);
  return Math.min(Math.max(decimals, 0), 12);
}

/** The slider of a quantity, or undefined where it can't have one: no limits, or a unit of unknown size. */
export function scaleOf(given: GivenView, unit: Unit | undefined): Scale | undefined {
  if (given.form !== "quantity" || !unit || given.min === undefined || given.max === undefined) return undefined;
  const tidy = (si: number) => Number((si / unit.factor).toPrecision(12));
  const low = tidy(given.min);
  const high = tidy(given.max);
  if (!Number.isFinite(low) || !Number.isFinite(high) || high <= low) return undefined;
  const asked = given.step === undefined ? 0 : tidy(given.step);
  const step = asked > 0 && (high - low) / asked <= 1000 ? asked : roundStep((high - low) / (asked > 0 ? 1000 : 500));
  // Positions lie on multiples of the step; the limits themselves are the ends even where they are no multiple.
  const first = Math.floor(low / step + 1e-9);
  const last = Math.max(Math.ceil(high / step - 1e-9) - first, 1);
  const decimals = Math.max(decimalsOf(step), 0);
  return {
    last,
    positionOf: (value) => Math.min(Math.max(Math.round(value / unit.factor / step) - first, 0), last),
    textAt(position) {
      const number = position <= 0 ? low : position >= last ? high : (first + position) * step;
      const text =
        position <= 0 || position >= last ? String(Number(number.toPrecision(12))) : number.toFixed(decimals);
      const padded = decimalsOf(Number(text)) < decimals ? Number(text).toFixed(decimals) : text;
      return unit.name ? `${padded} ${unit.name}` : padded;
    },
  };
}

/** Whether a given differs from the file: by number where both are written in one unit, else by text. */
export function differs(given: GivenView): boolean {
  const now = readQuantity(given.text);
  const file = readQuantity(given.defaultText);
  if (given.form === "quantity" && now && file && now.unit === file.unit) return now.number !== file.number;
  return plain(given.text) !== plain(given.defaultText);
}
