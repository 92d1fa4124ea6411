import { describe, expect, test } from "vitest";
import { levelAt } from "../../../cells/pattern/cuts.ts";
import { cosineFeed, gaussianFeed } from "../../../cells/pattern/ideal-feeds.ts";
import { boresightIntensity, directivity, radiatedPower } from "../../../cells/pattern/power.ts";
import { assertClose } from "../../assert-close.ts";

describe("cosineFeed", () => {
  // G = 2(n+1)cosⁿθ: Silver 1949; Balanis 15-57. Closed form.
  test.each([2, 4, 6, 8, 20])("n = %i: directivity 2(n+1), 1 W", (n) => {
    const feed = cosineFeed(n);
    const because = "the kink at 90° under the quadrature at 0.5°";
    assertClose(4 * Math.PI * boresightIntensity(feed), 2 * (n + 1), { rel: 1e-14, because: "closed form" });
    assertClose(directivity(feed), 2 * (n + 1), { rel: 2e-6, because });
    assertClose(radiatedPower(feed), 1, { rel: 2e-6, because });
    expect(feed.aperturePower).toBe(1);
  });

  // Feed part of the edge level at the optimum half-angle of a cosⁿ feed (2: −7.81 dB at 65.99°, 8: −9.77 at 40.99°). Computed.
  test.each([
    [2, 65.99, -7.81],
    [4, 53.31, -8.95],
    [6, 45.95, -9.47],
    [8, 40.99, -9.77],
  ])("n = %i at %d°: %d dB", (n, angleDeg, levelDb) => {
    const level = levelAt(cosineFeed(n), (angleDeg * Math.PI) / 180);
    assertClose(level.ePlaneDb, levelDb, { abs: 6e-3, because: "2 printed decimals" });
    assertClose(level.hPlaneDb, level.ePlaneDb, { abs: 1e-12, because: "equal planes" });
  });

  test("zero from 90° on", () => {
    const feed = cosineFeed(2, { thetaCount: 361 });
    expect(feed.ePlane.re[180]).toBe(0);
    expect(feed.ePlane.re[300]).toBe(0);
    expect(feed.ePlane.re[179]).toBeGreaterThan(0);
  });

  test("refusals", () => {
    expect(() => cosineFeed(0)).toThrow(/cosineFeed: n/);
    expect(() => cosineFeed(2, { frequency: -1 })).toThrow(/frequency must be a number above 0 Hz; got -1 Hz/);
    expect(() => gaussianFeed({ halfAngle: 4, taperDb: 10 })).toThrow(/halfAngle/);
    expect(() => gaussianFeed({ halfAngle: 1, taperDb: 0 })).toThrow(/taperDb/);
  });
});

test("gaussianFeed: 1 W, and for a narrow beam the directivity of a Gaussian, 4/θ₀² with U = e^{−θ²/θ₀²·…}", () => {
  const feed = gaussianFeed({ halfAngle: 0.1, taperDb: 20 }, { thetaCount: 3601 });
  assertClose(radiatedPower(feed), 1, { rel: 1e-14, because: "normalized by the same integral" });
  // U = U₀ e^{−aθ²}, a = ln(10)·taper/(10·halfAngle²): P ≈ U₀·π/a·(1 − 1/(6a)).
  const a = (Math.LN10 * 2) / 0.01;
  assertClose(directivity(feed), (4 * a) / (1 - 1 / (6 * a)), { rel: 1e-5, because: "next term of order 1/a²" });
});
