// A horn of the reader's own: its inner wall as a table of z and r.

import { fromMm } from "../../units.ts";
import { CsvError, numberColumn, readCsvTable } from "../csv-table.ts";
import type { HornProfile } from "../horn-profile.ts";

/** Most points of a polyline that is still a horn's wall. */
const mostPoints = 20_000;

/**
 * Inner wall from CSV with the columns z_mm and r_mm, one point a row, from the throat to the mouth or from the mouth to the
 * throat. Two points at one z are an abrupt step. Whatever z counts from, the mouth comes to stand at z = 0: it is the end at
 * the larger z, which opens toward +z. Other columns are left alone.
 *
 *     z_mm,r_mm
 *     0,11
 *     20,11
 *     120,36
 *
 * @param file what messages call it; default "profile"
 * @returns m
 * @throws {CsvError} not such a table; fewer than two points; a radius not above 0; z that turns back; no length at all
 */
export function readProfile(text: string, file = "profile"): HornProfile {
  const table = readCsvTable(text, file);
  const z = numberColumn(table, "z_mm");
  const radius = numberColumn(table, "r_mm");
  const lines = table.rows.map(({ line }) => line);
  if (z.length < 2) throw new CsvError(file, lines[0] ?? 1, "", `at least two points are expected; got ${z.length}`);
  if (z.length > mostPoints) throw new CsvError(file, lines[mostPoints]!, "", `at most ${mostPoints} points are taken`);
  const rising = z.at(-1)! > z[0]!;
  z.forEach((value, i) => {
    if (!(radius[i]! > 0))
      throw new CsvError(file, lines[i]!, "r_mm", `a radius above 0 is expected; got ${radius[i]}`);
    if (radius[i]! > 1e5 || Math.abs(value) > 1e6)
      throw new CsvError(file, lines[i]!, "", `millimetres are expected; got z ${value} and r ${radius[i]}`);
    const step = i === 0 ? 0 : value - z[i - 1]!;
    if (rising ? step < 0 : step > 0)
      throw new CsvError(
        file,
        lines[i]!,
        "z_mm",
        `z must keep ${rising ? "rising" : "falling"} from one end of the horn to the other; got ${value} after ${z[i - 1]}`,
      );
  });
  if (z.at(-1) === z[0]) throw new CsvError(file, lines.at(-1)!, "z_mm", "a horn has a length; every point has one z");
  const order = rising ? z.map((_, i) => i) : z.map((_, i) => z.length - 1 - i);
  const mouth = z[order.at(-1)!]!;
  return {
    // + 0: the mouth is at 0, not −0
    z: order.map((i) => fromMm(z[i]! - mouth) + 0),
    radius: order.map((i) => fromMm(radius[i]!)),
  };
}
