// Plain numbers of the language that can stand in a formula.

/** A bigint, an integer that a double holds exactly, or an infinity, such as the order of a point. */
export function isPlainNumber(value: unknown): value is bigint | number {
  if (typeof value === "bigint") return true;
  return typeof value === "number" && (Number.isSafeInteger(value) || Math.abs(value) === Number.POSITIVE_INFINITY);
}
