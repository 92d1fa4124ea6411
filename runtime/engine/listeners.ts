// Who wants to know what has changed: told once for each burst, in a microtask, so that a page paints in the same frame.
import type { CellView } from "../study.ts";

type Listener = (changed: readonly CellView[]) => void;

export class Listeners {
  private readonly listeners = new Set<Listener>();
  private changed = new Set<CellView>();
  private telling = false;

  add(listener: Listener): () => void {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  }

  clear(): void {
    this.listeners.clear();
  }

  note(view: CellView): void {
    this.changed.add(view);
  }

  /** Tells in a microtask, unless a new burst has begun by then. */
  tellSoon(ready: () => boolean): void {
    if (this.telling || this.changed.size === 0) return;
    this.telling = true;
    queueMicrotask(() => {
      this.telling = false;
      if (ready()) this.tell();
    });
  }

  private tell(): void {
    const changed = [...this.changed];
    this.changed = new Set();
    for (const listener of [...this.listeners]) {
      try {
        listener(changed);
      } catch (error) {
        // A listener's fault is its own: the others are told, and the study goes on.
        queueMicrotask(() => {
          throw error;
        });
      }
    }
  }
}
