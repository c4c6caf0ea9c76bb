import type { Generator } from '../random/generator.ts'

/**
 * Equally weighted rows in place of weighted ones, by systematic resampling (Carpenter, Clifford and Fearnhead 1999,
 * IEE Proc. Radar 146:2): a row of weight w is taken floor or ceiling of count x w times. The rows come back in their
 * order, those taken more than once side by side.
 *
 * @param weights - shape (n), >= 0, summing to 1
 * @returns shape (count), indices into `weights`
 */
export function resample(weights: Float64Array, count: number, generator: Generator): Int32Array {
  const chosen = new Int32Array(count)
  const offset = generator.uniform()
  let cumulative = 0
  let row = -1
  for (let i = 0; i < count; i++) {
    const mark = (i + offset) / count
    while (row < weights.length - 1 && cumulative <= mark) cumulative += weights[++row]
    chosen[i] = row
  }
  return chosen
}
