// The page that the control-turn benchmark measures: the live page as a reader has it, with clocks around its parts.

import { browserSpawn } from "../../runtime/background/browser.ts";
import { createBackgroundPool } from "../../runtime/background/pool.ts";
import { createStudy } from "../../runtime/engine.ts";
import { mountStudy } from "../../runtime/page/mount.ts";
import type { CompiledCell, NotebookModule, Study } from "../../runtime/study.ts";

type Span = [from: number, to: number];

/** One turn of a control, ms. */
export interface Turn {
  /** from entering the text to the frame that shows the result */
  total: number;
  /** some cell was being evaluated, here or in a worker */
  cells: number;
  /** the page was brought up to date, figures included */
  page: number;
  /** figures were drawn */
  figures: number;
  /** waiting for the screen's next frame, before the evaluation begins: up to 16.7 ms at 60 frames a second */
  wait: number;
  /** none of these, until every cell was settled: the engine's own work, messages to and from workers */
  engine: number;
  /** from settled to the frame shown */
  paint: number;
  /** cells evaluated */
  evaluations: number;
}

export interface TurnHandle {
  turn(name: string, text: string): Promise<Turn>;
}

const now = () => performance.now();

/** Length of the union of spans within [from, to]. */
function covered(spans: readonly Span[], from: number, to: number): number {
  let sum = 0;
  let reached = from;
  for (const [start, end] of [...spans].sort((a, b) => a[0] - b[0])) {
    const begin = Math.max(start, reached);
    const stop = Math.min(end, to);
    if (stop > begin) sum += stop - begin;
    reached = Math.max(reached, stop);
  }
  return sum;
}

export function startTurnPage(notebook: NotebookModule, workerUrl: string): void {
  const cellSpans: Span[] = [];
  const pageSpans: Span[] = [];
  const figureSpans: Span[] = [];
  const waitSpans: Span[] = [];

  const frame = window.requestAnimationFrame.bind(window);
  window.requestAnimationFrame = (callback) => {
    const from = now();
    return frame((time) => {
      waitSpans.push([from, now()]);
      callback(time);
    });
  };

  const timed = (define: (...inputs: unknown[]) => unknown) =>
    function (this: unknown, ...inputs: unknown[]): unknown {
      const from = now();
      const end = () => void cellSpans.push([from, now()]);
      let value: unknown;
      try {
        value = define.apply(this, inputs);
      } catch (error) {
        end();
        throw error;
      }
      if (!(value instanceof Promise)) {
        end();
        return timedFigure(value);
      }
      return value.then(timedFigure).finally(end);
    };

  const timedFigure = (value: unknown): unknown => {
    const drawing = (value as { drawing?: { draw?: unknown } } | undefined)?.drawing;
    if (typeof drawing?.draw !== "function") return value;
    const draw = drawing.draw as (context: unknown) => Element;
    return {
      ...(value as object),
      drawing: {
        ...drawing,
        draw(context: unknown) {
          const from = now();
          try {
            return draw(context);
          } finally {
            figureSpans.push([from, now()]);
          }
        },
      },
    };
  };

  const cells = notebook.cells.map((cell) =>
    cell.role === "value" ? { ...cell, define: timed(cell.define as never) as CompiledCell["define"] } : cell,
  );
  const background = createBackgroundPool({ spawn: browserSpawn({ url: workerUrl }), workers: 2 });
  background.warm();
  const study = createStudy({ ...notebook, cells }, { background });
  // The page hears of changes through a clock.
  const watched: Study = new Proxy(study, {
    get(target, name) {
      if (name !== "subscribe") {
        const value = Reflect.get(target, name, target);
        return typeof value === "function" ? value.bind(target) : value;
      }
      return (listener: Parameters<Study["subscribe"]>[0]) =>
        target.subscribe((changed) => {
          const from = now();
          listener(changed);
          pageSpans.push([from, now()]);
        });
    },
  });
  mountStudy(document.getElementById("study")!, watched, { program: "Hornbook" });

  const evaluations = () => study.cells.reduce((sum, cell) => sum + (cell.role === "value" ? cell.evaluations : 0), 0);
  const shown = () =>
    new Promise<void>((resolve) =>
      frame(() => {
        // A message posted inside a frame is answered after it was painted.
        const { port1, port2 } = new MessageChannel();
        port1.onmessage = () => resolve();
        port2.postMessage(undefined);
      }),
    );
  const handle: TurnHandle = {
    async turn(name, text) {
      await study.settled();
      await shown();
      for (const spans of [cellSpans, pageSpans, figureSpans, waitSpans]) spans.length = 0;
      const before = evaluations();
      const begun = now();
      const outcome = study.set(name, text);
      if (!outcome.ok) throw new Error(outcome.message);
      await study.settled();
      const settled = now();
      await shown();
      const end = now();
      return {
        total: end - begun,
        cells: covered(cellSpans, begun, settled),
        page: covered(pageSpans, begun, end),
        figures: covered(figureSpans, begun, end),
        wait: covered(waitSpans, begun, settled),
        engine: settled - begun - covered([...cellSpans, ...pageSpans, ...waitSpans], begun, settled),
        paint: end - settled,
        evaluations: evaluations() - before,
      };
    },
  };
  Object.assign(globalThis, { turnHandle: handle });
}
