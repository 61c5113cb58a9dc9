// What a result was made from, kept beside it for derivations. A weak reference: it costs no time and keeps nothing alive.

const BEHIND = new WeakMap<object, object>();

/** The result itself, with a note of what it was made from. Results that are no objects stay as they are. */
export function remember<T>(result: T, made: object): T {
  if (typeof result === "object" && result !== null) BEHIND.set(result, made);
  return result;
}

export function recall(result: object): object | undefined {
  return BEHIND.get(result);
}
