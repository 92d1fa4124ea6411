// The page's end of the event stream: hears what the notebook is now, and whether the server is still there.

import type { OpenState } from "./open-state.ts";

export interface Follower {
  close(): void;
}

/**
 * Listens to the server for as long as the page can be seen. A hidden page lets go, since a browser opens only six connections to
 * one server and every page keeps one; when it is seen again, the server's first word tells what it missed.
 * @param lost called with true when the server can't be reached, with false when it can again
 */
export function followServer(
  window: Window & typeof globalThis,
  heard: (state: OpenState) => void,
  lost: (away: boolean) => void,
): Follower {
  const { document } = window;
  let source: EventSource | undefined;
  let timer: ReturnType<typeof setTimeout> | undefined;

  const found = () => {
    clearTimeout(timer);
    timer = undefined;
    lost(false);
  };
  const join = () => {
    if (source || document.visibilityState === "hidden") return;
    source = new window.EventSource("/events");
    const take = (event: MessageEvent<string>) => {
      found();
      heard(JSON.parse(event.data) as OpenState);
    };
    source.addEventListener("hello", take);
    source.addEventListener("notebook", take);
    source.addEventListener("error", () => {
      timer ??= setTimeout(() => lost(true), 2500);
      // A browser gives up after a refusal; a stopped server may come back under the same address.
      if (source?.readyState === window.EventSource.CLOSED) {
        source = undefined;
        setTimeout(join, 3000);
      }
    });
  };
  const leave = () => {
    clearTimeout(timer);
    timer = undefined;
    source?.close();
    source = undefined;
  };
  const seen = () => (document.visibilityState === "hidden" ? leave() : join());
  document.addEventListener("visibilitychange", seen);
  join();
  return {
    close() {
      document.removeEventListener("visibilitychange", seen);
      leave();
    },
  };
}
