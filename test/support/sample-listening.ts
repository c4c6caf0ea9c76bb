import type { Findings } from '../../model/findings/schema.ts'
import { around, average, periodNames, ripple } from './sample-series.ts'

type Speaking = Findings['speaking']
type Benchmark = NonNullable<Findings['benchmark']>
type Coder = Findings['coder']
export type CoderState = 'absent' | 'applied' | Exclude<Coder['reason'], null>

interface Venue { readonly venue: string, readonly label: string }

/** Wilson's interval at 90 %, so that the sample's bounds are like those of a review. */
function wilson(stayed: number, authors: number): { readonly share: number, readonly low: number, readonly high: number } {
  const [z2, share] = [1.645 ** 2, stayed / authors]
  const middle = (share + z2 / (2 * authors)) / (1 + z2 / authors)
  const half = 1.645 * Math.sqrt((share * (1 - share) + z2 / (4 * authors)) / authors) / (1 + z2 / authors)
  return { share, low: middle - half, high: middle + half }
}

const stances = ['negative', 'middle', 'positive'] as const

/** Who posts again: those in the middle less and less. In one month too few positive authors posted to show. */
function staying(): NonNullable<Speaking['staying']> {
  const pairs = periodNames.slice(0, -1)
  const periods = pairs.flatMap((from, at) => stances.map((stance, s) => {
    const authors = stance === 'positive' && at === 4 ? 8 : Math.round(240 + 90 * s + 40 * ripple(at, s))
    const usual = stance === 'middle' ? 0.42 - 0.16 * at / pairs.length : 0.41 + 0.03 * s
    const stayed = Math.round(authors * (usual + 0.025 * ripple(at, s + 4)))
    const to = periodNames[at + 1]!
    return authors < 10 ? { from, to, stance, authors, stayed: null, share: null, low: null, high: null } : { from, to, stance, authors, stayed, ...wilson(stayed, authors) }
  }))
  return {
    periods,
    middle_gap: { difference: -15.2, low: -18.9, high: -11.5, movement: 'down' },
    middle_gap_change: { difference: -13.4, low: -18.1, high: -8.7, movement: 'down' },
  }
}

/** Scores inside boards lie further apart than they did. */
function spread(venues: readonly Venue[]): Speaking['spread'] {
  return venues.map(({ venue, label }, v) => {
    const widened = venue === 'boards' ? 7.5 : 0.6 * v - 1
    const at = (period: number) => 58 + 3 * v + widened * period / periodNames.length + 1.4 * ripple(period, v + 20)
    const series = periodNames.map((period, p) => ({ period, mentions: 300 + 40 * v, spread: at(p), extremes: 0.44 + 0.03 * v + 0.006 * (widened * p / periodNames.length) + 0.01 * ripple(p, v + 30) }))
    const base = average(series.slice(0, 12).map((of) => of.spread))
    const now = series.at(-1)!.spread
    return { venue, label, now, base, change: around(now - base, 2.2), movement: now - base > 2.2 ? 'up' : 'not-established', series }
  })
}

function pull(venues: readonly Venue[]): Speaking['pull'] {
  const slopes: Readonly<Record<string, readonly [number, number]>> = { boards: [0.24, 0.06], microblogs: [-0.13, 0.05], video: [0.05, 0.11] }
  const classes = [null, 'occasional', 'regular', 'prolific'] as const
  return venues.flatMap(({ venue, label }) => {
    const [slope, half] = slopes[venue] ?? []
    if (slope === undefined || half === undefined) return []
    return classes.map((poster, p) => {
      const of = around(slope + (p === 0 ? 0 : 0.05 * (p - 2)), half * (p === 0 ? 1 : 1.8))
      return {
        venue, label, poster, poster_label: poster, replies: p === 0 ? 8400 : 2800, authors: p === 0 ? 2100 : 700, slope: of,
        movement: of.low > 0 ? 'up' as const : of.high < 0 ? 'down' as const : 'not-established' as const,
      }
    })
  })
}

/** Who is speaking, as far as it goes beyond concentration and mix. */
export function sampleStaying(venues: readonly Venue[]): Pick<Speaking, 'staying' | 'spread' | 'pull'> {
  return { staying: staying(), spread: spread(venues), pull: pull(venues) }
}

const authorsKnown = 1212

/**
 * @param jointly - authors needed besides if all levels are brought to their shares at once
 * @param planned - as many, if several levels are short
 */
function level(name: string, customers: number, authors: number | null, needed: number, jointly: number, planned = jointly): Benchmark['margins'][number]['levels'][number] {
  const heard = authors === null ? null : authors / authorsKnown
  return { level: name, customers, heard, authors, gap: heard === null ? null : 100 * (heard - customers), shortfall: 100 * Math.max(0, customers - (heard ?? 0)), needed, needed_jointly: jointly, planned }
}

/** Customers by two traits; freight customers are too few to show, of school parties nobody was heard. */
export function sampleBenchmark(): Benchmark {
  return {
    margins: [
      {
        margin: 'segment', dissimilarity: 0.307, authors: authorsKnown, all_authors: 1490, needed_jointly: 385 + 63 + 151 + 76,
        levels: [level('islander', 0.34, 254, 240, 385), level('commuter', 0.24, 388, 0, 63), level('holiday', 0.3, 563, 0, 0), level('freight', 0.08, null, 99, 151), level('school parties', 0.04, 0, 51, 76)],
      },
      {
        margin: 'age', dissimilarity: 0.19, authors: 1187, all_authors: 1490, needed_jointly: 366 + 691,
        levels: [level('under 35', 0.22, 499, 0, 0), level('35 to 54', 0.35, 428, 0, 366, 0), level('55 and over', 0.43, 285, 416, 691, 416)],
      },
    ],
    raking: { converged: true, cycles: 9, lowest: 0.31, highest: 4.2, bounded: 14, design_effect: 1.94, authors: 1187, effective_authors: 612 },
    unreachable: [{ margin: 'segment', level: 'school parties', customers: 0.04 }],
    as_heard: 17.2, weighted: around(11.6, 3.4),
  }
}

export function sampleVolume(): NonNullable<Findings['volume']> {
  return { wave: '2026-10', metric: 'favourability', label: 'Favourability', posts: 53.4, survey: 45.6, gap: 7.8, authors: 1490, customers: 310_000, defect_correlation: 0.0109, equal_sample: 44.8 }
}

/** Odds of praise as the sample's opinion has them in the two months; the curve divides them by how much likelier the content became to post. */
export function sampleTipping(before: number, now: number): NonNullable<Findings['tipping']> {
  const odds = (points: number) => (1 + points / 100) / (1 - points / 100)
  const pointsOf = (of: number) => 100 * (of - 1) / (of + 1)
  const ratio = odds(now) / odds(before)
  const ratios = [...Array.from({ length: 17 }, (_, at) => 1.2 ** ((at - 8) / 8)), ratio].sort((a, b) => a - b)
  return {
    ratio: around(ratio, 0.03), who: 'content',
    curve: ratios.map((of) => ({ ratio: of, change: around(pointsOf(odds(now) / of) - before, 1.4) })),
  }
}

/** The coder checked by people, or not: each state that a review can be in. */
export function sampleCoder(state: CoderState, venues: readonly Venue[]): Coder {
  const size = { width: 2, accuracy: 0.85, codings_per_venue: 350, codings: 350 * venues.length }
  if (state === 'absent') return { status: 'absent', reason: null, venues: [], correction: null, movement: null, audit_size: size }
  const corrections = [-3.2, -1.1, 0.9, -2.4, 1.2]
  // star ratings hold no labels
  const stars = (venue: string) => venue === 'reviews'
  const checked: Coder['venues'] = venues.map(({ venue, label }, v) => (stars(venue) ? { venue, label, codings: 0, agreement: 0, smallest_singular_value: 0, refused: 'ranges' as const, correction: null } : {
    venue, label, codings: state === 'too-few' && v === 1 ? 22 : 150 + 5 * v, agreement: state === 'too-poor' ? 0.41 : 0.86 - 0.02 * v,
    smallest_singular_value: state === 'too-poor' ? 0.11 : 0.58, refused: state === 'too-poor' || (state === 'too-few' && v === 1) ? state : null, correction: state === 'applied' ? around(corrections[v % corrections.length]!, 1.6) : null,
  }))
  if (state === 'applied') return { status: 'applied', reason: null, venues: checked, correction: around(-1.9, 0.9), movement: 'down', audit_size: null }
  return { status: 'refused', reason: state, venues: state === 'ranges' || state === 'ready-made' ? [] : checked, correction: null, movement: null, audit_size: state === 'too-few' || state === 'too-poor' ? size : null }
}

/** Much is said of punctuality; what is eaten on board, and how staff behave, matters as much and is hardly talked about. */
export function sampleImportance(topics: readonly { readonly topic: string, readonly label: string, readonly share: number, readonly authors: number }[]): NonNullable<Findings['importance']> {
  const weights: Readonly<Record<string, number>> = { punctuality: 0.17, 'on-board': 0.27, staff: 0.21, fares: 0.19, booking: 0.12, weather: 0.04 }
  const weighed = topics.map(({ topic, label, share, authors }) => {
    const importance = weights[topic] ?? 0
    return { topic, label, importance, talk: topic === 'weather' ? null : share, authors: topic === 'weather' ? null : authors, gap: topic === 'weather' ? null : 100 * (share - importance) }
  })
  return { source: 'relative-weights', respondents: 400, explained: 0.58, topics: weighed, dissimilarity: 0.24, level: around(28.1, 4), change: around(2.2, 1.5) }
}

export function sampleSensitivity(): Findings['sensitivity'] {
  return { scales: [{ scale: 'mu', shift: 0.11 }, { scale: 'tau', shift: 0.02 }, { scale: 'venue_drift.boards', shift: 0.06 }], shift: 0.11, reliable: true }
}

/** Full widths in points: video comments would tell most for what they cost, boards least. */
export function sampleHearing(venues: readonly Venue[]): NonNullable<Findings['hearing']> {
  const gains = [0.15, 0.3, 0.55, 0.4, 0.75]
  return {
    width: 3.6,
    venues: venues.map(({ venue, label }, v) => ({
      venue, label, cost_per_author: v === 0 ? 3 : 1, cost_given: v === 0,
      curve: [0, 25, 50, 100, 200, 400, 800].map((authors) => ({ authors, width: 3.6 - gains[v % gains.length]! * authors / (authors + 160) })),
    })),
  }
}

/** A piece of each kind of advice, the most gained for its cost first, what hardly helps last; worded by the catalogue. */
export function sampleAdvice(): Findings['advice'] {
  const piece = (code: string, where: string, where_kind: Findings['advice'][number]['where_kind'], how_many: number, figures: Findings['advice'][number]['figures'], gain: number | null = null, gain_of: Findings['advice'][number]['gain_of'] = 'none', cost: number | null = null, gainShare: number | null = null): Findings['advice'][number] => ({
    code, where, where_kind, how_many, helps: gainShare === null ? 'not-computed' : gainShare < 0.05 ? 'hardly' : 'clearly', gain_share: gainShare, gain: gain === null ? null : around(gain, 0.02), gain_of, cost, cost_given: false, gain_per_cost: gain === null || cost === null ? null : gain / cost,
    action: `action of ${code}`, evidence: `evidence of ${code}`, success: `success of ${code}`, figures,
  })
  return [
    piece('hear-venue', 'Video comments', 'venue', 200, { venue: 'Video comments', authors: 200, heard: 118, width_before: 3.6, width_after: 3.18, cost: 200 }, 0.13, 'next-change', 200, 0.117),
    piece('hear-topic', 'On board', 'topic', 150, { topic: 'On board', authors: 150, talk: 0.16, importance: 0.27, width_before: 4.2, width_after: 3.7, cost: 150 }, 0.15, 'importance-level', 150, 0.119),
    piece('hear-segment', 'islander', 'segment', 385, { margin: 'segment', segment: 'islander', authors: 385, alone: 240, heard: 0.21, customers: 0.34, effective_before: 612, effective_after: 941, cost: 385 }, 0.2, 'customer-mean', 385, 0.194),
    piece('audit-more', 'Microblogs', 'coder', 28, { venue: 'Microblogs', codings: 22, needed: 50 }),
    piece('survey-waves', 'Favourability', 'survey', 11, { waves: 11, waves_now: 30, correlation: 0.31 }),
    piece('invite-everyone', '', 'all', 0, { extremes: 0.61 }),
    piece('standing-way-in', '', 'all', 0, { share: 0.27 }),
    piece('hear-venue', 'Blogs', 'venue', 125, { venue: 'Blogs', authors: 125, heard: 310, width_before: 3.6, width_after: 3.49, cost: 125 }, 0.03, 'next-change', 125, 0.031),
  ]
}
