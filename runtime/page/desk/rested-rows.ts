// The rows of a rationale's form in which the numbers stand that it rests on.

import type { RationaleDraft } from "../../desk.ts";
import { html } from "../dom.ts";
import { formField } from "./form.ts";

export interface RestedRows {
  readonly element: HTMLElement;
  /** rows with anything in them */
  read(): RationaleDraft["numbers"];
}

const names = ["label", "expression", "unit", "tolerance"] as const;
const labels = { label: "Called", expression: "Number", unit: "Unit", tolerance: "May move by" };

/** @param paths proposals for the number */
export function restedRows(document: Document, first: RationaleDraft["numbers"], paths: readonly string[]): RestedRows {
  const listId = `numbers-${Math.random().toString(36).slice(2)}`;
  const list = html(
    document,
    "datalist",
    { id: listId },
    ...paths.map((path) => html(document, "option", { value: path })),
  );
  const rows: Record<(typeof names)[number], HTMLInputElement>[] = [];
  const body = html(document, "div", { class: "rows" });
  const add = (number?: RationaleDraft["numbers"][number]) => {
    const fields = names.map((name) => ({
      name,
      ...formField(document, {
        name,
        label: labels[name],
        value: number?.[name] ?? "",
        list: name === "expression" ? listId : undefined,
      }),
    }));
    rows.push(Object.fromEntries(fields.map(({ name, input }) => [name, input])) as (typeof rows)[number]);
    body.append(
      html(
        document,
        "div",
        { class: "row", role: "group", "aria-label": `number ${rows.length}` },
        ...fields.map(({ element }) => element),
      ),
    );
  };
  for (const number of first) add(number);
  if (first.length === 0) add();
  const more = html(document, "button", { type: "button" }, "another number");
  more.addEventListener("click", () => {
    add();
    rows.at(-1)?.label.focus();
  });
  const hint =
    "A number is written as the notebook reads it: trade.rows[2].gainDbi. Unit and slack as agreed: dBi and 0.1 dBi. A row that is emptied is left out.";
  return {
    element: html(
      document,
      "fieldset",
      { class: "rested-rows" },
      html(document, "legend", {}, "Numbers it rests on"),
      html(document, "p", { class: "hint" }, hint),
      body,
      more,
      list,
    ),
    read: () =>
      rows
        .map((row) => Object.fromEntries(names.map((name) => [name, row[name].value.trim()])))
        .filter((row) => Object.values(row).some((text) => text !== "")) as RationaleDraft["numbers"],
  };
}
