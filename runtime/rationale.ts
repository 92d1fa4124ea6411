// A decision beside its numbers: what was chosen and why, the numbers it rested on as agreed that day, and whether they still hold.

import { parseQuantity, QuantityError, type Unit, unitNamed } from "./quantity.ts";
import type { FormerAgreement, Rationale, RestedOn, RestedUnit } from "./shown.ts";

export interface RestsOnDetails {
  /** the number as agreed, with its unit: "44.71 dBi", "96.6 mm" */
  agreed: string;
  /** by how much it may move either way before the decision has to be looked at again, in the same unit: "0.1 dBi" */
  mayMove: string;
}

/**
 * A number that a decision rests on, for a rationale's `numbers`.
 * @param now the live number: SI, or a level in decibels; null where there is none any more
 * @throws {TypeError | RangeError} no label, texts that are no quantity of one kind, nothing it may move by, `now` not finite
 */
export function restsOn(label: string, now: number | null, details: RestsOnDetails): RestedOn {
  if (typeof label !== "string" || label.trim() === "")
    throw new TypeError("restsOn: label must say which number it is");
  if (now !== null && !Number.isFinite(now)) throw new RangeError(`restsOn: ${label} must be finite; got ${now}`);
  if (typeof details?.agreed !== "string" || typeof details.mayMove !== "string")
    throw new TypeError(`restsOn: ${label} needs agreed and mayMove as texts like "96.6 mm"`);
  const { agreed, mayMove } = details;
  const then = read(`restsOn: the agreed value of ${label}`, agreed);
  const unit = unitNamed(then.unit);
  const slack = read(`restsOn: what ${label} may move by`, mayMove, then.unit);
  const tolerance = Math.abs(slack.value - unit.offset);
  if (!(tolerance > 0)) throw new RangeError(`restsOn: what ${label} may move by must be above 0; got ${mayMove}`);
  return {
    label,
    agreed: then.value,
    now,
    tolerance,
    ...restedUnit(unit, then.digits),
    moved: now === null || Math.abs(now - then.value) > tolerance * (1 + 1e-9),
  };
}

export interface RationaleDetails {
  /** what was decided, one sentence */
  decision: string;
  /** the candidate chosen, in the study's own word */
  chosen: string;
  author: string;
  /** day of the agreement, "2026-11-30" */
  date: string;
  /** why: a note`…` with live numbers, or plain text */
  reasons: { markdown: string } | string;
  numbers: readonly RestedOn[];
  /** former agreements, oldest first; "agree again" on the page adds to them */
  history?: readonly { author: string; date: string; agreed: Readonly<Record<string, string>> }[];
  /** the file this was forked from; taken away when someone agrees here */
  inherited?: string;
}

/**
 * A decision with what it rests on, alone as the value of a top-level const; it stands in the margin beside a figure or table:
 *
 *     export const feedChosen = rationale(tradeView, {
 *       decision: "Build the corrugated horn.",
 *       chosen: "corrugated",
 *       author: "R. Aldous",
 *       date: "2026-11-30",
 *       reasons: note`It alone keeps ${show(crossPolarLimit, "dB", 0)} over the band.`,
 *       numbers: [restsOn("Gain, worst", row.worst.gainDbi, { agreed: "44.71 dBi", mayMove: "0.1 dBi" })],
 *     });
 *
 * @param beside the cell itself, by its name
 * @throws {TypeError | RangeError} an empty text, a date that is none, no numbers, a history that can't be read
 */
export function rationale(beside: unknown, details: RationaleDetails): Rationale {
  void beside;
  if (typeof details !== "object" || details === null)
    throw new TypeError("rationale: needs what was decided, why and on which numbers as its second argument");
  const { decision, chosen, author, date, reasons, numbers, history = [], inherited } = details;
  for (const [name, text] of Object.entries({ decision, chosen, author }))
    if (typeof text !== "string" || text.trim() === "")
      throw new TypeError(`rationale: ${name} must be said in words; got nothing`);
  if (!Array.isArray(numbers) || numbers.length === 0)
    throw new RangeError("rationale: numbers must hold at least one number that the decision rests on; got none");
  if (!numbers.every((one) => typeof one?.label === "string"))
    throw new TypeError("rationale: numbers must each be written by restsOn(…)");
  if (typeof reasons !== "string" && typeof reasons?.markdown !== "string")
    throw new TypeError("rationale: reasons must be a note or text; got nothing");
  if (!Array.isArray(history) || !history.every((one) => typeof one?.agreed === "object" && one.agreed !== null))
    throw new TypeError("rationale: history must be a list of { author, date, agreed }");
  const labels = numbers.map(({ label }: RestedOn) => label);
  const twice = labels.find((label, i) => labels.indexOf(label) !== i);
  if (twice !== undefined)
    throw new RangeError(`rationale: each number must have a label of its own; got "${twice}" twice`);
  return {
    shows: "rationale",
    ...{ decision, chosen, author, date: day("rationale: date", date) },
    markdown: typeof reasons === "string" ? reasons : reasons.markdown,
    ...(inherited === undefined ? {} : { inherited }),
    numbers: [...numbers],
    history: history.map(former),
  };
}

function restedUnit({ text, scale, offset }: Unit, digits: number): RestedUnit {
  return { unit: text, perUnit: scale, offset, digits };
}

function former({ author, date, agreed }: NonNullable<RationaleDetails["history"]>[number]): FormerAgreement {
  return {
    author,
    date: day("rationale: date of a former agreement", date),
    agreed: Object.entries(agreed).map(([label, text]) => {
      const { value, unit, digits } = read(`rationale: the former ${label}`, text);
      return { label, value, ...restedUnit(unitNamed(unit), digits) };
    }),
  };
}

function read(what: string, text: string, unitText?: string): { value: number; unit: string; digits: number } {
  try {
    const { value, unit, text: tidy } = parseQuantity(text, unitText === undefined ? undefined : unitNamed(unitText));
    const [, decimals = ""] = /^[+-]?\d*\.?(\d*)/.exec(tidy) ?? [];
    return { value, unit: unit.text, digits: Math.min(15, decimals.length) };
  } catch (error) {
    if (error instanceof QuantityError) throw new RangeError(`${what} ${error.message}`);
    throw error;
  }
}

/** @throws {RangeError} not a day of the calendar, written as ISO 8601 does */
function day(what: string, text: string): string {
  const time = /^\d{4}-\d{2}-\d{2}$/.test(text) ? Date.parse(`${text}T00:00:00Z`) : Number.NaN;
  if (Number.isNaN(time) || new Date(time).toISOString().slice(0, 10) !== text)
    throw new RangeError(`${what} must be a day like 2026-11-30; got ${text}`);
  return text;
}
