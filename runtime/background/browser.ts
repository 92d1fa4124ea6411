// Workers of a browser, from an address or from the text of the script itself (a file that is opened without a server).
import type { FromWorker, ToWorker } from "./messages.ts";
import type { WorkerHandle } from "./pool.ts";
import type { ServePort } from "./serve.ts";

/**
 * Makes workers of a module script at an address, or of the text of a classic script. Text goes through a Blob, which is how a
 * single file brings its worker along; Chromium refuses module workers of a Blob to a page opened from a file.
 */
export function browserSpawn(script: { url: string } | { text: string }): () => WorkerHandle {
  const url = "url" in script ? script.url : URL.createObjectURL(new Blob([script.text], { type: "text/javascript" }));
  const type = "url" in script ? "module" : "classic";
  return () => {
    const worker = new Worker(url, { type, name: "hornbook background" });
    return {
      post: (message) => worker.postMessage(message),
      listen(receive, ended) {
        worker.onmessage = (event: MessageEvent<FromWorker>) => receive(event.data);
        // An error that reaches this event was caught by nobody inside; what the worker then holds can't be trusted.
        const end = (reason: string) => {
          worker.onerror = null;
          worker.terminate();
          ended(reason);
        };
        worker.onerror = (event) => {
          event.preventDefault();
          end(event.message || "its script could not be loaded");
        };
        worker.onmessageerror = () => end("its answer could not be read");
      },
      terminate: () => worker.terminate(),
    };
  };
}

/** True inside a worker: a bundle that serves both sides asks this first. */
export function inBackgroundWorker(): boolean {
  const scope = (globalThis as { WorkerGlobalScope?: new () => object }).WorkerGlobalScope;
  return typeof scope === "function" && globalThis instanceof scope;
}

/** A worker's way to the page. */
export function browserPort(): ServePort {
  const scope = globalThis as unknown as {
    postMessage(message: FromWorker): void;
    onmessage: ((event: { data: ToWorker }) => void) | null;
  };
  return {
    post: (message) => scope.postMessage(message),
    listen(receive) {
      scope.onmessage = (event) => receive(event.data);
    },
  };
}
