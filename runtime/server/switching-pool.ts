// A pool of workers that can be exchanged under a running study: a saved notebook brings new functions, while calls that are still
// wanted finish in the workers that began them.

import type { BackgroundPool } from "../background/pool.ts";

export interface SwitchingPool extends BackgroundPool {
  /** New calls go to `next`; the former pool is disposed of when its last call has ended. */
  switchTo(next: BackgroundPool): void;
}

export function switchingPool(first: BackgroundPool): SwitchingPool {
  const calls = new Map<BackgroundPool, number>([[first, 0]]);
  let now = first;
  const leave = (pool: BackgroundPool) => {
    const left = (calls.get(pool) ?? 0) - 1;
    calls.set(pool, left);
    if (left <= 0 && pool !== now) {
      calls.delete(pool);
      pool.dispose();
    }
  };
  return {
    start(name, args, onProgress) {
      const pool = now;
      calls.set(pool, (calls.get(pool) ?? 0) + 1);
      const job = pool.start(name, args, onProgress);
      let open = true;
      const end = () => {
        if (open) leave(pool);
        open = false;
      };
      job.result.then(end, end);
      return {
        result: job.result,
        cancel() {
          job.cancel();
          end();
        },
      };
    },
    switchTo(next) {
      const former = now;
      now = next;
      calls.set(next, 0);
      if ((calls.get(former) ?? 0) === 0) {
        calls.delete(former);
        former.dispose();
      }
    },
    dispose() {
      for (const pool of calls.keys()) pool.dispose();
      calls.clear();
    },
  };
}
