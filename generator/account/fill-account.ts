import type { Grid } from '../calendar/grid.ts'
import type { Account, FileSet, LevelEntry, ScoreReading, Source } from './account.ts'
import type { Entries, SourceEntry } from './schema.ts'
import { dotted, type KeyPath } from './yaml-places.ts'

type Found = ReadonlyMap<string, readonly string[]>
type Level = Entries['venues'][string]

/** From about two months behind the survey to four months ahead of it. */
const usualLags: Readonly<Record<Grid, readonly [number, number]>> = { day: [-56, 112], week: [-8, 16], month: [-2, 4] }

/** The account from entries that are sound, each and together, and the files found for them. */
export function accountOf(folder: string, entries: Entries, found: Found, places: Readonly<Record<string, string>>): Account {
  const table = (key: 'benchmark' | 'coding_audit' | 'importance' | 'events' | 'outcome'): FileSet | null =>
    entries[key] === undefined ? null : fileSet([key, 'files'], entries[key].files, found)
  return {
    folder,
    account: entries.account, brand: entries.brand, competitors: entries.competitors,
    locale: entries.locale, timeZone: entries.time_zone, grid: entries.grid, reporting: entries.reporting,
    base: entries.base ?? null, interval: entries.interval,
    mentions: entries.mentions.map((source, index) => sourceOf(source, index, found)),
    factors: entries.factors,
    venues: levelsOf(entries.venues), topics: levelsOf(entries.topics), posters: entries.posters,
    targetMix: Object.entries(entries.target_mix).map(([factor, shares]) => ({
      factor, shares: Object.entries(shares).map(([level, share]) => ({ level, share })),
    })),
    survey: entries.survey === undefined ? null : {
      ...fileSet(['survey', 'files'], entries.survey.files, found),
      headline: entries.survey.headline ?? null, lags: entries.survey.lags ?? usualLags[entries.grid],
      labels: entries.survey.labels, nextFieldwork: entries.survey.next_fieldwork ?? null,
    },
    benchmark: table('benchmark'), customers: entries.customers ?? null, codingAudit: table('coding_audit'), importance: table('importance'),
    events: table('events'), outcome: table('outcome'),
    template: entries.template ?? null, theme: entries.theme ?? null, notes: entries.notes ?? null, words: entries.words ?? null,
    preparedBy: entries.prepared_by ?? null, reviewedBy: entries.reviewed_by ?? null, onePersonSeals: entries.one_person_seals,
    smallestGroup: entries.smallest_group,
    places,
  }
}

function fileSet(path: KeyPath, pattern: string, found: Found): FileSet {
  return { pattern, files: found.get(dotted(path)) ?? [] }
}

function sourceOf(source: SourceEntry, index: number, found: Found): Source {
  const cut = { delimiter: source.delimiter ?? null, quote: source.quote ?? null }
  if (source.cells !== undefined) return { kind: 'cells', ...cut, ...fileSet(['mentions', index, 'cells'], source.cells, found) }
  return {
    kind: 'mentions', ...cut, ...fileSet(['mentions', index, 'files'], source.files ?? '', found),
    columns: source.columns ?? {}, score: scoreOf(source), timeFormat: source.time_format ?? null,
  }
}

function scoreOf({ score }: SourceEntry): ScoreReading {
  if (score?.range !== undefined) return { kind: 'range', low: score.range[0], high: score.range[1] }
  return { kind: 'labels', labels: Object.entries(score?.labels ?? {}).map(([label, value]) => ({ label, score: value })) }
}

function levelsOf(levels: Readonly<Record<string, Level>>): readonly LevelEntry[] {
  return Object.entries(levels).map(([name, level]) => ({
    name, label: level?.label ?? name, values: level?.values ?? [], anchor: level?.drift === 'none', costPerAuthor: level?.cost_per_author ?? null,
  }))
}
