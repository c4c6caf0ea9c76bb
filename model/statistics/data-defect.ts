import { ModelError } from '../model-error.ts'
import type { Decidable } from './decidable.ts'

/** What was heard of a population whose mean is known. */
export interface Heard {
  /** n: how many were heard, > 0. */
  readonly size: number
  /** N: how many there are, > 0. */
  readonly population: number
  /** Mean of those heard less mean of the population. */
  readonly gap: number
  /** sigma: standard deviation in the population, divisor N, >= 0; sqrt(mu (1 - mu)) for a share mu. */
  readonly sd: number
}

/**
 * Data defect correlation: between being heard and what one has to say, over the whole population. From the identity
 * gap = rho sqrt((1 - f) / f) sigma with f = n / N.
 *
 * @returns undecided where the population does not vary, or where those heard are not a part of it (n >= N)
 * @throws {ModelError} `heard-invalid` (names the figure)
 * @see Meng (2018), Statistical paradises and paradoxes in big data (I), Annals of Applied Statistics 12:685-726
 * @example defectCorrelation({ size: 50, population: 100, gap: 0.125, sd: 0.5 }) // => { value: 0.25 }
 */
export function defectCorrelation(heard: Heard): Decidable<'no-variation' | 'not-a-part'> {
  requireHeard(heard)
  const { size, population, gap, sd } = heard
  if (size >= population) return { value: null, reason: 'not-a-part' }
  if (sd === 0) return { value: null, reason: 'no-variation' }
  return { value: gap / (sd * Math.sqrt((population - size) / size)) }
}

/**
 * The most interviews of a simple random sample that data with such a defect are worth: f / ((1 - f) rho^2).
 *
 * @param correlation - rho, in [-1, 1]
 * @param fraction - f, share of the population that was heard, in (0, 1)
 * @returns undecided where there is no defect
 * @throws {ModelError} `defect-invalid`
 * @see Meng (2018), Annals of Applied Statistics 12:685-726, section 3
 * @example effectiveSizeBound(0.25, 0.5) // => { value: 16 }
 */
export function effectiveSizeBound(correlation: number, fraction: number): Decidable<'no-defect'> {
  if (!(Math.abs(correlation) <= 1 && fraction > 0 && fraction < 1)) {
    throw new ModelError('defect-invalid', `Unexpected correlation ${correlation} at fraction ${fraction}, expected one in [-1, 1] at one in (0, 1)`)
  }
  return correlation === 0 ? { value: null, reason: 'no-defect' } : { value: fraction / ((1 - fraction) * correlation * correlation) }
}

/**
 * The gap in standard errors of a simple random sample of that size: sqrt(N - 1) rho. It grows with the population, however
 * large a part of it was heard.
 *
 * @param correlation - rho, in [-1, 1]
 * @param population - N, >= 1
 * @throws {ModelError} `defect-invalid`
 * @see Meng (2018), Annals of Applied Statistics 12:685-726, the law of large populations
 * @example standardisedError(0.25, 17) // => 1
 */
export function standardisedError(correlation: number, population: number): number {
  if (!(Math.abs(correlation) <= 1 && population >= 1 && population < Infinity)) {
    throw new ModelError('defect-invalid', `Unexpected correlation ${correlation} in a population of ${population}, expected one in [-1, 1] in one of at least 1`)
  }
  return correlation * Math.sqrt(population - 1)
}

/**
 * Interviews of a simple random sample whose expected squared error is that of the posts. What the survey itself may err by is
 * taken out of the gap: sigma^2 / (gap^2 - se^2).
 *
 * @param gap - mean of those heard less what the survey found
 * @param standardError - of the survey, >= 0; 0 where the population is known
 * @param sd - sigma, standard deviation in the population, >= 0
 * @returns > 0; undecided where the survey's own error is as large as the gap, or nothing varies
 * @throws {ModelError} `heard-invalid` (names the figure)
 * @see Meng (2018), Annals of Applied Statistics 12:685-726, section 3: the bound above in the units of the gap
 * @example equalSampleSize(0.5, 0.3, 0.4) // => { value: 1 }
 */
export function equalSampleSize(gap: number, standardError: number, sd: number): Decidable<'within-survey-error' | 'no-variation'> {
  requireFigure('gap', gap, -Infinity)
  requireFigure('standardError', standardError, 0)
  requireFigure('sd', sd, 0)
  if (sd === 0) return { value: null, reason: 'no-variation' }
  const ownSquare = (Math.abs(gap) - standardError) * (Math.abs(gap) + standardError)
  return ownSquare > 0 ? { value: (sd * sd) / ownSquare } : { value: null, reason: 'within-survey-error' }
}

function requireHeard({ size, population, gap, sd }: Heard): void {
  requireFigure('size', size, Number.MIN_VALUE)
  requireFigure('population', population, Number.MIN_VALUE)
  requireFigure('gap', gap, -Infinity)
  requireFigure('sd', sd, 0)
}

function requireFigure(name: string, value: number, least: number): void {
  if (!(Number.isFinite(value) && value >= least)) throw new ModelError('heard-invalid', `Unexpected ${name} ${value}, expected a finite number of at least ${least}`)
}
