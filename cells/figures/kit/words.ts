// Numbers as a drawing or its text alternative writes them: true minus, a space before the unit, as many digits as asked.

import { toDeg, toGHz, toMm } from "../../units.ts";

/** Fixed number of decimals, true minus; what rounds to zero has no sign. */
export function decimal(value: number, digits: number): string {
  const fixed = Math.abs(value).toFixed(digits);
  return value < 0 && Number(fixed) !== 0 ? `−${fixed}` : fixed;
}

export const decibels = (valueDb: number, digits = 1): string => `${decimal(valueDb, digits)} dB`;
export const percent = (ratio: number, digits = 1): string => `${decimal(100 * ratio, digits)} %`;
export const degrees = (angle: number, digits = 1): string => `${decimal(toDeg(angle), digits)}°`;

/** Length with its unit, by size: 2.40 m, 188 mm, 26.9 mm, 2.40 mm. */
export function length(value: number): string {
  const mm = Math.abs(toMm(value));
  if (mm >= 1000) return `${decimal(value, 2)} m`;
  return `${decimal(toMm(value), mm >= 100 ? 0 : mm >= 10 ? 1 : 2)} mm`;
}

/** Millimetres without the unit, as a drawing that states its unit once writes them. */
export const millimetres = (value: number, digits = 1): string => decimal(toMm(value), digits);

/** Frequency in GHz with up to three decimals, but never fewer than one: 8.2, 8.025. */
export function gigahertz(frequency: number): string {
  const fixed = toGHz(frequency)
    .toFixed(3)
    .replace(/0{1,2}$/, "");
  return fixed;
}

/** "a, b and c" */
export function listed(parts: readonly string[]): string {
  if (parts.length < 2) return parts.join("");
  return `${parts.slice(0, -1).join(", ")} and ${parts.at(-1)}`;
}
