import { dirname, join } from 'node:path'
import type { Browser } from 'puppeteer'
import type { Findings } from '../../model/findings/schema.ts'
import type { Account } from '../account/account.ts'
import { openCache } from '../cache/cache.ts'
import { compose } from '../compose/compose.ts'
import { firstForecast, marginsAsked, placeInputs } from '../inputs/place-inputs.ts'
import { readSmallInputs } from '../inputs/read-small-inputs.ts'
import { readIntake } from '../intake/read-intake.ts'
import { print } from '../print/print.ts'
import type { Program } from '../program/program.ts'
import { imprintOf } from '../render/imprint.ts'
import { render } from '../render/render.ts'
import { tablesOf } from '../tables/tables-of.ts'
import { attachmentsOf, dataFiles } from './data-files.ts'
import { loadHouse, type House } from './house.ts'
import { makeFindings, requireSteps } from './make-findings.ts'
import type { Progress } from './stages.ts'
import { unlessStopped } from './stopping.ts'
import { openDraft, requireDraft, type DraftContents } from './write-draft.ts'

/*
 *   account ──▶ intake tables ──▶ findings ──▶ document ──▶ review.html ──▶ review.pdf
 *          │    (readIntake)    (makeFindings)  (compose)     (render)        (print)
 *          └──▶ small inputs ──────▲
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
  const house = await loadHouse(program, account)
  const browser = options.browser === null ? null : options.browser()
  // a machine without a browser is told at once, not after the fit; the answer is awaited where it is needed
  browser?.catch(() => undefined)
  if (options.out !== undefined) await requireDraft(options.out)
  const draft = await openDraft(options.out === undefined ? join(account.folder, 'drafts') : dirname(options.out))
  try {
    const contents = await unlessStopped(options.stop, makeContents(program, account, house, draft.rejects, browser, options))
    const folder = options.out ?? join(account.folder, 'drafts', contents.findings.period.name)
    await draft.finish(folder, contents)
    return { folder, findings: contents.findings }
  } catch (error) {
    await draft.abandon()
    throw error
  }
}

async function makeContents(
  program: Program, account: Account, house: House, rejects: string, browser: Promise<Browser> | null, { period, threads, seed, progress }: BuildOptions,
): Promise<DraftContents> {
  progress.stage('intake')
  const inputs = await readSmallInputs(account)
  const tables = await readIntake(account, {
    period, threads, rejects, hindsightFrom: firstForecast(inputs),
    labels: inputs.audit !== null, margins: marginsAsked(inputs), progress: progress.detail,
  })
  requireSteps(account, tables)
  const small = placeInputs(inputs, account, tables.timeline)
  progress.stage('fit')
  const findings = await makeFindings(account, { tables, small, files: inputs.files }, house.words, {
    seed, version: program.version, threads, cache: openCache(join(account.folder, 'cache'), program.model), progress,
  })
  progress.stage('document')
  const figures = tablesOf(findings)
  const document = compose({ template: house.template, findings, tables: figures, charts: [...house.charts.keys()], words: house.words })
  const html = await render(document, { tables: figures, charts: house.charts, words: house.words, theme: house.theme, imprint: imprintOf(findings, house.words) })
  const data = dataFiles(findings, figures)
  if (browser !== null) progress.stage('print')
  const pdf = browser === null ? null : await print(html, await browser, {
    title: document.title, author: account.preparedBy ?? account.brand, date: findings.period.end, language: document.lang,
  }, attachmentsOf(data, house.words))
  return { findings, data, html, pdf }
}
