/**
 * Pearson correlation.
 *
 * @param x - shape (n), n >= 2
 * @param y - shape (n)
 * @returns in [-1, 1]; null where one of the two does not vary
 * @example correlation(Float64Array.of(1, 2, 3), Float64Array.of(2, 4, 6)) // => 1
 */
export function correlation(x: ArrayLike<number>, y: ArrayLike<number>): number | null {
  const n = x.length
  let meanX = 0
  let meanY = 0
  for (let i = 0; i < n; i++) {
    meanX += x[i] / n
    meanY += y[i] / n
  }
  let xx = 0
  let yy = 0
  let xy = 0
  for (let i = 0; i < n; i++) {
    xx += (x[i] - meanX) ** 2
    yy += (y[i] - meanY) ** 2
    xy += (x[i] - meanX) * (y[i] - meanY)
  }
  return xx === 0 || yy === 0 ? null : Math.max(-1, Math.min(1, xy / Math.sqrt(xx * yy)))
}
