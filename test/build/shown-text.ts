import type { Locator, Page } from "playwright-core";

/** The text that a reader sees: without what the style hides. */
export function shownText(where: Page | Locator): Promise<string> {
  const locator = "goto" in where ? where.locator("body") : where;
  // biome-ignore lint/performance/useDomNodeTextContent: what is shown, not what the document holds
  return locator.innerText();
}
