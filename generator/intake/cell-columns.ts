import type { CellColumns, CellLabels, Factor } from '../../model/intake/intake-tables.ts'
import type { CellPart } from './cell-part.ts'
import type { LabelSet } from './labels.ts'

/** A cell with the indices of its step and levels. */
export interface PlacedCell {
  readonly part: CellPart
  readonly key: readonly number[]
}

/**
 * Cells sorted by step and then by the levels of each factor. Two sources may say something of the same cell: these stay
 * two, since each has a design effect of its own.
 *
 * @param steps - day number on which each step begins
 */
export function placeCells(parts: readonly CellPart[], steps: readonly number[], factors: readonly Factor[]): readonly PlacedCell[] {
  const stepIndex = indexOf(steps)
  const levelIndex = factors.map((factor) => indexOf(factor.levels.map((level) => level.name)))
  const cells = parts.map((part) => ({ part, key: [stepIndex.get(part.step)!, ...part.levels.map((level, factor) => levelIndex[factor]!.get(level)!)] }))
  return cells.sort((a, b) => compare(a.key, b.key))
}

export function cellColumns(cells: readonly PlacedCell[], factors: readonly Factor[]): CellColumns {
  const column = (value: (part: CellPart) => number): Float64Array => Float64Array.from(cells, (cell) => value(cell.part))
  return {
    count: cells.length,
    step: Int32Array.from(cells, (cell) => cell.key[0]!),
    levels: factors.map((_, factor) => Int32Array.from(cells, (cell) => cell.key[factor + 1]!)),
    mentions: column((part) => part.mentions),
    authors: column((part) => part.authors),
    mean: column((part) => part.mean),
    squares: column((part) => part.squares),
    freedom: column((part) => part.freedom),
    clustering: column((part) => part.clustering),
    deff: column((part) => part.deff),
  }
}

/** Mentions of each label, cell by cell. */
export function cellLabels(cells: readonly PlacedCell[], { names, scores }: LabelSet): CellLabels {
  return { names, scores: Float64Array.from(scores), counts: Float64Array.from(cells.flatMap(({ part }) => part.labels)) }
}

function indexOf<T>(values: readonly T[]): ReadonlyMap<T, number> {
  return new Map(values.map((value, index) => [value, index]))
}

function compare(a: readonly number[], b: readonly number[]): number {
  for (const [index, value] of a.entries()) if (value !== b[index]) return value - b[index]!
  return 0
}
