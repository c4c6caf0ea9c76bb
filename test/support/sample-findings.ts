import { sampleCompetitors } from './sample-competitors.ts'
import type { Findings } from '../../model/findings/schema.ts'
import { type CoderState, sampleAdvice, sampleBenchmark, sampleCoder, sampleHearing, sampleImportance, sampleSensitivity, sampleStaying, sampleTipping, sampleVolume } from './sample-listening.ts'
import { around, average, baseSteps, opinionAt, periodNames, periodOf, ripple, stepDate, steps, stepsOf } from './sample-series.ts'
import { sampleEvents, sampleOutcome, sampleSurvey } from './sample-survey.ts'
import type { Verdict } from './sample-survey.ts'
import { sampleFollowUp, sampleRevisions } from './sample-past.ts'
import { sampleCaveats, sampleDiagnostics, sampleMethod } from './sample-surroundings.ts'

interface SampleVenue { readonly venue: string, readonly label: string, readonly offset: number, readonly drift: number, readonly from: number, readonly to: number }

/** `from` and `to`: share of mentions at the first and the last step; `drift`: points over the whole history. */
const venuesGiven: readonly SampleVenue[] = [
  { venue: 'boards', label: 'Discussion boards', offset: -9, drift: -15, from: 0.2, to: 0.41 },
  { venue: 'microblogs', label: 'Microblogs', offset: -4, drift: 1, from: 0.35, to: 0.27 },
  { venue: 'blogs', label: 'Blogs', offset: 11, drift: 0.5, from: 0.1, to: 0.06 },
  { venue: 'reviews', label: 'Review sites', offset: 6, drift: -0.8, from: 0.25, to: 0.18 },
  { venue: 'video', label: 'Video comments', offset: 1, drift: 2, from: 0.1, to: 0.08 },
]
const topicsGiven = [
  { level: 'booking', label: 'Booking and app', offset: -5, from: 0.18, to: 0.15 },
  { level: 'fares', label: 'Fares', offset: -8, from: 0.2, to: 0.17 },
  { level: 'on-board', label: 'On board', offset: 9, from: 0.2, to: 0.16 },
  { level: 'punctuality', label: 'Punctuality', offset: -14, from: 0.17, to: 0.31 },
  { level: 'staff', label: 'Staff', offset: 13, from: 0.13, to: 0.11 },
  { level: 'weather', label: 'Crossings in bad weather', offset: -1, from: 0.12, to: 0.1 },
]
const postersGiven = [
  { level: 'occasional', label: 'occasional', offset: 4, from: 0.55, to: 0.48 },
  { level: 'prolific', label: 'prolific', offset: -6, from: 0.15, to: 0.24 },
  { level: 'regular', label: 'regular', offset: 0.5, from: 0.3, to: 0.28 },
]

const now = stepsOf('2026-10')
const before = stepsOf('2026-09')
const progress = (step: number) => step / (steps.length - 1)
const mentionsAt = (step: number) => Math.round(480 + 90 * ripple(step, 3) + (step > 120 ? 120 : 0))
const shareAt = (level: { from: number, to: number }, step: number) => level.from + (level.to - level.from) * progress(step)
const driftAt = (venue: SampleVenue, step: number) => venue.drift * progress(step)
const total = (list: readonly number[], of: (step: number) => number) => list.reduce((sum, step) => sum + of(step), 0)
const mean = (list: readonly number[], of: (step: number) => number) => average(list.map(of))
const meanOf = (list: readonly number[], level: { from: number, to: number }) => mean(list, (step) => shareAt(level, step))
const shareMix = (levels: readonly { offset: number, from: number, to: number }[], step: number) =>
  levels.reduce((sum, level) => sum + shareAt(level, step) * level.offset, 0)
const venueDrift = (step: number) => venuesGiven.reduce((sum, venue) => sum + shareAt(venue, step) * driftAt(venue, step), 0)

/** The storm of the last month, in points of the raw average: what its mix, its boards' drift, its topics and its posters took away. */
const storm = { venueMix: 1.6, venueDrift: 1.3, topicMix: 0.9, posterMix: 0.3 }
const stormAt = (step: number) => periodOf(step) === '2026-10' ? storm.venueMix + storm.venueDrift + storm.topicMix + storm.posterMix : 0

function rawAt(step: number): number {
  return opinionAt(step) - stormAt(step) + shareMix(venuesGiven, step) + venueDrift(step) + shareMix(topicsGiven, step) + shareMix(postersGiven, step) + ripple(step, 1)
}

function rawOf(list: readonly number[]): number {
  return total(list, (step) => mentionsAt(step) * rawAt(step)) / total(list, mentionsAt)
}

function opinion(): Findings['opinion'] {
  const baseLevel = mean(baseSteps, opinionAt)
  const changeInto = (period: string) => {
    const earlier = periodNames[periodNames.indexOf(period) - 1]
    return earlier === undefined ? null : around(mean(stepsOf(period), opinionAt) - mean(stepsOf(earlier), opinionAt), 1.4)
  }
  const mentions = (list: readonly number[]) => total(list, mentionsAt)
  const authors = (list: readonly number[]) => Math.round(mentions(list) * 0.62)
  return {
    series: steps.map((step) => ({
      step: stepDate(step), adjusted: around(opinionAt(step), 4.2), since_base: around(opinionAt(step) - baseLevel, 2.1),
      raw: step === 33 ? null : rawAt(step), mentions: step === 33 ? 0 : mentionsAt(step), authors: step === 33 ? 0 : Math.round(mentionsAt(step) * 0.7),
      in_period: periodOf(step) === '2026-10',
    })),
    periods: periodNames.map((period) => {
      const own = stepsOf(period)
      return {
        period, adjusted: around(mean(own, opinionAt), 3.9), since_base: around(mean(own, opinionAt) - baseLevel, 1.9),
        change: changeInto(period), raw: rawOf(own), mentions: mentions(own), authors: authors(own),
      }
    }),
    period: around(mean(now, opinionAt), 3.9), previous: around(mean(before, opinionAt), 3.9), previous_sealed: sampleRevisions().periods.at(-1)!.level,
    change: around(mean(now, opinionAt) - mean(before, opinionAt), 1.4), probability_up: 0.9987, movement: 'up',
    since_base: around(mean(now, opinionAt) - baseLevel, 1.9), movement_since_base: 'up',
    raw: rawOf(now), raw_previous: rawOf(before), raw_change: rawOf(now) - rawOf(before),
    mentions: mentions(now), mentions_previous: mentions(before), authors: authors(now),
  }
}

function decomposition(): NonNullable<Findings['decomposition']> {
  const change = (of: (step: number) => number) => mean(now, of) - mean(before, of)
  const rawChange = rawOf(now) - rawOf(before)
  const means: [string, number, number, 'up' | 'down' | 'not-established'][] = [
    ['opinion', change(opinionAt), 1.4, 'up'], ['timing', 0.1, 0.3, 'not-established'],
    ['venue_mix', change((step) => shareMix(venuesGiven, step)) - storm.venueMix, 0.4, 'down'], ['venue_drift', change(venueDrift) - storm.venueDrift, 0.9, 'down'],
    ['topic_mix', change((step) => shareMix(topicsGiven, step)) - storm.topicMix, 0.2, 'down'], ['poster_mix', change((step) => shareMix(postersGiven, step)) - storm.posterMix, 0.2, 'down'],
  ]
  const rest = rawChange - means.reduce((sum, [, value]) => sum + value, 0)
  return {
    from: '2026-09', to: '2026-10', raw_change: rawChange, chance_sd: 0.9, raw_movement: rawChange < 0 ? 'down' : 'up', largest: 'venue_mix',
    parts: [...means, ['unexplained', rest, 0.3, 'not-established'] as const].map(([part, value, half, movement]) => ({ part, estimate: around(value, half), movement, leading: leadingOf(part, value) })),
  }
}

/** The level that did most of a mix, as the sample's story has it. */
function leadingOf(part: string, value: number): NonNullable<Findings['decomposition']>['parts'][number]['leading'] {
  const estimate = around(0.8 * value, 0.3)
  if (part === 'venue_mix') return { level: 'boards', label: 'Discussion boards', share_from: 0.33, share_to: 0.4, estimate }
  if (part === 'topic_mix') return { level: 'punctuality', label: 'Punctuality', share_from: 0.24, share_to: 0.46, estimate }
  return part === 'poster_mix' ? { level: 'prolific', label: 'Prolific posters', share_from: 0.3, share_to: 0.34, estimate } : null
}

function venues(): Findings['venues'] {
  return venuesGiven.map((venue, at) => {
    const level = (step: number) => opinionAt(step) + venue.offset + driftAt(venue, step)
    const drift = mean(now, (step) => driftAt(venue, step)) - mean(baseSteps, (step) => driftAt(venue, step))
    const moved = Math.abs(drift) > 3 ? (drift < 0 ? 'down' as const : 'up' as const) : 'not-established' as const
    const mentions = (list: readonly number[]) => Math.round(total(list, (step) => shareAt(venue, step) * mentionsAt(step)))
    return {
      venue: venue.venue, label: venue.label, anchor: false,
      mentions: mentions(now), mentions_previous: mentions(before), authors: Math.round(mentions(now) * 0.6),
      share: meanOf(now, venue), share_previous: meanOf(before, venue), share_base: meanOf(baseSteps, venue), authors_known: venue.venue === 'video' ? 0.71 : 0.98,
      raw: mean(now, level) + ripple(at, 5), raw_previous: mean(before, level) + ripple(at, 6),
      level: around(mean(now, level), 4.4), level_previous: around(mean(before, level), 4.4), level_base: around(mean(baseSteps, level), 4.1),
      drift: around(drift, 2.8), movement: moved, slope: around(venue.drift / 32.5, 0.4), slope_movement: moved,
      probability_drift_down: venue.venue === 'boards' ? 0.9996 : 0.42 + 0.05 * at, spread: 58 + 3 * at, spread_change: 0.4 * at - 1,
      offset: around(venue.offset, 2.2), first_step: stepDate(0), last_step: stepDate(steps.length - 1),
      series: steps.map((step) => ({
        step: stepDate(step), level: around(level(step), 4.6), drift: around(driftAt(venue, step), 0.3 + 2.5 * progress(step)),
        raw: step === 33 ? null : level(step) + 4 * ripple(step, at), mentions: step === 33 ? 0 : Math.round(shareAt(venue, step) * mentionsAt(step)),
      })),
    }
  })
}

function levelFinding(given: { label: string, offset: number, from: number, to: number }) {
  const mentions = (list: readonly number[]) => Math.round(total(list, (step) => shareAt(given, step) * mentionsAt(step)))
  return {
    label: given.label, offset: around(given.offset, 1.5), mentions: mentions(now), mentions_previous: mentions(before),
    share: meanOf(now, given), share_previous: meanOf(before, given), share_base: meanOf(baseSteps, given), authors: Math.round(mentions(now) * 0.6),
    raw: 14 + given.offset, raw_previous: 15 + given.offset,
  }
}

function topics(): Findings['topics'] {
  return topicsGiven.map((topic) => ({ topic: topic.level, ...levelFinding(topic) }))
}

function speaking(): Findings['speaking'] {
  const concentration = (authors: number, mentions: number) => ({ authors, mentions, top_share: 0.14, gini: 0.43, effective_authors: authors * 0.48 })
  const mixOf = (factor: string, levels: readonly { name: string, label: string, from: number, to: number }[]) => periodNames.flatMap((period) =>
    levels.map((level) => {
      const own = stepsOf(period)
      return { factor, level: level.name, label: level.label, period, mentions: Math.round(total(own, (step) => shareAt(level, step) * mentionsAt(step))), share: meanOf(own, level) }
    }))
  const named = <L extends { level: string }>(level: L) => ({ ...level, name: level.level })
  return {
    concentration: { period: concentration(1490, 2410), previous: concentration(1310, 2010) },
    venues: venuesGiven.map((venue, at) => ({ venue: venue.venue, concentration: at === 4 ? null : concentration(300 + 40 * at, 520 + 50 * at) })),
    mix: [
      ...mixOf('venue', venuesGiven.map((venue) => ({ ...venue, name: venue.venue }))),
      ...mixOf('topic', topicsGiven.map(named)), ...mixOf('poster', postersGiven.map(named)),
    ],
    ...sampleStaying(venuesGiven),
  }
}

/** Invented findings of an invented ferry operator: the same ones at every call, valid by the schema, of the demo's shape. */
export function sampleFindings(): Findings {
  const modelled = total(steps, mentionsAt) - mentionsAt(33)
  return {
    schema: 'tareline-findings/1', account: 'skerrow-ferries', brand: 'Skerrow Ferries', locale: 'en-GB',
    period: { name: '2026-10', start: '2026-10-01', end: '2026-10-31' }, previous_period: { name: '2026-09', start: '2026-09-01', end: '2026-09-30' },
    period_steps: { count: 5, start: '2026-09-28', end: '2026-10-31' }, grid: 'week', interval: 0.9,
    accounting: {
      received: modelled + 312 + 1204 + 2088, rejected: 312, duplicates: 1204, out_of_scope: 2088, modelled,
      reasons: { 'time-unreadable': 141, 'score-unreadable': 171, 'same-id': 380, repost: 824, 'other-brand': 2088, 'time-doubled': 9 },
      unmapped: [{ factor: 'topic', value: 'harbour works', mentions: 118 }], authors: 'known', ready_made: 'none',
      in_period: total(now, mentionsAt), first_step: stepDate(0), last_step: stepDate(steps.length - 1), last_day: '2026-10-31',
    },
    opinion: opinion(), decomposition: decomposition(), venues: venues(),
    topics: topics(),
    posters: postersGiven.map((poster) => ({ poster: poster.level, ...levelFinding(poster) })),
    factors: [],
    scales: {
      mu: around(1.3, 0.4), tau: around(6.1, 0.5),
      venue_drift: Object.fromEntries(venuesGiven.map((venue, at) => [venue.venue, around(at === 0 ? 1.1 : 0.4, 0.3)])),
      venue: around(9.2, 4.1), topic: around(10.4, 4.4), poster: around(6, 3.9), factors: {},
    },
    survey: sampleSurvey(), events: sampleEvents(), outcome: sampleOutcome(), speaking: speaking(),
    benchmark: sampleBenchmark(), importance: sampleImportance(topics()), volume: sampleVolume(), tipping: sampleTipping(mean(before, opinionAt), mean(now, opinionAt)),
    coder: sampleCoder('applied', venuesGiven), sensitivity: sampleSensitivity(), hearing: sampleHearing(venuesGiven), competitors: sampleCompetitors(),
    revisions: sampleRevisions(), follow_up: sampleFollowUp(),
    caveats: sampleCaveats(), advice: sampleAdvice(), diagnostics: sampleDiagnostics(venuesGiven.map((venue) => venue.venue)),
    method: sampleMethod([
      ...venuesGiven.map((venue) => ({ factor: 'venue', level: venue.venue, label: venue.label, share: meanOf(baseSteps, venue) })),
      ...topicsGiven.map((topic) => ({ factor: 'topic', level: topic.level, label: topic.label, share: meanOf(baseSteps, topic) })),
      ...postersGiven.map((poster) => ({ factor: 'poster', level: poster.level, label: poster.label, share: meanOf(baseSteps, poster) })),
    ], venuesGiven),
    inputs: [
      { path: 'mentions/2026-q3.csv.gz', sha256: '3b1f'.repeat(16), rows: 41020 },
      { path: 'mentions/2026-q4.csv.gz', sha256: '9ac4'.repeat(16), rows: modelled + 312 + 1204 + 2088 - 41020 },
    ],
    program: { version: '0.1.0', seed: 20261101 },
  }
}

/** The sample with another verdict on its survey. */
export function withVerdict(verdict: Verdict): Findings {
  return { ...sampleFindings(), survey: sampleSurvey(verdict) }
}

/** The sample with its coder in another state. */
export function withCoder(state: CoderState): Findings {
  return { ...sampleFindings(), coder: sampleCoder(state, venuesGiven) }
}

/** The sample of an account that gives posts alone: no survey, no picture of the customers, no audit, no threads. */
export function postsAlone(): Findings {
  const findings = withCoder('absent')
  const absent = ['survey-absent', 'benchmark-absent', 'coder-unaudited'].map((code) => ({ code, severity: 'caution' as const, figures: {}, evidence: '', meaning: '', remedy: '' }))
  return {
    ...findings, competitors: null, survey: null, events: null, outcome: null, benchmark: null, importance: null, volume: null, speaking: { ...findings.speaking, pull: [] },
    caveats: [...findings.caveats.filter(({ code }) => !ofInputs.includes(code)), ...absent],
    advice: findings.advice.filter(({ code }) => ['hear-venue', 'invite-everyone', 'standing-way-in'].includes(code)),
  }
}

/** Caveats of the sample that rest on an input beside the posts. */
const ofInputs: readonly string[] = ['survey-bases-small', 'benchmark-mismatch', 'coder-biased', 'talk-unlike-importance', 'conversation-pull']

/** The sample as far as a table of ready-made cells goes: nothing is known of authors but their number. */
export function readyMade(): Findings {
  const findings = postsAlone()
  return {
    ...findings, accounting: { ...findings.accounting, authors: 'summed', ready_made: 'all' }, coder: { ...findings.coder, audit_size: null }, hearing: null, tipping: null, advice: [],
    speaking: { ...findings.speaking, staying: null, spread: [] },
  }
}
