import { expectations as expected } from '../faults/catalogue-account.ts'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import type { Entries, SourceEntry } from './schema.ts'
import { unknownKey } from './shape-faults.ts'
import { placeOf, type KeyPath } from './yaml-places.ts'

type Places = Readonly<Record<string, string>>
/** The keys whose own shape is right; the others are absent, and have their fault already. */
export type SoundEntries = { readonly [K in keyof Entries]?: Entries[K] | undefined }

/** Columns that the program knows by name; a factor of the account may be mapped besides. */
const knownColumns = ['id', 'posted_at', 'venue', 'author', 'score', 'topic', 'thread', 'reply_to', 'thread_position', 'brand', 'segment', 'text'] as const

const cellColumns: readonly string[] = ['step', 'mentions', 'authors', 'mean', 'variance', 'deff', 'score', 'posted_at']
const posterClasses: readonly string[] = ['occasional', 'regular', 'prolific', 'unknown']
const fold = (text: string): string => text.trim().toLowerCase().replace(/\s+/g, ' ')

/** What is right key by key and wrong together. */
export function combinationFaults(entries: SoundEntries, places: Places): readonly Fault[] {
  const wrong: Wrong = (path, actual, expectation) => faultOf('account-combination', placeOf(places, path), { actual, expected: expectation })
  return [
    ...(entries.mentions ?? []).flatMap((source, index) => [
      ...sourceFaults(source, ['mentions', index], wrong),
      ...columnFaults(source, index, entries.factors ?? [], places, wrong),
    ]),
    ...factorFaults(entries, wrong),
    ...valueFaults('venues', entries.venues ?? {}, wrong),
    ...valueFaults('topics', entries.topics ?? {}, wrong),
    ...targetFaults(entries, wrong),
    ...competitorFaults(entries, wrong),
    ...(entries.grid === 'month' && entries.reporting === 'week' ? [wrong(['reporting'], 'weeks on a grid of months', expected.reportingCoarser)] : []),
  ]
}

type Wrong = (path: KeyPath, actual: string, expectation: string) => Fault

function sourceFaults(source: SourceEntry, path: KeyPath, wrong: Wrong): readonly Fault[] {
  if (source.cells !== undefined) {
    return (['files', 'columns', 'score', 'time_format'] as const).filter((key) => source[key] !== undefined)
      .map((key) => wrong([...path, key], `\`${key}\` beside \`cells\``, expected.oneMode))
  }
  const { labels, range } = source.score ?? {}
  const folded = Object.keys(labels ?? {}).map(fold)
  return [
    ...(source.files === undefined ? [wrong(path, 'source without files', expected.needsFiles)] : []),
    ...(source.columns === undefined ? [wrong(path, 'source without columns', expected.needsColumns)] : []),
    ...(source.score === undefined ? [wrong(path, 'source without score', expected.needsScore)] : []),
    ...(source.score !== undefined && (labels === undefined) === (range === undefined)
      ? [wrong([...path, 'score'], labels === undefined ? 'neither of the two' : 'both of the two', expected.oneScore)] : []),
    ...(labels !== undefined && folded.length === 0 ? [wrong([...path, 'score', 'labels'], 'no label', expected.someLabels)] : []),
    ...(new Set(folded).size < folded.length ? [wrong([...path, 'score', 'labels'], 'label twice', expected.labelTwice)] : []),
  ]
}

function columnFaults(source: SourceEntry, index: number, factors: readonly string[], places: Places, wrong: Wrong): readonly Fault[] {
  if (source.columns === undefined || source.cells !== undefined) return []
  const path = ['mentions', index, 'columns']
  const known: readonly string[] = [...new Set([...knownColumns, ...factors.filter((factor) => factor !== 'poster')])]
  return [
    ...Object.keys(source.columns).filter((column) => !known.includes(column)).map((column) => unknownKey([...path, column], known, places)),
    ...['posted_at', 'venue', 'score'].filter((column) => !Object.hasOwn(source.columns!, column))
      .map((column) => wrong(path, `columns without \`${column}\``, expected.columnNeeded)),
  ]
}

function factorFaults(entries: SoundEntries, wrong: Wrong): readonly Fault[] {
  const factors = entries.factors ?? ['venue']
  const sources = entries.mentions ?? []
  const mapped = new Set(sources.flatMap((source) => Object.keys(source.columns ?? {})))
  const unreadable = factors.filter((factor) => !/^[a-z][a-z0-9_]*$/.test(factor) || cellColumns.includes(factor))
  // The columns of a ready-made cell table are known only when it is read.
  const unmapped = sources.some((source) => source.cells !== undefined) || sources.length === 0 ? []
    : factors.filter((factor) => !['venue', 'topic', 'poster'].includes(factor) && !mapped.has(factor))
  return [
    ...(factors[0] !== 'venue' || new Set(factors).size < factors.length ? [wrong(['factors'], `\`${factors.join(', ')}\``, expected.factors)] : []),
    ...unreadable.map((factor) => wrong(['factors', factors.indexOf(factor)], `factor \`${factor}\``, expected.factorName)),
    ...unmapped.map((factor) => wrong(['factors', factors.indexOf(factor)], `factor \`${factor}\``, expected.factorColumn)),
  ]
}

function valueFaults(key: 'venues' | 'topics', levels: Readonly<Record<string, { readonly values?: readonly string[] | undefined } | null>>, wrong: Wrong): readonly Fault[] {
  const owner = new Map<string, string>()
  const faults: Fault[] = []
  for (const [name, level] of Object.entries(levels)) {
    for (const value of new Set([name, ...(level?.values ?? [])].map(fold))) {
      const other = owner.get(value)
      if (other !== undefined) faults.push(wrong([key, name], `value \`${value}\`, which \`${other}\` has already`, expected.valueOnce))
      owner.set(value, name)
    }
  }
  return faults
}

function targetFaults(entries: SoundEntries, wrong: Wrong): readonly Fault[] {
  return Object.entries(entries.target_mix ?? {}).flatMap(([factor, shares]) => {
    const path = ['target_mix', factor]
    const sum = Object.values(shares).reduce((total, share) => total + share, 0)
    return [
      ...(entries.factors !== undefined && !entries.factors.includes(factor) ? [wrong(path, `\`${factor}\``, expected.targetFactor)] : []),
      ...(Math.abs(sum - 1) > 1e-6 ? [wrong(path, `shares that sum to ${Number(sum.toFixed(6))}`, expected.shareSum)] : []),
      ...(factor === 'poster' ? Object.keys(shares).filter((level) => !posterClasses.includes(level))
        .map((level) => wrong([...path, level], `level \`${level}\``, expected.posterLevel)) : []),
    ]
  })
}

/** Names are compared as those of rows are: without regard to case and the spaces around them. */
function competitorFaults({ brand, competitors = [] }: SoundEntries, wrong: Wrong): readonly Fault[] {
  const names = competitors.map((name) => name.trim().toLowerCase())
  return competitors.flatMap((name, index) => [
    ...(names[index] === brand?.trim().toLowerCase() ? [wrong(['competitors', index], `\`${name}\`, the brand itself`, expected.competitorOther)] : []),
    ...(names.indexOf(names[index]!) < index ? [wrong(['competitors', index], `\`${name}\`, which is listed already`, expected.competitorOnce)] : []),
  ])
}
