import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import type { Browser } from 'puppeteer'
import { readAccount } from '../account/read-account.ts'
import type { Cache } from '../cache/cache.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault, MachineFault, type Fault } from '../faults/fault.ts'
import { readSmallInputs } from '../inputs/read-small-inputs.ts'
import { sealedBefore } from '../past/read-past.ts'
import type { Program } from '../program/program.ts'
import { readHouse } from '../review/house.ts'
import { makeReview, type MadeReview } from '../review/make-review.ts'
import type { Progress } from '../review/stages.ts'
import { Stopped } from '../review/stopping.ts'
import { compareFindings, largest, type Comparison, type Difference } from './compare-findings.ts'
import { readCompetitorFiles } from './competitor-files.ts'
import { readIntakeFiles } from './intake-files.ts'
import { madeHere, sha256Of, type MadeWith, type Manifest } from './manifest.ts'
import type { Archive, SealFolder } from './read-archive.ts'

export interface RebuildOptions {
  /** null: PDFs are not printed again. */
  readonly browser: Promise<Browser> | null
  readonly threads?: number | undefined
  /** The archive that the seal is in: a review looks back at what was sealed before it. */
  readonly archive: Archive
  readonly progress: Progress
}

/** What became of a sealed review when it was made again. */
export interface Rebuilt {
  readonly name: string
  /** In what the program or machine here is another than the one that made it: `version`, `model`, `code`, `runtime`, `browser`. */
  readonly otherwise: readonly (keyof MadeWith)[]
  /** null where it could not be made again. */
  readonly findings: Comparison | null
  /** Files whose bytes are not those that were sealed, or that are there in one of the two only; sorted. */
  readonly files: readonly string[]
  /** Files compared. */
  readonly compared: number
  /** Whether the PDF is among them. */
  readonly printed: boolean
  /** What must not be: differences that another program or machine does not account for. */
  readonly faults: readonly Fault[]
  /** Why it could not be made again, where another program may be the reason. */
  readonly refusals: readonly Fault[]
}

/**
 * Make a sealed review again, from its own folder alone: the account, the small inputs and the template in `account/`, the cells in `intake/`, the seed in
 * the manifest; nothing that was remembered. Then hold it against what was sealed, value by value and byte by byte.
 */
export async function rebuildSeal(program: Program, seal: SealFolder & { readonly manifest: Manifest }, options: RebuildOptions): Promise<Rebuilt> {
  const { name, folder, manifest } = seal
  const printer = options.browser === null ? null : await (await options.browser).version()
  const otherwise = othersOf(manifest.program, { ...madeHere(program), browser: printer ?? manifest.program.browser })
  const same = !otherwise.some((part) => part !== 'browser')
  const made = await madeAgain(program, folder, manifest, options).catch((error: unknown) => reasonsOf(name, error))
  if (!('html' in made)) return { name, otherwise, findings: null, files: [], compared: 0, printed: false, faults: same ? made.reasons : [], refusals: same ? [] : made.reasons }
  const compared = compareFindings(JSON.parse(await readFile(join(folder, 'findings.json'), 'utf8')), JSON.parse(textOf(made, 'findings.json')))
  // the version stands in the findings: of another program it is no news
  const findings = { ...compared, differences: compared.differences.filter(({ path }) => path !== 'program.version' || same) }
  const rebuilt = filesOf(made)
  const sealed = new Map(manifest.files.filter(({ path }) => isOutput(path, made.pdf !== null)).map(({ path, sha256 }) => [path, sha256]))
  const all = [...new Set([...rebuilt.keys(), ...sealed.keys()])].sort()
  const files = all.filter((path) => rebuilt.get(path) !== sealed.get(path))
  const unaccounted = same ? files.filter((path) => path !== 'review.pdf' || !otherwise.includes('browser')) : []
  return {
    name, otherwise, findings, files, compared: all.length, printed: made.pdf !== null, refusals: [],
    faults: same ? [...findingsFaults(name, findings), ...unaccounted.filter((path) => path !== 'findings.json' || findings.differences.length === 0).map((path) => faultOf('rebuild-differs', `archive/${name}/${path}`, { found: 'other bytes', expected: 'the file as it was sealed' }))] : [],
  }
}

async function madeAgain(program: Program, folder: string, { seed, sequence }: Manifest, { archive, browser, threads, progress }: RebuildOptions): Promise<MadeReview> {
  const account = await readAccount(join(folder, 'account'), { archived: true })
  const house = await readHouse(program, account)
  const intake = join(folder, 'intake')
  const material = { tables: await readIntakeFiles(intake), competitors: await readCompetitorFiles(intake), inputs: await readSmallInputs(account), sealed: sealedBefore(archive, sequence) }
  return makeReview(program, account, house, material, { seed, threads, cache: rememberNothing, browser, progress })
}

const rememberNothing: Cache = { remember: (_kind, _from, compute) => compute() }

/** What keeps a review from being made again is told of its seal; a machine that lacks something, or a signal, is no matter of the seal. */
function reasonsOf(name: string, error: unknown): { readonly reasons: readonly Fault[] } {
  if (error instanceof MachineFault || error instanceof Stopped) throw error
  if (error instanceof InputFault) return { reasons: error.faults.map((fault) => ({ ...fault, place: `archive/${name}/account/${fault.place}` })) }
  return { reasons: [faultOf('rebuild-failed', `archive/${name}`, { reason: error instanceof Error ? error.message : String(error) })] }
}

function othersOf(sealed: MadeWith, here: MadeWith): readonly (keyof MadeWith)[] {
  return (['version', 'model', 'code', 'runtime', 'browser'] as const).filter((part) => sealed[part] !== here[part])
}

/** What the program makes, apart from what it was made from. */
function isOutput(path: string, printed: boolean): boolean {
  return path === 'findings.json' || path === 'review.html' || path.startsWith('tables/') || (path === 'review.pdf' && printed)
}

function filesOf({ data, html, pdf }: MadeReview): ReadonlyMap<string, string> {
  return new Map([...data.map(({ path, bytes }) => [path, sha256Of(bytes)] as const), ['review.html', sha256Of(html)], ...(pdf === null ? [] : [['review.pdf', sha256Of(pdf)] as const])])
}

function textOf({ data }: MadeReview, wanted: string): string {
  return new TextDecoder().decode(data.find(({ path }) => path === wanted)?.bytes)
}

function findingsFaults(name: string, { values, differences }: Comparison): readonly Fault[] {
  const worst = largest(differences)
  if (worst === undefined) return []
  return [faultOf('rebuild-differs', `archive/${name}/findings.json ${worst.path}`, {
    found: shown(worst.rebuilt), expected: `${shown(worst.sealed)} as it was sealed; ${differences.length} of ${values} values differ, this one the most`,
  })]
}

/** A value of the findings in a message. */
export function shown(value: Difference['sealed']): string {
  const text = value === undefined ? 'nothing' : JSON.stringify(value)
  return text.length > 80 ? `${text.slice(0, 77)}...` : text
}
