/**
 * Where in a value the first number is that is not finite: "rows[2].gainDbi is NaN"; undefined if all are. Looks into arrays, typed
 * arrays, maps, sets and fields of objects; functions are not entered.
 */
export function nonFinitePath(value: unknown): string | undefined {
  return search(value, "", new Set());
}

function search(value: unknown, path: string, seen: Set<object>): string | undefined {
  if (typeof value === "number") return Number.isFinite(value) ? undefined : `${path || "the value"} is ${value}`;
  if (typeof value !== "object" || value === null || seen.has(value)) return undefined;
  seen.add(value);
  const inner: Iterable<[unknown, unknown]> =
    value instanceof Map
      ? value.entries()
      : Array.isArray(value) || value instanceof Set || (ArrayBuffer.isView(value) && !(value instanceof DataView))
        ? numbered(value as Iterable<unknown>)
        : Object.entries(value);
  const list = Symbol.iterator in value && !(value instanceof Map);
  for (const [key, item] of inner) {
    const at = list ? `${path}[${key}]` : path === "" ? String(key) : `${path}.${key}`;
    const found = search(item, at, seen);
    if (found !== undefined) return found;
  }
  return undefined;
}

function* numbered(items: Iterable<unknown>): Iterable<[number, unknown]> {
  let index = 0;
  for (const item of items) yield [index++, item];
}
