import type { SamplingVariance } from '../cells/sampling-variance.ts'
import type { CellColumns, IntakeTables } from '../intake/intake-tables.ts'

/** Cells of which only the precision is asked: how many, where, how exactly known. What they say does not matter. */
export interface ExpectedCells {
  readonly tables: Pick<IntakeTables, 'factors' | 'cells'> & { readonly timeline: { readonly steps: readonly string[]; readonly stepDays: number } }
  /** Shape (cells): V_c. */
  readonly variance: Float64Array
  /** The steps of the period under review, and those of the next one, as many. */
  readonly nowSteps: readonly number[]
  readonly nextSteps: readonly number[]
}

/** People heard besides: how many authors, each with one post, in which cell of the next period. */
export interface HeardBesides {
  /** Index into the steps. */
  readonly step: number
  /** One level per factor. */
  readonly levels: readonly number[]
  /** Above 0; need not be whole. */
  readonly authors: number
}

/**
 * History and, after it, a next period in which as many people are heard in the same places as in the one under review, and perhaps some
 * besides. Whoever is heard besides posts once: a cell with n posts of design effect deff becomes one of n + m posts with
 * (n deff + m) / (n + m), since m authors of one post each add m to both sums of Kish's b; a cell that was empty has n = 0.
 *
 * @param nowSteps - steps of the period under review
 */
export function expectNextPeriod(tables: IntakeTables, sampling: SamplingVariance, nowSteps: readonly number[], besides: readonly HeardBesides[] = []): ExpectedCells {
  const { cells, timeline, factors } = tables
  const steps = timeline.steps.length
  const nextSteps = nowSteps.map((_, i) => steps + i)
  const placeOf = new Map(nowSteps.map((step, i) => [step, nextSteps[i]]))
  const copied = Array.from({ length: cells.count }, (_, c) => c).filter((c) => placeOf.has(cells.step[c]))
  const rows: ExpectedRow[] = [
    ...Array.from({ length: cells.count }, (_, c) => rowOf(tables, sampling, c, cells.step[c])),
    ...copied.map((c) => rowOf(tables, sampling, c, placeOf.get(cells.step[c])!)),
  ]
  const found = new Map(rows.map((row, i) => [keyOf(row.step, row.levels), i]))
  for (const { step, levels, authors } of besides) {
    const at = found.get(keyOf(step, levels))
    if (at === undefined) found.set(keyOf(step, levels), rows.push({ step, levels, posts: authors, effective: authors }) - 1)
    else rows[at] = { ...rows[at], posts: rows[at].posts + authors, effective: rows[at].effective + authors }
  }
  const sorted = rows.sort((a, b) => a.step - b.step)
  return {
    tables: {
      factors, cells: columnsOf(sorted, factors.length),
      timeline: { steps: [...timeline.steps, ...nextSteps.map((step) => `next ${step}`)], stepDays: timeline.stepDays },
    },
    variance: Float64Array.from(sorted, ({ levels, posts, effective }) => sampling.withinCell[levels[0]] * effective / (posts * posts)),
    nowSteps, nextSteps,
  }
}

interface ExpectedRow {
  readonly step: number
  readonly levels: readonly number[]
  readonly posts: number
  /** Posts times their design effect. */
  readonly effective: number
}

function rowOf({ cells }: IntakeTables, { designEffect }: SamplingVariance, c: number, step: number): ExpectedRow {
  const posts = cells.mentions[c]
  return { step, levels: cells.levels.map((column) => column[c]), posts, effective: posts * designEffect[c] }
}

function keyOf(step: number, levels: readonly number[]): string {
  return `${step} ${levels.join(' ')}`
}

function columnsOf(rows: readonly ExpectedRow[], factors: number): CellColumns {
  const posts = Float64Array.from(rows, (row) => row.posts)
  const zero = new Float64Array(rows.length)
  return {
    count: rows.length, step: Int32Array.from(rows, ({ step }) => step),
    levels: Array.from({ length: factors }, (_, f) => Int32Array.from(rows, ({ levels }) => levels[f])),
    mentions: posts, authors: posts, mean: zero, squares: zero, freedom: zero, clustering: zero, deff: Float64Array.from(rows, (row) => row.effective / row.posts),
  }
}

/**
 * Where people heard besides would post: in the next period's steps alike, as the venue's (or the topic's) posts of the period under review
 * are spread over all else, in the class of those who post once. Where nobody posts so now: as all posts are spread.
 *
 * @param factor - which factor the level belongs to
 * @param authors - above 0
 */
export function hearBesides(tables: IntakeTables, nowSteps: readonly number[], factor: number, level: number, authors: number): readonly HeardBesides[] {
  const { cells, factors, timeline } = tables
  const now = new Set(nowSteps)
  const poster = factors.findIndex(({ name }) => name === 'poster')
  const once = poster < 0 ? -1 : factors[poster].levels.findIndex(({ name }) => name === 'occasional')
  const inPeriod = Array.from({ length: cells.count }, (_, c) => c).filter((c) => now.has(cells.step[c]))
  const own = inPeriod.filter((c) => cells.levels[factor][c] === level)
  const weights = new Map<string, { readonly levels: readonly number[]; mentions: number }>()
  for (const c of own.length > 0 ? own : inPeriod) {
    const levels = cells.levels.map((column, f) => (f === factor ? level : f === poster && once >= 0 ? once : column[c]))
    const held = weights.get(levels.join(' ')) ?? { levels, mentions: 0 }
    held.mentions += cells.mentions[c]
    weights.set(levels.join(' '), held)
  }
  const total = [...weights.values()].reduce((sum, { mentions }) => sum + mentions, 0)
  return nowSteps.flatMap((_, i) => [...weights.values()].map(({ levels, mentions }) => ({
    step: timeline.steps.length + i, levels, authors: authors * mentions / total / nowSteps.length,
  })))
}
