// Figures: physics values in, drawings out. Every one carries its words and its numbers.

export { apertureFields, type FieldPlateEntry, type FieldPlateGap } from "./aperture-fields.ts";
export {
  type BandCurvesOptions,
  type BandGap,
  type BandPoint,
  type BandQuantity,
  type BandSeries,
  bandCurves,
  standardQuantities,
} from "./band-curves.ts";
export { buildDrawing } from "./build-drawing.ts";
export { type BuildTables, buildTables, type SheetTable } from "./build-tables.ts";
export { type ComparedPattern, type ComparisonOptions, comparison } from "./comparison.ts";
export { type DishSectionOptions, dishSection } from "./dish-section.ts";
export { type DispersionCurve, type DispersionOptions, dispersion } from "./dispersion.ts";
export type { Drawing, DrawingContext, DrawingFile } from "./drawing.ts";
export { distanceText, type ExposureTable, exposureTable } from "./exposure-table.ts";
export { type ApertureField, sampledField, strengthAtWall, sumOfFields } from "./field-plate.ts";
export { type DrawnHorn, hornsToScale } from "./horns-to-scale.ts";
export { type PatternDifference, patternDifference } from "./kit/pattern-difference.ts";
export { type LossEntry, type LossGap, type LossStep, lossSteps, performanceSteps } from "./loss-steps.ts";
export { disagreements, modelsSheet } from "./models-sheet.ts";
export { type CutEntry, type CutGap, type PatternCutsOptions, patternCuts } from "./pattern-cuts.ts";
export { type TradeSheet, tradeSheet } from "./trade-sheet.ts";
export { bestRow, kindNames, kindNouns, tradeSentences } from "./trade-words.ts";
