import type { Generator } from '../random/generator.ts'
import { sampleVariance } from '../statistics/moments.ts'
import { fillMemory, restrictedLogLikelihood, type Memory } from '../statistics/noisy-autoregression.ts'

/** Prior odds are even: a survey returns to its mean, with any coefficient from 0 to 1 alike, or wanders off as a random walk. */
const coefficients = 40
/** Innovations from this much of the waves' own standard deviation ... */
const leastInnovation = 0.02
/** ... to this much, alike on the scale of logarithms. */
const mostInnovation = 3
const innovations = 24
/** A wave in which nobody, or everybody, said yes is not free of error. */
const leastErrorShare = 1e-6

/** Writes a survey that might have been over the one given. */
export type DrawSurrogate = (target: Float64Array, generator: Generator) => void

/**
 * Surveys that have nothing to do with any other series and yet might have given waves like these: a memory drawn from its posterior given
 * the waves, a series with that memory, and each wave's own sampling error on top. A single fitted coefficient would be too sure of itself:
 * thirty waves can hardly tell a random walk from a series that returns, and unrelated walks correlate often (Granger and Newbold 1974,
 * Journal of Econometrics 2:111).
 *
 * @param values - shape (waves), in order of time
 * @param standardErrors - shape (waves), of each wave, in the same unit
 * @returns null with fewer than 3 waves, or where all say the same: nothing goes with those
 */
export function surrogatesOf(values: ArrayLike<number>, standardErrors: ArrayLike<number>): DrawSurrogate | null {
  const total = values.length < 3 ? 0 : sampleVariance(values)
  if (total === 0) return null
  const errors = Float64Array.from(standardErrors, (error) => Math.max(error ** 2, leastErrorShare * total))
  const memories = memoryGrid(Math.sqrt(total))
  const cumulative = cumulate(memories, memories.map(({ coefficient }) => (coefficient === 1 ? coefficients : 1)), values, errors)
  const sds = errors.map(Math.sqrt)
  return (target, generator) => {
    fillMemory(target, memories[firstAbove(cumulative, generator.uniform())], generator)
    for (let w = 0; w < target.length; w++) target[w] += sds[w] * generator.normal()
  }
}

function memoryGrid(sd: number): readonly Memory[] {
  const range = Math.log(mostInnovation / leastInnovation)
  const scales = Array.from({ length: innovations }, (_, i) => sd * leastInnovation * Math.exp(range * (i + 0.5) / innovations))
  const memories = [...Array.from({ length: coefficients }, (_, i) => (i + 0.5) / coefficients), 1]
  return memories.flatMap((coefficient) => scales.map((innovation) => ({ coefficient, innovation })))
}

/** Posterior probabilities, summed up to each point. */
function cumulate(memories: readonly Memory[], prior: readonly number[], values: ArrayLike<number>, errors: Float64Array): Float64Array {
  const logs = memories.map((memory, i) => Math.log(prior[i]) + restrictedLogLikelihood(values, errors, memory))
  const largest = Math.max(...logs)
  const weights = logs.map((log) => Math.exp(log - largest))
  const sum = weights.reduce((a, b) => a + b, 0)
  let upTo = 0
  return Float64Array.from(weights, (weight) => (upTo += weight / sum))
}

function firstAbove(cumulative: Float64Array, u: number): number {
  let [low, high] = [0, cumulative.length - 1]
  while (low < high) {
    const middle = (low + high) >> 1
    if (cumulative[middle] > u) high = middle
    else low = middle + 1
  }
  return low
}
