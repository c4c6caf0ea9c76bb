import type { Datum } from './chart-data.ts'
import { spreadLabels } from './spread-labels.ts'

/** Vertical room of one line of a label, and of a label beside its lines, px. */
const lineHeight = 14
const labelGap = 3

export interface StackedShares {
  readonly stack: readonly Datum[]
  readonly ends: readonly Datum[]
  /** Of the plot, px: as asked for, or what the labels need. */
  readonly height: number
}

/**
 * A stack of shares in the order of the table, the first level at the bottom, and where its labels stand at the right end.
 *
 * @param mix - data of the table `mix`
 * @param factor - which factor's shares
 * @param asked - height of the plot in px, on which shares from 0 to 1 are drawn
 * @returns `stack`: the rows with `from` and `to` (shares), `shade` (0 for the first level, 1 for the last) and `leads`, true for the level whose
 *   share is furthest from that in the base; `ends`: the rows of the last
 *   period with `middle` of the level's segment and `place` of its label, moved apart where segments are thin
 */
export function stackedShares(mix: readonly Datum[], factor: string, asked: number): StackedShares {
  const rows = mix.filter((row) => row.factor === factor)
  const last = Math.max(...rows.map((row) => Number(row.start)))
  const order = [...new Set(rows.map((row) => String(row.level)))]
  const leading = furthestFromBase(rows.filter((row) => row.start === last))
  const stack = [...new Set(rows.map((row) => row.start))].flatMap((start) => stackOne(rows.filter((row) => row.start === start), order, leading))
  const segments = stack.filter((row) => row.start === last)
  const middles = segments.map((row) => (Number(row.from) + Number(row.to)) / 2)
  const rooms = segments.map((row) => String(row.label).split('\n').length * lineHeight + labelGap)
  const height = Math.max(asked, Math.ceil(rooms.reduce((sum, room) => sum + room, 0)))
  const places = spreadLabels(middles, rooms.map((room) => room / height), [0, 1])
  return { stack, height, ends: segments.map((row, index) => ({ ...row, middle: middles[index], place: places[index] })) }
}

/** The one that the chart's title names: sentences choose it by the same two figures. */
function furthestFromBase(rows: readonly Datum[]): Datum[string] {
  const distance = (row: Datum) => typeof row.share_base === 'number' ? Math.abs(Number(row.share) - row.share_base) : -1
  return rows.reduce<Datum | undefined>((most, row) => (most === undefined || distance(row) > distance(most) ? row : most), undefined)?.level ?? null
}

function stackOne(rows: readonly Datum[], order: readonly string[], leading: Datum[string]): readonly Datum[] {
  let from = 0
  return order.flatMap((level, index) => {
    const row = rows.find((candidate) => candidate.level === level)
    if (row === undefined) return []
    const segment = { ...row, from, to: from + Number(row.share), shade: order.length > 1 ? index / (order.length - 1) : 0, leads: level === leading }
    from = segment.to
    return [segment]
  })
}
