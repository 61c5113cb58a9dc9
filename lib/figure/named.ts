// Marked points with their names, as figures take them.

/** Values by their names, { P, Q }, or a list. */
export type Named<T> = Readonly<Record<string, T>> | readonly T[];

/** Names and values; the values of a list are named by `nameAt`. */
export function namedEntries<T>(
  named: Named<T> | undefined,
  nameAt: (value: T, index: number) => string,
): (readonly [name: string, value: T])[] {
  if (named === undefined) return [];
  if (!isList(named)) return Object.entries(named);
  return named.map((value, k) => [nameAt(value, k), value]);
}

function isList<T>(named: Named<T>): named is readonly T[] {
  return Array.isArray(named);
}
