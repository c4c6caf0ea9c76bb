import { ModelError } from '../model-error.ts'
import type { Generator } from './generator.ts'

/**
 * A gamma draw with scale 1: mean and variance are `shape`. By rejection from a cubed normal; below shape 1 a draw of
 * shape + 1 is shrunk by a power of a uniform.
 *
 * @param shape - finite, > 0
 * @param generator - moved on
 * @returns > 0, save that a shape far below 1 may underflow to 0
 * @throws {ModelError} `gamma-shape`
 * @see Marsaglia and Tsang (2000), A simple method for generating gamma variables, ACM TOMS 26:363-372
 * @example drawGamma(2, createGenerator(1, 0)) > 0 // => true
 */
export function drawGamma(shape: number, generator: Generator): number {
  if (!(shape > 0 && shape < Infinity)) throw new ModelError('gamma-shape', `Unexpected shape ${shape}, expected a finite number above 0`)
  if (shape < 1) return drawGamma(shape + 1, generator) * Math.pow(generator.uniform(), 1 / shape)
  const d = shape - 1 / 3
  const c = 1 / Math.sqrt(9 * d)
  for (;;) {
    const x = generator.normal()
    const v = (1 + c * x) ** 3
    if (v > 0 && Math.log(generator.uniform()) < 0.5 * x * x + d * (1 - v + Math.log(v))) return d * v
  }
}
