import { availableParallelism } from 'node:os'
import { analyse, type Analysis } from '../../model/analyse.ts'
import { findingsSchema, type Findings } from '../../model/findings/schema.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import type { Account } from '../account/account.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import { wordCaveat } from '../words/caveats.ts'
import type { Words } from '../words/words.ts'
import { startFitThreads, type FitThreads } from './threads.ts'

export interface FitOptions {
  readonly seed: number
  readonly version: string
  /** Threads of the fit; the findings do not depend on it. Default: the machine's. */
  readonly threads?: number | undefined
  readonly draws?: (share: number) => void
}

/** Intake tables ──model──▶ analysis ──worded──▶ findings, checked against their schema. */
export async function makeFindings(account: Account, tables: IntakeTables, words: Words, options: FitOptions): Promise<Findings> {
  const analysis = await fit(account, tables, options)
  const { caveats, ...computed } = analysis
  return findingsSchema.parse({
    ...computed,
    account: account.account, brand: account.brand, locale: account.locale,
    caveats: caveats.map((caveat) => ({ ...caveat, ...wordCaveat(words, caveat.code, caveat.figures) })),
    inputs: tables.accounting.inputs.map((input) => ({ ...input })),
    program: { version: options.version, seed: options.seed },
  })
}

async function fit(account: Account, tables: IntakeTables, options: FitOptions): Promise<Analysis> {
  const open: FitThreads[] = []
  try {
    return await analyse(tables, {
      interval: account.interval, seed: options.seed,
      targetMix: Object.fromEntries(account.targetMix.map(({ factor, shares }) => [factor, Object.fromEntries(shares.map(({ level, share }) => [level, share]))])),
      facts: {
        givenNotUsed: account.givenNotUsed, smallestGroup: account.smallestGroup, posterBounds: account.posters, preparedBy: account.preparedBy, reviewedBy: account.reviewedBy,
        timeZone: account.timeZone, reporting: account.reporting,
      },
    }, (problem) => {
      const threads = startFitThreads(problem, options.threads ?? Math.min(8, availableParallelism()))
      open.push(threads)
      return threads.executor
    }, options.draws)
  } finally {
    await Promise.all(open.map((threads) => threads.close()))
  }
}

/**
 * What a fit needs of the time axis, asked before it begins.
 *
 * @throws {InputFault} `period-empty`, `base-empty`: no step's middle lies in the period under review, or in the base
 */
export function requireSteps(account: Account, { timeline }: IntakeTables): void {
  const span = { first: timeline.steps[0], last: timeline.lastMention }
  if (timeline.current < 0) throw new InputFault([faultOf('period-empty', '--period', { name: timeline.review.name, ...span })])
  if (!timeline.inBase.includes(1)) throw new InputFault([faultOf('base-empty', account.places['base'] ?? 'account.yaml', { ...timeline.base, ...span })])
}
