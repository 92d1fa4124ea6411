// How far from a transmitting antenna each reference level is met, as a table.

import { exposureDistances, nearFieldEstimate, type Transmitter } from "../reflector/exposure.ts";
import { decimal } from "./kit/words.ts";

/** Rows of a table as plain data: what the page's `table` takes. */
export interface ExposureTable {
  columns: { label: string }[];
  rows: { key: string; label: string; under: string; cells: { text: string; word?: string }[] }[];
  caption: string;
  /** for CSV: first row the column names with units */
  data: (string | number)[][];
}

/** Metres as one keeps away: rounded up to two figures, never below what was computed. */
export function distanceText(distance: number): string {
  if (distance === 0) return "at the antenna";
  const power = 10 ** (Math.floor(Math.log10(distance)) - 1);
  const up = Math.ceil(distance / power - 1e-9) * power;
  return `${decimal(up, Math.max(0, -Math.floor(Math.log10(power) + 1e-9)))} m`;
}

const two = (density: number): string =>
  density >= 100 ? decimal(density, 0) : decimal(density, density >= 10 ? 1 : 2);

/**
 * Reference levels at a frequency and the distances on the axis beyond which they are met.
 * @throws {RangeError} as `exposureDistances`
 */
export function exposureTable(transmitter: Transmitter): ExposureTable {
  const found = exposureDistances(transmitter);
  const near = nearFieldEstimate(transmitter);
  return {
    columns: [{ label: "Level (W/m²)" }, { label: "Averaged over" }, { label: "Met on the axis from" }],
    rows: found.map(({ standard, who, over, density, averagingTime, distance, exceededAtSurface }) => ({
      key: `${standard}, ${who}, ${over}`,
      label: `${standard}, ${who}`,
      under: over,
      cells: [
        { text: two(density) },
        { text: `${decimal(averagingTime / 60, 0)} min` },
        {
          text: distanceText(distance),
          ...(exceededAtSurface ? { word: "may be exceeded at its surface" } : {}),
        },
      ],
    })),
    caption: `Estimate of OET Bulletin 65 for a round aperture, without what ground and walls reflect. At the surface at most ${two(near.surfaceDensity)} W/m²; on the axis ${two(near.nearFieldDensity)} W/m² as far as ${decimal(near.nearFieldLength, 1)} m, falling from there; at least a diameter beside the beam ${two(near.besideBeamDensity)} W/m². The code in force where the antenna stands goes before every line.`,
    data: [
      [
        "standard",
        "who",
        "over",
        "level (W/m²)",
        "averaging time (s)",
        "distance (m)",
        "may be exceeded at the surface",
      ],
      ...found.map(
        ({ standard, who, over, density, averagingTime, distance, exceededAtSurface }): (string | number)[] => [
          standard,
          who,
          over,
          density,
          averagingTime,
          distance,
          exceededAtSurface ? "yes" : "no",
        ],
      ),
    ],
  };
}
