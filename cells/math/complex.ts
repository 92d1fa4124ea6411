// Complex numbers as plain data, so that results can be sent to and from a worker.

export interface Complex {
  re: number;
  im: number;
}

/** A complex vector: two real arrays of one length. */
export interface ComplexVector {
  re: Float64Array;
  im: Float64Array;
}

export function complexVector(length: number): ComplexVector {
  return { re: new Float64Array(length), im: new Float64Array(length) };
}
