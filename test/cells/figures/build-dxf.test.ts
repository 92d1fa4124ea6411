// The file for the workshop, read back by a reader that knows nothing of its writer.

import DxfParser, { type ILineEntity, type ILwpolylineEntity } from "dxf-parser";
import { describe, expect, test } from "vitest";
import { buildDxf, dxfFile, dxfLayers } from "../../../cells/figures/build-dxf.ts";
import { buildSheet } from "../../../cells/horn/workshop/build-sheet.ts";
import { assertClose } from "../../assert-close.ts";
import { corrugatedHorn, dualModeHorn, smoothHorn } from "./examples.ts";

type Realizable = Parameters<typeof buildSheet>[0];
const sheetOf = (horn: unknown) => buildSheet(horn as Realizable, { highestFrequency: 12e9 });

function read(text: string) {
  const file = new DxfParser().parseSync(text)!;
  const on = (layer: string) => file.entities.filter((one) => one.layer === layer);
  return { file, on };
}

describe("DXF", () => {
  test.each([
    ["smooth", smoothHorn],
    ["dual-mode", dualModeHorn],
    ["corrugated", corrugatedHorn],
  ])("%s: both walls come back point by point, in mm", (_, horn) => {
    const sheet = sheetOf(horn);
    const { on } = read(buildDxf(sheet));
    for (const [layer, wall] of [
      [dxfLayers.inner, sheet.inner],
      [dxfLayers.outer, sheet.outer],
    ] as const) {
      const found = on(layer);
      expect(found).toHaveLength(1);
      const { type, vertices, shape } = found[0] as ILwpolylineEntity;
      expect(type).toBe("LWPOLYLINE");
      expect(shape).toBe(false);
      expect(vertices).toHaveLength(wall.length);
      vertices.forEach(({ x, y }, i) => {
        const exact = { abs: 6e-7, because: "written to a nanometre" };
        assertClose(x, wall[i]![0] * 1e3, exact);
        assertClose(y, wall[i]![1] * 1e3, exact);
      });
    }
  });

  test("end faces close the metal exactly where the walls end; the axis is a chain line on radius 0", () => {
    const { file, on } = read(buildDxf(sheetOf(corrugatedHorn)));
    const ends = (layer: string) => {
      const { vertices } = on(layer)[0] as ILwpolylineEntity;
      return [vertices[0]!, vertices.at(-1)!].map(({ x, y }) => [x, y]);
    };
    const faces = (on(dxfLayers.faces) as ILineEntity[]).map(({ vertices }) => vertices.map(({ x, y }) => [x, y]));
    const [inner, outer] = [ends(dxfLayers.inner), ends(dxfLayers.outer)];
    expect(faces).toEqual([
      [inner[0], outer[0]],
      [inner[1], outer[1]],
    ]);
    expect(inner[1]![0]).toBe(0);
    const [axis] = on(dxfLayers.axis) as ILineEntity[];
    expect(axis!.vertices.map(({ y }) => y)).toEqual([0, 0]);
    assertClose(axis!.vertices[0]!.x, -164 * 1.05, { abs: 1e-6, because: "5 % beyond the horn" });
    expect(file.tables.layer.layers[dxfLayers.axis]).toMatchObject({ name: "AXIS" });
    expect(Object.keys(file.tables.lineType.lineTypes)).toContain("CENTER");
  });

  test("says that it is in mm, has no other entity, and is the same every time", () => {
    const text = buildDxf(sheetOf(smoothHorn));
    const { file } = read(text);
    // DXF reference: $INSUNITS 4 is millimetres, $MEASUREMENT 1 is metric
    expect(file.header).toMatchObject({ $INSUNITS: 4, $MEASUREMENT: 1 });
    expect(file.entities).toHaveLength(5);
    expect(buildDxf(sheetOf(smoothHorn))).toBe(text);
    expect(dxfFile(sheetOf(smoothHorn)).text()).toBe(text);
  });
});
