// A build sheet as tables: dimensions with tolerances, slots, what the workshop can make of it, what it weighs.

import type { BuildSheet, SheetDimension } from "../horn/workshop/build-sheet.ts";
import type { MachiningVerdict, MachiningWord } from "../horn/workshop/machining.ts";
import { toDeg, toMm } from "../units.ts";
import { plusMinus } from "./build-dimensions.ts";
import { decimal, millimetres } from "./kit/words.ts";

/** Rows of a table as plain data: what the page's `table` takes. */
export interface SheetTable {
  columns: { label: string }[];
  rows: {
    key: string;
    label: string;
    under?: string;
    cells: { text: string; word?: string; verdict?: MachiningWord }[];
  }[];
  caption?: string;
  /** for CSV: first row the column names with units */
  data: (string | number)[][];
}

/** The tables of a sheet; `slots` only where there are some. Lengths in mm, masses in kg, all from the mouth as datum. */
export interface BuildTables {
  dimensions: SheetTable;
  slots?: SheetTable;
  machining: SheetTable;
  mass: SheetTable;
}

/** Digits of a length in the tables: a hundredth of the tightest usual tolerance would be noise, a micrometre isn't. */
const lengthDigits = 3;
const mm = (length: number): string => millimetres(length, lengthDigits);

export function buildTables(sheet: BuildSheet): BuildTables {
  return {
    dimensions: dimensionTable(sheet),
    ...(sheet.slots.length > 0 ? { slots: slotTable(sheet) } : {}),
    machining: machiningTable(sheet),
    mass: massTable(sheet),
  };
}

/** The rule of a tolerance, without its reason: "λ/200". */
const ruleOf = (basis: string): string => basis.split(":")[0]!;

function valueText({ value, unit, diameter }: SheetDimension): string {
  if (unit === "1") return decimal(value, 0);
  if (unit === "rad") return `${decimal(toDeg(value), 2)}°`;
  return `${diameter ? "Ø " : ""}${mm(value)}`;
}

function dimensionTable({ dimensions, slotTolerance }: BuildSheet): SheetTable {
  const bases = new Set(dimensions.flatMap(({ tolerance }) => (tolerance ? [tolerance.basis] : [])));
  if (slotTolerance) bases.add(slotTolerance.basis);
  return {
    columns: [{ label: "Dimension (mm)" }, { label: "Tolerance (mm)" }],
    rows: dimensions.map((one) => ({
      key: one.label,
      label: one.label[0]!.toUpperCase() + one.label.slice(1),
      cells: [
        { text: valueText(one) },
        one.tolerance
          ? { text: plusMinus(one.tolerance.plusMinus), word: ruleOf(one.tolerance.basis) }
          : { text: one.unit === "1" ? "exact" : "for reference" },
      ],
    })),
    caption: `λ is the wavelength at the upper band edge. Tolerances by common practice, not by an analysis of this horn. ${[...bases].map((basis) => `${basis}.`).join(" ")}`,
    data: [
      ["dimension", "value", "unit", "tolerance, either way (mm)", "basis"],
      ...dimensions.map(({ label, value, unit, tolerance }): (string | number)[] => [
        label,
        unit === "m" ? toMm(value) : unit === "rad" ? toDeg(value) : value,
        unit === "m" ? "mm" : unit === "rad" ? "deg" : "",
        tolerance ? toMm(tolerance.plusMinus) : "",
        tolerance?.basis ?? "",
      ]),
    ],
  };
}

function slotTable({ slots, slotTolerance }: BuildSheet): SheetTable {
  const tolerance = slotTolerance
    ? ` Each ${plusMinus(slotTolerance.plusMinus)} mm (${ruleOf(slotTolerance.basis)}).`
    : "";
  return {
    columns: ["z (mm)", "Width (mm)", "Inner radius (mm)", "Depth (mm)"].map((label) => ({ label })),
    rows: slots.map(({ number, z, width, innerRadius, depth }) => ({
      key: `slot ${number}`,
      label: String(number),
      cells: [z, width, innerRadius, depth].map((length) => ({ text: mm(length) })),
    })),
    caption: `Slots from the throat. z: the slot's wall on the mouth side, from the mouth; inner radius: the top of the tooth on that side; depth from there.${tolerance}`,
    data: [
      ["slot", "z of the mouth-side wall (mm)", "width (mm)", "inner radius (mm)", "depth (mm)"],
      ...slots.map(({ number, z, width, innerRadius, depth }) => [number, ...[z, width, innerRadius, depth].map(toMm)]),
    ],
  };
}

/** A length in mm, a ratio plain. */
const checkedText = (value: number | null, unit: MachiningVerdict["unit"]): string =>
  value === null ? "none" : unit === "m" ? `${decimal(toMm(value), value < 1e-4 ? 3 : 2)} mm` : decimal(value, 1);

const verdictWords: Record<MachiningWord, string> = {
  passes: "passes",
  barely: "asks for care",
  misses: "beyond the limit",
};

function machiningTable({ machining }: BuildSheet): SheetTable {
  return {
    columns: [{ label: "This horn" }, { label: "Usual" }, { label: "Limit" }],
    rows: machining.map(({ field, label, words, value, unit, usual, limit, verdict, sense }) => ({
      key: field,
      label,
      under: words,
      cells: [
        { text: checkedText(value, unit), word: verdictWords[verdict], verdict },
        { text: `${sense} ${checkedText(usual, unit)}` },
        { text: `${sense} ${checkedText(limit, unit)}` },
      ],
    })),
    caption: "Figures of common practice for turning aluminium and brass: ask the shop that will make it.",
    data: [
      ["check", "value", "unit", "sense", "usual", "limit", "verdict", "where"],
      ...machining.map(({ label, value, unit, sense, usual, limit, verdict, words }): (string | number)[] => {
        const shown = (one: number): number => (unit === "m" ? toMm(one) : one);
        const found = value === null ? "" : shown(value);
        return [label, found, unit === "m" ? "mm" : "", sense, shown(usual), shown(limit), verdict, words];
      }),
    ],
  };
}

function massTable({ masses, volume }: BuildSheet): SheetTable {
  return {
    columns: [{ label: "Density (g/cm³)" }, { label: "Mass (kg)" }],
    rows: masses.map(({ name, density, mass }) => ({
      key: name,
      label: name[0]!.toUpperCase() + name.slice(1),
      cells: [{ text: decimal(density / 1000, 2) }, { text: decimal(mass, mass < 0.1 ? 4 : 3) }],
    })),
    caption: `${decimal(volume * 1e6, 1)} cm³ of metal between the walls drawn, without flange and fixing.`,
    data: [
      ["metal", "density (kg/m³)", "mass (kg)"],
      ...masses.map(({ name, density, mass }): (string | number)[] => [name, density, mass]),
    ],
  };
}
