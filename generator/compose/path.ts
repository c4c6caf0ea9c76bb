/**
 * Paths into the findings: `opinion.change.mean`, `venue.label` inside a block repeated as `venue`, and
 * `decomposition.parts[part=venue_mix].estimate`, the item of a list that a field picks out; with `@` the wanted value
 * is itself looked up: `decomposition.parts[part=@decomposition.largest].estimate`. `waves[first]` and `waves[last]` are the two ends of a list;
 * `margins[all].levels` are the levels of every margin, one after the other.
 */
export type Path = readonly Step[]

export interface Step {
  readonly key: string
  readonly pick?: { readonly field: string, readonly value: string | Path }
  readonly end?: 'first' | 'last'
  readonly all?: true
}

/** Where paths start: the item at hand (inside `where`, `by`), the names given by `each`, the findings. First found wins. */
export interface Scope {
  readonly findings: unknown
  readonly names: Readonly<Record<string, unknown>>
  readonly item?: unknown
}

const stepForm = /^([\p{L}\p{N}_-]+)(?:\[(?:([\w-]+)=(@?)([^\]@][^\]]*)|(first|last|all))\])?$/u

/** Read a path; undefined where the text is none. */
export function parsePath(text: string): Path | undefined {
  const steps = split(text).map(parseStep)
  return steps.every((step) => step !== undefined) ? steps : undefined
}

/** Split at dots outside brackets. */
function split(text: string): readonly string[] {
  return text.split(/\.(?![^[]*\])/)
}

function parseStep(text: string): Step | undefined {
  const [, key, field, reference, value, end] = stepForm.exec(text) ?? []
  if (key === undefined) return undefined
  if (end === 'first' || end === 'last') return { key, end }
  if (end === 'all') return { key, all: true }
  if (field === undefined || value === undefined) return { key }
  const wanted = reference === '@' ? parsePath(value) : value
  return wanted === undefined ? undefined : { key, pick: { field, value: wanted } }
}

/** The first item of a path that its list does not hold; undefined where every list has what is picked of it, or where something before it is missing. */
export function missingItem(path: Path, scope: Scope): { readonly list: string, readonly sought: string, readonly items: readonly string[] } | undefined {
  for (const [at, step] of path.entries()) {
    if (!step.pick || path.slice(0, at).some(({ all }) => all)) continue
    const { field, value: wanted } = step.pick
    const list = lookUp([...path.slice(0, at), { key: step.key }], scope)
    const sought = typeof wanted === 'string' ? wanted : lookUp(wanted, scope)
    if (!Array.isArray(list) || (typeof sought !== 'string' && typeof sought !== 'number')) return undefined
    const items = list.flatMap((item: unknown) => hasOwn(item, field) ? [String(item[field])] : [])
    if (!items.includes(String(sought))) return { list: step.key, sought: String(sought), items }
  }
  return undefined
}

/** The value at a path; undefined where there is none. Total: it never throws. */
export function lookUp(path: Path, scope: Scope): unknown {
  const [first] = path
  if (!first) return undefined
  return along(startOf(first.key, scope), path, scope)
}

function along(value: unknown, [step, ...rest]: Path, scope: Scope): unknown {
  if (!step) return value
  const next = follow(value, step, scope)
  if (!step.all) return along(next, rest, scope)
  return Array.isArray(next) ? next.flatMap((item: unknown) => along(item, rest, scope)) : undefined
}

function startOf(key: string, scope: Scope): unknown {
  if (hasOwn(scope.item, key)) return scope.item
  return hasOwn(scope.names, key) ? scope.names : scope.findings
}

function follow(value: unknown, step: Step, scope: Scope): unknown {
  const next = hasOwn(value, step.key) ? value[step.key] : undefined
  if (step.end) return Array.isArray(next) ? next.at(step.end === 'last' ? -1 : 0) : undefined
  if (!step.pick) return next
  const { field, value: wanted } = step.pick
  const sought = typeof wanted === 'string' ? wanted : lookUp(wanted, scope)
  return Array.isArray(next) ? next.find((item: unknown) => hasOwn(item, field) && String(item[field]) === String(sought)) : undefined
}

function hasOwn(value: unknown, key: string): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && Object.hasOwn(value, key)
}
