// Whether a value that says it can be shown has all that its kind needs. Types say so first, but a notebook also runs with faults in
// its types, and one caption that is no text must not take the whole page with it.

import { isShown } from "./shown.ts";

/** What is wrong with a value, as "rows[2].label must be text; got undefined"; undefined when nothing is. */
type Check = (value: unknown, path: string) => string | undefined;

const got = (value: unknown): string => {
  if (value === null || value === undefined || typeof value === "boolean") return String(value);
  if (typeof value === "number" || typeof value === "bigint") return String(value);
  if (typeof value === "string") return JSON.stringify(value.slice(0, 40));
  return Array.isArray(value) ? "a list" : typeof value === "object" ? "an object" : `a ${typeof value}`;
};

const must =
  (what: string, test: (value: unknown) => boolean): Check =>
  (value, path) =>
    test(value) ? undefined : `${path} must be ${what}; got ${got(value)}`;

const text = must("text", (value) => typeof value === "string");
const number = must("a finite number", Number.isFinite);
const isObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === "object" && value !== null && !Array.isArray(value);

const optional =
  (check: Check): Check =>
  (value, path) =>
    value === undefined ? undefined : check(value, path);

const list =
  (check: Check): Check =>
  (value, path) => {
    if (!Array.isArray(value)) return `${path} must be a list; got ${got(value)}`;
    for (const [i, item] of value.entries()) {
      const fault = check(item, `${path}[${i}]`);
      if (fault !== undefined) return fault;
    }
    return undefined;
  };

const fields =
  (checks: Record<string, Check>): Check =>
  (value, path) => {
    if (!isObject(value)) return `${path} must be an object; got ${got(value)}`;
    for (const [name, check] of Object.entries(checks)) {
      const fault = check(value[name], path === "" ? name : `${path}.${name}`);
      if (fault !== undefined) return fault;
    }
    return undefined;
  };

const data = optional(list(must("a row of values", Array.isArray)));
const anyOf =
  (first: Check, second: Check): Check =>
  (value, path) =>
    first(value, path) === undefined ? undefined : second(value, path);
const unit = { unit: text, perUnit: number, offset: number, digits: number };

const kinds = {
  head: fields({ document: text, title: text, facts: list(list(text)) }),
  note: fields({ markdown: text }),
  lead: fields({ markdown: text }),
  margin: fields({ mark: text, markdown: text, row: optional(text) }),
  caution: fields({ title: text, markdown: text }),
  figure: fields({
    ...{ title: optional(text), caption: text, basis: optional(text) },
    drawing: fields({ alt: text, draw: must("a function", (value) => typeof value === "function"), data }),
  }),
  table: fields({
    ...{ title: optional(text), caption: optional(text), basis: optional(text), data },
    columns: list(fields({ label: text, kind: optional(text) })),
    rows: list(
      fields({
        ...{ key: optional(text), label: text, under: optional(text) },
        cells: anyOf(text, list(fields({ text, word: optional(text), verdict: optional(text) }))),
      }),
    ),
  }),
  rationale: fields({
    ...{ decision: text, chosen: text, markdown: text, author: text, date: text, inherited: optional(text) },
    numbers: list(
      fields({
        ...{ label: text, agreed: number, tolerance: number, ...unit },
        now: anyOf(
          must("null", (value) => value === null),
          number,
        ),
      }),
    ),
    history: list(fields({ author: text, date: text, agreed: list(fields({ label: text, value: number, ...unit })) })),
  }),
} satisfies Record<string, Check>;

/**
 * @throws {TypeError} a value that says it can be shown and can't: "table: rows[2].label must be text; got undefined"
 */
export function requireShowable(value: unknown): void {
  if (!isShown(value)) return;
  const kind: string = value.shows;
  if (!Object.hasOwn(kinds, kind))
    throw new TypeError(
      `a value with a field "shows" must be one of ${Object.keys(kinds).join(", ")}; got ${got(kind)}`,
    );
  const fault = kinds[kind as keyof typeof kinds](value, "");
  if (fault !== undefined) throw new TypeError(`${kind}: ${fault}`);
}
