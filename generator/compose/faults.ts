import { closest, distance } from 'fastest-levenshtein'
import type { Fault } from '../faults/fault.ts'

/** Anything that may know where in its file it stands: a node of a tree, an entry of sentences.yaml. */
export interface Placed {
  readonly position?: { readonly start: { readonly line: number, readonly column: number } } | undefined
}

/** Collects what is wrong in one file; all faults of a template are told at once. */
export interface Reporter {
  readonly place: string
  readonly report: (at: Placed | undefined, code: string, unexpected: string, expected: string, mend: string) => void
}

/** A reporter that adds to `faults`, naming file, line and column. */
export function createReporter(place: string, faults: Fault[]): Reporter {
  return {
    place,
    report: (at, code, unexpected, expected, mend) => {
      const start = at?.position?.start
      const where = start ? `${place}:${start.line}:${start.column}` : place
      faults.push({ code, place: where, message: `Unexpected ${unexpected}, expected ${expected}`, mend })
    },
  }
}

/** Names told in a mend: all where they are few, else the nearest ones. */
const mostTold = 12
const nearestTold = 5

/** The mend for a misspelt name: the nearest of those known. */
export function nearest(name: string, known: readonly string[]): string {
  if (known.length === 0) return `Remove "${name}": none is known.`
  if (known.length <= mostTold) return `Write "${closest(name, known)}", if that is meant; known are ${known.join(', ')}.`
  const near = [...known].sort((a, b) => distance(name, a) - distance(name, b)).slice(0, nearestTold)
  return `Write "${near[0]}", if that is meant; near are ${near.slice(1).join(', ')}, and ${known.length - nearestTold} more are known.`
}
