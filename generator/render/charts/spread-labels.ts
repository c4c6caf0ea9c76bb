/**
 * Move labels apart until each has room, as little as possible: the least-squares solution, by pooling neighbours that collide.
 *
 * @param wanted - where each label would like to stand, ascending
 * @param gap - smallest distance between two labels
 * @param range - lowest and highest place; where they hold no more labels, the gap shrinks evenly
 * @returns the places, ascending, in the order of `wanted`
 * @see Barlow, Bartholomew, Bremner and Brunk (1972), Statistical Inference under Order Restrictions, section 1.2 (pool adjacent violators)
 * @example spreadLabels([0.5, 0.5], 0.2, [0, 1]) // => [0.4, 0.6]
 */
export function spreadLabels(wanted: readonly number[], gap: number, range: readonly [number, number]): readonly number[] {
  const [lowest, highest] = range
  const room = wanted.length > 1 ? Math.min(gap, (highest - lowest) / (wanted.length - 1)) : gap
  const pools: { sum: number, count: number }[] = []
  wanted.forEach((place, index) => {
    pools.push({ sum: place - index * room, count: 1 })
    while (pools.length > 1 && mean(pools[pools.length - 2]) > mean(pools[pools.length - 1])) {
      const last = pools.pop()
      const before = pools[pools.length - 1]
      if (last) { before.sum += last.sum; before.count += last.count }
    }
  })
  const free = pools.flatMap((pool) => Array.from({ length: pool.count }, () => mean(pool)))
  const most = highest - (wanted.length - 1) * room
  return free.map((place, index) => Math.min(Math.max(place, lowest), most) + index * room)
}

function mean(pool: { readonly sum: number, readonly count: number }): number {
  return pool.sum / pool.count
}
