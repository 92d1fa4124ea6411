// The last line of an exported page.

import type { ExportRecord } from "./export-record.ts";

/** "Exported by Hornbook 0.1.0 on 6 May 2031." with the date as UTC has it. */
export function imprint({
  program,
  version,
  exported,
}: Pick<ExportRecord, "program" | "version" | "exported">): string {
  const date = new Date(exported);
  const month = "January February March April May June July August September October November December".split(" ");
  return `Exported by ${program} ${version} on ${date.getUTCDate()} ${month[date.getUTCMonth()]} ${date.getUTCFullYear()}.`;
}
