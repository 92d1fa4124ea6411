// Heavy work without workers: on this thread, after the page had a chance to say that it is working.
import { type BackgroundJob, Cancelled } from "./pool.ts";

export function startHere(
  heavy: (...args: never[]) => unknown,
  args: readonly unknown[],
  onProgress: (fraction: number) => void,
): BackgroundJob {
  let cancelled = false;
  let cancel = (): void => {};
  const result = new Promise<unknown>((resolve, reject) => {
    cancel = () => {
      cancelled = true;
      reject(new Cancelled("no longer wanted"));
    };
    const progress = (fraction: number): void => {
      if (cancelled) throw new Cancelled("no longer wanted");
      if (Number.isFinite(fraction)) onProgress(Math.min(1, Math.max(0, fraction)));
    };
    setTimeout(async () => {
      if (cancelled) return;
      try {
        resolve(await heavy(...(args as never[]), progress as never));
      } catch (error) {
        reject(error);
      }
    }, 0);
  });
  result.catch(() => {});
  return { result, cancel: () => cancel() };
}
