import { neededRoles, roles, wordsOf, type Role } from './column-names.ts'
import { profileOf, type ColumnProfile, type HeadColumn } from './column-profile.ts'
import { count, percent, roleRules, type Surroundings } from './role-rules.ts'

/** One of our columns and the one of the file that is proposed for it. */
export interface ColumnProposal {
  readonly role: Role
  readonly column: ColumnProfile
  readonly reason: string
  /** Whether name or values tell it apart; otherwise it is only the best there is. */
  readonly sure: boolean
  /** Other columns that it could be, the likeliest first. */
  readonly alternatives: readonly string[]
}

/** A mapping as proposed. */
export interface ColumnProposals {
  /** In the order of `roles`. */
  readonly columns: readonly ColumnProposal[]
  /** Needed ones for which no column is likely enough, with those that come nearest. */
  readonly undecided: readonly { readonly role: Role; readonly candidates: readonly string[] }[]
  /** Columns of the file that nothing is proposed for, and why. */
  readonly unused: readonly UnusedColumn[]
}

export interface UnusedColumn {
  readonly name: string
  /** In words, for the account file. */
  readonly reason: string
}

interface Candidate {
  readonly role: Role
  readonly column: ColumnProfile
  readonly total: number
  readonly reason: string
}

/** Below it a column is not proposed. */
const threshold = 0.4
/** A needed column may be one that only stands out from the others by so much. */
const lead = 0.08
/** Below it a column is not even a guess. */
const guess = 0.25
/** How likely a column must be beside the chosen one to be told as well. */
const rivalry = 0.6

export interface ProposeOptions {
  /** The account's name: a brand is recognised by it. */
  readonly account: string
  /** Whether `3,5` is a number. */
  readonly decimalCommas: boolean
}

/**
 * Propose which column of a file is which of ours. The values are asked first: what they rule out no name brings back, and the
 * name adds up to two thirds to what they say. The likeliest pair is settled first, then the likeliest of those left.
 *
 * @param head - the columns that an account can name, with the values of the first rows, as many in each
 */
export function proposeColumns(head: readonly HeadColumn[], { account, decimalCommas }: ProposeOptions): ColumnProposals {
  const columns = head.map((column) => profileOf(column, decimalCommas))
  const around: Surroundings = { rows: Math.max(1, head[0]?.values.length ?? 0), ids: null, account: wordsOf(account).join(' ') }
  const alone = candidatesOf(columns, around)
  const likelyId = alone.filter(({ role }) => role === 'id').sort(byTotal)[0]?.column
  const ids = likelyId === undefined ? null : { column: likelyId, values: new Set(likelyId.values.map((value) => value.trim())) }
  const all = earlierFirst(candidatesOf(columns, { ...around, ids }))
  const chosen = assign(all)
  const isFree = ({ column }: Candidate): boolean => !chosen.some((other) => other.column === column)
  for (const role of neededRoles.filter((needed) => !chosen.some((candidate) => candidate.role === needed))) {
    const [best, second] = all.filter((candidate) => candidate.role === role && isFree(candidate)).sort(byTotal)
    if (best !== undefined && best.total >= guess && best.total - (second?.total ?? 0) >= lead) chosen.push(best)
  }
  const others = (role: Role): readonly string[] => {
    const taken = chosen.find((candidate) => candidate.role === role)
    return all.filter((candidate) => candidate.role === role && candidate.column !== taken?.column && candidate.total >= (taken === undefined ? guess : rivalry * taken.total))
      .sort(byTotal).map(({ column }) => column.name).slice(0, 3)
  }
  return {
    columns: roles.flatMap((role) => chosen.filter((candidate) => candidate.role === role).map(({ column, reason, total }): ColumnProposal => (
      { role, column, reason, sure: total >= threshold, alternatives: others(role) }))),
    undecided: neededRoles.filter((role) => !chosen.some((candidate) => candidate.role === role)).map((role) => ({ role, candidates: others(role) })),
    unused: columns.filter((column) => !chosen.some((candidate) => candidate.column === column)).map((column) => ({ name: column.name, reason: whyUnused(column, all, chosen) })),
  }
}

function whyUnused(column: ColumnProfile, all: readonly Candidate[], chosen: readonly Candidate[]): string {
  if (column.filled === 0) return 'without any value'
  if (column.names.later && column.time !== null) return 'times of something else than posting'
  if (column.names.foreign) return 'none of ours; to adjust for it, map it and name it under `factors`'
  const likely = all.filter((candidate) => candidate.column === column && candidate.total >= guess).sort(byTotal)
  for (const { role } of likely) {
    const taken = chosen.find((candidate) => candidate.role === role)
    if (taken !== undefined) return `\`${taken.column.name}\` is likelier as ${role}`
  }
  return likely.length === 0 ? 'its values are like none of what an account reads' : `too unlike ${likely[0]!.role} to be proposed`
}

const byTotal = (a: Candidate, b: Candidate): number => b.total - a.total || roles.indexOf(a.role) - roles.indexOf(b.role)

function candidatesOf(columns: readonly ColumnProfile[], around: Surroundings): readonly Candidate[] {
  return columns.flatMap((column) => roles.flatMap((role): readonly Candidate[] => {
    const { weight, foreign, later } = column.names
    const named = weight[role]
    const evidence = column.filled === 0 ? { weight: 0.5, reason: 'by its name alone: no values' } : roleRules[role](column, around)
    if (evidence === null || (column.filled === 0 && named < 1)) return []
    // a name that says something else counts against it
    const against = foreign ? 0.5 : role === 'posted_at' && later ? 0.6 : named === 0 && roles.some((other) => weight[other] === 1) ? 0.75 : 1
    return [{ role, column, total: evidence.weight * (0.6 + 0.4 * named) * against, reason: evidence.reason }]
  }))
}

/** The likeliest pair first, each role and each column once. */
function assign(candidates: readonly Candidate[]): Candidate[] {
  const chosen: Candidate[] = []
  for (const candidate of candidates.filter(({ total }) => total >= threshold).sort(byTotal)) {
    if (!chosen.some(({ role, column }) => role === candidate.role || column === candidate.column)) chosen.push(candidate)
  }
  return chosen
}

/** How near two columns of times must be for their values to decide between them. */
const near = 0.1

/** Where two columns of times are about as likely, the one whose times are the earlier ones: a post is collected after it is written. */
function earlierFirst(candidates: readonly Candidate[]): readonly Candidate[] {
  const [first, second] = candidates.filter(({ role }) => role === 'posted_at').sort(byTotal)
  if (first === undefined || second === undefined || first.total - second.total > near) return candidates
  const gaps = Array.from(first.column.time?.moments ?? [], (moment, row) => (second.column.time?.moments[row] ?? Number.NaN) - moment).filter(Number.isFinite)
  const before = gaps.filter((gap) => gap < 0).length
  const after = gaps.filter((gap) => gap > 0).length
  if (before === 0 && after === 0) return candidates
  const [earlier, other, share] = after >= before ? [first, second, after / gaps.length] : [second, first, before / gaps.length]
  const reason = `${earlier.reason}; earlier than \`${other.column.name}\` in ${percent(share)} of ${count(gaps.length)} rows`
  return candidates.map((candidate) => (candidate === earlier ? { ...earlier, total: Math.max(first.total, second.total) + 1e-6, reason } : candidate))
}
