// Numbers in text as a printer would set them: a true minus sign, and no line break between a number and its unit.

const units =
  "dB(?:i|m|W|/K)?|[kMGT]?Hz|[kcmµun]?m(?:²|/s)?|mm²|[kMm]?W(?:/m²)?|W/kg|[kMm]?V(?:/m)?|K|%|°|deg|m?rad|[mµn]?s|min|k?g|λ|h?Pa|S/m|Ω|h";

const hyphenBeforeDigit = /(^|[\s([{=<>≤≥±~,;:/–—|]) ?-(?=\d)/g;
const numberAndUnit = new RegExp(`(\\d) (?=(?:${units})(?![\\p{L}\\d]))`, "gu");

/** Text for display: "-23.6 dB" becomes "−23.6 dB" that doesn't break before its unit. Not for code, addresses or CSV. */
export function typeset(text: string): string {
  return text
    .replace(hyphenBeforeDigit, (match, before: string) => `${before}${match.startsWith(`${before} `) ? " " : ""}−`)
    .replace(numberAndUnit, "$1\u00a0");
}

/** What a reader typed, with signs and spaces a parser knows: true minus and no-break spaces undone, ends trimmed. */
export function plain(text: string): string {
  return text
    .replace(/[−‐‑–]/g, "-")
    .replace(/[\u00a0\u2007\u2009\u202f]/g, " ")
    .trim();
}
