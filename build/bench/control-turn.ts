// One turn of a given of the whole trade study, from the entry to the frame that shows the result, in headless Chromium.

import { startLocalServer } from "../../runtime/server/local-server.ts";
import type { Bench, Figures } from "../bench.ts";
import { bundleOnce, bundleStyle } from "../bundle.ts";
import { launchBrowser } from "../chromium.ts";
import { findNotebook } from "../notebook-place.ts";
import { NOTEBOOK_IMPORT } from "../notebook-plugin.ts";
import type { Turn, TurnHandle } from "./turn-page.ts";
import { runYardstick } from "./yardstick.ts";

const NOTEBOOK = "notebooks/trade-study.ts";
/** The given that moves most, between two depths at which every kind of horn can be built. */
const GIVEN = "fOverD";
const TEXTS = ["0.8", "0.82"];
const WARM_UP = 4;
const TURNS = 15;

const ENTRY = `
import { notebook } from "${NOTEBOOK_IMPORT}";
import { browserPort, inBackgroundWorker } from "./runtime/background/browser.ts";
import { serveBackground } from "./runtime/background/serve.ts";
import { startTurnPage } from "./build/bench/turn-page.ts";
if (inBackgroundWorker()) serveBackground(notebook.backgroundFunctions, browserPort());
else startTurnPage(notebook, import.meta.url);
`;

export const bench: Bench = {
  async run({ projectRoot }, say): Promise<Figures> {
    const place = findNotebook(NOTEBOOK, projectRoot);
    say("bundling");
    const script = await bundleOnce({ projectRoot, entry: ENTRY, notebook: place, platform: "browser", minify: true });
    const style = await bundleStyle(["runtime/page/page.css"], projectRoot, true);
    const server = await startLocalServer({
      page: () =>
        '<!doctype html><html lang="en"><meta charset="utf-8"><title>bench</title><link rel="stylesheet" href="/page.css">' +
        '<div id="study"></div><script type="module" src="/page.js"></script></html>',
      asset: (path) =>
        path === "/page.js"
          ? { type: "text/javascript; charset=utf-8", body: script.code }
          : path === "/page.css"
            ? { type: "text/css; charset=utf-8", body: style.code }
            : undefined,
      hello: () => null,
    });
    let turns: Turn[];
    try {
      say("starting the browser");
      turns = await turnsInBrowser(server.url, say);
    } finally {
      await server.close();
    }
    say("running the yardstick");
    const yardstick = await runYardstick();
    return figuresOf(turns, yardstick?.modeMatchingPerFrequency["20"] ?? null);
  },
};

async function turnsInBrowser(url: string, say: (text: string) => void): Promise<Turn[]> {
  const browser = await launchBrowser();
  try {
    const page = await browser.newPage({ viewport: { width: 1440, height: 900 } });
    await page.goto(url);
    await page.waitForFunction(() => "turnHandle" in globalThis);
    const turns: Turn[] = [];
    for (let i = 0; i < WARM_UP + TURNS; i++) {
      say(`turn ${i + 1} of ${WARM_UP + TURNS}`);
      const turn = await page.evaluate(
        ([name, text]) => (globalThis as unknown as { turnHandle: TurnHandle }).turnHandle.turn(name!, text!),
        [GIVEN, TEXTS[(i + 1) % 2]],
      );
      if (i >= WARM_UP) turns.push(turn);
    }
    return turns;
  } finally {
    await browser.close();
  }
}

function figuresOf(turns: readonly Turn[], yardstickMs: number | null): Figures {
  const median = (pick: (turn: Turn) => number): number => {
    const sorted = turns.map(pick).sort((a, b) => a - b);
    return sorted[Math.floor(sorted.length / 2)]!;
  };
  const rounded = (value: number, digits: number) => Number(value.toFixed(digits));
  const total = median((turn) => turn.total);
  const share = (pick: (turn: Turn) => number) =>
    rounded(
      median((turn) => pick(turn) / turn.total),
      4,
    );
  return {
    turnMs: rounded(total, 2),
    worstTurnMs: rounded(Math.max(...turns.map((turn) => turn.total)), 2),
    physicsMs: rounded(
      median((turn) => turn.cells),
      2,
    ),
    engineMs: rounded(
      median((turn) => turn.engine),
      2,
    ),
    waitMs: rounded(
      median((turn) => turn.wait),
      2,
    ),
    pageMs: rounded(
      median((turn) => turn.page),
      2,
    ),
    figuresMs: rounded(
      median((turn) => turn.figures),
      2,
    ),
    paintMs: rounded(
      median((turn) => turn.paint),
      2,
    ),
    physicsShare: share((turn) => turn.cells),
    engineShare: share((turn) => turn.engine),
    pageShare: share((turn) => turn.page),
    evaluations: median((turn) => turn.evaluations),
    turns: turns.length,
    yardstickMs,
    ratio: yardstickMs === null ? null : rounded(total / yardstickMs, 2),
  };
}
