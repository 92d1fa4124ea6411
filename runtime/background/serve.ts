// The worker's side: runs the notebook's heavy functions, one call at a time.
import { carriedError, type FromWorker, type ToWorker } from "./messages.ts";

/** How a worker reaches the thread that started it. */
export interface ServePort {
  post(message: FromWorker): void;
  listen(receive: (message: ToWorker) => void): void;
}

/** Thrown out of a dropped call by its own progress report; nobody waits for it any more. */
class Dropped extends Error {
  override name = "Dropped";
}

/** Least time between two progress reports, ms: a page can't show more. */
const REPORT_INTERVAL = 40;

/**
 * Answers calls with `functions`, by name.
 * A call gets its arguments and, after them, a progress callback. Reporting progress is also where a dropped call ends early.
 */
export function serveBackground(
  functions: Readonly<Record<string, (...args: never[]) => unknown>>,
  port: ServePort,
): void {
  const cancelled = new Set<number>();
  const answer = async (id: number, name: string, args: readonly unknown[], dropped?: Int32Array): Promise<void> => {
    let lastReport = Number.NEGATIVE_INFINITY;
    const progress = (fraction: number): void => {
      if (cancelled.has(id) || (dropped && Atomics.load(dropped, 0) === 1)) throw new Dropped("no longer wanted");
      const now = performance.now();
      if (!Number.isFinite(fraction) || (now - lastReport < REPORT_INTERVAL && fraction < 1)) return;
      lastReport = now;
      port.post({ type: "progress", id, fraction: Math.min(1, Math.max(0, fraction)) });
    };
    try {
      const heavy = Object.hasOwn(functions, name) ? functions[name] : undefined;
      if (!heavy) throw new Error(`background: this worker knows no function ${name}`);
      const value = await heavy(...(args as never[]), progress as never);
      port.post({ type: "done", id, value });
    } catch (error) {
      port.post({ type: "failed", id, error: carriedError(error) });
    } finally {
      cancelled.delete(id);
    }
  };
  port.listen((message) => {
    if (message.type === "cancel") cancelled.add(message.id);
    else void answer(message.id, message.name, message.args, message.dropped);
  });
  port.post({ type: "ready" });
}
