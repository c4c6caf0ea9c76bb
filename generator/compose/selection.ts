import type { Condition } from './condition.ts'
import { holds } from './condition.ts'
import { lookUp } from './path.ts'
import type { Path, Scope } from './path.ts'

/** Which items of a list, and in which order: paths in it start at the item. */
export interface Selection {
  readonly of: Path
  readonly where?: Condition
  /** A number to sort by, largest first; items without one come last. */
  readonly by?: Path
  /** Another number: sorted by how far `by` lies above it, so that what moved most comes first. */
  readonly against?: Path
  /** `most` (default): largest first; `least`: smallest first; `size`: largest without regard to the sign first. */
  readonly order?: Order
  /** At most so many. */
  readonly most?: number
  /** Only so many from the end of the list as it stands, before it is sorted: the latest. */
  readonly last?: number
}

export const orders = ['most', 'least', 'size'] as const
export type Order = (typeof orders)[number]

/** The items selected; empty where the path leads to no list. */
export function selected(selection: Selection, scope: Scope): readonly unknown[] {
  const list = lookUp(selection.of, scope)
  if (!Array.isArray(list)) return []
  const { where, by, against, order = 'most', most = list.length, last = list.length } = selection
  const kept = where ? list.filter((item: unknown) => holds(where, { ...scope, item })) : list
  const valueOf = (item: unknown) => by && distance(lookUp(by, { ...scope, item }), against ? lookUp(against, { ...scope, item }) : 0)
  const rank = (item: unknown) => by ? rankOf(valueOf(item), order) : 0
  return kept.slice(-last).sort((a, b) => rank(b) - rank(a) || 0).slice(0, most)
}

function distance(value: unknown, from: unknown): number | undefined {
  return typeof value === 'number' && typeof from === 'number' ? value - from : undefined
}

function rankOf(value: unknown, order: Order): number {
  if (typeof value !== 'number') return -Number.MAX_VALUE
  if (order === 'size') return Math.abs(value)
  return order === 'least' ? -value : value
}
