import { expect, test } from "vitest";
import { distanceText, exposureTable } from "../../../cells/figures/index.ts";
import { exposureDistances } from "../../../cells/reflector/exposure.ts";

test("distanceText: never nearer than computed, two figures", () => {
  expect(distanceText(0)).toBe("at the antenna");
  expect(distanceText(68.21)).toBe("69 m");
  expect(distanceText(131)).toBe("140 m");
  expect(distanceText(1.2)).toBe("1.2 m");
  expect(distanceText(0.0611)).toBe("0.062 m");
});

test("exposureTable: a line a level, all of them in numbers too", () => {
  // 14.2 GHz, 2.4 m, 49.2 dBi, 40 W: 16ηP/(πD²) = 23.1 W/m² to 68.2 m, so 10 W/m² is met at 157 m, 50 W/m² at once
  const station = { frequency: 14.2e9, diameter: 2.4, gainDbi: 49.2, power: 40 };
  const { rows, data, caption } = exposureTable(station);
  expect(rows.map(({ label, under, cells }) => [label, under, ...cells.map(({ text }) => text)])).toEqual([
    ["ICNIRP 2020, public", "whole body", "10.0", "30 min", "160 m"],
    ["ICNIRP 2020, occupational", "whole body", "50.0", "30 min", "at the antenna"],
    ["ICNIRP 2020, public", "local", "34.4", "6 min", "at the antenna"],
    ["ICNIRP 2020, occupational", "local", "172", "6 min", "at the antenna"],
    ["FCC 47 CFR 1.1310, public", "whole body", "10.0", "30 min", "160 m"],
    ["FCC 47 CFR 1.1310, occupational", "whole body", "50.0", "6 min", "at the antenna"],
  ]);
  // 4P/A = 35.4 W/m²
  expect(rows[2]!.cells[2]!.word).toBe("may be exceeded at its surface");
  expect(rows[1]!.cells[2]!.word).toBeUndefined();
  expect(caption).toContain("on the axis 23.1 W/m² as far as 68.2 m");
  expect(data.slice(1).map((row) => row[5])).toEqual(exposureDistances(station).map(({ distance }) => distance));
});
