import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { InputFault } from '../faults/fault.ts'
import { csvForm } from '../intake/csv-header.ts'
import { openDatabase } from '../intake/database.ts'
import { lookOver, type InputFile } from '../intake/input-file.ts'
import { openAccountFolder, writing } from './account-folder.ts'
import { accountText } from './account-text.ts'
import { copyMentions } from './copy-mentions.ts'
import { proposeAccount, slug, type AccountProposal } from './propose-account.ts'
import { proposeColumns } from './propose-columns.ts'
import { skeletonText } from './skeleton.ts'
import { readHead, type TableHead } from './table-head.ts'
import { tallyColumns } from './tally-columns.ts'

export interface StartOptions {
  /** A file of mentions; null for an account to be filled in by hand. */
  readonly from: string | null
  readonly progress: (text: string) => void
  readonly stop?: AbortSignal | undefined
}

/** An account that was laid out. */
export interface StartedAccount {
  /** Absolute. */
  readonly folder: string
  /** The copy of the mentions, relative to the folder; null without a file. */
  readonly mentions: string | null
  readonly proposal: AccountProposal | null
}

/**
 * Lay out a new account:
 *
 *   file ──copy──▶ mentions/ ──head──▶ header, 2,000 rows ──propose──▶ which column is what ──tally──▶ values and times of the whole file
 *     ──propose──▶ scores, brand, venues, topics, grid ──▶ account.yaml ──▶ in its place, whole
 *
 * @param target - a folder that is absent or empty; it is made only when all is ready, and left alone if anything fails
 * @throws {InputFault} `start-...`, `file-unreadable`
 * @throws {MachineFault} `start-unwritable`; and the reason of `stop`
 */
export async function startAccount(target: string, options: StartOptions): Promise<StartedAccount> {
  const folder = path.resolve(target)
  const unfinished = await openAccountFolder(folder)
  try {
    // asked to end, the work is not left to itself: it would write into a folder that is being taken away
    const filled = await fill(unfinished.folder, namesFrom(path.basename(folder)), options)
    options.stop?.throwIfAborted()
    await unfinished.finish()
    return { folder, ...filled }
  } catch (error) {
    await unfinished.abandon()
    options.stop?.throwIfAborted()
    throw error
  }
}

interface AccountNames {
  readonly account: string
  readonly brand: string
}

/** What a folder's name says. @example namesFrom('skerrow-ferries') // => { account: 'skerrow-ferries', brand: 'Skerrow Ferries' } */
export function namesFrom(folder: string): AccountNames {
  const words = folder.replace(/[^\p{L}\p{N}]+/gu, ' ').trim().split(' ').filter((word) => word !== '')
  return { account: slug(folder) || 'account', brand: words.map((word) => word.replace(/^\p{L}/u, (letter) => letter.toUpperCase())).join(' ') || 'Brand' }
}

async function fill(folder: string, names: AccountNames, { from, progress, stop }: StartOptions): Promise<Pick<StartedAccount, 'mentions' | 'proposal'>> {
  const write = (text: string): Promise<void> => writing(folder, () => writeFile(path.join(folder, 'account.yaml'), text))
  if (from === null) {
    await write(skeletonText(names.account, names.brand))
    return { mentions: null, proposal: null }
  }
  const copy = await copyMentions(from, folder, progress, stop)
  try {
    progress(`reading ${path.basename(from)}`)
    const { proposal, form } = await proposeFrom(folder, copy.file, names.account, stop)
    await write(accountText(proposal, { ...names, files: copy.pattern, from: path.basename(from), form }))
    return { mentions: copy.file, proposal }
  } catch (error) {
    throw placedAt(error, copy.file, from)
  }
}

async function proposeFrom(
  folder: string, mentions: string, account: string, stop: AbortSignal | undefined,
): Promise<{ readonly proposal: AccountProposal; readonly form: TableHead['form'] }> {
  const scratch = await mkdtemp(path.join(tmpdir(), 'tareline-start-'))
  try {
    const file = await lookOver(folder, mentions, scratch)
    stop?.throwIfAborted()
    const database = await openDatabase({ readable: [file.readable], scratch, threads: undefined })
    try {
      const head = await readHead(database, file, scratch)
      // as the intake has it: not where commas part the fields
      const decimalCommas = head.form?.delimiter !== ','
      const columns = proposeColumns(head.columns, { account, decimalCommas })
      const tally = await tallyColumns(database, file, columns, head.form)
      return { proposal: proposeAccount(columns, tally, decimalCommas), form: toBeStated(file, head.form, columns.columns.map(({ column }) => column.name)) }
    } finally {
      database.close()
    }
  } finally {
    await rm(scratch, { recursive: true, force: true })
  }
}

/** How fields are cut, where the intake would cut them otherwise from the mapped columns alone. */
function toBeStated(file: InputFile, form: TableHead['form'], mapped: readonly string[]): TableHead['form'] {
  if (form === null) return null
  const seen = csvForm(file.start, mapped, { delimiter: null, quote: null })
  return seen.delimiter === form.delimiter && seen.quote === form.quote ? null : form
}

/** A fault of the copy, which goes with the folder, is one of the file that was named. */
function placedAt(error: unknown, copy: string, from: string): unknown {
  if (!(error instanceof InputFault)) return error
  return new InputFault(error.faults.map((fault) => ({ ...fault, place: fault.place.replace(copy, () => from), message: fault.message.replaceAll(copy, () => from) })))
}
