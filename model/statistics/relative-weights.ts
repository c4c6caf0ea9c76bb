import { ModelError } from '../model-error.ts'
import { dot, sideOf, singularDecomposition } from './singular-decomposition.ts'

/** How the variance that predictors explain together is shared among them. */
export type RelativeWeights =
  /** `weights`: shape (k), >= 0, summing to `explained`, the R squared. */
  | { readonly weights: Float64Array; readonly explained: number }
  | { readonly weights: null; readonly reason: 'collinear' }

/** Smallest eigenvalue at and below which predictors are collinear: half the digits are gone. */
const collinear = 1e-8

/**
 * Relative weights: the response is explained by orthogonal variables as close to the predictors as can be, and what each of
 * these explains goes back to the predictors by their squared correlations with it.
 *
 * @param correlations - shape (k * k), of the predictors, k >= 1
 * @param withResponse - shape (k): correlation of each predictor with the response
 * @returns `collinear` where one predictor is (almost) a combination of others
 * @throws {ModelError} `matrix-not-square`, `matrix-not-finite`, `predictors-differ`, `correlations-invalid`
 * @see Johnson (2000), A heuristic method for estimating the relative weight of predictor variables, Multivariate Behavioral Research 35:1-19
 * @example relativeWeights([1, 0, 0, 1], [0.5, -0.25]).weights?.join() // => '0.25,0.0625'
 */
export function relativeWeights(correlations: ArrayLike<number>, withResponse: ArrayLike<number>): RelativeWeights {
  requireCorrelations(correlations, withResponse)
  const { side, values, left, right } = singularDecomposition(correlations)
  // Of a matrix with a negative eigenvalue the vectors on the left and on the right point away from each other.
  if (values.some((value, j) => value > collinear && dot(left[j], right[j]) < 0.5)) {
    throw new ModelError('correlations-invalid', 'Unexpected correlations that no data can have (an eigenvalue below 0), expected those of complete data')
  }
  if (values[side - 1] <= collinear) return { weights: null, reason: 'collinear' }
  const roots = values.map(Math.sqrt)
  const projections = right.map((vector, j) => dot(vector, withResponse) / roots[j])
  const weights = new Float64Array(side)
  let explained = 0
  for (let z = 0; z < side; z += 1) {
    const square = right.reduce((sum, vector, j) => sum + vector[z] * projections[j], 0) ** 2
    explained += square
    for (let i = 0; i < side; i += 1) weights[i] += square * right.reduce((sum, vector, j) => sum + vector[i] * roots[j] * vector[z], 0) ** 2
  }
  if (explained > 1 + 1e-9) throw new ModelError('correlations-invalid', `Unexpected share of variance explained ${explained}, expected correlations of complete data`)
  return { weights, explained }
}

function requireCorrelations(correlations: ArrayLike<number>, withResponse: ArrayLike<number>): void {
  const side = sideOf(correlations)
  if (withResponse.length !== side) throw new ModelError('predictors-differ', `Unexpected number of predictors ${withResponse.length}, expected ${side}`)
  for (let i = 0; i < side; i += 1) {
    if (!(Math.abs(withResponse[i]) <= 1 + 1e-9)) throw new ModelError('correlations-invalid', `Unexpected withResponse[${i}] ${withResponse[i]}, expected one in [-1, 1]`)
    for (let j = 0; j <= i; j += 1) {
      const [here, there] = [correlations[i * side + j], correlations[j * side + i]]
      const possible = i === j ? Math.abs(here - 1) <= 1e-9 : Math.abs(here) <= 1 + 1e-9 && Math.abs(here - there) <= 1e-9
      if (!possible) throw new ModelError('correlations-invalid', `Unexpected correlation ${here} at (${i}, ${j}), ${there} at (${j}, ${i}), expected a symmetric matrix with 1 on the diagonal`)
    }
  }
}
