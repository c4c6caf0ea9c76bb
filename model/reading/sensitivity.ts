import type { Findings } from '../findings/schema.ts'
import { paretoSmooth } from '../diagnostics/pareto-k.ts'
import { mean, standardDeviation } from '../statistics/moments.ts'
import type { Reading } from './context.ts'
import { average, difference } from './draw-columns.ts'

type Sensitivity = Findings['sensitivity']

/** Powers that a prior is raised to, half as strong and twice: re-weighting a draw by prior^(power - 1). */
const powers = [0.5, 2] as const
/** Pareto k above which re-weighted draws say nothing (Vehtari and others 2024). */
const reliableK = 0.7

/**
 * Does the prior still matter? How far the change of opinion (its gain on the base, where there is no period before) moves, in posterior standard deviations,
 * if the half-normal prior of one standard deviation were half or twice as strong: by re-weighting the draws (power-scaling; Kallioinen, Paananen,
 * Buerkner and Vehtari 2023, Statistics and Computing 34:57).
 */
export function readSensitivity({ posterior: { draws, problem }, adjusted, periodSteps, previousSteps, baseSteps }: Reading): Sensitivity {
  const of = (steps: readonly number[]) => average(steps.map((t) => adjusted[t]))
  const quantity = difference(of(periodSteps), of(previousSteps ?? baseSteps))
  const centre = mean(quantity)
  const sd = standardDeviation(quantity, centre)
  const d = problem.scales.length
  let reliable = true
  const scales = problem.scales.map(({ name, prior }, j) => {
    const shifts = powers.map((power) => {
      // log of a half-normal density, up to a constant
      const smoothed = paretoSmooth(Float64Array.from({ length: draws.count }, (_, i) => (1 - power) * 0.5 * (draws.sigmas[i * d + j] / prior) ** 2))
      if ((smoothed.paretoK.value ?? 0) > reliableK) reliable = false
      return Math.abs(smoothed.weights.reduce((sum, weight, i) => sum + weight * quantity[i], 0) - centre) / sd
    })
    return { scale: name, shift: sd > 0 ? Math.max(...shifts) : 0 }
  })
  return { scales, shift: Math.max(0, ...scales.map(({ shift }) => shift)), reliable }
}
