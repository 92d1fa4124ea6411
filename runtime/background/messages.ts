// What the page's side and a worker say to one another.

export interface CallMessage {
  type: "call";
  id: number;
  name: string;
  args: readonly unknown[];
  /** set to 1 when the result is no longer wanted; only where memory can be shared */
  dropped?: Int32Array;
}

export interface CancelMessage {
  type: "cancel";
  id: number;
}

export type ToWorker = CallMessage | CancelMessage;

/** An error as it travels: a class does not survive the crossing, its words and stack do. */
export interface CarriedError {
  name: string;
  message: string;
  stack?: string;
}

export type FromWorker =
  | { type: "ready" }
  | { type: "progress"; id: number; fraction: number }
  | { type: "done"; id: number; value: unknown }
  | { type: "failed"; id: number; error: CarriedError };

export function carriedError(error: unknown): CarriedError {
  if (!(error instanceof Error)) return { name: "Error", message: String(error) };
  const { name, message, stack } = error;
  return { name, message, ...(stack === undefined ? {} : { stack }) };
}

/** The error on this side: same name, words and stack. */
export function revivedError({ name, message, stack }: CarriedError): Error {
  const error = new Error(message);
  error.name = name;
  if (stack !== undefined) error.stack = stack;
  return error;
}
