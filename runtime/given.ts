// Givens: how a study declares an input, and how text that a person enters becomes its value or a sentence of refusal.
import { kindWords, parseQuantity, QuantityError, unitNamed } from "./quantity.ts";

/** What a given's declaration evaluates to: plain data, so that a study bundled apart from the engine is still understood. */
export interface GivenDeclaration {
  declares: "given";
  form: "quantity" | "choice" | "switch" | "text";
  label: string;
  why: string;
  /** unit of the default as written; "" for none */
  unit: string;
  defaultText: string;
  /** SI number, option, true/false or text */
  default: number | string | boolean;
  /** quantity: limits and step, SI */
  min?: number;
  max?: number;
  step?: number;
  /** quantity: the limits as written, for the sentence of a refusal */
  limits?: [min: string, max: string];
  options?: string[];
  /** text: most characters taken */
  longest?: number;
}

/** Entered text that a given refuses; the message is one sentence that names the given. */
export class Refusal extends Error {
  override name = "Refusal";
}

export interface QuantityOptions {
  label: string;
  /** the reason for the default, shown beside it */
  why: string;
  /** limits, included: "0.3 m", or a number in the default's unit */
  min: string | number;
  max: string | number;
  /** slider step; a hundredth of the range or so when left out */
  step?: string | number;
}

export function declareQuantity(text: string, options: QuantityOptions): GivenDeclaration {
  const { label, why } = named("given", options, text);
  if (typeof text !== "string")
    throw new Refusal(`given: ${label} must be text, a number with its unit like "2.4 m"; got ${typeof text}`);
  try {
    const { value, unit, text: defaultText } = parseQuantity(text);
    const bound = (name: "min" | "max" | "step") => {
      const entered = options[name];
      if (entered === undefined) throw new QuantityError(`needs its ${name}`);
      return parseQuantity(String(entered), unit);
    };
    const [{ value: min, text: minText }, { value: max, text: maxText }] = [bound("min"), bound("max")];
    if (!(min < max)) throw new QuantityError(`must have min below max; got ${options.min} and ${options.max}`);
    const step = options.step === undefined ? undefined : bound("step").value - unit.offset;
    if (step !== undefined && !(step > 0)) throw new QuantityError(`must have a positive step; got ${options.step}`);
    const declaration: GivenDeclaration = {
      ...{ declares: "given", form: "quantity", label, why, unit: unit.text, defaultText, default: value, min, max },
      ...{ limits: [minText, maxText], ...(step === undefined ? {} : { step }) },
    };
    readGiven(declaration, defaultText);
    return declaration;
  } catch (error) {
    if (error instanceof Refusal) throw new Refusal(`given: the default is refused: ${error.message}`);
    if (error instanceof QuantityError) throw new Refusal(`given: ${label} ${error.message}`);
    throw error;
  }
}

export interface ChoiceOptions<T extends string> {
  label: string;
  why: string;
  /** the first option when left out */
  default?: T;
}

export function declareChoice<T extends string>(options: readonly T[], details: ChoiceOptions<T>): GivenDeclaration {
  const { label, why } = named("given.choice", details, options);
  if (!Array.isArray(options) || options.some((option) => typeof option !== "string"))
    throw new Refusal(`given.choice: ${label} must offer a list of texts; got ${typeof options}`);
  if (options.length < 2 || new Set(options).size !== options.length) {
    throw new Refusal(
      `given.choice: ${label} must offer at least two different options; got ${JSON.stringify(options)}`,
    );
  }
  const chosen = details.default ?? (options[0] as T);
  const declaration: GivenDeclaration = {
    ...{
      declares: "given",
      form: "choice",
      label,
      why,
      unit: "",
      defaultText: chosen,
      default: chosen,
      options: [...options],
    },
  };
  readGiven(declaration, chosen);
  return declaration;
}

export interface SwitchOptions {
  label: string;
  why: string;
}

export function declareSwitch(on: boolean, details: SwitchOptions): GivenDeclaration {
  const { label, why } = named("given.switch", details, on);
  if (typeof on !== "boolean") throw new Refusal(`given.switch: ${label} must be true or false; got ${wordsFor(on)}`);
  return { declares: "given", form: "switch", label, why, unit: "", defaultText: on ? "on" : "off", default: on };
}

export interface TextOptions {
  label: string;
  why: string;
  /** most characters taken; a million when left out */
  longest?: number;
}

export function declareText(text: string, details: TextOptions): GivenDeclaration {
  const { label, why } = named("given.text", details, text);
  if (typeof text !== "string") throw new Refusal(`given.text: ${label} must be text; got ${typeof text}`);
  const longest = details.longest ?? 1_000_000;
  const declaration: GivenDeclaration = {
    ...{ declares: "given", form: "text", label, why, unit: "", defaultText: text, default: text, longest },
  };
  readGiven(declaration, text);
  return declaration;
}

/** A value of any kind in a few words. */
function wordsFor(value: unknown): string {
  if (Array.isArray(value)) return value.slice(0, 8).map(wordsFor).join(",");
  return ["string", "boolean", "number"].includes(typeof value) ? String(value).slice(0, 60) : typeof value;
}

function named(
  where: string,
  details: { label: string; why: string } | undefined,
  value: unknown,
): { label: string; why: string } {
  const { label, why } = details ?? { label: "", why: "" };
  if (typeof label !== "string" || label.trim() === "") {
    throw new Refusal(
      `${where}: a given needs a label, the words that name it on the page; the one of ${wordsFor(value)} has none`,
    );
  }
  return { label: label.trim(), why: typeof why === "string" ? why : "" };
}

export interface GivenReading {
  value: number | string | boolean;
  /** what the field shows: tidied, reads back to the same value */
  text: string;
}

/**
 * Reads what a person entered for a given.
 * @throws {Refusal} one sentence: the given's label, what it allows, what was entered
 */
export function readGiven(given: GivenDeclaration, entered: string): GivenReading {
  switch (given.form) {
    case "quantity":
      return readQuantity(given, entered);
    case "choice": {
      const text = entered.trim();
      if (given.options?.includes(text)) return { value: text, text };
      throw new Refusal(`${given.label} must be one of ${given.options?.join(", ")}; got ${clipped(entered)}`);
    }
    case "switch": {
      const word = entered.trim().toLowerCase();
      if (["on", "true", "yes", "1"].includes(word)) return { value: true, text: "on" };
      if (["off", "false", "no", "0"].includes(word)) return { value: false, text: "off" };
      throw new Refusal(`${given.label} must be on or off; got ${clipped(entered)}`);
    }
    case "text": {
      const longest = given.longest ?? 1_000_000;
      if (entered.length <= longest) return { value: entered, text: entered };
      throw new Refusal(`${given.label} must be at most ${longest} characters long; got ${entered.length}`);
    }
  }
}

function readQuantity(given: GivenDeclaration, entered: string): GivenReading {
  const unit = unitNamed(given.unit);
  try {
    const { value, text } = parseQuantity(entered, unit);
    if (value >= (given.min ?? -Infinity) && value <= (given.max ?? Infinity)) return { value, text };
    throw new QuantityError(`must be ${kindWords(unit)}; got ${text}`);
  } catch (error) {
    if (!(error instanceof QuantityError)) throw error;
    // "must be a length; got …" becomes "must be a length between 0.3 m and 20 m; got …".
    throw new Refusal(`${given.label} ${error.message.replace(`must be ${kindWords(unit)}`, `$&${between(given)}`)}`);
  }
}

const between = ({ limits }: GivenDeclaration): string => (limits ? ` between ${limits[0]} and ${limits[1]}` : "");

const clipped = (text: string): string => (text === "" ? "nothing" : text.length > 60 ? `${text.slice(0, 60)}…` : text);
