/** The answer, or null where the question has none. */
export function orNull<T>(ask: () => T): T | null {
  try {
    return ask();
  } catch (reason) {
    if (reason instanceof RangeError) return null;
    throw reason;
  }
}
