// A horn's section as a DXF file, for the workshop's own programs. Not among the exports of index.ts: the library behind it
// is 86 kB, which only a notebook that asks for such a file has to carry.

import { Colors, DxfWriter, point2d, point3d, Units } from "@tarikjabiri/dxf";
import type { BuildSheet } from "../horn/workshop/build-sheet.ts";
import type { ZR } from "../horn/workshop/metal.ts";
import { toMm } from "../units.ts";
import type { DrawingFile } from "./drawing.ts";

/** Layers of the file, each with what is on it. */
export const dxfLayers = { inner: "INNER_WALL", outer: "OUTER_WALL", faces: "END_FACES", axis: "AXIS" } as const;

/** How far the axis runs beyond the horn, as a part of its length. */
const axisBeyond = 0.05;

/** Nanometres are kept, noise of the last digits is not. */
const asMm = (length: number): number => Math.round(toMm(length) * 1e6) / 1e6 + 0;

/**
 * Half section of a horn as an ASCII DXF (AC1021, readable since 2007), mm: X along the axis (datum at the mouth, X = 0, negative
 * into the horn), Y the radius. The metal is what lies between the inner and the outer wall, closed by the two end faces; the
 * axis is a chain line.
 *
 * The same sheet always gives the same text.
 * @source DXF reference, release 2007; written with @tarikjabiri/dxf
 */
export function buildDxf(sheet: BuildSheet): string {
  const file = new DxfWriter();
  file.setUnits(Units.Millimeters);
  file.setVariable("$MEASUREMENT", { 70: 1 });
  file.addLType("CENTER", "Center ____ _ ____ _ ____", [31.75, -6.35, 6.35, -6.35]);
  file.addLayer(dxfLayers.inner, Colors.White, "Continuous");
  file.addLayer(dxfLayers.outer, Colors.White, "Continuous");
  file.addLayer(dxfLayers.faces, Colors.White, "Continuous");
  file.addLayer(dxfLayers.axis, Colors.Red, "CENTER");
  const { inner, outer } = sheet;
  const wall = (points: readonly ZR[], layerName: string) =>
    file.addLWPolyline(
      points.map(([z, r]) => ({ point: point2d(asMm(z), asMm(r)) })),
      { layerName },
    );
  wall(inner, dxfLayers.inner);
  wall(outer, dxfLayers.outer);
  const line = ([z0, r0]: ZR, [z1, r1]: ZR, layerName: string) =>
    file.addLine(point3d(asMm(z0), asMm(r0)), point3d(asMm(z1), asMm(r1)), { layerName });
  line(inner[0]!, outer[0]!, dxfLayers.faces);
  line(inner.at(-1)!, outer.at(-1)!, dxfLayers.faces);
  const [throat, mouth] = [inner[0]![0], inner.at(-1)![0]];
  const beyond = axisBeyond * (mouth - throat);
  line([throat - beyond, 0], [mouth + beyond, 0], dxfLayers.axis);
  return file.stringify();
}

/** The file as a drawing offers it: `{ ...buildDrawing(sheet), files: [dxfFile(sheet)] }`. */
export function dxfFile(sheet: BuildSheet): DrawingFile {
  return { label: "DXF", extension: "dxf", type: "image/vnd.dxf", text: () => buildDxf(sheet) };
}
