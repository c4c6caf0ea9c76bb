import { readdir, readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { findingsSchema } from '../../model/findings/schema.ts'
import type { Account } from '../account/account.ts'
import { draftChanges, type DraftChanges } from '../archive/draft-changes.ts'
import { madeHere } from '../archive/manifest.ts'
import { readRecord, type BuildRecord } from '../archive/record.ts'
import { periodNamed } from '../calendar/periods.ts'
import { soundArchive, type SealedBefore } from '../past/read-past.ts'
import type { Program } from '../program/program.ts'
import type { Draft } from './build-review.ts'
import { readHouse } from './house.ts'
import { inputPaths } from './record-inputs.ts'
import { restoreDrafts } from './restore-drafts.ts'

/** What a build would be asked for. */
export interface DraftWish {
  /** Absent: the last whole one that the mentions cover. */
  readonly period?: string | undefined
  readonly seed: number
  /** Version of the browser that would print; null: no PDF is asked for. */
  readonly browser: string | null
}

/**
 * The draft that stands in an account and is whole, and the very one that a build would make: the same inputs and no more, program, seed, browser, and
 * seals to look back at. Whoever builds many accounts anew after an interruption need not make it again.
 *
 * @returns null where there is none
 * @throws {InputFault} what a build would throw of template, words, looks and archive
 */
export async function unchangedDraft(program: Program, account: Account, wish: DraftWish): Promise<Draft | null> {
  const drafts = join(account.folder, 'drafts')
  await restoreDrafts(drafts)
  const alike = (await recordsOf(drafts)).filter((record) => madeAlike(record, program, account, wish))
  if (alike.length === 0) return null
  const house = await readHouse(program, account)
  const archive = await soundArchive(account.folder)
  for (const record of alike) {
    const { kept, notKept } = inputPaths(account, house, record.period)
    const standing = { folder: account.folder, draft: join(drafts, record.period), inputs: [...kept, ...notKept] }
    if ((record.past === archive.end || isSealed(record, archive)) && sameNames(record, standing.inputs) && !hasChanges(await draftChanges(standing, record))) return { folder: standing.draft, findings: await findingsOf(standing.draft) }
  }
  return null
}

/** Of all drafts under the name of their period, the latest first. */
async function recordsOf(drafts: string): Promise<readonly BuildRecord[]> {
  const records: BuildRecord[] = []
  for (const name of (await readdir(drafts).catch(() => [])).sort().reverse()) {
    const record = await readRecord(join(drafts, name))
    if (record?.period === name) records.push(record)
  }
  return records
}

/** All that the record tells by itself, without a look at any other file. */
function madeAlike(record: BuildRecord, program: Program, { account, reporting }: Account, { period, seed, browser }: DraftWish): boolean {
  const wanted = period === undefined ? record.default_period : record.period === period
  const made = Object.entries(madeHere(program)).every(([part, here]) => record.program[part as keyof BuildRecord['program']] === here)
  const printed = browser === null || (record.program.browser === browser && record.files.some(({ path }) => path === 'review.pdf'))
  return wanted && made && printed && record.seed === seed && record.account === account && periodNamed(reporting, record.period) !== undefined
}

/** Whether this very draft has been sealed: building it again would only make it look back at itself. */
function isSealed({ period, past, files }: BuildRecord, { seals }: SealedBefore): boolean {
  const hashOf = (of: BuildRecord['files']) => of.find(({ path }) => path === 'findings.json')?.sha256
  return seals.some(({ manifest }) => manifest.period === period && manifest.previous === past && hashOf(manifest.files) === hashOf(files))
}

/** Names first: inputs that have come or gone are found without hashing any. */
function sameNames({ inputs }: BuildRecord, now: readonly string[]): boolean {
  return inputs.length === now.length && inputs.every(({ path }) => now.includes(path))
}

function hasChanges({ draft, inputs }: DraftChanges): boolean {
  return draft.length > 0 || inputs.length > 0
}

async function findingsOf(draft: string): Promise<Draft['findings']> {
  return findingsSchema.parse(JSON.parse(await readFile(join(draft, 'findings.json'), 'utf8')))
}
