/**
 * Move labels apart until each has room, as little as possible: the least-squares solution, by pooling neighbours that collide.
 *
 * @param wanted - where each label's middle would like to stand, ascending
 * @param sizes - room that each label takes, in the same unit
 * @param range - lowest and highest edge; where they hold not all labels, every size shrinks evenly
 * @returns the middles, ascending, in the order of `wanted`
 * @see Barlow, Bartholomew, Bremner and Brunk (1972), Statistical Inference under Order Restrictions, section 1.2 (pool adjacent violators)
 * @example spreadLabels([0.5, 0.5], [0.2, 0.2], [0, 1]) // => [0.4, 0.6]
 */
export function spreadLabels(wanted: readonly number[], sizes: readonly number[], range: readonly [number, number]): readonly number[] {
  const [lowest, highest] = range
  const needed = sizes.reduce((sum, size) => sum + size, 0)
  const shrink = Math.min(1, (highest - lowest) / needed)
  // Less what stands before it, a label's middle only has to be no lower than that of its neighbour below: a monotone regression.
  const before = sizes.map((size, index) => (sizes.slice(0, index).reduce((sum, other) => sum + other, 0) + size / 2) * shrink)
  const pools: { sum: number, count: number }[] = []
  wanted.forEach((place, index) => {
    pools.push({ sum: place - before[index], count: 1 })
    while (pools.length > 1 && mean(pools[pools.length - 2]) > mean(pools[pools.length - 1])) {
      const last = pools.splice(-1)[0]
      const under = pools[pools.length - 1]
      pools[pools.length - 1] = { sum: under.sum + last.sum, count: under.count + last.count }
    }
  })
  const free = pools.flatMap((pool) => Array.from({ length: pool.count }, () => mean(pool)))
  const most = highest - needed * shrink
  return free.map((place, index) => Math.min(Math.max(place, lowest), most) + before[index])
}

function mean(pool: { readonly sum: number, readonly count: number }): number {
  return pool.sum / pool.count
}
