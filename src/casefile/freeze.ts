/** Freezes plain data to its leaves and returns it. The elements of typed arrays cannot be frozen; nothing here writes to them. */
export function deepFreeze<T>(value: T): T {
  if (typeof value === 'object' && value !== null && !ArrayBuffer.isView(value) && !Object.isFrozen(value)) {
    Object.freeze(value);
    for (const inner of Object.values(value)) deepFreeze(inner);
  }
  return value;
}
