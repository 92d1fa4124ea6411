// A warm pool of workers for heavy functions. A dropped call never starts if it is still waiting; a running one is told, and its
// worker is replaced if it goes on. So a control that moves twenty times starts a handful of runs on two workers, not twenty.
import { type FromWorker, revivedError, type ToWorker } from "./messages.ts";

/** A call under way. */
export interface BackgroundJob {
  /** Rejects with `Cancelled` once cancelled. */
  result: Promise<unknown>;
  /** The result is no longer wanted. */
  cancel(): void;
}

export interface BackgroundPool {
  /** Calls a function of the notebook's backgroundFunctions by name. */
  start(name: string, args: readonly unknown[], onProgress?: (fraction: number) => void): BackgroundJob;
  /** Ends every worker; calls under way are cancelled. */
  dispose(): void;
}

/** One worker, as the pool drives it; background/browser.ts and background/node.ts make them. */
export interface WorkerHandle {
  /** @throws what structured clone throws for data that can't travel */
  post(message: ToWorker): void;
  /** `ended` is called once, when the worker has stopped by itself, with the reason. */
  listen(receive: (message: FromWorker) => void, ended: (reason: string) => void): void;
  terminate(): void;
  /** Node: a busy worker keeps the process alive, an idle one doesn't. */
  hold?(busy: boolean): void;
}

export interface PoolOptions {
  spawn: () => WorkerHandle;
  /** most workers at one time; two, or one on a single core */
  workers?: number;
  /** ms that a dropped call may go on before its worker is replaced */
  patience?: number;
}

export interface WarmPool extends BackgroundPool {
  /** Starts the workers before the first call. */
  warm(): void;
  /** workers alive, and workers started since the beginning */
  readonly alive: number;
  readonly started: number;
}

/** The background stopped or could not begin; the message says why. */
export class BackgroundError extends Error {
  override name = "BackgroundError";
}

export class Cancelled extends Error {
  override name = "Cancelled";
}

interface Job {
  id: number;
  name: string;
  args: readonly unknown[];
  onProgress?: ((fraction: number) => void) | undefined;
  resolve: (value: unknown) => void;
  reject: (error: unknown) => void;
  cancelled: boolean;
  dropped?: Int32Array;
}

interface Seat {
  handle: WorkerHandle;
  ready: boolean;
  job?: Job | undefined;
  impatience?: ReturnType<typeof setTimeout> | undefined;
}

export function createBackgroundPool(options: PoolOptions): WarmPool {
  const { spawn, patience = 200 } = options;
  const most = Math.max(1, options.workers ?? Math.min(2, coreCount()));
  const seats = new Set<Seat>();
  const queue: Job[] = [];
  let nextId = 1;
  let started = 0;
  let disposed = false;

  function sit(): Seat {
    const seat: Seat = { handle: spawn(), ready: false };
    started++;
    seats.add(seat);
    seat.handle.listen(
      (message) => receive(seat, message),
      (reason) => lost(seat, reason),
    );
    seat.handle.hold?.(false);
    return seat;
  }

  function receive(seat: Seat, message: FromWorker): void {
    if (message.type === "ready") {
      seat.ready = true;
      return;
    }
    const { job } = seat;
    if (!job || message.id !== job.id) return;
    if (message.type === "progress") {
      if (!job.cancelled) job.onProgress?.(message.fraction);
      return;
    }
    vacate(seat);
    if (message.type === "done") job.resolve(message.value);
    else job.reject(revivedError(message.error));
    pump();
  }

  function vacate(seat: Seat): void {
    clearTimeout(seat.impatience);
    seat.impatience = undefined;
    seat.job = undefined;
    seat.handle.hold?.(false);
  }

  /** A worker has died: its call fails with the reason, and another takes its place. */
  function lost(seat: Seat, reason: string): void {
    if (!seats.delete(seat)) return;
    const { job, ready } = seat;
    vacate(seat);
    job?.reject(
      new BackgroundError(
        ready
          ? `the background worker stopped while it ran ${job.name}: ${reason}`
          : `the background worker could not start: ${reason}`,
      ),
    );
    // One that dies idle would die again at once: the next call starts another.
    if (ready && job && !disposed) refill();
    pump();
  }

  function replace(seat: Seat): void {
    seats.delete(seat);
    vacate(seat);
    seat.handle.terminate();
    refill();
    pump();
  }

  function refill(): void {
    try {
      sit();
    } catch {
      // The next call tries again, and reports it if it fails again.
    }
  }

  function pump(): void {
    while (queue.length > 0 && !disposed) {
      let seat = [...seats].find((one) => !one.job);
      if (!seat && seats.size >= most) return;
      const job = queue.shift() as Job;
      try {
        seat ??= sit();
      } catch (error) {
        job.reject(new BackgroundError(`the background worker could not start: ${(error as Error).message}`));
        continue;
      }
      begin(seat, job);
    }
  }

  function begin(seat: Seat, job: Job): void {
    const { id, name, args, dropped } = job;
    try {
      seat.handle.post({ type: "call", id, name, args, ...(dropped ? { dropped } : {}) });
    } catch (error) {
      const why = (error as Error).message;
      job.reject(
        new BackgroundError(`an argument of ${name} can't travel to the background: ${why}; hand over plain data`),
      );
      return;
    }
    seat.job = job;
    seat.handle.hold?.(true);
  }

  function cancel(job: Job): void {
    if (job.cancelled) return;
    job.cancelled = true;
    const waiting = queue.indexOf(job);
    if (waiting >= 0) queue.splice(waiting, 1);
    job.reject(new Cancelled(`${job.name} is no longer wanted`));
    const seat = [...seats].find((one) => one.job === job);
    if (!seat) return;
    if (job.dropped) Atomics.store(job.dropped, 0, 1);
    seat.handle.post({ type: "cancel", id: job.id });
    seat.impatience = setTimeout(() => replace(seat), patience);
  }

  return {
    start(name, args, onProgress) {
      const dropped = sharedFlag();
      let settle: Pick<Job, "resolve" | "reject"> | undefined;
      const result = new Promise<unknown>((resolve, reject) => {
        settle = { resolve, reject };
      });
      // Whoever cancels need not listen for the rejection.
      result.catch(() => {});
      const job: Job = {
        id: nextId++,
        name,
        args,
        onProgress,
        cancelled: false,
        ...(settle as Pick<Job, "resolve" | "reject">),
      };
      if (dropped) job.dropped = dropped;
      if (disposed) job.reject(new BackgroundError("the background has been closed"));
      else {
        queue.push(job);
        pump();
      }
      return { result, cancel: () => cancel(job) };
    },
    warm() {
      while (!disposed && seats.size < most) sit();
    },
    dispose() {
      disposed = true;
      for (const job of queue.splice(0)) job.reject(new Cancelled(`${job.name} is no longer wanted`));
      for (const seat of seats) {
        seat.job?.reject(new Cancelled(`${seat.job.name} is no longer wanted`));
        clearTimeout(seat.impatience);
        seat.handle.terminate();
      }
      seats.clear();
    },
    get alive() {
      return seats.size;
    },
    get started() {
      return started;
    },
  };
}

/** Memory that a busy worker can look at; browsers give it to isolated pages only, and never to a file. */
function sharedFlag(): Int32Array | undefined {
  if (typeof SharedArrayBuffer === "undefined") return undefined;
  const isolated = (globalThis as { crossOriginIsolated?: boolean }).crossOriginIsolated;
  return isolated === false ? undefined : new Int32Array(new SharedArrayBuffer(4));
}

function coreCount(): number {
  return (globalThis as { navigator?: { hardwareConcurrency?: number } }).navigator?.hardwareConcurrency ?? 2;
}
