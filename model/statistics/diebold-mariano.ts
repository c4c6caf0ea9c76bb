import { ModelError } from '../model-error.ts'
import { laggedSum } from './autocorrelation.ts'
import type { Decidable } from './decidable.ts'
import { mean, requireFinite } from './moments.ts'
import { studentCdf } from './student-t.ts'

/** `losses-alike`: the difference of losses is the same every time. `variance-not-positive`: the autocovariances sum to none. */
export type DieboldMarianoReason = 'losses-alike' | 'variance-not-positive'

/** Whether one forecast loses more than another. */
export interface DieboldMariano {
  /** Mean of squared errors A less that of B: above 0 where A is the worse forecast. */
  readonly lossDifference: number
  /** With the correction for few forecasts; to be held against Student's t with one degree of freedom fewer than forecasts. */
  readonly statistic: Decidable<DieboldMarianoReason>
  /** Two-sided. */
  readonly p: Decidable<DieboldMarianoReason>
}

/**
 * Test of equal squared-error loss of two forecasts of the same things, the long-run variance from the autocovariances up to
 * lag horizon - 1 (divisor n), which forecasts `horizon` steps ahead have even where they are as good as can be.
 *
 * @param errorsA - shape (n), n >= 2, observed less forecast, in order of time
 * @param errorsB - shape (n)
 * @param horizon - steps ahead, whole, in [1, n - 1]
 * @throws {ModelError} `pairs-differ`, `values-too-few`, `values-not-finite` (names the index), `horizon-invalid`
 * @see Diebold and Mariano (1995), J. of Business and Economic Statistics 13:253-263; Harvey, Leybourne and Newbold (1997),
 *   International J. of Forecasting 13:281-291, eq. 9
 * @example dieboldMariano([1, 2, 1], [0, 1, 1], 1).lossDifference // => 1.3333333333333333
 */
export function dieboldMariano(errorsA: ArrayLike<number>, errorsB: ArrayLike<number>, horizon: number): DieboldMariano {
  const n = errorsA.length
  if (errorsB.length !== n) throw new ModelError('pairs-differ', `Unexpected number of errors ${errorsB.length}, expected ${n}`)
  if (n < 2) throw new ModelError('values-too-few', `Unexpected number of errors ${n}, expected at least 2`)
  if (!(Number.isInteger(horizon) && horizon >= 1 && horizon < n)) {
    throw new ModelError('horizon-invalid', `Unexpected horizon ${horizon}, expected a whole number from 1 to one below the ${n} errors`)
  }
  requireFinite(errorsA, 'errorsA')
  requireFinite(errorsB, 'errorsB')
  const differences = Float64Array.from({ length: n }, (_, t) => (errorsA[t] - errorsB[t]) * (errorsA[t] + errorsB[t]))
  const lossDifference = mean(differences)
  const undecided = (reason: DieboldMarianoReason) => ({ lossDifference, statistic: { value: null, reason }, p: { value: null, reason } }) as const
  const deviations = differences.map((difference) => difference - lossDifference)
  if (Math.sqrt(laggedSum(deviations, 0) / n) <= 1e-12 * largestLoss(errorsA, errorsB)) return undecided('losses-alike')
  let longRun = laggedSum(deviations, 0)
  for (let lag = 1; lag < horizon; lag += 1) longRun += 2 * laggedSum(deviations, lag)
  if (longRun <= 0) return undecided('variance-not-positive')
  // n + 1 - 2 h + h (h - 1) / n, over n, is (n - h) (n - h + 1) / n^2.
  const fewForecasts = Math.sqrt((n - horizon) * (n - horizon + 1)) / n
  const statistic = (fewForecasts * lossDifference * n) / Math.sqrt(longRun)
  return { lossDifference, statistic: { value: statistic }, p: { value: 2 * studentCdf(-Math.abs(statistic), n - 1) } }
}

function largestLoss(errorsA: ArrayLike<number>, errorsB: ArrayLike<number>): number {
  let largest = 0
  for (let t = 0; t < errorsA.length; t += 1) largest = Math.max(largest, errorsA[t] * errorsA[t], errorsB[t] * errorsB[t])
  return largest
}
