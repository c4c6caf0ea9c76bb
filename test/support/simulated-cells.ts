import type { Randomness, Sigmas, Sizes, States } from './simulated-states.ts'

/** Relative shares of each factor's levels at the first and the last step. */
export interface MixOverTime {
  readonly venue: SharesOverTime
  readonly topic: SharesOverTime
  readonly poster: SharesOverTime
}

export interface SharesOverTime {
  readonly from: readonly number[]
  readonly to: readonly number[]
}

export interface Truth extends States {
  /** Mix-adjusted opinion A, shape (steps), at the mix of the base as drawn. */
  readonly adjusted: Float64Array
  readonly sigmas: Sigmas
}

/** A cell as drawn; `levels` are indices of venue, topic and poster class. */
export interface SimulatedCell {
  readonly step: number
  readonly levels: readonly [venue: number, topic: number, poster: number]
  readonly mentions: number
  readonly mean: number
  readonly squares: number
}

export interface CellDraw extends Sizes {
  readonly mentionsPerStep: number
  readonly mix?: Partial<MixOverTime>
  readonly mentionVariance?: number
  readonly sigmas: Sigmas
  readonly states: States
  readonly inBase: Uint8Array
}

/** Cells with at least one mention, by step, venue, topic and poster class; counts are Poisson. */
export function drawCells(draw: CellDraw, random: Randomness): { readonly cells: readonly SimulatedCell[]; readonly adjusted: Float64Array } {
  const variance = draw.mentionVariance ?? 0.3
  const shares = [sharesOf(draw.mix?.venue, draw.venues, draw.steps), sharesOf(draw.mix?.topic, draw.topics, draw.steps), sharesOf(draw.mix?.poster, draw.posters, draw.steps)]
  const { mu, drift, offsets } = draw.states
  const cells: SimulatedCell[] = []
  for (let step = 0; step < draw.steps; step++) {
    for (let v = 0; v < draw.venues; v++) for (let k = 0; k < draw.topics; k++) for (let g = 0; g < draw.posters; g++) {
      const mentions = poisson(draw.mentionsPerStep * shares[0](v, step) * shares[1](k, step) * shares[2](g, step), random)
      if (mentions === 0) continue
      const expected = mu[step] + offsets[0][v] + drift[v][step] + offsets[1][k] + offsets[2][g]
      const mean = expected + Math.sqrt(variance / mentions + draw.sigmas.tau ** 2) * random.normal()
      cells.push({ step, levels: [v, k, g], mentions, mean, squares: variance * chiSquare(mentions - 1, random) })
    }
  }
  const standing = [draw.venues, draw.topics, draw.posters].reduce((sum, levels, factor) => sum + targetOffset(cells, factor, levels, offsets[factor], draw.inBase), 0)
  return { cells, adjusted: mu.map((level) => level + standing) }
}

/** Mean offset of one factor at its shares of mentions in the base. */
function targetOffset(cells: readonly SimulatedCell[], factor: number, levels: number, offsets: Float64Array, inBase: Uint8Array): number {
  const mentions = new Float64Array(levels)
  for (const cell of cells) if (inBase[cell.step] === 1) mentions[cell.levels[factor]] += cell.mentions
  const total = mentions.reduce((sum, count) => sum + count, 0)
  return mentions.reduce((sum, count, level) => sum + (count / total) * offsets[level], 0)
}

function sharesOf(given: SharesOverTime | undefined, levels: number, steps: number): (level: number, step: number) => number {
  const { from, to } = given ?? { from: Array<number>(levels).fill(1), to: Array<number>(levels).fill(1) }
  if (from.length !== levels || to.length !== levels) throw new RangeError(`Unexpected mix of ${from.length} and ${to.length} levels, expected ${levels}`)
  const total = (weights: readonly number[]): number => weights.reduce((sum, weight) => sum + weight, 0)
  return (level, step) => {
    const late = steps === 1 ? 0 : step / (steps - 1)
    return ((1 - late) * from[level]) / total(from) + (late * to[level]) / total(to)
  }
}

/** Poisson count: by multiplying uniforms (Knuth, The Art of Computer Programming 2, 3.4.1); a large mean is split. */
function poisson(mean: number, random: Randomness): number {
  if (mean > 100) return poisson(mean / 2, random) + poisson(mean / 2, random)
  const floor = Math.exp(-mean)
  let count = 0
  for (let product = random.uniform(); product > floor; product *= random.uniform()) count += 1
  return count
}

function chiSquare(freedom: number, random: Randomness): number {
  let sum = 0
  for (let i = 0; i < freedom; i++) sum += random.normal() ** 2
  return sum
}
