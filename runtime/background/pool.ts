// The pool of background workers, as the engine sees it.

/** A call under way. */
export interface BackgroundJob {
  result: Promise<unknown>;
  /** The result is no longer wanted: a queued call never starts, a running one is dropped, and its worker replaced if it goes on. */
  cancel(): void;
}

export interface BackgroundPool {
  /** Calls a function of the notebook's backgroundFunctions by name. */
  start(name: string, args: readonly unknown[], onProgress?: (fraction: number) => void): BackgroundJob;
  dispose(): void;
}
