// The physicist's entrance: what the rooms of cells/ offer, in the order in which a signal meets them on its way out.
// Everything is SI and linear unless its name says otherwise; time e^{+jωt}; +z out of the horn, mouth at z = 0.
// What isn't listed here (kernels, tables, the folders of one kind of horn) is for the rooms themselves.

// Ground: constants, units, how a result says that it is in doubt.
export { ConvergenceError, type Warning, type WarningCode } from "./check.ts";
export { speedOfLight, vacuumImpedance, vacuumPermeability } from "./constants.ts";
// Guide: the modes of a smooth circular guide and of a corrugated one.
export * from "./guide/hybrid.ts";
export * from "./guide/hybrid-dispersion.ts";
export { hybridField } from "./guide/hybrid-field.ts";
export * from "./guide/mode.ts";
export {
  balancedFrequency,
  balancedSlotDepth,
  type CapacitiveWindow,
  capacitiveWindow,
  type Slot,
  slotReactance,
  slowWaveLimit,
} from "./guide/slot.ts";
// Horn: one folder a kind. First dimensions for what a dish asks, or the reason why there are none; pattern, modes at the mouth, loss.
export {
  type BreakdownMargin,
  breakdownField,
  breakdownMargin,
  type PoweredGuide,
  seaLevelBreakdownField,
  te10BreakdownPower,
  te11PeakField,
  usualMarginDb,
} from "./horn/air-breakdown.ts";
export * from "./horn/custom/own-band.ts";
export { readProfile } from "./horn/custom/read-profile.ts";
export * from "./horn/index.ts";
export { type MeasuredPattern, readPatternCuts } from "./horn/measured/pattern-cuts.ts";
export { type MeasuredMatch, readTouchstone } from "./horn/measured/touchstone.ts";
// Workshop: what it takes to build one of them, or an own profile.
export {
  type BuildableHorn,
  type BuildGivens,
  type BuildSheet,
  buildSheet,
  type SheetDimension,
  type SlotRow,
} from "./horn/workshop/build-sheet.ts";
export { type MachiningVerdict, type ShopLimits, usualShop } from "./horn/workshop/machining.ts";
export { type MetalMass, metals } from "./horn/workshop/mass.ts";

// Matching: the modes at the mouth of an actual profile, with the error that they are good to.
export * from "./matching/index.ts";

// Pattern: the one form in which every feed hands its far field on, and what can be read from it.
export * from "./pattern/cuts.ts";
export type { FeedPattern } from "./pattern/feed-pattern.ts";
export { cosineFeed, gaussianFeed } from "./pattern/ideal-feeds.ts";
export { resample } from "./pattern/interpolant.ts";
export { movedPhaseOrigin, type PhaseCenter, phaseCenter } from "./pattern/phase-center.ts";
export { apertureDirectivity, boresightIntensity, directivity, radiatedPower } from "./pattern/power.ts";

// Radiation: from what stands at a mouth to its far field.
export type { ApertureModes } from "./radiation/aperture-modes.ts";
export { aperturePattern } from "./radiation/aperture-pattern.ts";
export { hybridModePattern, hybridPattern } from "./radiation/hybrid-pattern.ts";
// Reflector: the dish, what it asks of a feed, what it makes of one.
export * from "./reflector/dish.ts";
export * from "./reflector/efficiency.ts";
export {
  densityOnAxis,
  type ExposureDistance,
  exposureDistances,
  type NearFieldEstimate,
  nearFieldEstimate,
  type Transmitter,
} from "./reflector/exposure.ts";
export { type ExposureLimit, exposureLimits } from "./reflector/exposure-limits.ts";
export { phaseCenterOverDish } from "./reflector/feed-position.ts";
export * from "./reflector/losses.ts";
export * from "./reflector/requirement.ts";
export {
  type DishSurface,
  type SunFocus,
  type SunGivens,
  specularReflectance,
  sunFocus,
} from "./reflector/sun-focus.ts";
// Trade: every candidate over the band, side by side, judged.
export * from "./trade/matched-band.ts";
export * from "./trade/measured-performance.ts";
export * from "./trade/over-band.ts";
export * from "./trade/trade-table.ts";
export * from "./trade/verdict.ts";
export * from "./units.ts";
