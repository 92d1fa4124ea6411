// Failed cells as a person should hear of them: each cause once, with where it began and how much it took along.

import type { Study } from "../../runtime/study.ts";

/** Tells standard error of each cell in which a failure began. @returns how many cells have no value */
export function tellFailures(study: Study): number {
  const failed = study.cells.filter(({ state }) => state === "failed");
  const causes = new Map<string, { reason: string; place: string; others: number }>();
  for (const { name, failure } of failed) {
    const began = failure?.cell ?? name;
    const known = causes.get(began);
    if (known) known.others++;
    else {
      const place = failure ? ` (${failure.file}:${failure.line})` : "";
      causes.set(began, { reason: failure?.reason ?? "it has no value", place, others: 0 });
    }
  }
  for (const [name, { reason, place, others }] of causes) {
    const more = others === 0 ? "" : others === 1 ? "; 1 cell depends on it" : `; ${others} cells depend on it`;
    process.stderr.write(`hornbook: ${name} failed: ${reason}${more}${place}\n`);
  }
  return failed.length;
}
