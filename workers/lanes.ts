/**
 * Works through items with several at once, in order of start.
 *
 * After the first failure no further item starts; what is under way is waited for, so that nothing
 * goes on behind the caller's back, and the first failure is thrown.
 */
export async function inLanes<Item>(
  items: readonly Item[],
  lanes: number,
  work: (item: Item, index: number) => Promise<void>,
): Promise<void> {
  let next = 0;
  let failure: { error: unknown } | undefined;
  async function lane(): Promise<void> {
    while (next < items.length && !failure) {
      const index = next++;
      try {
        await work(items[index], index);
      } catch (error) {
        failure ??= { error };
      }
    }
  }
  await Promise.all(Array.from({ length: Math.min(lanes, items.length) }, lane));
  if (failure) throw failure.error;
}
