/**
 * Do work on every item, a few at a time, each begun when one before it is done: what the work holds is never there for all items at once.
 *
 * @param atOnce - at least 1
 * @throws what the first work that fails throws; none is begun after it
 */
export async function inTurn<Item>(items: readonly Item[], atOnce: number, work: (item: Item) => Promise<void>): Promise<void> {
  let next = 0
  const lane = async (): Promise<void> => {
    while (next < items.length) {
      try {
        await work(items[next++])
      } catch (error) {
        next = items.length
        throw error
      }
    }
  }
  await Promise.all(Array.from({ length: atOnce }, lane))
}
