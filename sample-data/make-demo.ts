/**
 * Makes the demo's reviews: of the ferry account three months in a row, the first two sealed, and one of the bicycle maker.
 *
 *   npx tsx sample-data/make-demo.ts [FOLDER]
 *
 * FOLDER is demo if not given: reviews in FOLDER/skerrow-ferries and FOLDER/pellwick-cycles, the ferry's account with its archive in
 * FOLDER/accounts/skerrow-ferries. Every step is a command that an analyst would give; what happened between them is in `months`.
 */
import { spawnSync } from 'node:child_process'
import { cpSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join, relative, resolve } from 'node:path'
import { argv, execPath, exit, stderr } from 'node:process'
import { parse } from 'csv-parse/sync'
import { gunzipSync, gzipSync } from 'node:zlib'

const root = join(import.meta.dirname, '..')
const source = join(root, 'sample-data', 'skerrow-ferries')

interface Month {
  readonly period: string
  /** First day of the posts that the boards' export still lacks a third of, up to the end of the month. */
  readonly lateFrom: string
  /** The account file as it was then. */
  readonly accountFile: (now: string) => string
}

/**
 * Each month the boards' export came a few days short, and was whole by the next. In August nobody had yet noticed that the files call some boards
 * `island board`: it counted as a venue of its own.
 */
const months: readonly Month[] = [
  { period: '2026-08', lateFrom: '2026-08-21', accountFile: (now) => now.replace('values: [forum, board, island board]', 'values: [forum, board]') },
  { period: '2026-09', lateFrom: '2026-09-21', accountFile: (now) => now },
]
const shortened = 'posts/2026-Q3.csv.gz'

function makeDemo(folder: string): void {
  const account = join(folder, 'accounts', 'skerrow-ferries')
  layOut(account)
  for (const month of months) {
    writeFileSync(join(account, 'account.yaml'), month.accountFile(readFileSync(join(source, 'account.yaml'), 'utf8')))
    writeFileSync(join(account, shortened), gzipSync(withoutLate(readFileSync(join(source, shortened)), month)))
    tareline('build', account, '--period', month.period)
    tareline('seal', account, '--period', month.period)
  }
  for (const file of ['account.yaml', shortened]) cpSync(join(source, file), join(account, file))
  tareline('build', account, '--period', '2026-10')
  handOver(join(account, 'drafts', '2026-10'), join(folder, 'skerrow-ferries'))
  tareline('build', join(root, 'sample-data', 'pellwick-cycles'), '--out', join(folder, 'pellwick-cycles'))
}

/** The account as it is kept, without what builds add to it; what was remembered of an earlier run stays. */
function layOut(account: string): void {
  for (const made of ['archive', 'drafts']) rmSync(join(account, made), { recursive: true, force: true })
  mkdirSync(account, { recursive: true })
  cpSync(source, account, { recursive: true, filter: (path) => !['cache', 'drafts', 'archive'].includes(relative(source, path).split(/[\\/]/)[0]!) })
}

/** Every third post of the boards, by its place in the file, from a day to the end of its month. */
function withoutLate(file: Buffer, { period, lateFrom }: Month): string {
  const rows = parse(gunzipSync(file).toString('utf8'), { columns: true, raw: true, bom: true, relax_column_count: true }) as readonly { readonly raw: string; readonly record: Readonly<Record<string, string>> }[]
  const header = gunzipSync(file).toString('utf8').split('\n', 1)[0]!
  const isLate = ({ record }: (typeof rows)[number], row: number) => /board|forum/i.test(record['source'] ?? '') && (record['published'] ?? '') >= lateFrom && (record['published'] ?? '').startsWith(period) && row % 3 === 0
  return [`${header}\n`, ...rows.filter((row, at) => !isLate(row, at)).map(({ raw }) => raw)].join('')
}

function handOver(draft: string, review: string): void {
  rmSync(review, { recursive: true, force: true })
  cpSync(draft, review, { recursive: true })
}

function tareline(...args: readonly string[]): void {
  stderr.write(`tareline ${args.map((arg) => relative(process.cwd(), arg).startsWith('..') ? arg : arg.startsWith('/') ? relative(process.cwd(), arg) : arg).join(' ')}\n`)
  const { status } = spawnSync(execPath, [join(root, 'dist/generator/cli/main.js'), ...args], { stdio: 'inherit' })
  if (status !== 0) exit(status ?? 1)
}

makeDemo(resolve(argv[2] ?? 'demo'))
