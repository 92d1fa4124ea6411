// Watches a set of files for changes of their content. Editors save in many ways (rewrite, rename over, delete and create), so the
// folders are watched and the contents compared; where a file system sends no events, a slow look at size and time serves.

import { createHash } from "node:crypto";
import { type FSWatcher, watch } from "node:fs";
import { readFile, stat } from "node:fs/promises";
import { dirname } from "node:path";

export interface FileWatch {
  /** Replaces the set. Files that are away may be named: their coming is a change. */
  follow(files: readonly string[]): Promise<void>;
  close(): void;
}

export interface FileWatchOptions {
  /** quiet time after an event before contents are compared, ms: an editor's save is several events */
  quietMs?: number;
  /** pause between looks at size and time, ms */
  lookMs?: number;
}

/** @param changed called with the files whose content is another one than before; the next call waits for its promise */
export function watchFiles(
  changed: (files: string[]) => void | Promise<void>,
  { quietMs = 25, lookMs = 1500 }: FileWatchOptions = {},
): FileWatch {
  const digests = new Map<string, string>();
  const marks = new Map<string, string>();
  const folders = new Map<string, FSWatcher>();
  let timer: NodeJS.Timeout | undefined;
  let busy: Promise<void> = Promise.resolve();
  let closed = false;

  const soon = (delay = quietMs) => {
    clearTimeout(timer);
    timer = setTimeout(() => {
      busy = busy.then(compare).catch(() => {});
    }, delay);
  };

  async function compare(): Promise<void> {
    if (closed) return;
    const found: string[] = [];
    for (const [file, was] of digests) {
      const { digest, size } = await look(file);
      if (digest === was) continue;
      // Between truncation and writing a file is empty, between delete and create it is away: wait, and see it whole.
      if ((size === 0 || digest === "away") && !waited.has(file)) {
        waited.add(file);
        soon(150);
        continue;
      }
      waited.delete(file);
      digests.set(file, digest);
      found.push(file);
    }
    if (found.length > 0 && !closed) await changed(found);
  }
  const waited = new Set<string>();

  const slowLook = setInterval(async () => {
    for (const file of digests.keys()) {
      const mark = await stat(file).then(
        (s) => `${s.mtimeMs} ${s.size} ${s.ino}`,
        () => "away",
      );
      const was = marks.get(file);
      marks.set(file, mark);
      if (was !== undefined && was !== mark) soon();
    }
  }, lookMs);
  slowLook.unref();

  function followFolder(folder: string): void {
    if (folders.has(folder)) return;
    try {
      const watcher = watch(folder, { persistent: false }, () => soon());
      watcher.on("error", () => {
        watcher.close();
        folders.delete(folder);
      });
      folders.set(folder, watcher);
    } catch {
      // No such folder, or no watches left: the slow look still sees the files.
    }
  }

  return {
    async follow(files) {
      const wanted = new Set(files);
      for (const file of digests.keys()) if (!wanted.has(file)) digests.delete(file);
      await Promise.all(
        [...wanted].map(async (file) => {
          if (!digests.has(file)) digests.set(file, (await look(file)).digest);
        }),
      );
      const homes = new Set([...wanted].map((file) => dirname(file)));
      for (const [folder, watcher] of folders) {
        if (homes.has(folder)) continue;
        watcher.close();
        folders.delete(folder);
      }
      for (const folder of homes) followFolder(folder);
    },
    close() {
      closed = true;
      clearTimeout(timer);
      clearInterval(slowLook);
      for (const watcher of folders.values()) watcher.close();
    },
  };
}

async function look(file: string): Promise<{ digest: string; size: number }> {
  try {
    const data = await readFile(file);
    return { digest: createHash("sha256").update(data).digest("base64"), size: data.length };
  } catch {
    return { digest: "away", size: -1 };
  }
}
