// What stands at a horn's mouth by the closed form, term by term: for pictures of the field and for shares of power.

import type { TransverseField } from "../guide/mode.ts";
import type { Complex } from "../math/complex.ts";

/** One mode at the mouth, before the phase of the flare. */
export interface MouthTerm {
  /** "TE11", "TM11", "HE11" */
  name: string;
  /** share of the power at the mouth, 0…1 */
  powerShare: number;
  /** rad, positive ahead of the first term */
  phase: number;
  /** field of the term at (ρ m, φ rad) is `amplitude`·profile, V/m for 1 W at the throat; complex: its phase against the first */
  amplitude: Complex;
  profile: (rho: number, phi: number) => TransverseField;
}
