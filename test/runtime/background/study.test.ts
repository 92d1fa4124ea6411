import { build } from "esbuild";
import { afterEach, describe, expect, test } from "vitest";
import { nodeSpawn } from "../../../runtime/background/node.ts";
import { createBackgroundPool, type WarmPool } from "../../../runtime/background/pool.ts";
import { compileNotebook } from "../../../runtime/compile.ts";
import { createStudy } from "../../../runtime/engine.ts";
import { evaluateNotebook } from "../../../runtime/headless.ts";
import type { NotebookModule, Study } from "../../../runtime/study.ts";
import { bundled, importText, VOCABULARY } from "../load-notebook.ts";

const HEAVY = 'import { add, deaf, exits, refuses, reporting } from "../test/runtime/background/heavy-functions.ts";';
const repository = new URL("../../../", import.meta.url).pathname;
const SERVE = `import { notebook } from "the-notebook";
import { nodePort } from "./runtime/background/node.ts";
import { serveBackground } from "./runtime/background/serve.ts";
serveBackground(notebook.backgroundFunctions, nodePort());`;

/** A notebook, and the script of a worker that serves it, bundled as the command line does. */
async function withWorker(body: string): Promise<{ notebook: NotebookModule; script: string }> {
  const { code, problems } = compileNotebook(`${VOCABULARY}\n${HEAVY}\n${body}`, "notebooks/test.ts");
  expect(problems).toEqual([]);
  const { notebook } = await importText(await bundled(code, "notebooks/test.ts"));
  const result = await build({
    stdin: {
      contents: SERVE,
      loader: "ts",
      resolveDir: repository,
    },
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
    ...{ bundle: true, format: "esm", platform: "node", write: false, outdir: "/", logLevel: "silent" },
  });
  return { notebook, script: result.outputFiles[0]?.text ?? "" };
}

const studies: Study[] = [];
async function study(body: string): Promise<{ running: Study; workers: WarmPool }> {
  const { notebook, script } = await withWorker(body);
  const workers = createBackgroundPool({ spawn: nodeSpawn({ text: script }), workers: 2, patience: 50 });
  const running = createStudy(notebook, { background: workers });
  studies.push(running);
  return { running, workers };
}
afterEach(() => {
  for (const one of studies.splice(0)) one.dispose();
});
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));
const N = 'const n = given("1", { label: "N", why: "", min: 0, max: 1000 });';

describe("background() in a study", () => {
  test("works while it works, tells its progress, and the value is the function's", async () => {
    const { running } = await study(`${N} const sweep = await background(reporting, 5, 45); const after = sweep + n;`);
    const seen: (number | undefined)[] = [];
    running.subscribe(() => {
      const { state, progress } = running.cell("sweep");
      if (state === "working") seen.push(progress);
    });
    await running.settled();
    expect(running.cell("after").value).toBe("done1");
    expect(seen[0]).toBeUndefined();
    expect(seen.filter((one) => one !== undefined).length).toBeGreaterThan(1);
    expect(running.cell("sweep").progress).toBeUndefined();
    running.set("n", "2");
    await running.settled();
    expect(running.cell("sweep").evaluations).toBe(1);
  });

  test("twenty steps of a control: no more than two workers, the newest wins, no value of another step as current", async () => {
    const { running, workers } = await study(
      `${N} const label = "n" + n; const sweep = await background(deaf, new Int32Array(2), 30, label); const pair = [label, sweep];`,
    );
    await running.settled();
    let most = 0;
    running.subscribe(() => {
      const { state, value } = running.cell("pair");
      if (state === "current") expect((value as string[])[1]).toBe(`n${running.cell("n").value}`);
    });
    for (let i = 2; i <= 21; i++) {
      running.set("n", String(i));
      most = Math.max(most, workers.alive);
      await pause(8);
    }
    await running.settled();
    expect(running.cell("pair").value).toEqual(["n21", "n21"]);
    expect(most).toBeLessThanOrEqual(2);
    expect(workers.started).toBeLessThan(10);
  });

  test("functions of the notebook itself run in the worker, with what they need", async () => {
    const { running } = await study(
      `const two = 2; const twice = (x: number) => x * two; function heavy(x: number) { return twice(x) + 1; }
       const sum = (await background(heavy, 20)) + (await background(add, 1, 1));`,
    );
    await running.settled();
    expect(running.cell("sum").value).toBe(43);
  });

  test("an error is the cell's failure, with its own words", async () => {
    const { running } = await study("const bad = await background(refuses, -1); const after = bad;");
    await running.settled();
    expect(running.cell("after").failure).toMatchObject({
      ...{ reason: "refuses: value must be positive; got -1", cell: "bad", path: ["bad", "after"] },
    });
  });

  test("a crashed worker fails its cell with a clear reason; the rest lives, and so does the next call", async () => {
    const { running } = await study(
      `${N} const fatal = await (n === 1 ? background(exits, 3) : background(add, n, 1)); const other = await background(add, 1, 1);`,
    );
    await running.settled();
    expect(running.cell("fatal").failure?.reason).toBe(
      "the background worker stopped while it ran exits: it ended with exit code 3",
    );
    expect(running.cell("other").value).toBe(2);
    running.set("n", "5");
    await running.settled();
    expect(running.cell("fatal").value).toBe(6);
  });

  test("stop: the cell is behind, its worker free; again: it runs", async () => {
    const { running, workers } = await study(`${N} const slow = await background(reporting, 100000, n === 1 ? 1 : 0);`);
    while (running.cell("slow").progress === undefined) await pause(5);
    running.stop("slow");
    await running.settled();
    expect(running.cell("slow").state).toBe("behind");
    expect(await workers.start("reporting", [1, 0]).result).toBe("done");
    running.again("slow");
    await pause(10);
    expect(running.cell("slow").state).toBe("working");
    running.set("n", "2");
    await running.settled();
    expect(running.cell("slow").value).toBe("done");
  });

  test("a cell that is a function may call the background; its calls end when it does", async () => {
    const { running } = await study(
      `${N} const sumTo = (x: number) => background(add, x, n); const three = await sumTo(2);
       const sums = await Promise.all([1, 2, 3].map((x) => background(add, x, n)));`,
    );
    await running.settled();
    expect([running.cell("three").value, running.cell("sums").value]).toEqual([3, [2, 3, 4]]);
    const sumTo = running.cell("sumTo").value as (x: number) => Promise<number>;
    const under = Promise.allSettled([sumTo(1), sumTo(2), sumTo(3)]);
    running.set("n", "7");
    expect((await under).map(({ status }) => status)).toEqual(["rejected", "rejected", "rejected"]);
    await running.settled();
    expect([running.cell("three").value, running.cell("sums").value]).toEqual([9, [8, 9, 10]]);
  });

  test("without workers the same notebook gives the same values on this thread", async () => {
    const { notebook } = await withWorker(
      "const sum = await background(add, 1, 2); const text = await background(reporting, 2, 1); const bad = await background(refuses, 3);",
    );
    const values = await evaluateNotebook(notebook);
    expect(values.cells).toMatchObject({ sum: 3, text: "done" });
    expect(values.failed).toMatchObject([{ cell: "bad", reason: "refuses: value must be positive; got 3" }]);
  });

  test("a version with workers of its own takes the former ones' place; work under way begins again in them", async () => {
    const { running } = await study("const sweep = await background(reporting, 100000, 5); const apart = 1;");
    await pause(20);
    const { notebook, script } = await withWorker("const sweep = await background(reporting, 2, 1); const apart = 1;");
    running.redefine(notebook, createBackgroundPool({ spawn: nodeSpawn({ text: script }), workers: 1 }));
    await running.settled();
    expect(running.cell("sweep").value).toBe("done");
    expect(running.cell("apart").evaluations).toBe(1);
  });
});
