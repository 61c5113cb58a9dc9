/**
 * Values by number, made when first asked for; the oldest goes when there are more than `most`. A value is stored when it is complete, so a call that is
 * cut off leaves nothing behind.
 */
export function boundedCache<V>(most: number, make: (key: number) => V): (key: number) => V {
  const kept = new Map<number, V>();
  return (key) => {
    const known = kept.get(key);
    if (known !== undefined) return known;
    const fresh = make(key);
    if (kept.size >= most) kept.delete(kept.keys().next().value!);
    kept.set(key, fresh);
    return fresh;
  };
}
