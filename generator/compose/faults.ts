import { distance } from 'fastest-levenshtein'
import { faultOf, type FaultCode } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'

/** Anything that may know where in its file it stands: a node of a tree, an entry of sentences.yaml. */
export interface Placed {
  readonly position?: { readonly start: { readonly line: number, readonly column: number } } | undefined
}

/** Collects what is wrong in one file; all faults of a template are told at once. */
export interface Reporter {
  readonly report: (at: Placed | undefined, code: string, unexpected: string, expected: string, mend: string) => void
  /** Like `report`, in the words of the catalogue of faults. */
  readonly fault: <C extends FaultCode>(at: Placed | undefined, code: C, details: Parameters<typeof faultOf<C>>[2]) => void
  /** Where a node stands, as faults name it. */
  readonly placeOf: (at: Placed | undefined) => string
  readonly add: (fault: Fault) => void
  /** A reporter of another file, into the same list. */
  readonly of: (place: string) => Reporter
  /** A reporter that tells everything at one place of this file, whatever file it was found in. */
  readonly at: (placed: Placed) => Reporter
}

/** A reporter that adds to `faults`, naming file, line and column. */
export function createReporter(place: string, faults: Fault[]): Reporter {
  return reporterOf(faults, (at) => {
    const start = at?.position?.start
    return start ? `${place}:${start.line}:${start.column}` : place
  })
}

function reporterOf(faults: Fault[], placeOf: (at: Placed | undefined) => string): Reporter {
  return {
    placeOf,
    add: (fault) => void faults.push(fault),
    report: (at, code, unexpected, expected, mend) => void faults.push({ code, place: placeOf(at), message: `Unexpected ${unexpected}, expected ${expected}`, mend }),
    fault: (at, code, details) => void faults.push(faultOf(code, placeOf(at), details)),
    of: (place) => createReporter(place, faults),
    at: (placed) => reporterOf(faults, () => placeOf(placed)),
  }
}

/** Names told in a mend: all where they are few, else the nearest ones. */
const mostTold = 12
const nearestTold = 5

/** The mend for a misspelt name: the nearest of those known, where one is near. */
export function nearest(name: string, known: readonly string[]): string {
  if (known.length === 0) return `Remove "${name}": none is known.`
  const near = nearOnes(name, known)
  const meant = near[0] === undefined ? undefined : `Write "${near[0]}", if that is meant`
  if (known.length <= mostTold) return `${meant === undefined ? 'Known' : `${meant}; known`} are ${known.join(', ')}.`
  if (meant === undefined) return `None of the ${known.length} names known is near; templates/TEMPLATES.md says where they are listed.`
  const others = near.slice(1, nearestTold)
  return others.length === 0 ? `${meant}; ${known.length - 1} more are known.` : `${meant}; near are ${others.join(', ')}, and ${known.length - 1 - others.length} more are known.`
}

/** Known names that one may be the misspelling of, nearest first: at most a third of the letters differ. */
export function nearOnes(name: string, known: readonly string[]): readonly string[] {
  const far = (other: string) => distance(name.toLowerCase(), other.toLowerCase())
  const isNear = (other: string) => far(other) <= Math.max(1, Math.round(Math.max(name.length, other.length) / 3))
  return known.filter(isNear).sort((a, b) => far(a) - far(b))
}
