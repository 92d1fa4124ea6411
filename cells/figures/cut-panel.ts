// One panel of pattern cuts: E- and H-plane and cross-polar of one horn, by one model or several.

import { toDeg } from "../units.ts";
import type { Axis } from "./kit/axis.ts";
import { aboveFloor, chosenPoints } from "./kit/curve-points.ts";
import type { CutLevels } from "./kit/cut-levels.ts";
import { limitWords } from "./kit/limit-words.ts";
import { cutStroke, ink, type LineStyle, lineStroke, type MarkShape, paper, textSize } from "./kit/palette.ts";
import { band, curve, type Frame, limitLine, marks, type Panel, type Point, panel, uprights } from "./kit/panel.ts";
import { quietPlace } from "./kit/quiet-place.ts";
import { type Pen, text } from "./kit/svg.ts";
import { textWidth } from "./kit/text-width.ts";
import { decimal, degrees } from "./kit/words.ts";

/** One model's cuts, or a measurement. */
export interface CutSeries {
  style: LineStyle;
  levels: CutLevels;
}

/** dB; what lies lower isn't drawn */
export const floorDb = -45;

/** How a legend explains the marks of a measurement. */
export const measuredWords = "× E, + H, ○ cross-polar";

export interface CutPanelOptions {
  /** rad, rim of the dish */
  halfAngle: number;
  /** rad, end of the axis */
  thetaMax: number;
  /** dB, highest cross-polar asked */
  crossPolarLimitDb?: number;
  /** of the series drawn in full */
  color: string;
  /** levels at the rim of the first series: open dots */
  rimDots?: { ePlaneDb: number; hPlaneDb: number };
}

/** Axis of θ from 0 to `thetaMax` (rad), degrees. */
export function thetaAxis(thetaMax: number): Axis {
  const end = toDeg(thetaMax);
  const every = end > 120 ? 60 : end > 45 ? 30 : end > 20 ? 10 : 5;
  return {
    domain: [0, end],
    ticks: Array.from({ length: Math.floor(end / every + 1e-9) + 1 }, (_, i) => i * every),
    format: (value) => `${value}°`,
  };
}

/** Draws into a frame; the side that misses the dish is tinted. */
export function cutPanel(pen: Pen, frame: Frame, series: readonly CutSeries[], options: CutPanelOptions): Element[] {
  const { thetaMax, halfAngle, crossPolarLimitDb, color, rimDots } = options;
  const rim = toDeg(halfAngle);
  const limit = crossPolarLimitDb !== undefined && crossPolarLimitDb >= floorDb ? crossPolarLimitDb : undefined;
  const y: Axis = {
    domain: [floorDb, 0],
    ticks: [0, -10, -20, -30, -40],
    format: (value) => (value === 0 ? "0 dB" : decimal(value, 0)),
  };
  const dots = rimDots ? [rimDots.ePlaneDb, rimDots.hPlaneDb].filter((level) => level >= floorDb) : [];
  const drawn = panel(
    pen,
    frame,
    { x: thetaAxis(thetaMax), y },
    {
      under: [band(rim, toDeg(thetaMax))],
      over: [
        ...(limit === undefined ? [] : [limitLine(limit)]),
        uprights([rim]),
        // the first series lies on top
        ...[...series].reverse().flatMap((one) => cutMarks(one, color)),
        marks(
          dots.map((level) => [rim, level]),
          "circle",
          ink,
          3,
        ),
      ],
    },
  );
  const curves = series.flatMap(({ levels: { thetaDeg, ePlaneDb, hPlaneDb, crossPolarDb } }) =>
    [ePlaneDb, hPlaneDb, crossPolarDb].map((levels) => aboveFloor(thetaDeg, levels, floorDb)),
  );
  const elements = [drawn.element, rimLabel(pen, frame, drawn, halfAngle, curves)];
  if (limit !== undefined)
    elements.push(limitWords(pen, `asked: ≤ ${decimal(limit, 0)}`, limit, { frame, drawn, curves, uprights: [rim] }));
  return elements;
}

/** "rim 34.7°", beside the upright at its head; at its foot or on its other side where curves or the frame's end forbid that. */
function rimLabel(
  pen: Pen,
  frame: Frame,
  drawn: Panel,
  halfAngle: number,
  curves: readonly (readonly Point[])[],
): Element {
  const words = `rim ${degrees(halfAngle)}`;
  const size = textSize.axis;
  const width = textWidth(words, size);
  const height = size + 2;
  const x = drawn.xAt(toDeg(halfAngle));
  const [right, left] = [x + 5, x - 5 - width];
  const [head, foot] = [frame.top + 3, frame.top + frame.height - height - 4];
  const boxes = [
    { left: right, top: head, width, height },
    { left: right, top: foot, width, height },
    { left, top: head, width, height },
    { left, top: foot, width, height },
  ].filter((box) => box.left >= frame.left && box.left + width <= frame.left + frame.width + 4);
  const inPx = curves.map((points) => points.map(([px, py]): Point => [drawn.xAt(px), drawn.yAt(py)]));
  const place = boxes.length > 0 ? quietPlace(boxes, inPx) : { left: right, top: head };
  return text(pen, place.left, place.top + size - 1, words, { size, halo: place.left < x ? paper : undefined });
}

const measuredShapes = { e: "times", h: "plus", cross: "circle" } as const satisfies Record<string, MarkShape>;

function cutMarks({ style, levels }: CutSeries, fullColor: string) {
  const { thetaDeg, ePlaneDb, hPlaneDb, crossPolarDb } = levels;
  const { width, color = fullColor } = lineStroke[style];
  const cuts = [
    { cut: "cross", level: crossPolarDb },
    { cut: "h", level: hPlaneDb },
    { cut: "e", level: ePlaneDb },
  ] as const;
  return cuts.map(({ cut, level }) => {
    if (style === "measured") {
      const points = thetaDeg.map((theta, i): Point => [theta, level[i]!]).filter(([, y]) => y >= floorDb);
      return marks(chosenPoints(points, 28), measuredShapes[cut], color, cut === "cross" ? 1.6 : 2.6);
    }
    const points = aboveFloor(thetaDeg, level, floorDb);
    const stroke = cutStroke[cut];
    return curve(points, { color, width: style === "full" ? stroke.width : width, dash: stroke.dash });
  });
}
