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
 * A stack of shares, largest level of the last period at the bottom, and where its labels stand at the right end.
 *
 * @param mix - data of the table `mix`
 * @param factor - which factor's shares
 * @param asked - height of the plot in px, on which shares from 0 to 1 are drawn
 * @returns `stack`: the rows with `from` and `to` (shares) and `shade` (0 for the largest level, 1 for the smallest); `ends`: the rows of the last
 *   period with `middle` of the level's segment and `place` of its label, moved apart where segments are thin
 */
export function stackedShares(mix: readonly Datum[], factor: string, asked: number): StackedShares {
  const rows = mix.filter((row) => row.factor === factor)
  const last = Math.max(...rows.map((row) => Number(row.start)))
  const order = levelsBySize(rows, last)
  const stack = [...new Set(rows.map((row) => row.start))].flatMap((start) => stackOne(rows.filter((row) => row.start === start), order))
  const segments = stack.filter((row) => row.start === last)
  const middles = segments.map((row) => (Number(row.from) + Number(row.to)) / 2)
  const rooms = segments.map((row) => String(row.label).split('\n').length * lineHeight + labelGap)
  const height = Math.max(asked, Math.ceil(rooms.reduce((sum, room) => sum + room, 0)))
  const places = spreadLabels(middles, rooms.map((room) => room / height), [0, 1])
  return { stack, height, ends: segments.map((row, index) => ({ ...row, middle: middles[index], place: places[index] })) }
}

function levelsBySize(rows: readonly Datum[], last: number): readonly string[] {
  const levels = [...new Set(rows.map((row) => String(row.level)))]
  const size = new Map(rows.filter((row) => row.start === last).map((row) => [String(row.level), Number(row.share)]))
  return levels.sort((a, b) => (size.get(b) ?? 0) - (size.get(a) ?? 0))
}

function stackOne(rows: readonly Datum[], order: readonly string[]): readonly Datum[] {
  let from = 0
  return order.flatMap((level, index) => {
    const row = rows.find((candidate) => candidate.level === level)
    if (row === undefined) return []
    const segment = { ...row, from, to: from + Number(row.share), shade: order.length > 1 ? index / (order.length - 1) : 0 }
    from = segment.to
    return [segment]
  })
}
