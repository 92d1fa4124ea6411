// When a burst of changes is evaluated: in a browser with the next frame (all changes before it count as one), or shortly after
// if no frame comes, as in a hidden page; in Node at the end of the turn.

/** ms to wait for a frame: longer than the slowest usual screen takes, short for a page that nobody looks at */
const WITHOUT_FRAME = 50;

export function nextTurn(): Promise<void> {
  return new Promise((resolve) => {
    if (typeof requestAnimationFrame === "function") {
      requestAnimationFrame(() => resolve());
      setTimeout(resolve, WITHOUT_FRAME);
    } else if (typeof setImmediate === "function") setImmediate(resolve);
    else setTimeout(resolve, 0);
  });
}
