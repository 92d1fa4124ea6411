// An exported file in a real browser: opened from file:// with the network off, watched for whatever it shouldn't say or ask.

import { pathToFileURL } from "node:url";
import type { Browser, Page } from "playwright-core";
import { expect } from "vitest";
import { assertClose } from "../assert-close.ts";

/** What a page said that it shouldn't: errors, refusals of its policy, requests to anywhere. */
export interface Watched {
  page: Page;
  complaints: string[];
  close(): Promise<void>;
}

export async function openFile(
  browser: Browser,
  path: string,
  { scripts, width = 1280 }: { scripts: boolean; width?: number },
  fragment = "",
): Promise<Watched> {
  const context = await browser.newContext({
    javaScriptEnabled: scripts,
    offline: true,
    viewport: { width, height: 900 },
  });
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on("pageerror", (error) => complaints.push(`error: ${error.message}`));
  page.on("console", (message) => {
    if (["error", "warning"].includes(message.type())) complaints.push(`console: ${message.text()}`);
  });
  page.on("request", (request) => {
    if (!/^(file|blob|data):/.test(request.url())) complaints.push(`request: ${request.url()}`);
  });
  await page.goto(pathToFileURL(path).href + fragment);
  return { page, complaints, close: () => context.close() };
}

export interface Values {
  givens: Record<string, unknown>;
  cells: Record<string, unknown>;
  failed: unknown[];
}

export const pageValues = (page: Page): Promise<Values> =>
  page.evaluate(async () => {
    const handle = () => (globalThis as unknown as { hornbook?: { values(): Promise<never> } }).hornbook;
    while (!handle()) await new Promise((resolve) => setTimeout(resolve, 10));
    return handle()!.values();
  });

/** All numbers of two values are alike to 1e-12, everything else is equal. */
export function expectAlike(
  actual: unknown,
  expected: unknown,
  path = "values",
  tolerance: (path: string) => number = () => 1e-12,
): void {
  if (typeof expected === "number") {
    // a drawing's level in a null: 1e-16 of the field is more than 1e-12 of a level below −100 dB
    const inNull = expected < -100 && /\.drawing\.data\./.test(path);
    // a level in dB is as good as its field, 5e-12 of full scale after some hundred steps of elimination: more of a small one
    const level =
      /D[bB]\b[^.]*$/.test(path) && expected !== 0 ? 4.3e-11 * 10 ** (Math.min(200, Math.abs(expected)) / 20) : 0;
    assertClose(actual as number, expected, {
      rel: tolerance(path),
      // what is left of two equal lengths, or the logarithm of nearly one, is rounding in either engine
      abs: inNull ? 1e-3 : Math.max(0.1 * tolerance(path), level),
      because: `${path}: same source, another engine`,
    });
  } else if (typeof expected === "object" && expected !== null) {
    expect(Object.keys(actual as object), path).toEqual(Object.keys(expected));
    for (const [name, part] of Object.entries(expected)) {
      expectAlike((actual as Record<string, unknown>)[name], part, `${path}.${name}`, tolerance);
    }
  } else expect(actual, path).toEqual(expected);
}
