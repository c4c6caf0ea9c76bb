import { neededRoles, roles, type Role } from './column-names.ts'
import { furtherKeys } from './further-keys.ts'
import type { AccountProposal, LevelProposal } from './propose-account.ts'
import type { ColumnProposal } from './propose-columns.ts'
import { count, counted, percent } from './role-rules.ts'
import type { Tally } from './score-forms.ts'
import type { CsvCut } from './table-head.ts'
import type { TimeTally } from './tally-columns.ts'
import { inComment, withComments, yamlText } from './yaml-text.ts'

type Line = readonly [line: string, comment?: string]

/** What the text of an account says beside the proposal. */
export interface TextOptions {
  /** Letters, digits and hyphens. */
  readonly account: string
  /** In words, for want of a column that names it. */
  readonly brand: string
  /** Pattern of the mentions, such as `mentions/*.csv`. */
  readonly files: string
  /** What the file was called. */
  readonly from: string
  /** How the fields are cut, where the intake would not see it by itself. */
  readonly form: CsvCut | null
}

/** account.yaml for a proposal: every line with its reason, keys that are not used as comments. */
export function accountText(proposal: AccountProposal, options: TextOptions): string {
  const { axis, base, locale, tally, venues, topics } = proposal
  return [
    `# Proposed from ${inComment(options.from)} (${counted(tally.rows, 'row')}): read it line by line, mend what is wrong,`,
    '# and run `tareline check` until it says what you expect. Paths are relative to this folder.',
    '',
    withComments([
      [`account: ${options.account}`, 'a short name: letters, digits, hyphens'],
      brandLine(proposal, options),
      ...otherBrands(proposal).map((comment): Line => [`# ${comment}`]),
      [`locale: ${locale.locale}`, inComment(locale.reason, 200)],
      ['time_zone: UTC', zoneComment(tally.times, tally.rows)],
      [`grid: ${axis.grid}`, `the step of the time axis: ${axis.reason}`],
      [`reporting: ${axis.reporting}`, 'what one review covers: month, quarter or week'],
    ]),
    base === null ? '# base: { from: 2025-01-01, to: 2025-12-31 }   # what "since base" compares with; left out, the first 12 months of mentions'
      : `# base: { from: ${base.from}, to: ${base.to} }   # what "since base" compares with; left out, these first 12 months of mentions, or as much of them as there is`,
    'interval: 0.9   # probability inside every interval of the review',
    '',
    '# Our name on the left, the file\'s on the right. Only posted_at, venue and score are required.',
    ...sourceLines(proposal, options),
    ...levelLines('venues', proposal, venues),
    ...levelLines('topics', proposal, topics),
    '',
    furtherKeys,
  ].join('\n')
}

function brandLine({ brand }: AccountProposal, options: TextOptions): Line {
  return brand === null ? [`brand: ${yamlText(options.brand)}`, 'from the name of this folder: write it as people know it']
    : [`brand: ${yamlText(brand.name)}`, `the most frequent value of its column, in ${counted(brand.rows, 'row')}; others are out of scope`]
}

function otherBrands({ brand }: AccountProposal): readonly string[] {
  if (brand === null || brand.others.length === 0) return []
  const shown = brand.others.slice(0, 5).map(({ value }) => yamlText(inComment(value)))
  return [`competitors: [${shown.join(', ')}]   # also there: ${told(brand.others)}`]
}

function told(tally: Tally): string {
  const shown = tally.slice(0, 5).map(({ value, rows }) => `${inComment(value)} (${count(rows)})`).join(', ')
  return tally.length > 5 ? `${shown} and ${count(tally.length - 5)} more` : shown
}

function zoneComment(times: TimeTally | null, rows: number): string {
  const usual = 'where a day begins; name yours, such as Europe/Lisbon'
  if (times === null || times.read === 0) return `how a time without offset is read, and ${usual}`
  const without = times.read - times.withOffset
  return without === 0 ? `every time says its offset, so this is only ${usual}`
    : `how the times without offset are read (${without === rows ? 'all of them' : `${count(without)} of ${count(rows)}`}), and ${usual}`
}

const mostUnused = 12

function sourceLines({ columns, tally, score }: AccountProposal, { files, form }: TextOptions): readonly string[] {
  const proposed = columns.columns
  const shown = roles.filter((role) => neededRoles.includes(role) || proposed.some((candidate) => candidate.role === role))
  const lines: readonly Line[] = [
    ['mentions:'],
    [`  - files: ${yamlText(files)}`, 'put the next export beside the first one'],
    ...(proposed.length === 0 ? [['    columns: {}'] as const] : [['    columns:'] as const]),
    ...shown.map((role): Line => columnLine(role, proposed.find((candidate) => candidate.role === role), columns.undecided.find((candidate) => candidate.role === role)?.candidates ?? [])),
  ]
  return [
    withComments(lines),
    ...columns.unused.slice(0, mostUnused).map(({ name, reason }) => `      # not used: \`${inComment(name)}\`, ${inLine(reason)}`),
    ...(columns.unused.length <= mostUnused ? [] : [`      # not used either: ${counted(columns.unused.length - mostUnused, 'more column')}`]),
    ...(form === null ? [] : [`    delimiter: ${yamlText(form.delimiter)}`, `    quote: ${yamlText(form.quote)}`]),
    ...timeLines(tally.times),
    ...scoreLines(score, proposed.some(({ role }) => role === 'score')),
  ]
}

function columnLine(role: Role, proposal: ColumnProposal | undefined, candidates: readonly string[]): Line {
  const others = (names: readonly string[]): string => names.map((name) => `\`${inComment(name)}\``).join(', ')
  if (proposal === undefined) {
    return [`      # ${role}:`, `needed, and can't be told from the file${candidates.length === 0 ? '' : `; it may be ${others(candidates)}`}`]
  }
  const { column, reason, sure, alternatives } = proposal
  return [`      ${role}: ${yamlText(column.name)}`, `${sure ? '' : 'a guess, look at it: '}${inLine(reason)}${alternatives.length === 0 ? '' : `; or ${others(alternatives)}`}`]
}

/** A reason may quote the data. */
function inLine(reason: string): string {
  return reason.replace(/\p{C}+|[\u2028\u2029]+/gu, ' ').slice(0, 200)
}

function timeLines(times: TimeTally | null): readonly string[] {
  if (times?.format == null) return []
  return [
    ...(times.rival === null ? [] : [`    # No day above 12 tells days and months apart: is it '${times.rival}'?`]),
    `    time_format: '${times.format}'   # reads ${counted(times.read, 'row')}, from ${times.first} to ${times.last}`,
  ]
}

function scoreLines(score: AccountProposal['score'], mapped: boolean): readonly string[] {
  if (score === null) {
    return [
      `    # score is needed${mapped ? ', and the values are on no scale that is known' : ''}: labels with their score from -1 to 1, or the two ends of a range.`,
      '    # score: { labels: { negative: -1, neutral: 0, positive: 1 } }',
      '    # score: { range: [1, 5] }',
    ]
  }
  if (score.kind === 'range') return [`    score: { range: [${score.low}, ${score.high}] }   # the value that counts as -1, then the one that counts as 1`]
  const lines = score.labels.map(({ label, score: value, rows }): Line => [`        ${yamlText(label)}: ${value}`, counted(rows, 'row')])
  return [
    '    score:', '      labels:', withComments(lines),
    ...(score.unknown.length === 0 ? [] : [`        # without a score, so their rows are rejected: ${told(score.unknown)}`]),
  ]
}

function levelLines(key: 'venues' | 'topics', { columns, tally }: AccountProposal, levels: readonly LevelProposal[]): readonly string[] {
  const role = key === 'venues' ? 'venue' : 'topic'
  if (!columns.columns.some((candidate) => candidate.role === role)) return []
  const distinct = tally.values.get(role)?.distinct ?? 0
  if (levels.length === 0) return distinct === 0 ? [] : ['', `# ${count(distinct)} ${key}, too many to list: bring spellings together under names of your own.`, `# ${key}: { name: { label: Name, values: [spelling, other spelling] } }`]
  const total = levels.reduce((sum, { rows }) => sum + rows, 0)
  return [
    '', `# ${key === 'venues' ? 'Kinds of place' : 'Subjects'} as the file spells them. Join spellings that mean the same under one name, and mend the labels.`, `${key}:`,
    withComments(levels.map(({ name, label, values, rows }): Line => [
      `  ${yamlText(name)}: { label: ${yamlText(label)}, values: [${values.map(yamlText).join(', ')}] }`, `${counted(rows, 'row')}, ${percent(rows / total)}`,
    ])),
  ]
}
