// What is to be said of a rationale: that a number it rests on has moved, or that nobody has agreed to it here yet.

import { fixedPrint, withUnit } from "./print.ts";
import type { Rationale, RestedUnit } from "./shown.ts";

export interface RationaleFinding {
  code: "moved" | "inherited";
  text: string;
}

/** A number that was rested on, in its own unit and with the digits it was agreed with: "44.71 dBi". */
export function restedText(value: number | null, { unit, perUnit, offset, digits }: RestedUnit): string {
  return value === null ? "no value" : withUnit(fixedPrint((value - offset) / perUnit, digits), unit);
}

/** One sentence for each number that moved, one for an agreement that was only inherited. */
export function rationaleFindings({ decision, numbers, inherited }: Rationale): RationaleFinding[] {
  const moved = numbers
    .filter((number) => number.moved)
    .map(
      (number): RationaleFinding => ({
        code: "moved",
        text: `"${decision}" rests on ${number.label}, agreed as ${restedText(number.agreed, number)}, now ${restedText(number.now, number)}.`,
      }),
    );
  if (inherited === undefined) return moved;
  return [{ code: "inherited", text: `"${decision}" is inherited from ${inherited}, not yet confirmed.` }, ...moved];
}
