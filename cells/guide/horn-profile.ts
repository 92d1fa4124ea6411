// The inner wall of a horn, as one polyline: what a workshop turns and what the models analyse.

/**
 * Inner wall of a body of revolution as a polyline from the throat to the mouth.
 * z never decreases; two points at one z are an abrupt step (a slot wall, a diameter step). The mouth is at z = 0.
 * Mode matching alone takes one exception: a ring-loaded slot, whose bottom reaches behind the metal beside it; there z turns
 * back along the neck's radius.
 */
export interface HornProfile {
  /** m, [pointCount], last is 0 */
  z: number[];
  /** m, [pointCount], all positive */
  radius: number[];
}
