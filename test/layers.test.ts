// The rooms and the one way in which imports point. DEVELOPERS.md draws the same picture.

import { readdirSync, readFileSync } from "node:fs";
import { dirname, join, posix, relative, sep } from "node:path";
import { fileURLToPath } from "node:url";
import { parse } from "@babel/parser";
import { expect, test } from "vitest";

const root = join(dirname(fileURLToPath(import.meta.url)), "..");

/** Rooms of cells/ from left to right: an import points to the left or stays in its room. The files beside them are the ground. */
const cellRooms = [
  "math",
  "guide",
  "pattern",
  "radiation",
  "matching",
  "fullwave",
  "horn",
  "reflector",
  "noise",
  "trade",
  "figures",
];

/** What each room may import besides itself. */
const mayImport: Record<string, readonly string[]> = {
  cells: [],
  runtime: [],
  notebooks: ["runtime", "cells"],
  build: ["runtime", "cells", "notebooks"],
  test: ["runtime", "cells", "notebooks", "build"],
};

/** Packages that physics may use; figures draw with more. */
const cellPackages = /^@stdlib\/|^d3-dsv$/;
const figurePackages = /^@observablehq\/plot$|^d3-contour$|^d3-dsv$|dxf/;

interface Import {
  from: string;
  to: string;
  line: number;
}

function sources(folder: string): string[] {
  return readdirSync(join(root, folder), { withFileTypes: true }).flatMap((entry) => {
    const path = posix.join(folder, entry.name);
    if (entry.isDirectory()) return ["node_modules", "assembly"].includes(entry.name) ? [] : sources(path);
    return /\.(ts|mjs)$/.test(entry.name) && !/\.as\.ts$/.test(entry.name) ? [path] : [];
  });
}

/** Specifiers of static imports, re-exports and import("…"). */
function importsOf(file: string): Import[] {
  const ast = parse(readFileSync(join(root, file), "utf8"), { sourceType: "module", plugins: ["typescript"] });
  const found: Import[] = [];
  const visit = (node: unknown): void => {
    if (Array.isArray(node)) for (const each of node) visit(each);
    if (Array.isArray(node)) return;
    if (typeof node !== "object" || node === null) return;
    const { type, source, loc } = node as {
      type?: string;
      source?: { value?: unknown };
      loc?: { start: { line: number } };
    };
    if (type !== undefined && /^(Import|Export)/.test(type) && typeof source?.value === "string")
      found.push({ from: file, to: source.value, line: loc?.start.line ?? 0 });
    for (const [key, value] of Object.entries(node)) if (key !== "loc" && key !== "errors") visit(value);
  };
  visit(ast.program);
  return found;
}

const resolved = ({ from, to }: Import): string =>
  to.startsWith(".")
    ? relative(root, join(root, dirname(from), to))
        .split(sep)
        .join("/")
    : to;

const files = Object.keys(mayImport).flatMap(sources);
const imports = files.flatMap(importsOf);
const roomOf = (path: string): string => path.split("/")[0]!;
const cellRoomOf = (path: string): string | undefined => {
  const [, room, rest] = path.split("/");
  return rest === undefined ? undefined : room;
};
const told = ({ from, to, line }: Import): string => `${from}:${line} imports ${to}`;

test("layers: there is something to look at", () => {
  expect(files.length).toBeGreaterThan(200);
  expect(imports.length).toBeGreaterThan(500);
});

test("layers: no import leaves its room against the arrows", () => {
  const against = imports.filter((one) => {
    if (!one.to.startsWith(".")) return false;
    const [from, to] = [roomOf(one.from), roomOf(resolved(one))];
    return from !== to && !(mayImport[from] ?? []).includes(to);
  });
  // a browser test hands the page's code to the bundler as text, which isn't an import
  expect(against.map(told)).toEqual([]);
});

test("layers: in cells/ imports point to the left only", () => {
  const unknown = files.filter((file) => roomOf(file) === "cells" && !cellRooms.includes(cellRoomOf(file) ?? "math"));
  expect(unknown).toEqual([]);
  const against = imports.filter((one) => {
    if (roomOf(one.from) !== "cells" || !one.to.startsWith(".") || one.from === "cells/index.ts") return false;
    const [from, to] = [cellRoomOf(one.from), cellRoomOf(resolved(one))];
    if (from === undefined) return to !== undefined;
    return to !== undefined && cellRooms.indexOf(to) > cellRooms.indexOf(from);
  });
  expect(against.map(told)).toEqual([]);
});

test("layers: physics draws nothing and knows no runtime, page or disk", () => {
  const foreign = imports.filter(
    (one) =>
      roomOf(one.from) === "cells" &&
      !one.to.startsWith(".") &&
      !(cellRoomOf(one.from) === "figures" ? figurePackages : cellPackages).test(one.to),
  );
  expect(foreign.map(told)).toEqual([]);
});

test("layers: nothing imports a file that imports it", () => {
  const next = new Map<string, string[]>(files.map((file) => [file, []]));
  for (const one of imports) if (one.to.startsWith(".")) next.get(one.from)!.push(resolved(one));
  const state = new Map<string, "open" | "done">();
  const cycles: string[] = [];
  const walk = (file: string, path: readonly string[]): void => {
    if (state.get(file) === "done") return;
    if (state.get(file) === "open") {
      cycles.push([...path.slice(path.indexOf(file)), file].join(" → "));
      return;
    }
    state.set(file, "open");
    for (const to of next.get(file) ?? []) walk(to, [...path, file]);
    state.set(file, "done");
  };
  for (const file of files) walk(file, []);
  expect(cycles).toEqual([]);
});
