// A thin line between the least and the most, and a small tick at the value in the file.

import type { GivenView } from "../study.ts";
import { html, setAttribute, svg } from "./dom.ts";
import type { PageContext } from "./options.ts";
import { readQuantity, type Scale, scaleOf, type Unit, unitOf } from "./scale.ts";
import { typeset } from "./typography.ts";

// Width of the line and of the knob, px, as in the style sheet.
const width = 100;
const knob = 11;

export interface Slider {
  readonly element: HTMLElement;
  update(given: GivenView, changed: boolean): void;
}

/** `turned` hears each new position as text, while it is being turned. */
export function slider(context: PageContext, given: GivenView, turned: (text: string) => void): Slider {
  const { document, live } = context;
  let unit: Unit | undefined;
  let scale: Scale | undefined;
  let pressed = false;
  const input = html(document, "input", {
    type: "range",
    min: 0,
    step: 1,
    "aria-label": `${given.label}, slider`,
    disabled: !live,
  });
  const tick = svg(document, "svg", {
    class: "tick",
    viewBox: `0 0 ${width} 6`,
    width,
    height: 6,
    "aria-hidden": "true",
  });
  const element = html(document, "span", { class: "slide" }, input, tick);

  input.addEventListener("input", () => {
    const text = scale?.textAt(Number(input.value));
    if (text === undefined) return;
    setAttribute(input, "aria-valuetext", typeset(text));
    turned(text);
  });
  input.addEventListener("pointerdown", () => (pressed = true));
  for (const end of ["pointerup", "pointercancel", "blur"]) input.addEventListener(end, () => (pressed = false));

  return {
    element,
    update(next, changed) {
      unit = unitOf(next, unit);
      scale = scaleOf(next, unit);
      setAttribute(element, "hidden", scale ? undefined : "");
      if (!scale || !unit || typeof next.value !== "number") return;
      setAttribute(input, "max", String(scale.last));
      const position = String(scale.positionOf(next.value));
      setAttribute(input, "value", position);
      // While it is held, the hand is ahead of the study: the knob is the hand's.
      if (live && !pressed && input.value !== position) input.value = position;
      if (!pressed) setAttribute(input, "aria-valuetext", typeset(next.text));
      const file = readQuantity(next.defaultText);
      const at =
        changed && file?.unit === unit.name ? scale.positionOf(file.number * unit.factor) / scale.last : undefined;
      tick.replaceChildren();
      if (at === undefined) return;
      const x = knob / 2 + at * (width - knob);
      tick.append(
        svg(document, "rect", { x: (x - 0.75).toFixed(2), y: 0, width: 1.5, height: 6, fill: "currentColor" }),
      );
    },
  };
}
