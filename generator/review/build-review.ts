import { dirname, join } from 'node:path'
import type { Browser } from 'puppeteer'
import type { Findings } from '../../model/findings/schema.ts'
import type { Period } from '../../model/intake/intake-tables.ts'
import type { Account } from '../account/account.ts'
import { flattenIntake } from '../archive/flatten-intake.ts'
import { madeHere, type KeptFile } from '../archive/manifest.ts'
import { openCache } from '../cache/cache.ts'
import { firstForecast, marginsAsked } from '../inputs/place-inputs.ts'
import { readSmallInputs } from '../inputs/read-small-inputs.ts'
import { readIntakeAndCover } from '../intake/read-intake.ts'
import { soundArchive } from '../past/read-past.ts'
import type { Program } from '../program/program.ts'
import { checkHouse, readHouse, type House } from './house.ts'
import { makeReview, type ReviewMaterial } from './make-review.ts'
import { fingerprintHouse, recordInputs } from './record-inputs.ts'
import type { Progress } from './stages.ts'
import { unlessStopped } from './stopping.ts'
import { openDraft, requireDraft, type DraftContents } from './write-draft.ts'

/*
 *   account ──▶ intake tables ──▶ review ──▶ draft, with a record of what it was made from
 *          │    (readIntake)   (makeReview)  (openDraft)
 *          └──▶ small inputs ─────▲
 *               (readSmallInputs)
 */

export interface BuildOptions {
  readonly period?: string | undefined
  /** Folder of the draft; default ACCOUNT/drafts/PERIOD. */
  readonly out?: string | undefined
  readonly seed: number
  readonly threads?: number | undefined
  /** Opened once per run, when a PDF is first printed; null: no PDF. */
  readonly browser: (() => Promise<Browser>) | null
  readonly progress: Progress
  /** When it is aborted, the draft is abandoned, unless it is just being put in its place. */
  readonly stop?: AbortSignal | undefined
}

export interface Draft {
  readonly folder: string
  readonly findings: Findings
}

/** Make the draft review of one account and period. What was there before stays until the new draft is whole. */
export async function buildReview(program: Program, account: Account, options: BuildOptions): Promise<Draft> {
  const house = await readHouse(program, account)
  const ofHouse = await fingerprintHouse(account, house)
  await checkHouse(house, account)
  const browser = options.browser === null ? null : options.browser()
  // a machine without a browser is told at once, not after the fit; the answer is awaited where it is needed
  browser?.catch(() => undefined)
  if (options.out !== undefined) await requireDraft(options.out)
  const draft = await openDraft(options.out === undefined ? join(account.folder, 'drafts') : dirname(options.out))
  try {
    const contents = await unlessStopped(options.stop, makeContents(program, account, { house, ofHouse }, draft.rejects, browser, options))
    const folder = options.out ?? join(account.folder, 'drafts', contents.findings.period.name)
    await draft.finish(folder, contents)
    return { folder, findings: contents.findings }
  } catch (error) {
    await draft.abandon()
    throw error
  }
}

async function makeContents(
  program: Program, account: Account, { house, ofHouse }: { readonly house: House; readonly ofHouse: readonly KeptFile[] }, rejects: string, browser: Promise<Browser> | null, options: BuildOptions,
): Promise<DraftContents> {
  const { seed, threads, progress } = options
  progress.stage('intake')
  const { material, covered } = await readMaterial(account, rejects, options)
  const review = await makeReview(program, account, house, material, { seed, threads, cache: openCache(join(account.folder, 'cache'), program.model), browser, progress })
  const { period, diagnostics } = review.findings
  return {
    ...review, intake: flattenIntake(material.tables), competitors: material.competitors,
    record: {
      schema: 'tareline-record/1', account: account.account, period: period.name, default_period: period.name === covered?.name,
      program: { ...madeHere(program), browser: browser === null ? null : await (await browser).version() },
      seed, prepared_by: account.preparedBy, reviewed_by: account.reviewedBy, past: material.sealed.end, passed: diagnostics.passed,
      inputs: await recordInputs(account, house, period.name, ofHouse, material),
    },
  }
}

async function readMaterial(account: Account, rejects: string, { period, threads, progress }: BuildOptions): Promise<{ readonly material: ReviewMaterial; readonly covered: Period | null }> {
  const sealed = await soundArchive(account.folder)
  const inputs = await readSmallInputs(account)
  const { tables, competitors, covered } = await readIntakeAndCover(account, {
    period, threads, rejects, hindsightFrom: firstForecast(inputs),
    labels: inputs.audit !== null, margins: marginsAsked(inputs), competitors: true, progress: progress.detail,
  })
  return { material: { tables, competitors, inputs, sealed }, covered }
}
