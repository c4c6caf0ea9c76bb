import type { Accounting, Factor, IntakeTables, NoLabels, Period, SegmentTable } from '../../model/intake/intake-tables.ts'
import type { Account } from '../account/account.ts'
import { dayNumber } from '../calendar/days.ts'
import { timeline } from '../calendar/timeline.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import { placeOf } from '../account/yaml-places.ts'
import { addAuthors, authoredMentions, concentrationRows, extremeRows, hindsightOf, indicesOf, pullRows, stayingRows, variationRows } from './assemble.ts'
import { summedAuthors } from './author-counts.ts'
import { cellColumns, cellLabels, placeCells } from './cell-columns.ts'
import type { CellPart } from './cell-part.ts'
import type { Dated } from './dated-mentions.ts'
import type { LabelSet } from './labels.ts'
import { factorOf, mostLevels } from './level-names.ts'
import type { MarginWish } from './margins.ts'
import { daysOf } from './ready-made.ts'
import type { SettledMentions } from './read-mentions.ts'

/** What was gathered from all sources, for the tables to be put together from. */
export interface Material {
  /** null where no mention is in scope and no period was asked for. */
  readonly review: Period | null
  /** Rows of all sources, later than the period too; and what of them could not be read, where that is much. */
  readonly received: number
  readonly unread: Accounting['unread']
  /** Rows of mentions by reason. */
  readonly rejected: Readonly<Record<string, number>>
  readonly dated: Dated
  readonly settled: SettledMentions | null
  readonly unmapped: Accounting['unmapped']
  /** Ready-made cells of the review, and the number of those after it. */
  readonly ready: readonly CellPart[]
  readonly readyAfter: number
  readonly inputs: Accounting['inputs']
  /** null where nobody asks for labels by cell. */
  readonly labels: LabelSet | NoLabels | null
  readonly margins: readonly MarginWish[]
}

/** A source of which more than this share can't be read is mapped wrongly: what is left would stand for nothing. */
const mostRejected = 0.5
/** Of fewer rows than this a share says nothing. */
const manyRows = 200

/**
 * The intake tables from what was gathered.
 *
 * @throws {InputFault} `no-mentions`, `mostly-rejected`, `too-many-levels`, `target-mix-level`
 */
export function tablesOf(account: Account, material: Material): IntakeTables {
  const { review, settled, ready, labels, margins } = material
  const grouped = settled?.grouped ?? null
  const parts = [...ready, ...(grouped?.parts ?? [])]
  const accounting = accountingOf(material)
  if (review === null || parts.length === 0) {
    const reasons = Object.entries(accounting.reasons).map(([reason, rows]) => `${reason} ${rows}`)
    throw new InputFault([faultOf('no-mentions', 'mentions', { accounting: [`rows ${accounting.received}`, ...reasons].join(', '), unread: accounting.unread })])
  }
  if (accounting.received >= manyRows && accounting.rejected > mostRejected * accounting.received) {
    throw new InputFault([faultOf('mostly-rejected', 'mentions', { rejected: accounting.rejected, received: accounting.received, unread: accounting.unread })])
  }
  const factors = account.factors.map((name, index) => factorOf(account, name, parts.map((part) => part.levels[index]!)))
  checkLevels(factors)
  checkTarget(account, factors)
  // Ready-made cells do not say on which days of their step people posted.
  const spans = [grouped?.span ?? null, daysOf(ready, account.grid)].filter((span) => span !== null)
  const [firstDay, lastDay] = [Math.min(...spans.map((span) => span.first)), Math.max(...spans.map((span) => span.last))]
  const axis = timeline({ ...account, firstDay, lastDay, review })
  const steps = axis.steps.map(dayNumber)
  const readyCells = cellColumns(placeCells(ready, steps, factors), factors)
  const cells = placeCells(parts, steps, factors)
  const indices = grouped === null ? null : indicesOf(grouped, axis, factors)
  // Who is speaking is told of mentions alone.
  const people = ready.length > 0 ? null : grouped
  const summed = summedAuthors(readyCells, axis, factors)
  return {
    timeline: axis,
    factors,
    cells: cellColumns(cells, factors),
    variation: grouped === null ? factors[0]!.levels.map(() => null) : variationRows(grouped.variation, indices!, factors[0]!.levels.length),
    hindsight: grouped === null ? null : hindsightOf(grouped, indices!, axis, factors[0]!.levels.length),
    labels: labels === null || typeof labels === 'string' ? null : cellLabels(cells, labels),
    noLabels: typeof labels === 'string' ? labels : null,
    staying: people === null ? [] : stayingRows(people, indices!, axis),
    extremes: people === null ? [] : extremeRows(people, indices!),
    pull: people === null ? [] : pullRows(people, indices!, factors),
    segments: margins.length === 0 ? null : people?.segments ?? withoutAuthors(margins),
    concentration: grouped === null ? [] : concentrationRows(grouped, indices!),
    authors: grouped === null ? summed : addAuthors(summed, grouped, indices!, factors, ready.length === 0),
    accounting: { ...accounting, withAuthor: authoredMentions(grouped, indices, readyCells, factors), readyMade: ready.length > 0 },
  }
}

function withoutAuthors(margins: readonly MarginWish[]): SegmentTable {
  return { margins: margins.map(({ margin }) => margin), rows: [], levels: margins.map(() => []) }
}

/** Every row of every source, in one of four places. @throws if one is lost: a fault of the program */
function accountingOf({ received, unread, rejected, dated, settled, unmapped, ready, readyAfter, inputs }: Material): Omit<Accounting, 'withAuthor' | 'readyMade'> {
  const total = (counts: Readonly<Record<string, number>>): number => Object.values(counts).reduce((sum, rows) => sum + rows, 0)
  const duplicates = settled?.duplicates ?? { sameId: 0, repost: 0 }
  const outOfScope = { ...settled?.outOfScope, 'after-period': (settled?.outOfScope['after-period'] ?? 0) + readyAfter }
  const modelled = (settled?.grouped?.parts ?? []).reduce((sum, part) => sum + part.mentions, 0) + ready.length
  const counts = { rejected: total(rejected), duplicates: duplicates.sameId + duplicates.repost, outOfScope: total(outOfScope), modelled }
  if (settled !== null && received !== counts.rejected + counts.duplicates + counts.outOfScope + counts.modelled) {
    throw new Error(`The accounting of mentions does not add up: ${received} received, ${JSON.stringify(counts)}`)
  }
  const reasons = {
    ...rejected, ...outOfScope, 'same-id': duplicates.sameId, 'repost': duplicates.repost,
    'time-nonexistent': dated.nonexistent, 'time-doubled': dated.doubled,
  }
  return { received, ...counts, unread, reasons: Object.fromEntries(Object.entries(reasons).filter(([, rows]) => rows > 0)), unmapped, inputs }
}

function checkLevels(factors: readonly Factor[]): void {
  const faults = factors.filter(({ name, levels }) => levels.length > mostLevels(name))
    .map(({ name }) => faultOf('too-many-levels', `mentions ${name}`, { factor: name, most: mostLevels(name) }))
  if (faults.length > 0) throw new InputFault(faults)
}

/** A target can only be set for levels that mentions are in: nothing is known of the others. */
function checkTarget(account: Account, factors: readonly Factor[]): void {
  const faults = account.targetMix.flatMap(({ factor, shares }) => {
    const known = factors.find((candidate) => candidate.name === factor)!.levels.map((level) => level.name)
    return shares.filter(({ level, share }) => share > 0 && !known.includes(level))
      .map(({ level }) => faultOf('target-mix-level', placeOf(account.places, ['target_mix', factor, level]), { level, known }))
  })
  if (faults.length > 0) throw new InputFault(faults)
}
