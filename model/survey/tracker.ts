import type { Findings } from '../findings/schema.ts'
import type { SurveyInput, SurveyReading, SurveyWave } from '../inputs/small-inputs.ts'
import { movementOf } from '../reading/movement.ts'
import { holmAdjusted } from '../statistics/holm.ts'
import { twoMeans, twoShares } from '../statistics/two-sample-tests.ts'
import { twoSidedQuantile, wilsonInterval, type Interval } from '../statistics/wilson.ts'
import { standardErrorOf, unitOf } from './headline.ts'

type Survey = NonNullable<Findings['survey']>
type MetricFinding = Survey['metrics'][number]
type ReadingFinding = MetricFinding['waves'][number]
type Change = NonNullable<ReadingFinding['change']>

/** Bases below these are not shown, and flagged (common practice, no source). */
const hiddenBelow = 30
const flaggedBelow = 75

/**
 * The tracker's own figures: every metric for everyone and then for every segment, wave by wave, each with its interval and its
 * change on the last wave before with which it shares no day of fieldwork. Tests use effective bases; for everyone they are adjusted over
 * the metrics of a wave (Holm 1979).
 */
export function readTracker(survey: SurveyInput, interval: number): readonly MetricFinding[] {
  const plain = [-1, ...survey.segments.keys()].flatMap((segment) => survey.metrics.map((_, metric) => readMetric(survey, metric, segment, interval)))
  const everyone = plain.filter(({ segment }) => segment === null)
  return plain.map((finding) => (finding.segment === null ? adjustOverMetrics(finding, everyone, 1 - interval) : finding))
    .filter(({ waves }) => waves.length > 0)
}

function readMetric(survey: SurveyInput, metric: number, segment: number, interval: number): MetricFinding {
  const { name, label, kind } = survey.metrics[metric]
  const found = survey.waves.flatMap((wave) => {
    const reading = wave.readings.find((candidate) => candidate.metric === metric && candidate.segment === segment)
    return reading === undefined ? [] : [{ wave, reading }]
  })
  const having = new Set(found.map(({ wave }) => wave))
  return {
    metric: name, label, kind, segment: segment === -1 ? null : survey.segments[segment],
    missing: survey.waves.filter((wave) => !having.has(wave)).map((wave) => wave.name),
    waves: found.map(({ wave, reading }, i) => {
      const before = found.slice(0, i).reverse().find((earlier) => earlier.wave.end < wave.start)
      return readWave(kind, wave, reading, before, interval)
    }),
  }
}

interface WaveReading {
  readonly wave: SurveyWave
  readonly reading: SurveyReading
}

function readWave(kind: 'share' | 'mean', wave: SurveyWave, reading: SurveyReading, before: WaveReading | undefined, interval: number): ReadingFinding {
  const shown = showing(reading)
  const hidden = shown === 'hidden'
  const unit = unitOf(kind)
  const bounds = hidden ? null : boundsOf(reading, interval)
  return {
    wave: wave.name, field_start: wave.start, field_end: wave.end, base: reading.base, effective_base: reading.effectiveBase, shown,
    value: hidden ? null : unit * reading.value, low: bounds === null ? null : unit * bounds.low, high: bounds === null ? null : unit * bounds.high,
    change: hidden || before === undefined || showing(before.reading) === 'hidden' ? null : changeOf(unit, before, reading, interval),
  }
}

/** By the effective base, which says better what a figure is worth. */
function showing({ base, effectiveBase }: SurveyReading): ReadingFinding['shown'] {
  const worth = Math.min(base, effectiveBase)
  if (worth < hiddenBelow) return 'hidden'
  return worth < flaggedBelow ? 'flagged' : 'shown'
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
function adjustOverMetrics(finding: MetricFinding, everyone: readonly MetricFinding[], alpha: number): MetricFinding {
  return {
    ...finding,
    waves: finding.waves.map((reading) => {
      if (reading.change === null) return reading
      const tested = everyone.flatMap(({ metric, waves }) => waves.filter(({ wave, change }) => wave === reading.wave && change !== null).map(({ change }) => ({ metric, p: change?.p ?? 1 })))
      const adjusted = holmAdjusted(tested.map(({ p }) => p))[tested.findIndex(({ metric }) => metric === finding.metric)]
      const { difference } = reading.change
      const movement = adjusted > alpha || difference === 0 ? 'not-established' : difference > 0 ? 'up' : 'down'
      return { ...reading, change: { ...reading.change, adjusted_p: adjusted, movement } }
    }),
  }
}
