import type { Findings } from '../findings/schema.ts'
import type { SurveyInput, SurveyReading, SurveyWave } from '../inputs/small-inputs.ts'
import { movementOf } from '../reading/movement.ts'
import { holmAdjusted } from '../statistics/holm.ts'
import { twoMeans, twoShares } from '../statistics/two-sample-tests.ts'
import { twoSidedQuantile, wilsonInterval, type Interval } from '../statistics/wilson.ts'
import { showingOf, standardErrorOf, unitOf } from './headline.ts'

type Survey = NonNullable<Findings['survey']>
type MetricFinding = Survey['metrics'][number]
type ReadingFinding = MetricFinding['waves'][number]
type Change = NonNullable<ReadingFinding['change']>

/**
 * The tracker's own figures: every metric for everyone and then for every segment, wave by wave, each with its interval and its
 * change on the last wave before with which it shares no day of fieldwork. Tests use effective bases; for everyone they are adjusted over
 * the metrics of a wave (Holm 1979).
 */
export function readTracker(survey: SurveyInput, interval: number): readonly MetricFinding[] {
  const found = readingsByMetric(survey)
  const plain = [-1, ...survey.segments.keys()].flatMap((segment) => survey.metrics.map((_, metric) => readMetric(survey, metric, segment, found(metric, segment), interval)))
  const everyone = plain.filter(({ segment }) => segment === null)
  return [...adjustOverMetrics(everyone, 1 - interval), ...plain.slice(everyone.length)].filter(({ waves }) => waves.length > 0)
}

/** What every metric of every segment has, in order of the waves. */
function readingsByMetric(survey: SurveyInput): (metric: number, segment: number) => readonly WaveReading[] {
  const keyOf = (metric: number, segment: number) => metric * (survey.segments.length + 1) + segment + 1
  const found = new Map<number, WaveReading[]>()
  for (const wave of survey.waves) {
    for (const reading of wave.readings) {
      const key = keyOf(reading.metric, reading.segment)
      const before = found.get(key)
      if (before === undefined) found.set(key, [{ wave, reading }])
      else before.push({ wave, reading })
    }
  }
  return (metric, segment) => found.get(keyOf(metric, segment)) ?? []
}

function readMetric(survey: SurveyInput, metric: number, segment: number, found: readonly WaveReading[], interval: number): MetricFinding {
  const { name, label, kind } = survey.metrics[metric]
  const having = new Set(found.map(({ wave }) => wave))
  return {
    metric: name, label, kind, segment: segment === -1 ? null : survey.segments[segment],
    missing: survey.waves.filter((wave) => !having.has(wave)).map((wave) => wave.name),
    waves: found.map(({ wave, reading }, i) => readWave(kind, wave, reading, lastOverBefore(found, i), interval)),
  }
}

/** The last wave before whose fieldwork was over when that of this one began. */
function lastOverBefore(found: readonly WaveReading[], i: number): WaveReading | undefined {
  const { start } = found[i].wave
  for (let earlier = i - 1; earlier >= 0; earlier--) if (found[earlier].wave.end < start) return found[earlier]
  return undefined
}

interface WaveReading {
  readonly wave: SurveyWave
  readonly reading: SurveyReading
}

function readWave(kind: 'share' | 'mean', wave: SurveyWave, reading: SurveyReading, before: WaveReading | undefined, interval: number): ReadingFinding {
  const shown = showingOf(reading)
  const hidden = shown === 'hidden'
  const unit = unitOf(kind)
  const bounds = hidden ? null : boundsOf(reading, interval)
  return {
    wave: wave.name, field_start: wave.start, field_end: wave.end, base: reading.base, effective_base: reading.effectiveBase, shown,
    value: hidden ? null : unit * reading.value, low: bounds === null ? null : unit * bounds.low, high: bounds === null ? null : unit * bounds.high,
    change: hidden || before === undefined || showingOf(before.reading) === 'hidden' ? null : changeOf(unit, before, reading, interval),
  }
}

function boundsOf(reading: SurveyReading, interval: number): Interval {
  if (reading.sd === null) return wilsonInterval(reading.value * reading.effectiveBase, reading.effectiveBase, interval)
  const reach = twoSidedQuantile(interval) * standardErrorOf(reading)
  return { low: reading.value - reach, high: reading.value + reach }
}

function changeOf(unit: number, before: WaveReading, now: SurveyReading, interval: number): Change {
  const shareOf = ({ value, effectiveBase }: SurveyReading) => ({ share: value, base: effectiveBase })
  const meanOf = ({ value, sd, effectiveBase }: SurveyReading) => ({ mean: value, sd: sd ?? 0, base: effectiveBase })
  const compared = now.sd === null ? twoShares(shareOf(now), shareOf(before.reading), interval) : twoMeans(meanOf(now), meanOf(before.reading), interval)
  const [difference, low, high] = [compared.difference, compared.low, compared.high].map((x) => unit * x)
  return {
    // where nothing varies there is nothing to test, and no difference
    from: before.wave.name, difference, low, high, p: compared.p.value ?? 1, adjusted_p: null,
    movement: movementOf({ mean: difference, low, high, sd: 0 }),
  }
}

/** Give every change its p-value for as many metrics as the wave tests; by that one it is established or not. */
function adjustOverMetrics(everyone: readonly MetricFinding[], alpha: number): readonly MetricFinding[] {
  const tested = new Map<string, { readonly metric: string; readonly p: number }[]>()
  for (const { metric, waves } of everyone) {
    for (const { wave, change } of waves) {
      if (change !== null) tested.set(wave, [...(tested.get(wave) ?? []), { metric, p: change.p }])
    }
  }
  const adjusted = new Map([...tested].map(([wave, tests]) => {
    const values = holmAdjusted(tests.map(({ p }) => p))
    return [wave, new Map(tests.map(({ metric }, i) => [metric, values[i]]))]
  }))
  return everyone.map((finding) => ({
    ...finding,
    waves: finding.waves.map((reading) => {
      const p = adjusted.get(reading.wave)?.get(finding.metric)
      if (reading.change === null || p === undefined) return reading
      const { difference } = reading.change
      const movement = p > alpha || difference === 0 ? 'not-established' : difference > 0 ? 'up' : 'down'
      return { ...reading, change: { ...reading.change, adjusted_p: p, movement } }
    }),
  }))
}
