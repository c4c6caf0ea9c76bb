import type { Estimate, Findings } from '../../model/findings/schema.ts'
import { around, average, opinionAt, periodNames, ripple, stepsOf } from './sample-series.ts'

type Competitors = NonNullable<Findings['competitors']>
type Brand = Competitors['brands'][number]

const ownIn = (period: string) => average(stepsOf(period).map(opinionAt))
const movementOf = ({ low, high }: Estimate) => (low > 0 ? 'up' as const : high < 0 ? 'down' as const : 'not-established' as const)

function shareOf(now: number, previous: number, half: number): NonNullable<Brand['share']> {
  const change = around(now - previous, 1.3 * half)
  return { now: around(now, half), previous: around(previous, half), base: now - 2, change, movement: movementOf(change) }
}

/** Three competitors beside the sample's brand: one below it, one that can't be told apart and is heard in part of the mix alone, one of too few authors. */
export function sampleCompetitors(): Competitors {
  return {
    told: 'all',
    own: { mentions: 2410, mentions_previous: 2010, mentions_base: 21_400, authors: 1490, share: shareOf(66.7, 63.1, 1.4), equal_share: shareOf(64.2, 63.8, 1.5) },
    brands: [
      compared('Tarrin Line', { mentions: 905, authors: 640, lag: 6.4, half: 3.1, covered: 1 }),
      compared('Corran Ferries', { mentions: 286, authors: 201, lag: 1.1, half: 5.2, covered: 0.78 }),
      { ...compared('Lowmoor Boats', { mentions: 11, authors: 7, lag: 0, half: 9, covered: 1 }), ...untold('thin') },
    ],
    venues: [
      { venue: 'boards', label: 'Discussion boards', weight: 0.4, own: 1100, brands: counts(420, 130, 6) }, { venue: 'reviews', label: 'Review sites', weight: 0.6, own: 1310, brands: counts(485, 156, 5) },
    ],
    weight_heard: 1,
  }
}

/** One competitor alone, whose opinion is told apart from the brand's in a direction, or not. */
export function oneCompetitor(lag: number): Competitors {
  const sample = sampleCompetitors()
  return { ...sample, brands: [compared('Tarrin Line', { mentions: 905, authors: 640, lag, half: 3.1, covered: 1 })] }
}

/** Competitors of whom nothing is told, in each of the ways. */
export function untoldCompetitors(status: Exclude<Brand['status'], 'compared'>): Competitors {
  const sample = oneCompetitor(0)
  const silent = status === 'unread' || status === 'absent'
  const told = status === 'unread' ? 'none' : 'all'
  return {
    ...sample, told, own: told === 'none' ? { ...sample.own, share: null, equal_share: null } : sample.own, weight_heard: told === 'none' ? null : 1,
    brands: sample.brands.map((brand) => ({ ...brand, ...untold(status), ...(silent ? { rows: 0, mentions: 0, mentions_previous: 0, mentions_base: 0, authors: 0 } : {}) })),
  }
}

function counts(...mentions: readonly number[]) {
  return ['Tarrin Line', 'Corran Ferries', 'Lowmoor Boats'].map((brand, at) => ({ brand, mentions: mentions[at] }))
}

interface Told {
  readonly mentions: number
  readonly authors: number
  /** Points by which the brand stands above. */
  readonly lag: number
  readonly half: number
  readonly covered: number
}

function compared(brand: string, { mentions, authors, lag, half, covered }: Told): Brand {
  const now = periodNames[periodNames.length - 1]
  const before = periodNames[periodNames.length - 2]
  const [gap, own] = [around(lag, half), ownIn(now)]
  const moved = around(ownIn(now) - ownIn(before), 1.4)
  const still = around(0.2, 1.6)
  const gained = around(moved.mean - 0.2, 2.1)
  const change = { own: moved, level: still, movement: movementOf(still), difference: gained, difference_movement: movementOf(gained) }
  return {
    brand, status: 'compared', rows: mentions * 31, mentions, mentions_previous: mentions - 9, mentions_base: mentions * 10, authors,
    share: shareOf(mentions / 36, mentions / 36 + 0.2, 0.9), equal_share: shareOf(mentions / 34, mentions / 34 - 0.3, 1),
    covered, left_out: covered < 1 ? [{ factor: 'venue', label: 'Video comments' }] : [], converged: true,
    level: around(own - lag, half), own_level: around(own, 2.2), difference: { level: gap, movement: movementOf(gap) }, probability_above: 0.5 + Math.sign(lag) * Math.min(0.49, Math.abs(lag) / 10),
    change, since_base: change,
    share_difference: { raw: around(40, 2), raw_movement: 'up', equal: around(38, 2), equal_movement: 'up' },
    series: periodNames.map((period, at) => ({ period, own: around(ownIn(period), 2.3), level: at === 4 ? null : around(ownIn(period) - lag + 0.8 * ripple(at, 3), half) })),
  }
}

function untold(status: Brand['status']): Partial<Brand> {
  const unmoved = { own: null, level: null, movement: null, difference: null, difference_movement: null }
  return {
    status, covered: null, left_out: [], converged: null, level: null, own_level: null, difference: { level: null, movement: null }, probability_above: null,
    change: unmoved, since_base: unmoved, series: [],
  }
}
