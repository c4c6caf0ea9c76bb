import { samplingVariance } from '../cells/sampling-variance.ts'
import { buildProblem } from '../fit/build-problem.ts'
import type { FitProblem } from '../fit/problem.ts'
import type { DayWindow } from '../inputs/small-inputs.ts'
import type { FitTables, IntakeTables } from '../intake/intake-tables.ts'
import type { MixtureComponent } from '../statistics/mixture-forecast.ts'
import { tablesBefore } from './as-of.ts'
import type { HeadlineWave } from './headline.ts'
import { inTurn } from './in-turn.ts'
import { fitLagModels, forecastAlone, forecastFrom, type LagModel } from './lag-models.ts'
import { pairsNeeded } from './verdict.ts'
import { knownPartnerOf } from './windows.ts'

/** Posterior mean of mu by step, of a problem: `meanPath`, by whichever thread, or remembered. */
export type Refit = (problem: FitProblem, seed: number) => Promise<Float64Array>

/** A wave as it could be forecast on the day before its fieldwork began. */
export interface WaveForecast {
  readonly components: readonly MixtureComponent[]
  readonly models: readonly LagModel[]
  /** The same without opinion: the waves' own mean and persistence. */
  readonly wavesAlone: readonly MixtureComponent[]
  /** Earlier waves whose fieldwork was not over. */
  readonly pending: number
  /** The waves that were known by then, oldest first: at least `pairsNeeded`. */
  readonly known: readonly HeadlineWave[]
}

/** Earlier waves whose fieldwork was over when this one's began. */
function knownBefore(waves: readonly HeadlineWave[], window: DayWindow): readonly HeadlineWave[] {
  return waves.filter((wave) => wave.end < window.start)
}

/** A fit each: more would add hours and hardly change what is known of the errors. The last ones matter most. */
export const mostForecasts = 150
/** Fits whose problems are in memory together: enough for every thread to have one. */
const fitsAtOnce = 8

/** A wave to be forecast, by its place among the windows. */
interface Asked {
  readonly at: number
  readonly window: DayWindow
  readonly known: readonly HeadlineWave[]
}

/**
 * Forecast waves from what was known before their fieldwork began, each from a fit of its own: posts of the steps that were over by then, waves whose
 * fieldwork was. Waves whose fieldwork began in the same step knew the same posts, and share the fit. Opinion enters as the path of mu, whose movements are those of mix-adjusted opinion, so that no target mix of a
 * later day comes in.
 *
 * @param windows - the fieldwork of the waves to be forecast, in order of time; of more than 150 that can be, the last 150 are
 * @param lags - the lags looked at; those below 1 count as 1, the last step before the fieldwork
 * @returns shape (windows): null where fewer than 8 waves, or no posts, were known, and before the last 150
 */
export async function forecastWaves(
  tables: IntakeTables, waves: readonly HeadlineWave[], windows: readonly DayWindow[], lags: readonly number[], refit: Refit, seed: number,
): Promise<readonly (WaveForecast | null)[]> {
  const leads = [...new Set(lags.map((lag) => Math.max(1, lag)))]
  const forecasts = windows.map((): WaveForecast | null => null)
  await inTurn([...askedByStep(waves, windows, tables.timeline.steps.length)], fitsAtOnce, async ([end, asked]) => {
    const before = tablesBefore(tables, end)
    if (before.cells.count === 0) return
    const path = await refit(problemOf(before), seed)
    for (const { at, window, known } of asked) {
      const models = fitLagModels(leads.map((lag) => pairsAt(path, known, lag)))
      const components = forecastFrom(models, (lag) => knownPartnerOf(path, window, lag))
      const pending = waves.filter((wave) => wave.start < window.start && wave.end >= window.start).length
      if (components.length > 0) forecasts[at] = { components, models, known, pending, wavesAlone: forecastAlone(Float64Array.from(known, ({ value }) => value)) }
    }
  })
  return forecasts
}

/** The waves that can be forecast, by the number of steps that were over when their fieldwork began. */
function askedByStep(waves: readonly HeadlineWave[], windows: readonly DayWindow[], steps: number): ReadonlyMap<number, readonly Asked[]> {
  const byStep = new Map<number, Asked[]>()
  let count = 0
  for (let at = windows.length - 1; at >= 0 && count < mostForecasts; at--) {
    const window = windows[at]
    const known = knownBefore(waves, window)
    if (known.length < pairsNeeded) continue
    const end = Math.max(0, Math.min(window.startStep, steps))
    byStep.set(end, [...(byStep.get(end) ?? []), { at, window, known }])
    count++
  }
  return byStep
}

function problemOf(tables: FitTables): FitProblem {
  return buildProblem(tables, samplingVariance(tables).variance)
}

function pairsAt(path: Float64Array, waves: readonly HeadlineWave[], lag: number) {
  const pairs = waves.flatMap((wave) => {
    const x = knownPartnerOf(path, wave, lag)
    return x === null ? [] : [{ x, y: wave.value }]
  })
  return { lag, x: Float64Array.from(pairs, ({ x }) => x), y: Float64Array.from(pairs, ({ y }) => y) }
}
