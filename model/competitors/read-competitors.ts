import type { Findings } from '../findings/schema.ts'
import { effortFor } from '../fit/effort.ts'
import type { FitExecutor } from '../fit/executor.ts'
import { samplePosterior } from '../fit/posterior.ts'
import { prepareFit } from '../fit/prepare-fit.ts'
import type { FitProblem } from '../fit/problem.ts'
import type { SmallInputs } from '../inputs/small-inputs.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'
import { createGenerator } from '../random/generator.ts'
import { sumByStep } from '../reading/cell-sums.ts'
import type { Reading } from '../reading/context.ts'
import { hasConverged } from '../reading/diagnostics.ts'
import { drawColumns } from '../reading/draw-columns.ts'
import { authorsIn, compareOpinion, noOpinion } from './compare-opinion.ts'
import type { CompetitorBrand, CompetitorTables } from './competitor-tables.ts'
import { noDifference, readMentionShares, venueWeights } from './mention-shares.ts'
import { sharedMix } from './shared-mix.ts'
import { venueCounts } from './venue-counts.ts'

/*
 *   each competitor's tables ──▶ the same fit as the brand's ──▶ opinion beside the brand's, at one mix
 *   all brands' tables ──▶ counts by venue ──▶ shares of mentions, as counted and at one mix of venues
 */

type Competitors = NonNullable<Findings['competitors']>
type Brand = Competitors['brands'][number]

export interface CompareOptions {
  readonly seed: number
  readonly interval: number
  readonly smallestGroup: number
}

/** Streams of the seed, one a competitor for its own seed, and one for the counts. */
const [seedStream, countStream] = [9_000_000, 9_500_000]

/**
 * The competitors beside the brand. Each is fitted as the brand is: same model, same priors, the same audit of the coder; from a seed of its own.
 *
 * @param reading - of the brand
 * @param executorFor - who does the heavy work of a fit
 */
export async function readCompetitors(
  reading: Reading, { told, brands }: CompetitorTables, audit: SmallInputs['audit'], options: CompareOptions, executorFor: (problem: FitProblem) => FitExecutor,
): Promise<Competitors> {
  const { tables } = reading
  const all = [tables, ...brands.map((of) => of.tables)] as const
  const venues = venuesOf(all)
  const names = venues.map(({ name }) => name)
  const weights = venueWeights(all, names)
  const shares = told === 'all' ? readMentionShares(all, names, weights, options.interval, createGenerator(options.seed, countStream)) : null
  const counted = all.map((of) => venueCounts(of, names, tables.timeline.review.name))
  const voices = all.map((of, b) => ({ ...countsOf(of, reading), share: shares?.raw[b] ?? null, equal_share: shares?.equal[b] ?? null }))
  const compared: Brand[] = []
  for (const [b, brand] of brands.entries()) {
    compared.push({
      brand: brand.brand, rows: brand.tables?.accounting.received ?? 0, ...voices[b + 1],
      ...await compareBrand(reading, brand, told, audit, { ...options, seed: createGenerator(options.seed, seedStream + b).integer(2 ** 32) }, executorFor),
      share_difference: shares?.differences[b + 1] ?? noDifference,
    })
  }
  const heard = venues.reduce((sum, _, v) => (counted.some((of) => of[v].mentions > 0) ? sum + weights[v] : sum), 0)
  return {
    told, own: voices[0], brands: compared,
    venues: venues.map(({ name: venue, label }, v) => ({
      venue, label, weight: weights[v], own: counted[0][v].mentions, brands: brands.map(({ brand }, b) => ({ brand, mentions: counted[b + 1][v].mentions })),
    })),
    weight_heard: shares?.equal[0] == null ? null : Math.min(1, heard),
  }
}

type Compared = Omit<Brand, 'brand' | 'rows' | keyof Competitors['own'] | 'share_difference'>

async function compareBrand(
  reading: Reading, { tables }: CompetitorBrand, told: CompetitorTables['told'], audit: SmallInputs['audit'], { seed, interval, smallestGroup }: CompareOptions,
  executorFor: (problem: FitProblem) => FitExecutor,
): Promise<Compared> {
  const silent = (status: Brand['status']): Compared => ({ status, covered: null, left_out: [], converged: null, ...noOpinion })
  if (tables === null) return silent(told === 'none' ? 'unread' : 'absent')
  if (authorsIn(tables, reading.tables.timeline.review.name) < smallestGroup) return silent('thin')
  const mix = sharedMix(reading.tables.factors, reading.mix, tables.factors)
  if (mix === null) return silent('apart')
  const { problem } = prepareFit(tables, audit)
  const posterior = await samplePosterior(problem, executorFor(problem), { seed, ...effortFor(problem) })
  return {
    status: 'compared', covered: mix.covered, left_out: [...mix.leftOut], converged: hasConverged(posterior),
    ...compareOpinion(reading, tables, drawColumns(tables, posterior), mix, interval, smallestGroup),
  }
}

/** Mentions of a brand in the periods that the brand itself is read over. */
function countsOf(tables: IntakeTables | null, { tables: { timeline } }: Reading): Pick<Brand, 'mentions' | 'mentions_previous' | 'mentions_base' | 'authors'> {
  const [now, previous] = [timeline.periods[timeline.current].name, timeline.current < 1 ? null : timeline.periods[timeline.current - 1].name]
  const mentionsIn = (holds: (of: IntakeTables, step: number) => boolean) => (tables === null ? 0 : sumByStep(tables).mentions.reduce((sum, n, t) => (holds(tables, t) ? sum + n : sum), 0))
  const within = (name: string | null) => mentionsIn((of, t) => of.timeline.periods[of.timeline.periodOf[t]].name === name)
  return {
    mentions: within(now), mentions_previous: within(previous), mentions_base: mentionsIn((of, t) => of.timeline.inBase[t] === 1),
    authors: tables === null ? 0 : authorsIn(tables, now),
  }
}

/** Venues of any brand, sorted by name. */
function venuesOf(brands: readonly (IntakeTables | null)[]): readonly { readonly name: string; readonly label: string }[] {
  const labels = new Map(brands.flatMap((tables) => tables?.factors[0].levels.map(({ name, label }) => [name, label] as const) ?? []))
  return [...labels].map(([name, label]) => ({ name, label })).sort((a, b) => (a.name < b.name ? -1 : 1))
}
