import type { Fault } from '../faults/fault.ts'
import type { DraftResult } from './build-account.ts'
import type { ExitCode } from './outcome.ts'
import { plainText } from './plain-text.ts'
import type { BatchOutcome } from './show-batch.ts'

/** What came of one account of many. */
export interface AccountOutcome {
  /** Of its folder. */
  readonly name: string
  readonly outcome: BatchOutcome
  readonly exitCode: ExitCode
  /** null where it failed or was stopped. */
  readonly draft: DraftResult | null
  /** Of the review, relative to the account's folder. */
  readonly file: string | null
  readonly faults: readonly Fault[]
}

const heads = ['account', 'change of opinion, in points', 'serious caveats', 'file in its folder'] as const
const gap = '  '
/** No column is made narrower than this to fit. */
const narrowest = 10

/**
 * What came of many accounts: a row for each, in their order, wrapped to a width, and a line that counts them.
 *
 * @param around - the folder of the accounts, as it was given
 * @param width - of the screen, in characters; a table needs about 60
 */
export function closingTable(outcomes: readonly AccountOutcome[], around: string, width: number): string {
  const rows = outcomes.map(cellsOf)
  const widths = fittingWidths(heads.map((head, column) => Math.max(head.length, ...rows.map((row) => (row.length < heads.length && column > 0 ? 0 : row[column].length)))), width)
  // what went wrong has all the room beside the name
  const rest = [widths[0], Math.max(narrowest, width - widths[0] - gap.length)]
  const lines = rows.flatMap((row) => sideBySideLines(row, row.length < heads.length ? rest : widths))
  return ['', ...sideBySideLines(heads, widths), ...sideBySideLines(widths.map((columns) => '-'.repeat(columns)), widths), ...lines, '', `${plainText(around)}: ${countsOf(outcomes)}`].join('\n')
}

/** A cell under each head, or the name and what went wrong. */
function cellsOf({ name, outcome, draft, file, faults }: AccountOutcome): readonly string[] {
  if (draft === null || file === null) return [plainText(name), failureText(outcome, faults)]
  return [plainText(name), `${headlineOf(draft)}${outcome === 'unchanged' ? '; unchanged' : ''}`, draft.serious.length === 0 ? 'none' : draft.serious.join(', '), file]
}

/** The change of opinion in the period, in points, with its interval. @example headlineOf(draft) // => '2026-10: down 3.1 (-5.0 to -1.2)' */
function headlineOf({ period, movement, change }: DraftResult): string {
  if (change === null) return `${period}: no period before`
  const told = { up: `up ${points(change.mean)}`, down: `down ${points(-change.mean)}`, 'not-established': `no change established, ${points(change.mean)}` }[movement ?? 'not-established']
  return `${period}: ${told} (${points(change.low)} to ${points(change.high)})`
}

function points(value: number): string {
  return value.toFixed(1).replace(/^-(0\.0)$/, '$1')
}

function failureText(outcome: BatchOutcome, faults: readonly Fault[]): string {
  if (outcome === 'stopped') return 'stopped, not built'
  const [first, ...more] = faults
  return `not built: ${plainText(first.message.split('\n')[0])} [${first.code}]${more.length === 0 ? '' : `, and ${more.length} more`}`
}

function countsOf(outcomes: readonly AccountOutcome[]): string {
  const count = (outcome: BatchOutcome) => outcomes.filter((one) => one.outcome === outcome).length
  const told = ([['built', 'built'], ['unchanged', 'unchanged'], ['failed', 'not built'], ['stopped', 'stopped']] as const).flatMap(([outcome, word]) => (count(outcome) === 0 ? [] : [`${count(outcome)} ${word}`]))
  return `${outcomes.length} ${outcomes.length === 1 ? 'account' : 'accounts'}, ${told.join(', ')}`
}

/** Widths in which all columns fit: the widest gives way first. */
function fittingWidths(wanted: readonly number[], width: number): readonly number[] {
  const widths = [...wanted]
  const room = width - gap.length * (wanted.length - 1)
  while (widths.reduce((sum, columns) => sum + columns, 0) > room) {
    const widest = Math.max(...widths)
    if (widest <= narrowest) break
    widths[widths.indexOf(widest)]--
  }
  return widths
}

/** Cells beside each other, each over as many lines as it needs. */
function sideBySideLines(cells: readonly string[], widths: readonly number[]): readonly string[] {
  const wrapped = cells.map((cell, column) => wrap(cell, widths[column]))
  const height = Math.max(...wrapped.map(({ length }) => length))
  return Array.from({ length: height }, (_, line) => wrapped.map((lines, column) => (lines[line] ?? '').padEnd(widths[column])).join(gap).trimEnd())
}

/** Lines of a text: broken at spaces, after slashes, between the words of a code, and anywhere where a word is too long. */
function wrap(text: string, width: number): readonly string[] {
  const words = text.split(/(?<=[\s/])|(?<=[a-z]-)(?=[a-z])/)
  const lines = ['']
  for (const piece of words.flatMap((word) => word.match(new RegExp(`.{1,${width}}`, 'gu')) ?? [])) {
    const line = `${lines.at(-1)}${piece}`
    if (line.trimEnd().length > width) lines.push(piece)
    else lines[lines.length - 1] = line
  }
  return lines.map((line) => line.trim())
}
