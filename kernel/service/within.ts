// Waiting with a limit.

/** The promise, or `otherwise` if it takes more than `ms` or rejects. */
export async function within<T>(ms: number, promise: Promise<T>, otherwise: T): Promise<T> {
  let timer: NodeJS.Timeout | undefined;
  const limit = new Promise<T>((resolve) => {
    timer = setTimeout(() => resolve(otherwise), ms);
  });
  try {
    return await Promise.race([promise, limit]);
  } catch {
    return otherwise;
  } finally {
    clearTimeout(timer);
  }
}
