// Mode matching: from a profile to the modes at the mouth.

export type { BandAnalysis } from "./band-analysis.ts";
export type { BandOptions } from "./band-options.ts";
export type { Convergence } from "./convergence.ts";
export { junctionCouplings } from "./couplings.ts";
export { type StepOptions, type StepScattering, stepScattering } from "./junction.ts";
export { bandAnalysis, createMatcher, type Matcher } from "./matcher.ts";
export type { Level } from "./refinement.ts";
export type { Resonance } from "./resonances.ts";
