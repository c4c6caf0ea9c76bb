import type { DayWindow, SurveyInput, SurveyWave } from '../../model/inputs/small-inputs.ts'
import { createGenerator, type Generator } from '../../model/random/generator.ts'
import { fillMemory, type Memory } from '../../model/statistics/noisy-autoregression.ts'
import type { Findings } from '../../model/findings/schema.ts'
import { analyseHere, noInputs } from '../support/analyse-reference.ts'
import { simulateCells, type SimulationOptions } from '../support/simulate-cells.ts'

/** Four weeks a month, thirty months, and four weeks of posts before the first wave. */
const spacing = 4
const months = 30
const fieldworkWeeks = 2
/** Steps by which opinion comes before the survey, where it does. */
export const trueLead = 4
const interviews = 400
const steps = spacing * (months + 1)
/** A share for a score: from -1 to 1 opinion turns nobody into everybody. */
const shareOfScore = 0.5

/** Standard deviation of a week's movement of opinion. */
const movement = 0.025

const posts: SimulationOptions = {
  steps, venues: 4, topics: 3, posters: 1, mentionsPerStep: 600,
  sigmas: { mu: movement, venueDrift: [0.015, 0.004, 0.003, 0.008], venue: 0.2, topic: 0.25, poster: 0, tau: 0.03 },
  mix: { venue: { from: [0.2, 0.3, 0.3, 0.2], to: [0.5, 0.15, 0.15, 0.2] }, topic: { from: [0.6, 0.3, 0.1], to: [0.2, 0.3, 0.5] } },
}

/** `leading`: the survey says four weeks later what opinion was; it follows a walk of its own, of the same law (`unrelated`), or a series that returns (`returning`). */
export type SurveyScenario = 'leading' | 'unrelated' | 'returning'
/** What a week keeps of the week before where the survey's own series returns: 0.81 a month; its innovations give it the spread that opinion has. */
const returning: Memory = { coefficient: 0.95, innovation: 0.03 }

export interface SurveyRun {
  readonly verdict: NonNullable<Findings['survey']>['verdict']
  readonly bestLag: number | null
  readonly r: number | null
  readonly adjustedP: number | null
  readonly coverage: number
  readonly rmseRatios: readonly (number | null)[]
}

/** Simulate posts and a survey, analyse both. */
export async function runSurveyScenario(scenario: SurveyScenario, seed: number, run: number): Promise<SurveyRun> {
  const generator = createGenerator(seed, run)
  const { tables, truth } = simulateCells(posts, generator)
  const walk = scenario === 'leading' ? truth.mu : ownSeries(scenario === 'unrelated' ? { coefficient: 1, innovation: movement } : returning, generator)
  const survey = surveyOf(walk, scenario === 'leading' ? trueLead : 0, generator)
  const { survey: found } = await analyseHere(tables, { seed: run }, { ...noInputs, survey })
  if (found === null) throw new Error('a survey was given')
  const [adjusted] = found.candidates
  return {
    verdict: found.verdict, bestLag: adjusted.best_lag, r: adjusted.best?.r ?? null, adjustedP: adjusted.adjusted_p,
    coverage: found.forecast?.coverage ?? NaN, rmseRatios: found.forecast?.rivals.map(({ rmse_ratio }) => rmse_ratio) ?? [],
  }
}

function ownSeries(memory: Memory, generator: Generator): Float64Array {
  const series = new Float64Array(steps)
  fillMemory(series, memory, generator)
  return series
}

/** Monthly waves of two weeks, each of 400 interviews. */
function surveyOf(walk: ArrayLike<number>, lag: number, generator: Generator): SurveyInput {
  const centre = Array.from(walk).reduce((sum, value) => sum + value, 0) / steps
  const waves = Array.from({ length: months }, (_, month): SurveyWave => {
    const startStep = spacing * (month + 1)
    const from = startStep - lag
    const opinion = (walk[from] + walk[from + 1]) / fieldworkWeeks
    const share = Math.min(0.98, Math.max(0.02, 0.5 + shareOfScore * (opinion - centre)))
    let yes = 0
    for (let i = 0; i < interviews; i++) if (generator.uniform() < share) yes++
    return { name: String(month + 1), ...windowAt(startStep), readings: [{ metric: 0, segment: -1, base: interviews, effectiveBase: interviews, value: yes / interviews, sd: null }] }
  })
  return {
    headline: 0, lags: [-8, 16], metrics: [{ name: 'favourability', label: 'Favourability', kind: 'share' }], segments: [], waves, later: [],
    next: { ...windowAt(spacing * (months + 1)), dates: 'usual-spacing' },
  }
}

/** Two weeks from the Monday of a step; the grid begins on Monday 1 January 2024. */
function windowAt(startStep: number): DayWindow {
  const day = (step: number, more: number) => new Date(Date.UTC(2024, 0, 1 + 7 * step + more)).toISOString().slice(0, 10)
  return { start: day(startStep, 0), end: day(startStep, 7 * fieldworkWeeks - 1), startStep, days: new Float64Array(fieldworkWeeks).fill(7) }
}
