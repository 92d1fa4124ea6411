import { afterEach, describe, expect, test } from "vitest";
import { nodeSpawn } from "../../../runtime/background/node.ts";
import { Cancelled, createBackgroundPool, type PoolOptions, type WarmPool } from "../../../runtime/background/pool.ts";
import { bundled } from "../load-notebook.ts";

const script = await bundled(
  `import * as heavy from "../test/runtime/background/heavy-functions.ts";
   import { serveBackground } from "../runtime/background/serve.ts";
   import { nodePort } from "../runtime/background/node.ts";
   serveBackground(heavy, nodePort());`,
  "worker.ts",
);

const pools: WarmPool[] = [];
function pool(options: Partial<PoolOptions> = {}): WarmPool {
  const one = createBackgroundPool({ spawn: nodeSpawn({ text: script }), workers: 2, ...options });
  pools.push(one);
  return one;
}
afterEach(() => {
  for (const one of pools.splice(0)) one.dispose();
});

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

describe("calls", () => {
  test("results, typed arrays and maps travel; workers are kept", async () => {
    const workers = pool();
    expect(workers.started).toBe(0);
    expect(await workers.start("add", [1, 2]).result).toBe(3);
    const { typed, map } = (await workers.start("asynchronous", [1]).result) as {
      typed: Float64Array;
      map: Map<string, number>;
    };
    expect(typed).toEqual(Float64Array.of(1, 2, 3));
    expect(map).toEqual(new Map([["a", 1]]));
    for (let i = 0; i < 10; i++) expect(await workers.start("add", [i, i]).result).toBe(2 * i);
    expect(workers.started).toBe(1);
  });

  test("two at a time, the others wait their turn", async () => {
    const workers = pool();
    const sums = await Promise.all(Array.from({ length: 9 }, (_, i) => workers.start("add", [i, 1]).result));
    expect(sums).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9]);
    expect([workers.started, workers.alive]).toEqual([2, 2]);
  });

  test("progress, in order, between 0 and 1", async () => {
    const seen: number[] = [];
    await pool().start("reporting", [5, 45], (fraction) => seen.push(fraction)).result;
    expect(seen.at(-1)).toBe(1);
    expect(seen.length).toBeGreaterThan(1);
    expect(seen).toEqual([...seen].sort((a, b) => a - b));
  });

  test("an error keeps name, words and stack", async () => {
    const error: Error = await pool()
      .start("refuses", [-1])
      .result.then(
        () => new Error("no error"),
        (thrown) => thrown,
      );
    expect(error).toBeInstanceOf(Error);
    expect(error.name).toBe("RangeError");
    expect(error.message).toBe("refuses: value must be positive; got -1");
    expect(error.stack).toContain("refuses");
  });

  test.each([
    ["a thrown text", "throwsText", [], "only text"],
    ["an unknown function", "nothing", [], "background: this worker knows no function nothing"],
    ["a name of every object", "constructor", [], "background: this worker knows no function constructor"],
  ])("%s", async (_, name, args, message) => {
    await expect(pool().start(name, args).result).rejects.toThrow(message);
  });

  test("a result that can't travel", async () => {
    await expect(pool().start("unsendable", []).result).rejects.toThrow(/could not be cloned/);
  });

  test("an argument that can't travel is named, and the worker goes on", async () => {
    const workers = pool();
    await expect(workers.start("add", [() => 1, 2]).result).rejects.toThrow(
      /^an argument of add can't travel to the background: .*could not be cloned.*; hand over plain data$/,
    );
    expect(await workers.start("add", [1, 2]).result).toBe(3);
    expect(workers.started).toBe(1);
  });
});

describe("cancellation", () => {
  test("a waiting call never starts; a running one is dropped and its worker replaced if it goes on", async () => {
    const workers = pool({ workers: 1, patience: 30 });
    const starts = new Int32Array(new SharedArrayBuffer(8));
    await workers.start("add", [1, 1]).result;
    const running = workers.start("forever", []);
    const waiting = workers.start("deaf", [starts, 1, "waiting"]);
    const newest = workers.start("deaf", [starts, 1, "newest"]);
    running.cancel();
    waiting.cancel();
    await expect(running.result).rejects.toBeInstanceOf(Cancelled);
    await expect(waiting.result).rejects.toBeInstanceOf(Cancelled);
    expect(await newest.result).toBe("newest");
    expect([...starts]).toEqual([1, 1]);
    expect(workers.started).toBe(2);
    newest.cancel();
    expect(await newest.result).toBe("newest");
  });

  test("a call that reports progress ends early and keeps its worker", async () => {
    const workers = pool({ workers: 1, patience: 10_000 });
    let seen = 0;
    const job = workers.start("reporting", [100_000, 1], () => seen++);
    while (seen === 0) await pause(5);
    job.cancel();
    // It would take a hundred seconds; the next call on the same worker comes back because it ended at its next report.
    expect(await workers.start("add", [2, 2]).result).toBe(4);
    expect(workers.started).toBe(1);
  });

  test("twenty steps of a control: at most two workers at one time, a few runs, the newest wins", async () => {
    const workers = pool();
    const starts = new Int32Array(new SharedArrayBuffer(8));
    workers.warm();
    let job = workers.start("deaf", [starts, 150, "step 0"]);
    let most = 0;
    for (let i = 1; i < 20; i++) {
      await pause(5);
      job.cancel();
      job = workers.start("deaf", [starts, 150, `step ${i}`]);
      most = Math.max(most, workers.alive);
    }
    expect(await job.result).toBe("step 19");
    expect(most).toBe(2);
    expect(starts[0]).toBeLessThan(20);
    expect(workers.started).toBeLessThan(10);
  });

  test("dispose cancels what is under way", async () => {
    const workers = pool();
    const job = workers.start("forever", []);
    workers.dispose();
    await expect(job.result).rejects.toBeInstanceOf(Cancelled);
    await expect(workers.start("add", [1, 1]).result).rejects.toThrow("closed");
    expect(workers.alive).toBe(0);
  });
});

describe("a worker that dies", () => {
  test.each([
    ["process.exit", "exits", [3], /^the background worker stopped while it ran exits: it ended with exit code 3$/],
    [
      "an error nobody caught",
      "failsLater",
      [],
      /^the background worker stopped while it ran failsLater: nobody caught this$/,
    ],
  ])("%s: the call fails with the reason, another worker takes its place", async (_, name, args, reason) => {
    const workers = pool({ workers: 1 });
    const job = workers.start(name, args);
    const after = workers.start("add", [20, 1]);
    await expect(job.result).rejects.toThrow(reason);
    expect(await after.result).toBe(21);
    expect(workers.alive).toBe(1);
  });

  test("out of memory", async () => {
    const resourceLimits = { maxOldGenerationSizeMb: 24 };
    const workers = pool({ workers: 1, spawn: nodeSpawn({ text: script }, { resourceLimits }) });
    await expect(workers.start("exhausts", []).result).rejects.toThrow(
      /^the background worker stopped while it ran exhausts: .*memory/i,
    );
    expect(await workers.start("add", [1, 2]).result).toBe(3);
  });

  test("one that can't start: each call says why, and none hangs", async () => {
    const broken = pool({ spawn: nodeSpawn({ text: 'throw new Error("no kernel")' }) });
    await expect(broken.start("add", [1, 2]).result).rejects.toThrow(
      "the background worker could not start: no kernel",
    );
    await expect(broken.start("add", [1, 2]).result).rejects.toThrow("no kernel");
    const none = pool({
      spawn: () => {
        throw new Error("workers are forbidden here");
      },
    });
    await expect(none.start("add", [1, 2]).result).rejects.toThrow("could not start: workers are forbidden here");
  });
});
