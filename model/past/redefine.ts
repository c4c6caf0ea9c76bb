import type { CellLabels, Factor, IntakeTables } from '../intake/intake-tables.ts'
import { definitionChanges, type Definition, type DefinitionPart, type NamedLevel } from './definition.ts'

/** What can be undone in tables that are made: cells can be joined, and weighted otherwise, but not split or scored anew. */
const undoable: readonly DefinitionPart[] = ['base', 'target_mix', 'program', 'venues', 'topics', 'factors']

/**
 * Earlier tables as if they had been made by the definition of now: levels joined or renamed, factors left out, the base where it lies now.
 *
 * @param from - the definition by which they were made
 * @param now - tables made by the definition `to`: levels are theirs
 * @returns null where it can't be done: a level was split, a factor came in, scores or poster classes are read otherwise
 */
export function redefine(tables: IntakeTables, from: Definition, to: Definition, now: IntakeTables): IntakeTables | null {
  const changes = definitionChanges(from, to)
  if (changes.some((part) => !undoable.includes(part)) || now.factors.some(({ name }) => !tables.factors.some((factor) => factor.name === name))) return null
  const kept = now.factors.map(({ name }) => tables.factors.findIndex((factor) => factor.name === name))
  const joined = kept.map((f) => joinLevels(tables.factors[f], from, to))
  if (joined.some((names) => names === null)) return null
  const names = joined as readonly (readonly string[])[]
  const factors = now.factors.map((factor, f) => factorNow(factor, names[f]))
  const rebased = { ...tables, timeline: { ...tables.timeline, base: now.timeline.base, inBase: Uint8Array.from(tables.timeline.steps, (step) => now.timeline.inBase[now.timeline.steps.indexOf(step)] ?? 0) } }
  if (kept.length === tables.factors.length && kept.every((f, i) => f === i && names[i].every((name, l) => name === factors[i].levels[l]?.name))) return { ...rebased, factors }
  return joinCells(rebased, factors, kept.map((f, i) => ({ column: tables.cells.levels[f], levels: Int32Array.from(names[i], (name) => factors[i].levels.findIndex((level) => level.name === name)) })))
}

/** The name of now for each level of then; null where a level has become several. */
function joinLevels({ name, levels }: Factor, from: Definition, to: Definition): readonly string[] | null {
  if (name !== 'venue' && name !== 'topic') return levels.map((level) => level.name)
  const [then, now] = [from.levels[name], spellingsOf(to.levels[name])]
  const found = levels.map((level) => {
    const values = then.find((entry) => entry.name === level.name)?.values ?? []
    const names = new Set((values.length === 0 ? [level.name] : values).map((value) => now.get(folded(value)) ?? value))
    return names.size === 1 ? [...names][0] : null
  })
  return found.includes(null) ? null : found as readonly string[]
}

function spellingsOf(levels: readonly NamedLevel[]): ReadonlyMap<string, string> {
  return new Map(levels.flatMap(({ name, values }) => [name, ...values].map((value) => [folded(value), name] as const)))
}

/** As the intake tells spellings apart. */
function folded(value: string): string {
  return value.trim().toLowerCase().replace(/\s+/g, ' ')
}

/** The levels of now that were seen then, as they are now; one that is gone keeps its name. */
function factorNow({ name, levels }: Factor, seen: readonly string[]): Factor {
  const names = [...new Set(seen)].sort((a, b) => (a < b ? -1 : 1))
  return { name, levels: names.map((level) => levels.find((candidate) => candidate.name === level) ?? { name: level, label: level }) }
}

interface JoinedColumn {
  /** Shape (cells): levels of then. */
  readonly column: Int32Array
  /** Shape (levels of then): level of now. */
  readonly levels: Int32Array
}

/**
 * Cells that have become one: means are weighted by mentions, squares gain what parts the means, and clustering is exact where no author is in two of
 * them, as between venues; between topics an author who is in both counts as two.
 */
function joinCells(tables: IntakeTables, factors: readonly Factor[], columns: readonly JoinedColumn[]): IntakeTables {
  const { cells, labels } = tables
  const keyOf = (c: number) => [cells.step[c], ...columns.map(({ column, levels }) => levels[column[c]])]
  const groups = new Map<string, { readonly place: readonly number[]; readonly members: number[] }>()
  for (let c = 0; c < cells.count; c++) {
    const place = keyOf(c)
    const group = groups.get(place.join(' ')) ?? { place, members: [] }
    group.members.push(c)
    groups.set(place.join(' '), group)
  }
  const sorted = [...groups.values()].sort((a, b) => compare(a.place, b.place))
  const over = (value: (members: readonly number[]) => number) => Float64Array.from(sorted, ({ members }) => value(members))
  const sum = (members: readonly number[], of: (c: number) => number) => members.reduce((total, c) => total + of(c), 0)
  const { mentions: n, mean, squares } = cells
  const mentions = over((members) => sum(members, (c) => n[c]))
  const means = over((members) => sum(members, (c) => n[c] * mean[c]) / sum(members, (c) => n[c]))
  return {
    ...tables, factors, labels: labels === null ? null : joinLabels(labels, sorted.map(({ members }) => members)),
    variation: factors[0].levels.map((_, v) => joinVariation(tables, columns[0].levels, v)),
    cells: {
      count: sorted.length, step: Int32Array.from(sorted, ({ place }) => place[0]),
      levels: factors.map((_, f) => Int32Array.from(sorted, ({ place }) => place[f + 1])),
      mentions, mean: means, authors: over((members) => sum(members, (c) => cells.authors[c])),
      squares: Float64Array.from(sorted, ({ members }, g) => sum(members, (c) => squares[c] + (members.some((other) => cells.freedom[other] === 0 && n[other] > 1) ? 0 : n[c] * (mean[c] - means[g]) ** 2))),
      freedom: Float64Array.from(sorted, ({ members }, g) => (members.some((c) => cells.freedom[c] === 0 && n[c] > 1) ? sum(members, (c) => cells.freedom[c]) : mentions[g] - 1)),
      clustering: over((members) => sum(members, (c) => n[c] * cells.clustering[c]) / sum(members, (c) => n[c])),
      deff: over((members) => sum(members, (c) => n[c] * cells.deff[c]) / sum(members, (c) => n[c])),
    },
  }
}

function compare(a: readonly number[], b: readonly number[]): number {
  const at = a.findIndex((value, i) => value !== b[i])
  return at < 0 ? 0 : a[at] - b[at]
}

function joinLabels(labels: CellLabels, groups: readonly (readonly number[])[]): CellLabels {
  const k = labels.names.length
  return { ...labels, counts: Float64Array.from({ length: groups.length * k }, (_, i) => groups[Math.floor(i / k)].reduce((sum, c) => sum + labels.counts[c * k + i % k], 0)) }
}

/** An author is one handle in one venue: sums of joined venues add. */
function joinVariation({ variation }: IntakeTables, levels: Int32Array, venue: number): IntakeTables['variation'][number] {
  const members = variation.filter((_, v) => levels[v] === venue)
  const known = members.filter((sums) => sums !== null)
  if (known.length < members.length || known.length === 0) return null
  const sum = (of: (sums: (typeof known)[number]) => number) => known.reduce((total, sums) => total + of(sums), 0)
  return {
    authors: sum(({ authors }) => authors), mentions: sum(({ mentions }) => mentions), squaredSizes: sum(({ squaredSizes }) => squaredSizes),
    betweenSquares: sum(({ betweenSquares }) => betweenSquares), withinSquares: sum(({ withinSquares }) => withinSquares),
  }
}
