import type { AuthorCounts, AuthorVariation, CellColumns, ConcentrationRow, Factor, IntakeTables, Timeline } from '../../model/intake/intake-tables.ts'
import type { SimulatedCell } from './simulated-cells.ts'
import type { Sizes } from './simulated-states.ts'

/** Simulated cells as intake would hand them over, every mention by an author of its own. */
export function tablesOfCells(sizes: Sizes, timeline: Timeline, cells: readonly SimulatedCell[]): IntakeTables {
  const factors = [factorOf('venue', sizes.venues), factorOf('topic', sizes.topics), factorOf('poster', sizes.posters)]
  const total = cells.reduce((sum, cell) => sum + cell.mentions, 0)
  return {
    timeline, factors, cells: columnsOf(cells, factors.length),
    variation: factors[0].levels.map((_, v) => variationOf(cells.filter((cell) => cell.levels[0] === v))),
    hindsight: null, labels: null, noLabels: null, staying: [], extremes: [], pull: [], segments: null,
    concentration: concentrationOf(cells, timeline, sizes.venues),
    authors: authorsOf(cells, timeline, factors),
    accounting: {
      received: total, rejected: 0, duplicates: 0, outOfScope: 0, modelled: total, reasons: {}, unread: [], unmapped: [], inputs: [],
      withAuthor: Float64Array.from(factors[0].levels, (_, v) => cells.reduce((sum, cell) => sum + (cell.levels[0] === v ? cell.mentions : 0), 0)),
      readyMade: false,
    },
  }
}

/** Names sort in the order of their numbers. */
function factorOf(name: string, levels: number): Factor {
  const digits = String(levels).length
  return { name, levels: Array.from({ length: levels }, (_, i) => `${name}-${String(i + 1).padStart(digits, '0')}`).map((level) => ({ name: level, label: level })) }
}

function columnsOf(cells: readonly SimulatedCell[], factors: number): CellColumns {
  const mentions = Float64Array.from(cells, (cell) => cell.mentions)
  return {
    count: cells.length,
    step: Int32Array.from(cells, (cell) => cell.step),
    levels: Array.from({ length: factors }, (_, f) => Int32Array.from(cells, (cell) => cell.levels[f])),
    mentions, authors: mentions.slice(),
    mean: Float64Array.from(cells, (cell) => cell.mean),
    squares: Float64Array.from(cells, (cell) => cell.squares),
    freedom: mentions.map((count) => count - 1),
    clustering: new Float64Array(cells.length).fill(1),
    deff: new Float64Array(cells.length).fill(NaN),
  }
}

/** Sums of one venue, scores less the mean of their step: all between authors, since nobody posts twice. */
function variationOf(cells: readonly SimulatedCell[]): AuthorVariation {
  const mentions = cells.reduce((sum, cell) => sum + cell.mentions, 0)
  const steps = new Map<number, { mentions: number; score: number }>()
  for (const { step, mentions: count, mean } of cells) {
    const sums = steps.get(step) ?? { mentions: 0, score: 0 }
    steps.set(step, { mentions: sums.mentions + count, score: sums.score + count * mean })
  }
  const betweenSquares = cells.reduce((sum, cell) => {
    const { mentions: count, score } = steps.get(cell.step)!
    return sum + cell.squares + cell.mentions * (cell.mean - score / count) ** 2
  }, 0)
  return { authors: mentions, mentions, squaredSizes: mentions, betweenSquares, withinSquares: 0 }
}

function concentrationOf(cells: readonly SimulatedCell[], timeline: Timeline, venues: number): readonly ConcentrationRow[] {
  return timeline.periods.flatMap((_, period) => [-1, ...Array.from({ length: venues }, (__, v) => v)].map((venue) => ({
    period, venue, mentionsPerAuthor: 1,
    authors: cells.filter((cell) => timeline.periodOf[cell.step] === period && (venue === -1 || cell.levels[0] === venue)).reduce((sum, cell) => sum + cell.mentions, 0),
  }))).filter(({ authors }) => authors > 0)
}

function authorsOf(cells: readonly SimulatedCell[], timeline: Timeline, factors: readonly Factor[]): AuthorCounts {
  const byStep = new Float64Array(timeline.steps.length)
  const byStepVenue = new Float64Array(timeline.steps.length * factors[0].levels.length)
  const byPeriod = new Float64Array(timeline.periods.length)
  const byPeriodLevel = factors.map(({ levels }) => new Float64Array(timeline.periods.length * levels.length))
  for (const { step, levels, mentions } of cells) {
    const period = timeline.periodOf[step]
    byStep[step] += mentions
    byStepVenue[step * factors[0].levels.length + levels[0]] += mentions
    byPeriod[period] += mentions
    levels.forEach((level, f) => { byPeriodLevel[f][period * factors[f].levels.length + level] += mentions })
  }
  return { exact: true, byStep, byStepVenue, byPeriod, byPeriodLevel }
}
