// Units as a notebook writes them. js-quantities knows the units; decibels, kelvin and exact powers of ten are met here.
import Qty from "js-quantities";

/** One unit: what it measures and how its numbers become SI. */
export interface Unit {
  /** as written, tidied: "mm", "dBW", "" for a plain number */
  text: string;
  /** what it measures, in words: "length", "plain number", "power level" */
  kind: string;
  /** units with the same dimension convert into one another */
  dimension: string;
  /** SI = number × scale + offset */
  scale: number;
  offset: number;
  /** the scale is 10^exponent exactly */
  exponent?: number;
}

/** A unit or a quantity that could not be read; the message is one sentence. */
export class QuantityError extends Error {
  override name = "QuantityError";
}

/** Levels stay numbers in their own unit: 11 dB is 11, and no silent step to a linear ratio is taken. */
const DECIBELS: Record<string, { kind: string; offset?: number; dimension?: string }> = {
  dB: { kind: "ratio in decibels" },
  dBi: { kind: "gain over isotropic" },
  dBc: { kind: "level below a carrier" },
  dBW: { kind: "power level", dimension: "dBW" },
  dBm: { kind: "power level", dimension: "dBW", offset: -30 },
  "dB/K": { kind: "figure of merit" },
  dBsm: { kind: "radar cross section" },
};

/** Words for what the units library calls by a key or has no name for. */
const KINDS: Record<string, string> = {
  "m2*kg/s3*A*m": "electric field strength",
  "s3*A2/kg*m3": "conductivity",
  "kg*m2/s3*m2": "power density",
  magnetism: "magnetic field strength",
  "dB/m": "attenuation",
};

/** Often written, meant to be one of these. */
const FAMILIAR = [
  "m",
  "cm",
  "mm",
  "µm",
  "km",
  "in",
  "ft",
  "mil",
  "Hz",
  "kHz",
  "MHz",
  "GHz",
  "deg",
  "rad",
  "mrad",
  "W",
  "kW",
  "mW",
]
  .concat([
    "K",
    "°C",
    "Pa",
    "hPa",
    "kPa",
    "kg",
    "g",
    "s",
    "ms",
    "min",
    "h",
    "S/m",
    "MS/m",
    "V/m",
    "kV/m",
    "MV/m",
    "m/s",
    "%",
  ])
  .concat(Object.keys(DECIBELS));

const known = new Map<string, Unit>();

/**
 * The unit of that name.
 * @param text as written: "mm", "deg" or "°", "S/m", "dB", "K", "°C", "%", or "" for a plain number
 * @throws {QuantityError} unknown; where the intention is plain the message names the right spelling
 */
export function unitNamed(text: string): Unit {
  const tidy = tidyUnit(text);
  let unit = known.get(tidy);
  if (!unit) known.set(tidy, (unit = readUnit(tidy)));
  return unit;
}

function tidyUnit(text: string): string {
  return text
    .trim()
    .replace(/\s+/g, " ")
    .replace(/μ/g, "µ")
    .replace(/²/g, "^2")
    .replace(/³/g, "^3")
    .replace(/[·×]/g, "*")
    .replace(/^(deg(ree)?s?|°)$/, "deg");
}

function readUnit(text: string): Unit {
  if (text === "") return { text, kind: "plain number", dimension: "", scale: 1, offset: 0, exponent: 0 };
  const level = Object.hasOwn(DECIBELS, text) ? DECIBELS[text] : undefined;
  if (level) {
    const { kind, offset = 0, dimension = text } = level;
    return { text, kind, dimension, scale: 1, offset, exponent: 0 };
  }
  if (text === "K") return { text, kind: "temperature", dimension: "degK", scale: 1, offset: 0, exponent: 0 };
  if (/^(°C|degC)$/.test(text)) {
    return { text: "°C", kind: "temperature", dimension: "degK", scale: 1, offset: 273.15, exponent: 0 };
  }
  const quantity = libraryUnit(text);
  if (!quantity) throw new QuantityError(unknownUnit(text));
  // A slope ("mm/m") is a plain number, as a percentage is.
  const dimension = quantity
    .toBase()
    .units()
    .replace(/^m\/m$/, "");
  const kind = (KINDS[dimension] ?? KINDS[quantity.kind()] ?? quantity.kind() ?? "").replace(/_/g, " ");
  const scale = quantity.baseScalar;
  const exponent = Math.round(Math.log10(scale));
  return {
    text,
    kind: kind === "unitless" ? "plain number" : kind || `quantity in ${text}`,
    dimension,
    scale,
    offset: 0,
    ...(Number(`1e${exponent}`) === scale ? { exponent } : {}),
  };
}

/** Letters, digits and the signs of a compound only: the library would also evaluate a leading number. */
function libraryUnit(text: string): Qty | undefined {
  if (!/^[A-Za-zµΩ%"'][\w µΩ*/^%-]*$/.test(text) || text.length > 40) return undefined;
  try {
    return Qty(`1 ${text}`);
  } catch {
    return undefined;
  }
}

function unknownUnit(text: string): string {
  const meant = FAMILIAR.find((name) => name.toLowerCase() === text.toLowerCase());
  const shown = text.length > 40 ? `${text.slice(0, 40)}…` : text;
  return meant ? `"${shown}" is not a unit; write ${meant}` : `"${shown}" is not a unit known here`;
}
