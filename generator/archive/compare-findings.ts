/** A value that differs between two findings, and where. */
export interface Difference {
  /** `opinion.change.mean`, `venues.2.label`. */
  readonly path: string
  /** Undefined where the sealed findings have no such value. */
  readonly sealed: unknown
  readonly rebuilt: unknown
  /** Of two numbers, |a - b| over the larger of the two sizes, 0 to 2; null where either is no number. */
  readonly relative: number | null
}

export interface Comparison {
  /** Values compared, numbers and texts. */
  readonly values: number
  /** Every one that differs, in the order of the findings. */
  readonly differences: readonly Difference[]
}

/** Compare findings value by value; objects key by key whatever their order, lists place by place. */
export function compareFindings(sealed: unknown, rebuilt: unknown): Comparison {
  const [before, after] = [new Map(leaves(sealed, [])), new Map(leaves(rebuilt, []))]
  const paths = [...new Set([...before.keys(), ...after.keys()])]
  const differences = paths.filter((path) => !before.has(path) || !after.has(path) || !Object.is(before.get(path), after.get(path)))
    .map((path) => differenceAt(path, before.get(path), after.get(path)))
  return { values: paths.length, differences }
}

/** The one that is furthest off; of those that are no numbers the first. */
export function largest(differences: readonly Difference[]): Difference | undefined {
  return differences.toSorted((a, b) => (b.relative ?? -1) - (a.relative ?? -1))[0]
}

function differenceAt(path: string, sealed: unknown, rebuilt: unknown): Difference {
  const numbers = typeof sealed === 'number' && typeof rebuilt === 'number'
  return { path, sealed, rebuilt, relative: numbers ? Math.abs(sealed - rebuilt) / Math.max(Math.abs(sealed), Math.abs(rebuilt), Number.MIN_VALUE) : null }
}

/** An empty list or object is a value too: it may stand where there was none. */
function leaves(value: unknown, path: readonly string[]): readonly (readonly [string, unknown])[] {
  if (typeof value !== 'object' || value === null) return [[path.join('.'), value]]
  const entries = Object.entries(value)
  return entries.length === 0 ? [[path.join('.'), Array.isArray(value) ? '[]' : '{}']] : entries.flatMap(([key, inner]) => leaves(inner, [...path, key]))
}
