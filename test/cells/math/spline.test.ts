import { describe, expect, test } from "vitest";
import { cubicSpline } from "../../../cells/math/spline.ts";
import { assertClose } from "../../assert-close.ts";

const knots = [0, 0.4, 1.1, 1.5, 2.7, 3];
const heights = [1, -0.2, 0.5, 0.7, -1.3, 0.25];

// python3 -c "
// from scipy.interpolate import CubicSpline; x=[0,.4,1.1,1.5,2.7,3]; y=[1,-.2,.5,.7,-1.3,.25]
// for bc in ('not-a-knot','natural'): s=CubicSpline(x,y,bc_type=bc); print(bc,[(repr(float(s(t))),repr(float(s(t,1)))) for t in (.1,.9,2.2,2.95)])"
// SciPy 1.17.1
const scipy = {
  "not-a-knot": [
    [0.1, 0.5097401749575665, -4.187229917664698],
    [0.9, 0.1798703842182101, 1.6309519005171178],
    [2.2, -1.0962616327350638, -2.5129599625976438],
    [2.95, -0.12773455204765485, 7.034012528668333],
  ],
  natural: [
    [0.1, 0.6252743902439025, -3.647621951219511],
    [0.9, 0.13781483325037303, 1.849571926331508],
    [2.2, -1.257144026648601, -2.5819848528842435],
    [2.95, -0.051589035682022666, 5.982345625241971],
  ],
};

describe("cubicSpline against SciPy's CubicSpline", () => {
  test.each(Object.entries(scipy))("%s", (ends, rows) => {
    const spline = cubicSpline(knots, heights, ends as "natural");
    for (const [x, value, slope] of rows) {
      assertClose(spline.at(x!), value!, { abs: 5e-15, because: "rounding" });
      assertClose(spline.slopeAt(x!), slope!, { abs: 5e-14, because: "rounding over the spacing" });
    }
  });
});

describe("laws", () => {
  test("not-a-knot reproduces a cubic, also with two and three points a line and a parabola", () => {
    const cubic = (x: number): number => 2 - x + 3 * x * x - 0.5 * x ** 3;
    const spline = cubicSpline(knots, knots.map(cubic));
    assertClose(spline.at(2.05), cubic(2.05), { abs: 1e-14, because: "exact but for rounding" });
    assertClose(cubicSpline([0, 2], [1, 5]).at(0.5), 2, { abs: 1e-15, because: "a line" });
    assertClose(cubicSpline([0, 1, 3], [0, 1, 9]).at(2), 4, { abs: 1e-14, because: "a parabola" });
  });

  test("error falls with the fourth power of the spacing, up to the ends", () => {
    const worst = (count: number): number => {
      const x = Float64Array.from({ length: count }, (_, i) => (3 * i) / (count - 1));
      const spline = cubicSpline(x, x.map(Math.sin));
      let error = 0;
      for (let t = 0; t <= 3; t += 0.001) error = Math.max(error, Math.abs(spline.at(t) - Math.sin(t)));
      return error;
    };
    const ratio = worst(41) / worst(81);
    expect(ratio).toBeGreaterThan(13);
    expect(ratio).toBeLessThan(40);
  });
});

test("refusals", () => {
  expect(() => cubicSpline([0, 1], [1])).toThrow(/one length; got 2 and 1/);
  expect(() => cubicSpline([0], [1])).toThrow(/at least 2 points/);
  expect(() => cubicSpline([0, 1, 1], [1, 2, 3])).toThrow(/must ascend; got 1 then 1/);
  expect(() => cubicSpline([0, Number.NaN], [1, 2])).toThrow(/must ascend/);
});
