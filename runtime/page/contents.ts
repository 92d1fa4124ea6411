// The headings of the report as a quiet list, and the link that skips to the report.

import { html, showWhen } from "./dom.ts";
import type { PageContext } from "./options.ts";
import type { Section } from "./plan-entries.ts";
import { typeset } from "./typography.ts";

/** Fewer sections than this need no list. */
const fewest = 3;

export function contentsList(context: PageContext): {
  element: HTMLElement;
  update(sections: readonly Section[]): void;
} {
  const { document } = context;
  const list = html(document, "ol");
  const element = html(
    document,
    "nav",
    { class: "beside contents", "aria-label": "Contents" },
    html(document, "p", { class: "sort" }, "Contents"),
    list,
  );
  let shown = "";
  return {
    element,
    update(sections) {
      const titled = sections.filter((section) => section.title !== undefined);
      const next = JSON.stringify(titled.map(({ id, title }) => [id, title]));
      if (next === shown) return;
      shown = next;
      list.replaceChildren(
        ...titled.map(({ id, title }) =>
          html(document, "li", {}, html(document, "a", { href: `#${id}` }, typeset(title ?? ""))),
        ),
      );
      showWhen(element, titled.length >= fewest);
    },
  };
}
