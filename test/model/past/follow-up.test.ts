import { describe, expect, test } from 'vitest'
import { lastBefore, readFollowUp, type Seen } from '../../../model/past/follow-up.ts'
import type { Past, SealedAdvice, SealedReview } from '../../../model/past/past.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const findings = sampleFindings()
const seen: Seen = { ...findings, extremes: 0.4 }
const boards = findings.venues.find(({ venue }) => venue === 'boards')!
const topic = findings.importance!.topics[0]
const group = findings.benchmark!.margins[0].levels.find(({ heard }) => heard !== null)!
const margin = findings.benchmark!.margins[0].margin
const top = findings.speaking.concentration.period!.top_share
const codings = findings.coder.venues.reduce((sum, venue) => sum + venue.codings, 0)

function advice(code: string, figures: SealedAdvice['figures'], where = ''): SealedAdvice {
  return { code, where, where_kind: 'all', how_many: 1, helps: 'clearly', figures, action: `Do ${code}`, success: 'Seen' }
}

function reviewOf(period: string, given: readonly SealedAdvice[], revision = 1): SealedReview {
  return { name: revision === 1 ? period : `${period}.r${revision}`, period, revision, sealedOn: '2026-10-02', told: { advice: given } } as unknown as SealedReview
}

const follow = (piece: SealedAdvice, now: Seen = seen) => readFollowUp({ reviews: [reviewOf('2026-09', [piece])] } as unknown as Past, '2026-10', now)!.advice[0]

type Occasion = readonly [code: string, figures: SealedAdvice['figures'], where: string, outcome: string, progress: object]
/** Every kind of advice, each as it would be met, on its way, and not met. */
const occasions: readonly Occasion[] = [
  ['hear-venue', { heard: boards.authors - 30, authors: 20 }, boards.label, 'met', { counts: { before: boards.authors - 30, sought: boards.authors - 10, now: boards.authors } }],
  ['hear-venue', { heard: boards.authors - 30, authors: 100 }, boards.label, 'partly', {}],
  ['hear-venue', { heard: boards.authors, authors: 100 }, boards.label, 'not-met', {}],
  ['hear-venue', { heard: 10, authors: 100 }, 'Postcards', 'unknown', { counts: { now: null } }],
  ['hear-topic', { talk: topic.talk! - 0.02 }, topic.label, 'met', { shares: { sought: null, now: topic.talk } }],
  ['hear-topic', { talk: topic.talk! - 0.004 }, topic.label, 'not-met', {}],
  ['hear-segment', { heard: group.heard! - 0.1, customers: group.heard! - 0.01, margin }, group.level, 'met', {}],
  ['hear-segment', { heard: group.heard! - 0.1, customers: group.heard! + 0.05, margin }, group.level, 'partly', {}],
  ['hear-segment', { heard: group.heard!, customers: group.heard! + 0.05, margin }, group.level, 'not-met', {}],
  ['hear-segment', { heard: 0.1, customers: 0.2, margin: 'no such margin' }, group.level, 'unknown', {}],
  ['invite-everyone', { extremes: 0.5 }, '', 'met', { shares: { before: 0.5, now: 0.4 } }],
  ['invite-everyone', { extremes: 0.404 }, '', 'not-met', {}],
  ['standing-way-in', { share: top + 0.02 }, '', 'met', {}],
  ['standing-way-in', { share: top }, '', 'not-met', {}],
  ['survey-start', { waves: 8 }, '', 'met', { counts: { before: 0, sought: 8, now: findings.survey!.waves.length } }],
  ['survey-waves', { waves_now: findings.survey!.pairs - 1, waves: 4 }, '', 'partly', {}],
  ['survey-interviews', { interviews_now: findings.survey!.waves.at(-1)!.base, interviews: 5000 }, '', 'not-met', {}],
  ['audit-start', { codings }, '', 'met', { counts: { before: 0, sought: codings, now: codings } }],
  ['audit-more', { codings: 0, needed: 50 }, boards.label, findings.coder.venues.find(({ label }) => label === boards.label)!.codings >= 50 ? 'met' : 'partly', {}],
]

describe('what became of advice', () => {
  test.each(occasions)('%s %j in %s: %s', (code, figures, where, outcome, progress) => {
    expect(follow(advice(code, figures, where))).toMatchObject({ code, action: `Do ${code}`, outcome, ...progress })
  })
  test('every kind of advice that the catalogue words is followed', async () => {
    const { houseWords } = await import('../../support/house-words.ts')
    const worded = (await houseWords()).keys.flatMap((key) => /^advice-(.+)-success$/.exec(key)?.[1] ?? [])
    expect([...new Set(occasions.map(([code]) => code))].sort()).toEqual(worded.sort())
  })
  test('of a kind that this program does not know, or whose figures are of another make, it says that it can’t tell', () => {
    expect(follow(advice('sing-to-them', { songs: 3 }))).toMatchObject({ outcome: 'unknown', counts: null, shares: null })
    expect(follow(advice('hear-venue', {}, boards.label))).toMatchObject({ outcome: 'unknown', counts: null })
    expect(follow(advice('toString', {}))).toMatchObject({ outcome: 'unknown' })
  })
  test('the width that was expected stands beside the one seen', () => {
    const { high, low } = findings.opinion.change!
    expect(follow(advice('hear-venue', { heard: 1, authors: 1, width_after: 2.5 }, boards.label)).width).toEqual({ expected: 2.5, now: high - low })
  })
})

describe('which review', () => {
  const past = (...reviews: readonly SealedReview[]) => ({ reviews } as unknown as Past)
  const piece = advice('invite-everyone', { extremes: 0.5 })
  test('the newest of the latest earlier period, whenever it was sealed', () => {
    const reviews = [reviewOf('2026-09', [piece]), reviewOf('2026-08', [piece]), reviewOf('2026-09', [piece], 2), reviewOf('2026-10', [piece])]
    expect(lastBefore(reviews, '2026-10')?.name).toBe('2026-09.r2')
    expect(lastBefore(reviews, '2026-08')).toBeNull()
    expect(readFollowUp(past(...reviews), '2026-10', seen)).toMatchObject({ period: '2026-09', review: '2026-09.r2', met: 1, partly: 0, not_met: 0, unknown: 0 })
  })
  test('nothing where it gave no advice, and what hardly helped was none', () => {
    expect(readFollowUp(past(reviewOf('2026-09', [])), '2026-10', seen)).toBeNull()
    expect(readFollowUp(past(reviewOf('2026-09', [{ ...piece, helps: 'hardly' }, piece])), '2026-10', seen)?.advice).toHaveLength(1)
  })
})
