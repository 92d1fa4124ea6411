// Where to put a feed: its phase centre over the dish.

import type { FeedPattern } from "../pattern/feed-pattern.ts";
import { type PhaseCenter, phaseCenter } from "../pattern/phase-center.ts";
import type { Dish } from "./dish.ts";

/** Level, as a power ratio to boresight, that both planes must hold: −25 dB. */
const lobeEdge = 10 ** -2.5;

/**
 * Best-fit phase centre of a feed over the dish, or over its main lobe where that ends inside the dish: the fit stops where
 * either plane has fallen by 25 dB. Beyond, a null turns the phase by half a turn over next to nothing of the power, and no
 * single point explains both sides of it.
 *
 * @throws {RangeError} not a pattern, or a phase that runs too fast for its angles (see `phaseCenter`)
 */
export function phaseCenterOverDish(pattern: FeedPattern, dish: Dish): PhaseCenter {
  const { theta, ePlane, hPlane } = pattern;
  const least = lobeEdge * (ePlane.re[0]! ** 2 + ePlane.im[0]! ** 2);
  const below = theta.findIndex(
    (_, i) => ePlane.re[i]! ** 2 + ePlane.im[i]! ** 2 < least || hPlane.re[i]! ** 2 + hPlane.im[i]! ** 2 < least,
  );
  const lobe = below < 0 ? Math.PI : theta[Math.max(below - 1, 1)]!;
  return phaseCenter(pattern, Math.min(dish.halfAngle, lobe));
}
