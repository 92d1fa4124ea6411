// Workers of Node. The only file of the engine that needs Node.
import { parentPort, type ResourceLimits, Worker } from "node:worker_threads";
import type { FromWorker, ToWorker } from "./messages.ts";
import type { WorkerHandle } from "./pool.ts";
import type { ServePort } from "./serve.ts";

/** Makes workers of an ES module: a bundle on disk, or its text. */
export function nodeSpawn(
  script: string | URL | { text: string },
  options: { resourceLimits?: ResourceLimits } = {},
): () => WorkerHandle {
  const target =
    typeof script === "object" && "text" in script
      ? new URL(`data:text/javascript;base64,${Buffer.from(script.text).toString("base64")}`)
      : script;
  return () => {
    const worker = new Worker(target, { ...options, name: "hornbook background" });
    return {
      post: (message) => worker.postMessage(message),
      listen(receive, ended) {
        let reason: string | undefined;
        worker.on("message", (message: FromWorker) => receive(message));
        worker.on("messageerror", (error) => {
          reason = `its answer could not be read: ${error.message}`;
          void worker.terminate();
        });
        worker.on("error", (error: unknown) => {
          reason = error instanceof Error ? error.message : String(error);
        });
        worker.on("exit", (code) => ended(reason ?? `it ended with exit code ${code}`));
      },
      terminate: () => void worker.terminate(),
      hold: (busy) => (busy ? worker.ref() : worker.unref()),
    };
  };
}

/** A worker's way to the thread that started it. */
export function nodePort(): ServePort {
  const port = parentPort;
  if (!port) throw new Error("nodePort: must be called in a worker thread");
  return {
    post: (message) => port.postMessage(message),
    listen: (receive) => void port.on("message", (message: ToWorker) => receive(message)),
  };
}
