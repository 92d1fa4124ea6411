// Rationales as source: written, edited, agreed to again, marked as inherited.

import { children, type Node } from "../compile/syntax.ts";
import type { RationaleDraft } from "../desk.ts";
import { inUnit, parseQuantity, type Quantity, QuantityError, unitNamed } from "../quantity.ts";
import { insertAfter, namesBefore } from "./cells.ts";
import {
  argumentsOf,
  callOf,
  draftNamed,
  type Edit,
  indentAt,
  propertyOf,
  RewriteRefused,
  rewritten,
  type SourceView,
  textOf,
  valueNode,
  viewSource,
  withoutProperty,
} from "./edit.ts";
import { withVocabulary } from "./imports.ts";
import { proseTemplate, safeExpression, stringLiteral } from "./literal.ts";

/** The second argument of a cell's rationale(…). */
function detailsOf(view: SourceView, cell: string): Node {
  const found = callOf(draftNamed(view, cell));
  const details = found && argumentsOf(found.call)[1];
  if (found?.path.at(-1) !== "rationale" || details?.type !== "ObjectExpression")
    throw new RewriteRefused(`${view.file}: ${cell} is no rationale written out as an object`);
  return details;
}

/** The restsOn(…) calls of a rationale by their label. */
function numbersOf(view: SourceView, details: Node): Map<string, { call: Node; expression: string; details: Node }> {
  const list = valueNode(propertyOf(details, "numbers"));
  const found = new Map<string, { call: Node; expression: string; details: Node }>();
  for (const call of list ? children(list, "elements") : []) {
    const [label, now, rest] = call.type === "CallExpression" ? argumentsOf(call) : [];
    const text = textOf(label);
    if (text !== undefined && now && rest)
      found.set(text, { call, expression: view.source.slice(now.start, now.end), details: rest });
  }
  return found;
}

/** @throws {RewriteRefused} not a quantity, or of another kind */
function quantityOf(text: string, unitText?: string): Quantity {
  try {
    return parseQuantity(text, unitText === undefined ? undefined : unitNamed(unitText));
  } catch (error) {
    throw error instanceof QuantityError ? new RewriteRefused(`a number ${error.message}`) : error;
  }
}

/** A number as it is agreed: with as many digits as make the rounding a twentieth of what it may move by. */
function agreedText(now: number, unitText: string, mayMove: string): string {
  const unit = unitNamed(unitText);
  const slack = Math.abs(inUnit(quantityOf(mayMove, unitText).value, unit));
  const digits = Math.min(12, Math.max(0, Math.ceil(-Math.log10(slack / 20)) - 1));
  const number = inUnit(now, unit).toFixed(digits);
  return unit.text === "" ? number : `${number} ${unit.text}`;
}

function restsOnText(number: RationaleDraft["numbers"][number], now: number, known: ReadonlySet<string>): string {
  const { label, expression, unit, tolerance } = number;
  if (label.trim() === "") throw new RewriteRefused("a number that the rationale rests on has no label");
  if (!Number.isFinite(now)) throw new RewriteRefused(`${label} has no number now, so it can't be agreed to`);
  try {
    const mayMove = parseQuantity(tolerance, unitNamed(unit));
    const details = `{ agreed: ${stringLiteral(agreedText(now, unit, tolerance))}, mayMove: ${stringLiteral(mayMove.text)} }`;
    return `restsOn(${stringLiteral(label.trim())}, ${safeExpression(expression, known)}, ${details})`;
  } catch (error) {
    if (error instanceof RewriteRefused) throw error;
    throw new RewriteRefused(`what ${label} may move by ${error instanceof Error ? error.message : String(error)}`);
  }
}

function reasonsText(reasons: string, known: ReadonlySet<string>): string {
  return `note\`${proseTemplate(reasons.trim(), known)}\``;
}

/** A property that is a list, as the project's formatter writes it: on one line if it fits, unless it lists several objects. */
function listText(name: string, items: readonly string[], indent: string): string {
  const line = `[${items.join(", ")}]`;
  const objects = items.length > 1 && items.every((item) => item.startsWith("{"));
  if (!objects && !line.includes("\n") && `${indent}${name}: ${line},`.length <= 120) return line;
  return `[\n${items.map((item) => `${indent}  ${item},\n`).join("")}${indent}]`;
}

/** A name for a new rationale: corrugatedChosen, corrugatedChosen2 … */
function freshName({ module }: SourceView, chosen: string): string {
  const words = chosen.normalize("NFKD").match(/[A-Za-z0-9]+/g) ?? ["feed"];
  const joined = words
    .map((word, i) => (i === 0 ? word[0]!.toLowerCase() : word[0]!.toUpperCase()) + word.slice(1))
    .join("");
  const stem = `${/^[a-z]/.test(joined) ? joined : `feed${joined}`}Chosen`;
  const taken = new Set([...module.drafts.map(({ name }) => name), ...module.imports.keys(), ...module.ambient]);
  for (let i = 1; ; i++) {
    const name = i === 1 ? stem : `${stem}${i}`;
    if (!taken.has(name)) return name;
  }
}

function requireWords(draft: RationaleDraft): void {
  for (const name of ["decision", "chosen", "reasons", "author"] as const)
    if (draft[name].trim() === "") throw new RewriteRefused(`the rationale's ${name} has no words yet`);
  if (draft.numbers.length === 0) throw new RewriteRefused("a rationale rests on at least one number");
}

/**
 * Writes a new rationale after the cell beside which it stands, or after the last cell that it reads.
 * @param now   the numbers as they are, SI, in the draft's order: they are agreed
 * @param today "2026-11-30"
 * @returns the new source and the rationale's name
 * @throws {RewriteRefused} words or numbers missing, an expression that does more than read
 */
export function addRationale(
  source: string,
  file: string,
  { beside, draft, now, today }: { beside: string; draft: RationaleDraft; now: readonly number[]; today: string },
): { source: string; name: string } {
  const view = viewSource(source, file);
  const cell = draftNamed(view, beside);
  if (cell.node.type === "ExpressionStatement")
    throw new RewriteRefused(`a rationale stands beside a named cell; give the value of ${beside} a name first`);
  requireWords(draft);
  const everywhere = namesBefore(view, source.length);
  const texts = [draft.reasons, ...draft.numbers.map(({ expression }) => expression)].join(" ");
  const end = view.module.drafts
    .filter(
      ({ name }) =>
        name === beside || (everywhere.has(name) && new RegExp(`\\b${name.replace(/\$/g, "\\$")}\\b`).test(texts)),
    )
    .reduce((last, { sourceEnd }) => Math.max(last, sourceEnd), cell.sourceEnd);
  const known = namesBefore(view, end);
  const name = freshName(view, draft.chosen);
  const exported = source.slice(cell.statement.start, cell.statement.start + 6) === "export" ? "export " : "";
  const statement = `${exported}const ${name} = rationale(${beside}, {
  decision: ${stringLiteral(draft.decision.trim())},
  chosen: ${stringLiteral(draft.chosen.trim())},
  author: ${stringLiteral(draft.author.trim())},
  date: ${stringLiteral(today)},
  reasons: ${reasonsText(draft.reasons, known)},
  numbers: ${listText(
    "numbers",
    draft.numbers.map((number, i) => restsOnText(number, now[i] ?? Number.NaN, known)),
    "  ",
  )},
});`;
  const names = ["note", "rationale", "restsOn", ...(/\bshow\(/.test(statement) ? ["show"] : [])];
  return { source: rewritten(view, [...withVocabulary(view, names), insertAfter(view, end, statement)]), name };
}

/**
 * Writes new words or numbers into a rationale. A number that was there, under its label and expression, keeps what was agreed;
 * a new one is agreed as it is now.
 * @throws {RewriteRefused} as `addRationale`
 */
export function editRationale(
  source: string,
  file: string,
  { cell, draft, now }: { cell: string; draft: RationaleDraft; now: readonly number[] },
): string {
  const view = viewSource(source, file);
  const details = detailsOf(view, cell);
  requireWords(draft);
  const known = namesBefore(view, draftNamed(view, cell).sourceStart);
  const edits: Edit[] = [];
  const put = (name: string, text: string, was?: string) => {
    const value = valueNode(propertyOf(details, name));
    if (!value) throw new RewriteRefused(`${file}: the rationale ${cell} has no ${name}`);
    if (was === undefined || was !== text) edits.push({ start: value.start, end: value.end, text });
  };
  for (const name of ["decision", "chosen", "author"] as const) {
    const value = valueNode(propertyOf(details, name));
    if (textOf(value) !== draft[name].trim()) put(name, stringLiteral(draft[name].trim()));
  }
  const reasons = valueNode(propertyOf(details, "reasons"));
  const written = reasonsText(draft.reasons, known);
  if (!reasons || source.slice(reasons.start, reasons.end) !== written) put("reasons", written);
  const were = numbersOf(view, details);
  const numbers = draft.numbers.map((number, i) => {
    const was = were.get(number.label.trim());
    const text = restsOnText(number, now[i] ?? Number.NaN, known);
    if (was?.expression !== number.expression.trim()) return text;
    const agreed = textOf(valueNode(propertyOf(was.details, "agreed")));
    const sameUnit = agreed !== undefined && quantityOf(agreed).unit.text === number.unit;
    return sameUnit ? text.replace(/agreed: "(?:[^"\\]|\\.)*"/, () => `agreed: ${stringLiteral(agreed)}`) : text;
  });
  const list = valueNode(propertyOf(details, "numbers"));
  const rested = listText("numbers", numbers, list ? indentAt(source, list.start) : "  ");
  if (!list || source.slice(list.start, list.end) !== rested) put("numbers", rested);
  const names = ["note", "restsOn", ...(/\bshow\(/.test(written) ? ["show"] : [])];
  return rewritten(view, [...withVocabulary(view, names), ...edits]);
}

/** Text of a former agreement as one entry of `history`. */
function formerText(view: SourceView, details: Node): string {
  const text = (name: string): string => textOf(valueNode(propertyOf(details, name))) ?? "";
  const agreed = [...numbersOf(view, details)].map(([label, { details: rest }]) => {
    const value = textOf(valueNode(propertyOf(rest, "agreed"))) ?? "";
    return `${/^[A-Za-z_$][\w$]*$/.test(label) ? label : stringLiteral(label)}: ${stringLiteral(value)}`;
  });
  return `{ author: ${stringLiteral(text("author"))}, date: ${stringLiteral(text("date"))}, agreed: { ${agreed.join(", ")} } }`;
}

/**
 * Renews an agreement: the numbers as they are now, today, by this author. The former one goes to the end of the history, unless
 * nobody had agreed to it here; what was inherited is confirmed.
 * @param now by label, SI
 * @throws {RewriteRefused} a number without a value now
 */
export function agreeAgain(
  source: string,
  file: string,
  { cell, author, now, today }: { cell: string; author: string; now: Readonly<Record<string, number>>; today: string },
): string {
  const view = viewSource(source, file);
  const details = detailsOf(view, cell);
  if (author.trim() === "") throw new RewriteRefused("who agrees must be said");
  const edits: Edit[] = [];
  const put = (property: Node | undefined, text: string) => {
    const value = valueNode(property);
    if (!value) throw new RewriteRefused(`${file}: the rationale ${cell} isn't written out in full`);
    if (textOf(value) !== JSON.parse(text)) edits.push({ start: value.start, end: value.end, text });
  };
  put(propertyOf(details, "author"), stringLiteral(author.trim()));
  put(propertyOf(details, "date"), stringLiteral(today));
  for (const [label, number] of numbersOf(view, details)) {
    const live = Object.hasOwn(now, label) ? now[label]! : Number.NaN;
    if (!Number.isFinite(live)) throw new RewriteRefused(`${label} has no number now, so it can't be agreed to`);
    const mayMove = textOf(valueNode(propertyOf(number.details, "mayMove"))) ?? "";
    const agreed = textOf(valueNode(propertyOf(number.details, "agreed"))) ?? "";
    put(propertyOf(number.details, "agreed"), stringLiteral(agreedText(live, quantityOf(agreed).unit.text, mayMove)));
  }
  edits.push(historyEdit(view, details));
  const inherited = propertyOf(details, "inherited");
  if (inherited) edits.push(withoutProperty(source, inherited));
  return rewritten(view, edits);
}

function historyEdit(view: SourceView, details: Node): Edit {
  const entry = formerText(view, details);
  const list = valueNode(propertyOf(details, "history"));
  if (list?.type === "ArrayExpression") {
    const former = children(list, "elements").map(({ start, end }) => view.source.slice(start, end));
    const text = listText("history", [...former, entry], indentAt(view.source, list.start));
    return { start: list.start, end: list.end, text };
  }
  // behind the numbers, on a line of its own like them
  const anchor = propertyOf(details, "numbers");
  if (!anchor) throw new RewriteRefused(`${view.file}: the rationale has no numbers to agree to`);
  const indent = indentAt(view.source, anchor.start);
  const text = `,\n${indent}history: ${listText("history", [entry], indent)}`;
  return { start: anchor.end, end: anchor.end, text };
}

/** Marks every rationale as inherited from a file: nobody has agreed to it for the new dish. */
export function inheritedEdits(view: SourceView, from: string): Edit[] {
  return view.module.drafts.flatMap((draft) => {
    const found = callOf(draft);
    if (found?.path.at(-1) !== "rationale") return [];
    const details = argumentsOf(found.call)[1];
    if (details?.type !== "ObjectExpression") return [];
    const text = stringLiteral(from);
    const property = propertyOf(details, "inherited");
    const value = valueNode(property);
    if (value) return [{ start: value.start, end: value.end, text }];
    const last = children(details, "properties").at(-1);
    if (!last) return [];
    const indent = indentAt(view.source, last.start);
    return [{ start: last.end, end: last.end, text: `,\n${indent}inherited: ${text}` }];
  });
}
