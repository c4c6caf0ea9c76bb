/**
 * Reorder values[from..to] so that the element at `rank` is the one sorting would put there, none before it larger, none
 * behind it smaller. Needs about 1.5 (to - from) comparisons.
 *
 * @param values - reordered in place; no NaN
 * @param rank - in [from, to]
 * @see Floyd and Rivest (1975), Algorithm 489, Communications of the ACM 18:173
 */
export function select(values: Float64Array, rank: number, from: number, to: number): void {
  let left = from
  let right = to
  while (right > left) {
    if (right - left > 600) narrow(values, rank, left, right)
    const pivot = values[rank]
    let i = left
    let j = right
    swap(values, left, rank)
    if (values[right] > pivot) swap(values, right, left)
    while (i < j) {
      swap(values, i, j)
      i += 1
      j -= 1
      while (values[i] < pivot) i += 1
      while (values[j] > pivot) j -= 1
    }
    if (values[left] === pivot) {
      swap(values, left, j)
    } else {
      j += 1
      swap(values, j, right)
    }
    if (j <= rank) left = j + 1
    if (rank <= j) right = j - 1
  }
}

/** Select within a sample about the wanted rank first: its element is then a pivot very close to that rank. */
function narrow(values: Float64Array, rank: number, left: number, right: number): void {
  const n = right - left + 1
  const place = rank - left + 1
  const z = Math.log(n)
  const size = 0.5 * Math.exp((2 * z) / 3)
  const margin = 0.5 * Math.sqrt((z * size * (n - size)) / n) * Math.sign(place - n / 2)
  const sampleLeft = Math.max(left, Math.floor(rank - (place * size) / n + margin))
  const sampleRight = Math.min(right, Math.floor(rank + ((n - place) * size) / n + margin))
  select(values, rank, sampleLeft, sampleRight)
}

function swap(values: Float64Array, i: number, j: number): void {
  const kept = values[i]
  values[i] = values[j]
  values[j] = kept
}
