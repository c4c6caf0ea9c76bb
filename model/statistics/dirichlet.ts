import { ModelError } from '../model-error.ts'
import { drawGamma } from '../random/gamma.ts'
import type { Generator } from '../random/generator.ts'

/**
 * Overwrite `target` with shares drawn from a Dirichlet distribution: gamma draws over their sum.
 *
 * @param target - shape (k), k >= 1
 * @param concentrations - shape (k), finite, > 0; counts + 1 are the posterior of shares under a uniform prior
 * @param generator - moved on
 * @throws {ModelError} `dirichlet-length`, `gamma-shape`
 * @see Devroye (1986), Non-Uniform Random Variate Generation, chapter XI (from memory)
 */
export function fillDirichlet(target: Float64Array, concentrations: ArrayLike<number>, generator: Generator): void {
  if (target.length !== concentrations.length || target.length === 0) {
    throw new ModelError('dirichlet-length', `Unexpected length of target ${target.length}, expected that of the concentrations, ${concentrations.length}, and at least 1`)
  }
  let sum = 0
  // Far below 1 all draws may underflow together: then once more.
  while (sum === 0) {
    for (let i = 0; i < target.length; i += 1) {
      target[i] = drawGamma(concentrations[i], generator)
      sum += target[i]
    }
  }
  for (let i = 0; i < target.length; i += 1) target[i] /= sum
}
