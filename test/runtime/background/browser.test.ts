import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { build } from "esbuild";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { compileNotebook } from "../../../runtime/compile.ts";
import { launchBrowser } from "../../browser.ts";
import { VOCABULARY } from "../load-notebook.ts";

// One file that is opened without a server and without a network: its script serves the page and, through a Blob, its workers.

const repository = new URL("../../../", import.meta.url).pathname;
const NOTEBOOK = `${VOCABULARY}
import { asynchronous, deaf, failsLater, refuses, reporting } from "../test/runtime/background/heavy-functions.ts";
const n = given("1", { label: "N", why: "", min: 0, max: 1000 });
const sweep = await background(deaf, new Int32Array(2), 30, "n" + n);
const told = await background(reporting, 5, 45);
const typed = (await background(asynchronous, 1)).typed;
const refused = await background(refuses, -1);
const lost = await background(failsLater);
const pair = [n, sweep];
const double = n * 2;
const doubled = [double, n];
`;
const ENTRY = `
import { notebook } from "the-notebook";
import { browserPort, browserSpawn, inBackgroundWorker } from "./runtime/background/browser.ts";
import { createBackgroundPool } from "./runtime/background/pool.ts";
import { serveBackground } from "./runtime/background/serve.ts";
import { createStudy } from "./runtime/engine.ts";
import { compileNotebook } from "./runtime/compile.ts";
if (inBackgroundWorker()) serveBackground(notebook.backgroundFunctions, browserPort());
else {
  const text = document.querySelector("script").textContent;
  const pool = createBackgroundPool({ spawn: browserSpawn({ text }), workers: 2 });
  Object.assign(globalThis, { study: createStudy(notebook, { background: pool }), pool, compileNotebook });
}
`;

let browser: Browser;
let page: Page;
const folder = mkdtempSync(join(tmpdir(), "hornbook-file-"));
const { code } = compileNotebook(NOTEBOOK, "notebooks/test.ts");

beforeAll(async () => {
  const { outputFiles } = await build({
    stdin: { contents: ENTRY, loader: "ts", resolveDir: repository },
    plugins: [
      {
        name: "notebook",
        setup(setup) {
          setup.onResolve({ filter: /^the-notebook$/ }, () => ({ path: "test.ts", namespace: "notebook" }));
          setup.onLoad({ filter: /./, namespace: "notebook" }, () => ({
            ...{ contents: code, loader: "ts", resolveDir: `${repository}notebooks` },
          }));
        },
      },
    ],
    ...{
      bundle: true,
      format: "esm",
      platform: "browser",
      write: false,
      outdir: "/",
      logLevel: "silent",
      minify: true,
    },
  });
  const script = (outputFiles[0]?.text ?? "").replace(/<\/script/gi, "<\\/script").replace(/<!--/g, "<\\!--");
  const file = join(folder, "study.html");
  writeFileSync(file, `<!doctype html><meta charset="utf-8"><title>t</title><script type="module">${script}</script>`);
  browser = await launchBrowser();
  const context = await browser.newContext({ offline: true });
  page = await context.newPage();
  await page.goto(pathToFileURL(file).href);
  await page.evaluate("study.settled()");
});

afterAll(async () => {
  await browser?.close();
  rmSync(folder, { recursive: true, force: true });
});

describe("a file in a browser, network off", () => {
  test("values from workers; a refusal keeps its words; a lost worker says so", async () => {
    const cells: unknown = await page.evaluate(
      "Object.fromEntries(study.cells.map((c) => [c.name, c.failure ? c.failure.reason : c.value instanceof Float64Array ? [...c.value] : c.value]))",
    );
    expect(cells).toEqual({
      ...{ n: 1, sweep: "n1", told: "done", typed: [1, 2, 3], pair: [1, "n1"], double: 2, doubled: [2, 1] },
      refused: "refuses: value must be positive; got -1",
      lost: expect.stringMatching(/^the background worker stopped while it ran failsLater: .*nobody caught this$/),
    });
  });

  test("twenty steps of a control: two workers at most, the newest wins, never another step's value as current", async () => {
    const seen = (await page.evaluate(`(async () => {
      const before = pool.started;
      let most = 0, dishonest = 0;
      study.subscribe(() => {
        const { state, value } = study.cell("pair");
        if (state === "current" && value[1] !== "n" + study.cell("n").value) dishonest++;
      });
      for (let i = 2; i <= 21; i++) {
        study.set("n", String(i));
        most = Math.max(most, pool.alive);
        await new Promise((resolve) => setTimeout(resolve, 15));
      }
      await study.settled();
      return { pair: study.cell("pair").value, most, dishonest, started: pool.started - before };
    })()`)) as { pair: unknown; most: number; dishonest: number; started: number };
    expect(seen).toMatchObject({ pair: [21, "n21"], most: 2, dishonest: 0 });
    expect(seen.started).toBeLessThan(10);
  });

  test("the compiler gives the same text here as in Node", async () => {
    const here = (await page.evaluate(
      `compileNotebook(${JSON.stringify(NOTEBOOK)}, "notebooks/test.ts").code`,
    )) as string;
    expect(here).toBe(code);
  });

  test("a given turned twice at once is one evaluation, and what needs no waiting is current in the very next frame", async () => {
    const counted = await page.evaluate(`(async () => {
      const before = study.cell("doubled").evaluations;
      study.set("n", "31");
      study.set("n", "32");
      const { state, value } = await new Promise((resolve) =>
        requestAnimationFrame(() => resolve({ state: study.cell("doubled").state, value: study.cell("doubled").value })));
      await study.settled();
      return [state, value, study.cell("doubled").evaluations - before, study.cell("pair").value];
    })()`);
    expect(counted).toEqual(["current", [64, 32], 1, [32, "n32"]]);
  });
});
