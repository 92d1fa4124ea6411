// The page as a string of HTML, for the first paint of a file: readable with scripts off.

import type { Study } from "../study.ts";
import type { PageContext, PageOptions } from "./options.ts";
import { buildPage } from "./page.ts";
import { serialize } from "./serialize.ts";

export interface RenderOptions extends PageOptions {
  /** where elements are made: linkedom's document, or a browser's */
  document: Document;
  /** true: no controls, for a file that will never wake. Default false: the controls are there, and wait. */
  still?: boolean;
  /** px for drawings, default 760 */
  width?: number;
}

/**
 * What goes into the root element of a page. The study should be settled: what isn't current says so, on paper too.
 * Holds no script, no event handler, no style attribute of its own.
 */
export function renderStudy(study: Study, options: RenderOptions): string {
  const context: PageContext = {
    document: options.document,
    study,
    options,
    live: false,
    still: options.still ?? false,
    width: () => options.width ?? 760,
    enter: () => {},
    painted: new Map(),
  };
  const page = buildPage(context);
  page.update();
  return page.elements.map(serialize).join("\n");
}
