// Cells are pure: one that changes what it received would change another cell's value behind its back.

/** Freezes plain objects and arrays, all the way down. Typed arrays, maps and instances of classes are left as they are. */
export function deepFreeze(value: unknown): void {
  if (typeof value !== "object" || value === null || Object.isFrozen(value)) return;
  const prototype: unknown = Object.getPrototypeOf(value);
  if (!Array.isArray(value) && prototype !== Object.prototype && prototype !== null) return;
  Object.freeze(value);
  for (const inner of Object.values(value)) deepFreeze(inner);
}
