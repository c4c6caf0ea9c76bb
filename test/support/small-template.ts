import type { Findings } from '../../model/findings/schema.ts'
import type { Composition } from '../../generator/compose/compose.ts'
import { createWords } from '../../generator/words/words.ts'
import type { Table } from '../../generator/tables/table.ts'
import { sampleFindings } from './sample-findings.ts'

/** A catalogue of a dozen messages, so that a fixture changes only when the language does. */
const catalogue = {
  range: '{low} to {high}', 'not-known': 'not known', 'cell-empty': '–', 'how-made': 'How made', 'how-made-page': ', page {page}', contents: 'Contents',
  probability: '{words} ({figure})', 'probability-words': '{band, select, virtually_certain {virtually certain} other {other}}', 'probability-over': 'over {figure}', 'probability-under': 'under {figure}',
  'level-prolific': 'Prolific posters', 'document-title': 'Review of {brand}',
  plain: 'Plain words', 'heading-words': 'A heading', 'heading-plain': 'Another heading', named: 'called {label}',
  moved: '{movement, select, up {It rose by {size} points.} other {It did not.}}', drifted: '{n, plural, =0 {None drifted.} one {{which} drifted ({how_far}).} other {{which} drifted.}}',
  'chart-bars-title': 'Bars of {brand}', 'chart-bars-note': 'How to read', 'chart-bars-alt': 'Bars show {level} points',
  'table-small': 'A small table', 'table-hostile': 'A table', 'column-label': 'Name', 'column-mentions': 'Mentions', 'column-level': 'Level', 'column-interval': 'Interval',
  'term-mention': 'Mention', 'term-mention-means': 'One post.',
}

const sentences = `
document-title: &brand { brand: { of: brand, as: text } }
chart-bars-title: *brand
chart-bars-alt: { level: { of: opinion.period.mean, as: points } }
named: { label: { of: venue.label, as: text } }
moved: { movement: { of: opinion.movement, as: code }, size: { of: opinion.change.mean, as: size } }
drifted:
  n: { of: venues, where: movement is down, as: length }
  which: { of: venues, where: movement is down, pick: label, as: list }
  how_far: { of: venues, where: movement is down, pick: drift.mean, write: change, as: list }
`

const small: Table = {
  name: 'small', columns: [{ key: 'label', kind: 'text' }, { key: 'mentions', kind: 'count' }, { key: 'level', kind: 'points' }, { key: 'low', kind: 'points' }, { key: 'high', kind: 'points' }],
  rows: [
    { label: 'Boards', mentions: 12, level: -3.25, low: -5, high: 1.06 }, { label: 'Tiny', mentions: 5, level: 1, low: 0, high: 2 },
    { label: 'Blogs', mentions: 1200, level: null, low: null, high: null },
  ],
}

const hostileLabels = ['<script>alert(1)</script>', '[x](javascript:alert(1)) :figure{of="brand" as="text"}', '<img src=x onerror=alert(1)> {n, plural, other {#}} &amp; **b**']

const hostile: Table = { name: 'hostile', columns: [{ key: 'label', kind: 'text' }, { key: 'mentions', kind: 'count' }], rows: hostileLabels.map((label, mentions) => ({ label, mentions })) }

/** Findings whose brand and venues try to be more than text. */
export function hostileFindings(): Findings {
  const findings = sampleFindings()
  return { ...findings, brand: hostileLabels[0]!, venues: findings.venues.map((venue, at) => ({ ...venue, label: hostileLabels[at] ?? venue.label })) }
}

/** All that a template of one file is composed from. */
export function smallComposition(input: string, given: Partial<Composition> & { readonly sentencesText?: string, readonly messages?: Readonly<Record<string, string>> } = {}): Composition {
  const { sentencesText = sentences, messages = catalogue, ...rest } = given
  return {
    template: {
      review: { place: 'review.md', text: input }, house: { place: 'templates/review.md', text: '' }, sections: {}, ownSections: [],
      sentences: { place: 'sentences.yaml', text: sentencesText }, included: {}, notes: {},
    },
    findings: sampleFindings(), tables: [small, hostile], charts: ['bars'], words: createWords(messages, 'en', 'en-GB'), ...rest,
  }
}

export const smallCatalogue: Readonly<Record<string, string>> = catalogue
