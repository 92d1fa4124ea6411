// Conversions between SI and the units that a notebook's edge or a drawing speaks. Everything inside cells/ is SI and linear.

export const fromMm = (lengthMm: number): number => lengthMm * 1e-3;
export const toMm = (length: number): number => length * 1e3;
export const fromGHz = (frequencyGHz: number): number => frequencyGHz * 1e9;
export const toGHz = (frequency: number): number => frequency * 1e-9;
export const fromDeg = (angleDeg: number): number => (angleDeg * Math.PI) / 180;
export const toDeg = (angle: number): number => (angle * 180) / Math.PI;
/** Power ratio to decibel; 0 gives -Infinity, which the caller floors where it is shown. */
export const powerToDb = (ratio: number): number => 10 * Math.log10(ratio);
export const dbToPower = (valueDb: number): number => 10 ** (valueDb / 10);
/** Amplitude (field) ratio to decibel. */
export const fieldToDb = (ratio: number): number => 20 * Math.log10(ratio);
export const dbToField = (valueDb: number): number => 10 ** (valueDb / 20);
