// How numbers and units are printed: true minus, powers as figures, a space that doesn't break. Knows no units: light enough
// for the page.

const SPACE = "\u00a0";

/** Fixed decimals with a true minus; a negative that rounds to nothing has no sign. */
export function fixedPrint(value: number, digits: number): string {
  const text = value.toFixed(digits);
  return trueMinus(/^-0\.?0*$/.test(text) ? text.slice(1) : text);
}

export const trueMinus = (text: string): string => text.replace("-", "−");

/** A number's text with its unit: "8.400 GHz", "34.7°", "1.44 m²", "0.8" for none. */
export function withUnit(text: string, unit: string): string {
  if (unit === "") return text;
  if (unit === "deg") return `${text}°`;
  return `${text}${SPACE}${unit.replace(/\^2\b/g, "²").replace(/\^3\b/g, "³").replace(/\*/g, "·")}`;
}
