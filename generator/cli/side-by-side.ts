/**
 * Work through a list, a few items at a time, begun in the order of the list.
 *
 * @param atOnce - 1 or more
 * @param work - never rejects
 * @returns the results in the order of the list, whatever ended first
 */
export async function sideBySide<T, R>(items: readonly T[], atOnce: number, work: (item: T, index: number) => Promise<R>): Promise<readonly R[]> {
  const results: R[] = []
  let next = 0
  const worker = async (): Promise<void> => {
    while (next < items.length) {
      const index = next++
      results[index] = await work(items[index], index)
    }
  }
  await Promise.all(Array.from({ length: Math.min(atOnce, items.length) }, worker))
  return results
}
