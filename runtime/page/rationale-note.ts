// A rationale in the margin: what was decided and why, the numbers as agreed beside the numbers now, and what can be done about it.

import { restedText } from "../rationale-findings.ts";
import type { FormerAgreement, Rationale, RestedOn } from "../shown.ts";
import { html } from "./dom.ts";
import type { PageContext } from "./options.ts";
import { phrase, prose } from "./prose.ts";
import { typeset } from "./typography.ts";
import { countWord } from "./words.ts";

/** "30 November 2026" */
export function dayWords(date: string): string {
  const time = Date.parse(`${date}T00:00:00Z`);
  if (Number.isNaN(time)) return date;
  return new Intl.DateTimeFormat("en-GB", { day: "numeric", month: "long", year: "numeric", timeZone: "UTC" }).format(
    time,
  );
}

/** A difference of two levels is in plain decibels; no difference has an offset. */
const differenceText = (value: number, { unit, perUnit, digits }: RestedOn): string =>
  restedText(value, { unit: /^dB/.test(unit) ? "dB" : unit, perUnit, offset: 0, digits });

const slackText = (number: RestedOn): string => differenceText(number.tolerance, number);

/** "may move by 0.10 dBi"; moved ones say by how much they did. */
function verdict(number: RestedOn): string {
  if (!number.moved) return `may move by ${slackText(number)}`;
  if (number.now === null) return "moved: there is no such number any more";
  return `moved by ${differenceText(Math.abs(number.now - number.agreed), number)}, may by ${slackText(number)}`;
}

function numberLine(document: Document, number: RestedOn): HTMLElement {
  const value = (words: string, text: string) =>
    html(document, "span", { class: "value" }, html(document, "span", { class: "when" }, `${words} `), typeset(text));
  return html(
    document,
    "li",
    { "data-moved": number.moved },
    html(document, "span", { class: "label" }, typeset(number.label)),
    value("agreed", restedText(number.agreed, number)),
    value("now", restedText(number.now, number)),
    html(document, "span", { class: "verdict" }, typeset(verdict(number))),
  );
}

function history(document: Document, cell: string, former: readonly FormerAgreement[]): HTMLElement {
  const title = former.length === 1 ? "one former agreement" : `${countWord(former.length)} former agreements`;
  const entries = [...former]
    .reverse()
    .map(({ author, date, agreed }) =>
      html(
        document,
        "li",
        {},
        `${dayWords(date)}, ${author}: `,
        typeset(agreed.map((one) => `${one.label} ${restedText(one.value, one)}`).join(", ")),
      ),
    );
  return html(
    document,
    "details",
    { class: "history", id: `history-${cell}` },
    html(document, "summary", {}, title),
    html(document, "ul", {}, ...entries),
  );
}

/** Everything of the note below its first line. */
export function rationaleParts(context: PageContext, cell: string, rationale: Rationale): HTMLElement[] {
  const { document, live, still, writing } = context;
  const { decision, chosen, author, date, inherited, markdown, numbers } = rationale;
  const parts: HTMLElement[] = [
    html(document, "p", { class: "decision" }, ...phrase(document, decision)),
    inherited === undefined
      ? html(document, "p", { class: "who" }, typeset(`Chosen: ${chosen}. Agreed by ${author}, ${dayWords(date)}.`))
      : html(
          document,
          "p",
          { class: "who inherited" },
          html(document, "strong", {}, "Inherited, not yet confirmed."),
          typeset(` Chosen in ${inherited}: ${chosen}; agreed there by ${author}, ${dayWords(date)}.`),
        ),
    html(document, "div", { class: "saying" }, ...prose(document, markdown, 4)),
    html(document, "ul", { class: "rested" }, ...numbers.map((number) => numberLine(document, number))),
  ];
  if (rationale.history.length > 0) {
    const list = history(document, cell, rationale.history);
    // paper has no clicks: what was agreed before is printed
    if (still) list.setAttribute("open", "");
    parts.push(list);
  }
  if (live && writing) {
    const button = (label: string, act: () => void) => {
      const element = html(document, "button", { type: "button" }, label);
      element.addEventListener("click", act);
      return element;
    };
    const agree = inherited === undefined ? "agree again" : "agree";
    parts.push(
      html(
        document,
        "p",
        { class: "acts" },
        button(agree, () => writing.agreeAgain(cell)),
        " ",
        button("edit", () => writing.editRationale(cell)),
      ),
    );
  }
  return parts;
}
