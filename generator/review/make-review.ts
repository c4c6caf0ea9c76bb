import type { Browser } from 'puppeteer'
import type { CompetitorTables } from '../../model/competitors/competitor-tables.ts'
import type { Findings } from '../../model/findings/schema.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import type { Account } from '../account/account.ts'
import type { Cache } from '../cache/cache.ts'
import { compose } from '../compose/compose.ts'
import { placeInputs } from '../inputs/place-inputs.ts'
import type { RawInputs } from '../inputs/raw-inputs.ts'
import { readPast, type SealedBefore } from '../past/read-past.ts'
import { print } from '../print/print.ts'
import type { Program } from '../program/program.ts'
import { imprintOf } from '../render/imprint.ts'
import { render } from '../render/render.ts'
import { tablesOf } from '../tables/tables-of.ts'
import { attachmentsOf, dataFiles, type DataFile } from './data-files.ts'
import type { House } from './house.ts'
import { makeFindings, requireSteps } from './make-findings.ts'
import type { Progress } from './stages.ts'

/** What was read of an account, or out of an archive: no person is in it. */
export interface ReviewMaterial {
  readonly tables: IntakeTables
  /** null where the account gives none. */
  readonly competitors: CompetitorTables | null
  readonly inputs: RawInputs
  /** What was sealed before, to look back at. */
  readonly sealed: SealedBefore
}

export interface MakeOptions {
  readonly seed: number
  readonly threads?: number | undefined
  readonly cache: Cache
  /** null: no PDF. */
  readonly browser: Promise<Browser> | null
  readonly progress: Progress
}

/** A review in all its forms. */
export interface MadeReview {
  readonly findings: Findings
  /** `findings.json` and the tables. */
  readonly data: readonly DataFile[]
  readonly html: string
  /** null where there is no browser. */
  readonly pdf: Uint8Array | null
}

/**
 * From what was read to the finished review: a build and whoever makes a review again out of an archive go the same way.
 *
 *     tables, small inputs ──▶ findings ──▶ document ──▶ review.html ──▶ review.pdf
 *                         (makeFindings)  (compose)     (render)        (print)
 *
 * @throws {InputFault} `period-empty`, `base-empty`
 */
export async function makeReview(program: Program, account: Account, house: House, { tables, competitors, inputs, sealed }: ReviewMaterial, options: MakeOptions): Promise<MadeReview> {
  const { seed, threads, cache, browser, progress } = options
  requireSteps(account, tables)
  progress.stage('fit')
  const small = placeInputs(inputs, account, tables.timeline)
  const findings = await makeFindings(account, { tables, competitors, small, past: await readPast(program, account, tables, sealed), files: inputs.files }, house.words, { seed, version: program.version, threads, cache, progress })
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
