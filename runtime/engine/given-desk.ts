// The givens of a running study: what was entered, what was refused, what the file says.
import { type GivenDeclaration, type GivenReading, Refusal, readGiven } from "../given.ts";
import type { CompiledCell, GivenView } from "../study.ts";
import { unitNamed } from "../unit.ts";

interface Entry extends GivenReading {
  declaration: GivenDeclaration;
  refusal?: { entered: string; message: string } | undefined;
}

/** Thrown for a name that is no given of the study, or one whose own declaration is bad. */
export class UnknownGiven extends Error {
  override name = "UnknownGiven";
}

export class GivenDesk {
  private entries = new Map<string, Entry>();
  private broken = new Map<string, string>();
  /** what a reader entered, other than the default: outlives a version of the notebook that breaks the declaration */
  private entered = new Map<string, string>();

  /**
   * Takes a given's declaration. What a reader had entered is kept if the new declaration allows it; an untouched given follows
   * the file.
   * @returns its value
   * @throws  what the declaration throws
   */
  declare(cell: CompiledCell): Entry["value"] {
    this.entries.delete(cell.name);
    this.broken.delete(cell.name);
    try {
      const declaration = declarationOf(cell);
      const entry: Entry = { declaration, value: declaration.default, text: declaration.defaultText };
      this.entries.set(cell.name, entry);
      const text = this.entered.get(cell.name);
      if (text !== undefined) this.tryEnter(cell.name, text);
      return entry.value;
    } catch (error) {
      this.broken.set(cell.name, (error as Error).message);
      throw error;
    }
  }

  forget(name: string): void {
    this.entries.delete(name);
    this.broken.delete(name);
    this.entered.delete(name);
  }

  /** Reads text for a given without entering it. @throws {Refusal | UnknownGiven} */
  read(name: string, text: string): GivenReading {
    const entry = this.entries.get(name);
    if (entry) return readGiven(entry.declaration, text);
    const broken = this.broken.get(name);
    if (broken !== undefined)
      throw new UnknownGiven(`${name} can't be entered: its own declaration is wrong (${broken})`);
    const names = [...this.entries.keys()];
    throw new UnknownGiven(
      `there is no given ${JSON.stringify(name)}; ${names.length ? `the givens are ${names.join(", ")}` : "this study has none"}`,
    );
  }

  /** Enters a reading. @returns whether the value has moved */
  enter(name: string, { value, text }: GivenReading): boolean {
    const entry = this.entries.get(name) as Entry;
    const moved = !Object.is(entry.value, value);
    Object.assign(entry, { value, text, refusal: undefined });
    if (text === entry.declaration.defaultText) this.entered.delete(name);
    else this.entered.set(name, text);
    return moved;
  }

  refuse(name: string, entered: string, message: string): void {
    const entry = this.entries.get(name);
    if (entry) entry.refusal = { entered, message };
  }

  /** Enters text, or keeps why it was refused. */
  tryEnter(name: string, text: string): void {
    try {
      this.enter(name, this.read(name, text));
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      this.refuse(name, text, error.message);
    }
  }

  has = (name: string): boolean => this.entries.has(name);
  value = (name: string): Entry["value"] | undefined => this.entries.get(name)?.value;

  defaults(): Record<string, string> {
    return Object.fromEntries([...this.entries].map(([name, entry]) => [name, entry.declaration.defaultText]));
  }

  view(name: string): GivenView | undefined {
    const entry = this.entries.get(name);
    if (!entry) return undefined;
    const { form, label, why, unit, defaultText, min, max, step, options } = entry.declaration;
    return {
      ...{ name, form, label, why, unit, defaultText, text: entry.text, value: entry.value },
      ...(min === undefined ? {} : { min }),
      ...(max === undefined ? {} : { max }),
      ...(step === undefined ? {} : { step }),
      ...(form === "quantity" ? perUnitOf(unit) : {}),
      ...(options === undefined ? {} : { options: [...options] }),
      ...(entry.refusal === undefined ? {} : { refusal: { ...entry.refusal } }),
    };
  }
}

/** SI value of one unit, where a factor is all there is to it. */
function perUnitOf(unitText: string): { perUnit?: number } {
  const { scale, offset } = unitNamed(unitText);
  return offset === 0 ? { perUnit: scale } : {};
}

function declarationOf(cell: CompiledCell): GivenDeclaration {
  if (cell.problem !== undefined) throw new Error(cell.problem);
  const declaration = cell.define() as GivenDeclaration;
  if (declaration?.declares !== "given") throw new Error(`${cell.name} is marked as a given but declares none`);
  return declaration;
}
