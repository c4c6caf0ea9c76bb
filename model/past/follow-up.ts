import type { Findings } from '../findings/schema.ts'
import type { Past, SealedAdvice, SealedReview } from './past.ts'

type FollowUp = NonNullable<Findings['follow_up']>
type Followed = FollowUp['advice'][number]

/** Findings of the present review that show what became of advice. */
export type Seen = Pick<Findings, 'venues' | 'importance' | 'benchmark' | 'speaking' | 'survey' | 'coder' | 'opinion'> & {
  /** Share of the period's scores at either end; null where it is not known. */
  readonly extremes: number | null
}

/** Shares are told in whole percents: one that reads the same is the same. */
const toldAs = { counts: 1, shares: 100 } as const

/** One thing by which advice is measured, before and now; `sought` is null where any move in its direction will do. */
interface Measured {
  readonly of: 'counts' | 'shares'
  readonly better: 'more' | 'less'
  readonly before: number
  readonly sought: number | null
  readonly now: number | null
}

/** What each piece of advice is measured by: the figures that it was given with, beside the same figures now. */
const measureOf: Readonly<Record<string, (advice: SealedAdvice, seen: Seen) => Measured>> = {
  'hear-venue': ({ figures, where }, { venues }) => counted(figures['heard'], add(figures['heard'], figures['authors']), venues.find(({ label }) => label === where)?.authors ?? null),
  'hear-topic': ({ figures, where }, { importance }) => shared('more', figures['talk'], null, importance?.topics.find(({ label }) => label === where)?.talk ?? null),
  'hear-segment': ({ figures, where }, { benchmark }) => shared('more', figures['heard'], figures['customers'],
    benchmark?.margins.find(({ margin }) => margin === figures['margin'])?.levels.find(({ level }) => level === where)?.heard ?? null),
  'invite-everyone': ({ figures }, { extremes }) => shared('less', figures['extremes'], null, extremes),
  'standing-way-in': ({ figures }, { speaking }) => shared('less', figures['share'], null, speaking.concentration.period?.top_share ?? null),
  'survey-start': ({ figures }, { survey }) => counted(0, figures['waves'], survey?.waves.length ?? 0),
  'survey-waves': ({ figures }, { survey }) => counted(figures['waves_now'], add(figures['waves_now'], figures['waves']), survey?.pairs ?? 0),
  'survey-interviews': ({ figures }, { survey }) => counted(figures['interviews_now'], figures['interviews'], survey?.waves.at(-1)?.base ?? null),
  'audit-start': ({ figures }, { coder }) => counted(0, figures['codings'], coder.venues.reduce((sum, { codings }) => sum + codings, 0)),
  'audit-more': ({ figures, where }, { coder }) => counted(figures['codings'], figures['needed'], coder.venues.find(({ label }) => label === where)?.codings ?? 0),
}

/** What became of the advice of the last sealed review of an earlier period; null where there is none. */
export function readFollowUp({ reviews }: Past, current: string, seen: Seen): FollowUp | null {
  const last = lastBefore(reviews, current)
  if (last === null || last.told.advice.length === 0) return null
  const advice = last.told.advice.filter(({ helps }) => helps !== 'hardly').map((piece) => follow(piece, seen))
  const count = (outcome: Followed['outcome']) => advice.filter((piece) => piece.outcome === outcome).length
  return { period: last.period, review: last.name, sealed_on: last.sealedOn, met: count('met'), partly: count('partly'), not_met: count('not-met'), unknown: count('unknown'), advice }
}

/** The newest review of the latest period before one. */
export function lastBefore(reviews: readonly SealedReview[], current: string): SealedReview | null {
  const earlier = reviews.filter(({ period }) => period < current)
  const latest = earlier.reduce((found, { period }) => (period > found ? period : found), '')
  return earlier.filter(({ period }) => period === latest).at(-1) ?? null
}

function follow(advice: SealedAdvice, seen: Seen): Followed {
  const measured = Object.hasOwn(measureOf, advice.code) ? measureOf[advice.code](advice, seen) : null
  const { code, where, where_kind, action, success, figures } = advice
  const width = code === 'hear-venue' && typeof figures['width_after'] === 'number' ? { expected: figures['width_after'], now: widthOf(seen) } : null
  const progress = measured === null || !Number.isFinite(measured.before) ? null : measured
  const written = progress === null ? null : { before: progress.before, sought: progress.sought, now: progress.now }
  return {
    code, where, where_kind, action, success, width, outcome: progress === null ? 'unknown' : outcomeOf(progress),
    counts: progress?.of === 'counts' ? written : null, shares: progress?.of === 'shares' ? written : null,
  }
}

function widthOf({ opinion: { change } }: Seen): number | null {
  return change === null ? null : change.high - change.low
}

/** Met where what was sought is reached, or, where nothing in particular was, where it moved at all in that direction; partly where it moved and is not there yet. */
function outcomeOf({ of, better, before, sought, now }: Measured): Followed['outcome'] {
  if (now === null) return 'unknown'
  const gained = (from: number) => (better === 'more' ? 1 : -1) * (Math.round(toldAs[of] * now) - Math.round(toldAs[of] * from))
  const moved = gained(before) > 0
  if (sought === null) return moved ? 'met' : 'not-met'
  return gained(sought) >= 0 ? 'met' : moved ? 'partly' : 'not-met'
}

type Figure = string | number | undefined

function counted(before: Figure, sought: Figure, now: number | null): Measured {
  return { of: 'counts', better: 'more', before: numberOf(before), sought: numberOf(sought), now }
}

function shared(better: Measured['better'], before: Figure, sought: Figure | null, now: number | null): Measured {
  return { of: 'shares', better, before: numberOf(before), sought: sought === null ? null : numberOf(sought), now }
}

function add(a: Figure, b: Figure): number {
  return numberOf(a) + numberOf(b)
}

/** NaN where an older review wrote no such figure. */
function numberOf(figure: Figure): number {
  return typeof figure === 'number' ? figure : Number.NaN
}
