// One section of the report: its heading and its blocks, each kept as long as what it shows stays where it is.

import { holdChildren, html, idPart, setAttribute } from "./dom.ts";
import { figureBlock } from "./figure.ts";
import { givensBlock } from "./givens.ts";
import { cautionBlock, failureBlock, noteBlock } from "./note.ts";
import type { Block, PageContext } from "./options.ts";
import type { Entry, Section } from "./plan-entries.ts";
import { tableBlock } from "./table.ts";

type AnyBlock = Block<Entry>;

/** Blocks outlive the section they stand in: a note that becomes a heading moves them, and they keep their state. */
export class BlockStore {
  readonly #context: PageContext;
  readonly #blocks = new Map<string, { block: AnyBlock; kind: string; seen: number; level: { now: 2 | 3 } }>();
  #round = 0;

  constructor(context: PageContext) {
    this.#context = context;
  }

  begin(): void {
    this.#round += 1;
  }

  /** The block of an entry, made or kept, up to date. */
  blockFor(entry: Entry, titleLevel: 2 | 3): HTMLElement {
    let held = this.#blocks.get(entry.key);
    if (!held || held.kind !== entry.kind) {
      const level = { now: titleLevel };
      held = { block: this.#make(entry, level), kind: entry.kind, seen: 0, level };
      this.#blocks.set(entry.key, held);
    }
    held.seen = this.#round;
    held.level.now = titleLevel;
    held.block.update(entry);
    return held.block.element;
  }

  end(): void {
    for (const [key, held] of this.#blocks) if (held.seen !== this.#round) this.#blocks.delete(key);
  }

  #make(entry: Entry, level: { now: 2 | 3 }): AnyBlock {
    const context = this.#context;
    const titleLevel = () => level.now;
    switch (entry.kind) {
      case "givens":
        return givensBlock(context) as AnyBlock;
      case "failure":
        return failureBlock(context, entry) as AnyBlock;
      case "figure":
        return figureBlock(context, entry, titleLevel) as AnyBlock;
      case "table":
        return tableBlock(context, entry, titleLevel) as AnyBlock;
      case "caution":
        return cautionBlock(context, entry, titleLevel) as AnyBlock;
      case "note":
        return noteBlock(context, entry) as AnyBlock;
    }
  }
}

/** Brings a section's element up to date with its plan. */
export function updateSection(context: PageContext, store: BlockStore, element: HTMLElement, section: Section): void {
  const { document } = context;
  setAttribute(element, "id", section.id);
  setAttribute(element, "aria-labelledby", undefined);
  const level = section.title === undefined ? 2 : 3;
  const own = section.ownHeading
    ? (element.querySelector(":scope > h2") ?? html(document, "h2", {}, section.title))
    : undefined;
  const blocks = section.entries.map((entry) => store.blockFor(entry, level));
  holdChildren(element, own ? [own as HTMLElement, ...blocks] : blocks);
  const heading = section.title === undefined ? null : element.querySelector("h2");
  if (heading) {
    const id = `heading-${idPart(section.id)}`;
    setAttribute(heading, "id", id);
    setAttribute(element, "aria-labelledby", id);
  }
}
