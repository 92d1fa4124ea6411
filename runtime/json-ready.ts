// Values of cells as JSON: SI numbers, lists, texts. What can't be written is named, never written as something else.

export type Json = null | boolean | number | string | Json[] | { [key: string]: Json };

export interface JsonReady {
  /** undefined for what has no place in JSON: a function, a class, undefined */
  json: Json | undefined;
  /** paths of numbers that are not finite, with what they are; null stands in their place: "rows[2].gainDbi is NaN" */
  notFinite: string[];
}

/**
 * A value as JSON. Typed arrays and sets become arrays; a map becomes an object if its keys are texts, else pairs; dates become ISO
 * texts; figures become { caption, alt }, prose its Markdown; functions are left out; a reference back to what holds it becomes null.
 */
export function jsonReady(value: unknown): JsonReady {
  const notFinite: string[] = [];
  const json = convert(value, "", [], (path, number) => notFinite.push(`${path || "the value"} is ${number}`));
  return { json, notFinite };
}

/** Where in a value the first number is that is not finite: "rows[2].gainDbi", "" for the value itself; undefined if all are. */
export function nonFinitePath(value: unknown): string | undefined {
  let found: string | undefined;
  convert(value, "", [], (path) => {
    found ??= path;
  });
  return found;
}

type OnNonFinite = (path: string, value: number) => void;

function convert(value: unknown, path: string, holders: object[], onNonFinite: OnNonFinite): Json | undefined {
  switch (typeof value) {
    case "number":
      if (Number.isFinite(value)) return value;
      onNonFinite(path, value);
      return null;
    case "string":
    case "boolean":
      return value;
    case "bigint":
      return String(value);
    case "object":
      break;
    default:
      return undefined;
  }
  if (value === null || holders.includes(value)) return null;
  holders.push(value);
  const json = convertObject(value, path, (inner, at) => convert(inner, at, holders, onNonFinite));
  holders.pop();
  return json;
}

type Inner = (value: unknown, path: string) => Json | undefined;

function convertObject(value: object, path: string, inner: Inner): Json {
  const list = (items: Iterable<unknown>): Json[] =>
    Array.from(items, (item, index) => inner(item, `${path}[${index}]`) ?? null);
  if (Array.isArray(value) || value instanceof Set) return list(value);
  if (ArrayBuffer.isView(value)) return value instanceof DataView ? null : list(value as unknown as Iterable<number>);
  if (value instanceof Date) return Number.isNaN(value.getTime()) ? null : value.toISOString();
  if (value instanceof Error) return { name: value.name, message: value.message };
  if (value instanceof Map) {
    const texts = [...value.keys()].every((key) => typeof key === "string");
    return texts ? fields([...value] as [string, unknown][], path, inner) : list(value);
  }
  return shownAsJson(value, path, inner) ?? fields(Object.entries(value), path, inner);
}

function fields(entries: readonly [string, unknown][], path: string, inner: Inner): Json {
  const json: { [key: string]: Json } = {};
  for (const [key, value] of entries) {
    const converted = inner(value, path === "" ? key : `${path}.${key}`);
    // A name such as __proto__ must become a field, not a prototype.
    if (converted !== undefined)
      Object.defineProperty(json, key, { value: converted, enumerable: true, configurable: true, writable: true });
  }
  return json;
}

/** What the page shows, in words: a figure by its caption and text alternative, prose by its text. */
function shownAsJson(value: object, path: string, inner: Inner): Json | undefined {
  const shown = value as Record<string, unknown>;
  switch (shown.shows) {
    case "note":
    case "lead":
      return String(shown.markdown);
    case "figure": {
      const alt = (shown.drawing as { alt?: unknown } | undefined)?.alt;
      const title = shown.title === undefined ? [] : [["title", shown.title] as [string, unknown]];
      return fields([...title, ["caption", shown.caption], ["alt", alt]], path, inner);
    }
    default:
      return undefined;
  }
}
