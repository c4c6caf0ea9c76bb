import { day, firstMonday, isoDate, weekOf } from './calendar.ts'
import { perKey, type Week } from './story.ts'
import type { Draws } from './seeded-draws.ts'

/**
 * The monthly telephone survey of the demo: about 400 people, 30 waves. What people say of the brand follows opinion,
 * as the posts express it, four weeks late; the answers are drawn as a sample's are.
 */
const lateBy = 28 * day
const waves = 30

const groups = ['islander', 'visitor', 'other'] as const
type Group = (typeof groups)[number]
/** Segments that are told apart; the others count in everyone only. */
const segments = ['islander', 'visitor'] as const

interface Measure {
  /** Expected value at no opinion at all. */
  readonly at: number
  /** Added for every point of opinion. */
  readonly perPoint: number
  /** Standard deviation of what moves it besides opinion, drawn for every wave. */
  readonly own: number
  /** Added for a group. */
  readonly group: Readonly<Record<Group, number>>
}

/** Shares of people, but for satisfaction: the mean of a scale from 1 to 10. */
const measures = {
  favourability: { at: 0.36, perPoint: 0.0155, own: 0.004, group: { islander: 0.03, visitor: -0.04, other: -0.015 } },
  consideration: { at: 0.3, perPoint: 0.006, own: 0.012, group: { islander: 0.09, visitor: -0.08, other: -0.055 } },
  recommendation: { at: 0.26, perPoint: 0.005, own: 0.012, group: { islander: 0.02, visitor: -0.03, other: -0.008 } },
  satisfaction: { at: 6.5, perPoint: 0.04, own: 0.06, group: { islander: 0.2, visitor: -0.25, other: -0.1 } },
} as const satisfies Record<string, Measure>
type Metric = keyof typeof measures
const metrics = Object.keys(measures) as Metric[]
const satisfactionSd = 2

/** Waves, from 0, in which something was otherwise. */
const straddling = 16
const fewVisitors = { wave: 9, base: 24 }
const notAsked = { wave: 15, metric: 'recommendation' } as const

/** First and last day of fieldwork, as wall times. */
function fieldworkOf(wave: number, draws: Draws): { readonly start: number; readonly end: number } {
  const [date, days] = [14 + draws.integer(3), 10 + draws.integer(5)]
  const start = Date.UTC(2024, 4 + wave, wave === straddling ? 23 : date)
  return { start, end: start + (days - 1) * day }
}

/** Opinion in points, the mean of the days from `start` to `end`; before the first week it is that of the first week. */
export function opinionOver(story: readonly Week[], start: number, end: number): number {
  const days = Math.round((end - start) / day) + 1
  const values = Array.from({ length: days }, (_, i) => story[Math.max(0, weekOf(Math.max(firstMonday, start + i * day)))].opinion)
  return (100 * values.reduce((sum, value) => sum + value, 0)) / days
}

/** The lines of survey/tracker.csv. */
export function surveyLines(story: readonly Week[], draws: Draws): readonly string[] {
  const rows = Array.from({ length: waves }, (_, wave) => waveLines(wave, story, draws))
  return ['wave,field_start,field_end,metric,segment,base,effective_base,value,kind,sd', ...rows.flat()]
}

function waveLines(wave: number, story: readonly Week[], draws: Draws): readonly string[] {
  const { start, end } = fieldworkOf(wave, draws)
  const opinion = opinionOver(story, start - lateBy, end - lateBy)
  const efficiency = 0.8 + 0.1 * draws.uniform()
  const all = 380 + draws.integer(41)
  const visitor = wave === fewVisitors.wave ? fewVisitors.base : 55 + draws.integer(46)
  const islander = Math.round(all * (0.4 + 0.06 * draws.uniform()))
  const bases: Record<Group, number> = { islander, visitor, other: all - islander - visitor }
  return metrics.flatMap((metric) => {
    const measure = measures[metric]
    const expected = measure.at + measure.perPoint * opinion + measure.own * draws.normal()
    const answers = perKey(groups, (group) => answered(metric, expected + measure.group[group], Math.round(bases[group] * efficiency), draws))
    if (wave === notAsked.wave && metric === notAsked.metric) return []
    const line = (segment: string, inside: readonly Group[]): string => {
      const [base, effective, sum] = [inside.map((group) => bases[group]), inside.map((group) => Math.round(bases[group] * efficiency)), inside.map((group) => answers[group])].map(total)
      const figure = metric === 'satisfaction' ? [(sum / effective).toFixed(2), 'mean', satisfactionSd.toFixed(1)] : [(sum / effective).toFixed(3), 'share', '']
      return [isoDate(Date.UTC(2024, 4 + wave, 1)).slice(0, 7), isoDate(start), isoDate(end), metric, segment, base, effective, ...figure].join(',')
    }
    return [line('', groups), ...segments.map((segment) => line(segment, [segment]))]
  })
}

/** Sum of the answers of so many people: of those who say yes, or of marks. */
function answered(metric: Metric, expected: number, people: number, draws: Draws): number {
  if (metric === 'satisfaction') return people * expected + Math.sqrt(people) * satisfactionSd * draws.normal()
  return Array.from({ length: people }, () => draws.chance(expected)).filter(Boolean).length
}

function total(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0)
}
