import { samplingVariance } from '../cells/sampling-variance.ts'
import { buildProblem } from '../fit/build-problem.ts'
import type { FitProblem } from '../fit/problem.ts'
import type { DayWindow } from '../inputs/small-inputs.ts'
import type { FitTables, IntakeTables } from '../intake/intake-tables.ts'
import type { MixtureComponent } from '../statistics/mixture-forecast.ts'
import { tablesBefore } from './as-of.ts'
import type { HeadlineWave } from './headline.ts'
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
  /** The waves that were known by then, oldest first: at least `pairsNeeded`. */
  readonly known: readonly HeadlineWave[]
}

/** Earlier waves whose fieldwork was over when this one's began. */
function knownBefore(waves: readonly HeadlineWave[], window: DayWindow): readonly HeadlineWave[] {
  return waves.filter((wave) => wave.end < window.start)
}

/**
 * Forecast waves from what was known before their fieldwork began, each from a fit of its own: posts of the steps that were over by then, waves whose
 * fieldwork was. Opinion enters as the path of mu, whose movements are those of mix-adjusted opinion, so that no target mix of a
 * later day comes in.
 *
 * @param windows - the fieldwork of the waves to be forecast
 * @param lags - the lags looked at; those below 1 count as 1, the last step before the fieldwork
 * @returns shape (windows): null where fewer than 8 waves, or no posts, were known
 */
export function forecastWaves(
  tables: IntakeTables, waves: readonly HeadlineWave[], windows: readonly DayWindow[], lags: readonly number[], refit: Refit, seed: number,
): Promise<readonly (WaveForecast | null)[]> {
  const leads = [...new Set(lags.map((lag) => Math.max(1, lag)))]
  return Promise.all(windows.map(async (window) => {
    const known = knownBefore(waves, window)
    const before = tablesBefore(tables, Math.max(0, Math.min(window.startStep, tables.timeline.steps.length)))
    if (known.length < pairsNeeded || before.cells.count === 0) return null
    const path = await refit(problemOf(before), seed)
    const models = fitLagModels(leads.map((lag) => pairsAt(path, known, lag)))
    const components = forecastFrom(models, (lag) => knownPartnerOf(path, window, lag))
    return components.length === 0 ? null : { components, models, known, wavesAlone: forecastAlone(Float64Array.from(known, ({ value }) => value)) }
  }))
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
