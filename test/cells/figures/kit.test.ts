// The parts that figures are made of.

import { describe, expect, test } from "vitest";
import { roundAxis, roundStep } from "../../../cells/figures/kit/axis.ts";
import { columns } from "../../../cells/figures/kit/columns.ts";
import { aboveFloor, chosenPoints, lastPoint, seriesPoints } from "../../../cells/figures/kit/curve-points.ts";
import { hatchPath } from "../../../cells/figures/kit/hatch.ts";
import { quietPlace } from "../../../cells/figures/kit/quiet-place.ts";
import { spread } from "../../../cells/figures/kit/spread.ts";
import { coordinate, svgPen } from "../../../cells/figures/kit/svg.ts";
import { textWidth, wrapText } from "../../../cells/figures/kit/text-width.ts";
import { decibels, decimal, degrees, gigahertz, length, listed, percent } from "../../../cells/figures/kit/words.ts";
import { assertClose, seededRandom } from "../../assert-close.ts";
import { headlessDocument } from "./examples.ts";

describe("words", () => {
  test("a true minus, a space before the unit, no sign on what rounds to zero", () => {
    expect(decimal(-23.64, 1)).toBe("−23.6");
    expect(decimal(-0.004, 2)).toBe("0.00");
    expect(decibels(-0.96, 2)).toBe("−0.96 dB");
    expect(percent(0.6006)).toBe("60.1 %");
    expect(degrees(Math.PI / 6)).toBe("30.0°");
  });

  test("lengths in the unit that a drawing would use", () => {
    expect([2.4, 0.1875, 0.0269, 0.0024].map(length)).toEqual(["2.40 m", "188 mm", "26.9 mm", "2.40 mm"]);
  });

  test("frequencies as a band is spoken of", () => {
    expect([8.2e9, 8.025e9, 12e9, 11.75e9].map(gigahertz)).toEqual(["8.2", "8.025", "12.0", "11.75"]);
  });

  test("lists", () => {
    expect([[], ["a"], ["a", "b"], ["a", "b", "c"]].map(listed)).toEqual(["", "a", "a and b", "a, b and c"]);
  });
});

describe("text width", () => {
  test("Helvetica's metrics, on the safe side for a wider face", () => {
    // Adobe's AFM of Helvetica: H 722, a 556, l 222, per 1000
    assertClose(textWidth("Hal", 10), 15 * 1.17, { rel: 1e-12, because: "three advance widths and the allowance" });
  });

  test("lines keep within the width, all words in order", () => {
    const words =
      "A mouth wide enough in beam would be too small: toward the rim at 61.5° the pattern may fall 8.37 dB there";
    for (const width of [80, 150, 400]) {
      const lines = wrapText(words, width, 12);
      expect(lines.join(" ")).toBe(words);
      for (const line of lines.filter((line) => line.includes(" ")))
        expect(textWidth(line, 12)).toBeLessThanOrEqual(width);
    }
  });

  test("a number keeps its unit", () => {
    for (let width = 40; width < 200; width += 3)
      for (const line of wrapText("above 18.7 GHz, at 8.37 dB or 2.4 mm rms", width, 12))
        expect(line).not.toMatch(/^(GHz|dB|mm)/);
  });

  test("a word wider than the line stands alone", () => {
    expect(wrapText("a extraordinarily b", 20, 12)).toEqual(["a", "extraordinarily", "b"]);
  });
});

describe("spread", () => {
  test("labels that don't meet stay; two at one place move apart evenly", () => {
    expect(spread([10, 40], 14, 0, 100)).toEqual([10, 40]);
    expect(spread([50, 50], 14, 0, 100)).toEqual([43, 57]);
    expect(spread([2, 3], 14, 0, 100)).toEqual([0, 14]);
    expect(spread([], 14, 0, 100)).toEqual([]);
  });

  test("any labels: apart by the gap, in their order, within bounds", () => {
    const random = seededRandom(7);
    for (let trial = 0; trial < 300; trial++) {
      const wanted = Array.from({ length: 1 + Math.floor(random() * 7) }, () => random() * 120 - 10);
      const placed = spread(wanted, 14, 0, 100);
      const order = wanted.map((_, i) => i).sort((a, b) => wanted[a]! - wanted[b]! || a - b);
      order.forEach((index, i) => {
        expect(placed[index]!).toBeGreaterThanOrEqual(-1e-9);
        expect(placed[index]!).toBeLessThanOrEqual(100 + 1e-9);
        if (i > 0) expect(placed[index]! - placed[order[i - 1]!]!).toBeGreaterThanOrEqual(14 - 1e-9);
      });
    }
  });

  test("no room for all: the gap shrinks", () => {
    expect(spread([5, 5, 5], 14, 0, 10)).toEqual([0, 5, 10]);
  });
});

describe("axis", () => {
  test("steps are 1, 2 or 5 of a decade", () => {
    expect([0.7, 1, 1.2, 2.1, 6, 0.03].map(roundStep)).toEqual([1, 1, 2, 5, 10, 0.05]);
  });

  test("holds every value between round ticks", () => {
    const random = seededRandom(3);
    for (let trial = 0; trial < 200; trial++) {
      const values = Array.from({ length: 5 }, () => (random() - 0.5) * 10 ** (4 * random() - 1));
      const { domain, ticks } = roundAxis(values);
      expect(domain[0]).toBeLessThanOrEqual(Math.min(...values));
      expect(domain[1]).toBeGreaterThanOrEqual(Math.max(...values));
      expect(ticks.length).toBeGreaterThan(1);
      expect(ticks.length).toBeLessThan(12);
    }
  });

  test("values that hardly differ are opened to the least span, none at all give 0 to 1", () => {
    const flat = roundAxis([71.9, 72.1], { leastSpan: 4 });
    expect(flat.domain[1] - flat.domain[0]).toBeGreaterThanOrEqual(4);
    expect(roundAxis([Number.NaN, Infinity]).domain).toEqual([0, 1]);
    expect(roundAxis([0, 0]).domain[1]).toBeGreaterThan(0);
  });

  test("tick words have the decimals of the step", () => {
    const { ticks, format } = roundAxis([0, 1]);
    expect(ticks.map(format)).toEqual(["0.0", "0.2", "0.4", "0.6", "0.8", "1.0"]);
    expect(roundAxis([-45, 0]).ticks.map(roundAxis([-45, 0]).format)).toContain("−40");
  });
});

describe("curves", () => {
  test("a curve ends on the floor where it crosses it, and begins there again", () => {
    expect(aboveFloor([0, 1, 2, 3, 4], [0, -40, -60, -40, -10], -50)).toEqual([
      [0, 0],
      [1, -40],
      [1.5, -50],
      [2, Number.NaN],
      [2.5, -50],
      [3, -40],
      [4, -10],
    ]);
  });

  test("what has no value is a gap, not a fall", () => {
    expect(aboveFloor([0, 1, 2], [-1, Number.NaN, -3], -50)).toEqual([
      [0, -1],
      [1, Number.NaN],
      [2, -3],
    ]);
    expect(aboveFloor([0, 1], [-1, -Infinity], -50)[1]).toEqual([0, -50]);
    expect(seriesPoints([1, 2], [null, 5])).toEqual([
      [1, Number.NaN],
      [2, 5],
    ]);
  });

  test("chosen points include both ends", () => {
    const points = Array.from({ length: 21 }, (_, i) => [i, i] as const);
    expect(chosenPoints(points, 5)).toEqual([0, 5, 10, 15, 20].map((i) => [i, i]));
    expect(lastPoint([...points, [21, Number.NaN]])).toEqual([20, 20]);
    expect(lastPoint([[0, Number.NaN]])).toBeUndefined();
  });
});

describe("hatching", () => {
  const segments = (path: string) =>
    [...path.matchAll(/M(\S+) (\S+)l(\S+) (\S+?)(?=M|$)/g)].map((match) => {
      const [x, y, right, down] = match.slice(1).map(Number) as [number, number, number, number];
      return [x, y, x + right, y + down];
    });

  test("lines at 45°, rising to the right, as long as area over spacing", () => {
    const square = [
      [10, 10],
      [110, 10],
      [110, 110],
      [10, 110],
    ] as const;
    const lines = segments(hatchPath(square, 2));
    for (const [x0, y0, x1, y1] of lines) expect(Math.abs(x1! - x0! + (y1! - y0!))).toBeLessThan(0.021);
    const total = lines.reduce((sum, [x0, y0, x1, y1]) => sum + Math.hypot(x1! - x0!, y1! - y0!), 0);
    assertClose(total * 2, 100 * 100, { rel: 0.02, because: "one line in either corner may or may not fall inside" });
  });

  test("a notch stays empty", () => {
    const notched = [
      [0, 0],
      [100, 0],
      [100, 40],
      [50, 40],
      [50, 60],
      [100, 60],
      [100, 100],
      [0, 100],
    ] as const;
    const lines = segments(hatchPath(notched, 3));
    expect(lines.length).toBeGreaterThan(20);
    for (const [x0, y0, x1, y1] of lines) {
      const [x, y] = [(x0! + x1!) / 2, (y0! + y1!) / 2];
      expect(x > 50 && y > 40 && y < 60).toBe(false);
    }
  });
});

describe("placing", () => {
  const box = (left: number) => ({ left, top: 0, width: 20, height: 10 });

  test("words go where fewest curves run, the first of equals", () => {
    const curve = [
      [0, 5],
      [30, 5],
    ] as const;
    expect(quietPlace([box(0), box(50)], [curve])).toEqual(box(50));
    expect(quietPlace([box(50), box(80)], [curve])).toEqual(box(50));
    expect(
      quietPlace(
        [box(0)],
        [
          [
            [0, Number.NaN],
            [30, 5],
          ],
        ],
      ),
    ).toEqual(box(0));
  });

  test("columns make even rows", () => {
    expect([1, 2, 3, 4, 5, 6].map((items) => columns(items, 760, 220, 26).count)).toEqual([1, 2, 3, 2, 3, 3]);
    expect([1, 3, 4].map((items) => columns(items, 354, 220, 26).count)).toEqual([1, 1, 1]);
    const three = columns(3, 760, 220, 26);
    assertClose(three.left(2) + three.width, 760, { rel: 1e-12, because: "the last column ends at the right edge" });
  });
});

describe("elements", () => {
  test("coordinates are hundredths, never −0", () => {
    expect([1 / 3, -0.001, 5].map(coordinate)).toEqual(["0.33", "0", "5"]);
    expect(() => coordinate(Number.NaN)).toThrow("drawing: a coordinate must be a finite number of px; got NaN");
  });

  test("an attribute without a number is refused by name", () => {
    const pen = svgPen(headlessDocument());
    expect(() => pen("circle", { cx: Number.POSITIVE_INFINITY })).toThrow(
      "drawing: cx of <circle> must be a finite number",
    );
    expect(pen("circle", { cx: 1.23456, r: undefined }).outerHTML).toContain('cx="1.23"');
  });
});
