import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import type { Root } from 'hast'
import { h } from 'hastscript'
import type { Document } from '../../../generator/compose/document.ts'
import { loadCharts } from '../../../generator/render/load-charts.ts'
import { imprintOf } from '../../../generator/render/imprint.ts'
import type { Rendering } from '../../../generator/render/render.ts'
import { loadTheme } from '../../../generator/theme/load-theme.ts'
import type { Table } from '../../../generator/tables/table.ts'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import { createWords, type Words } from '../../../generator/words/words.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

/** The house folder of templates. */
export const templates = fileURLToPath(new URL('../../../templates/', import.meta.url))

/** A catalogue of this test's own, so that a change of the house's wording breaks no test of the page. */
export const sampleWords: Words = createWords({
  'axis-points': 'Points', 'axis-points-change': 'Points of change', 'axis-points-offset': 'Points off', 'label-raw': 'Raw average', 'label-adjusted': 'Mix-adjusted',
  'label-survey': 'Survey: …', 'label-survey-percent': 'Survey: …, %', 'label-posts': 'Posts', 'label-posts-later': 'Posts, moved … later', 'label-posts-earlier': 'Posts, moved … earlier', 'label-forecast': 'Forecast', 'label-observed': 'Found', 'axis-pull': 'Points a point', 'axis-points-correction': 'Points of correction', 'axis-times': 'Times as likely', 'axis-more-authors': 'More authors',
  'label-customers': 'Customers', 'label-heard': 'Heard', 'label-importance': 'Importance', 'label-talk': 'Talk', 'label-reported': 'As reported', 'label-next': 'next', 'label-first-sealed': 'As first sealed', 'label-stands-now': 'As it stands now', 'label-break': 'new definition', 'axis-mention-shares': 'Percent', 'label-as-counted': 'As counted', 'label-one-mix': 'At one mix', 'metric-segment': '{label}, {segment}', 'venue-raw': '{label}, raw',
  steps: '{steps} {grid}', 'mark-flagged': '*', 'span-base': 'Base', 'span-review': 'Period under review', 'when-base': 'Base', 'when-now': 'This period', 'part-factor_mix': 'Mix of {factor}',
  'page-of': 'Page {page} of {pages}', overline: 'Brand health review', 'cover-people': 'By {prepared}, {reviewed}', 'skip-to-review': 'Skip to the review', 'cell-empty': '–', range: '{low} to {high}',
  'probability-over': 'over {figure}', 'probability-under': 'under {figure}', 'not-known': 'not known',
}, 'en', 'en-GB')

export const chartNames = ['opinion', 'decomposition', 'venues', 'venues-before', 'mix-venue', 'mix-poster', 'topics', 'posters', 'accounting',
  'tracker', 'agreement', 'survey-lags', 'survey-forecasts', 'lag-weights',
  'staying', 'spread', 'pull', 'benchmark', 'importance', 'tipping', 'coder', 'hearing', 'revisions'] as const

export async function sampleRendering(findings: Findings = sampleFindings()): Promise<Rendering> {
  return { tables: tablesOf(findings), charts: await loadCharts(`${templates}charts`), words: sampleWords, theme: await loadTheme(`${templates}theme`), imprint: imprintOf(findings, sampleWords) }
}

/** A document with everything a page must hold well: contents, charts, a long table, a wide table, blocks, links. */
export function sampleDocument(tables: readonly Table[] = tablesOf(sampleFindings())): Document {
  const chapters = chartNames.map((name) => ({ id: `about-${name}`, text: `What chart ${name} shows` }))
  const tree: Root = { type: 'root', children: [
    h('section.section.section-first-page', { id: 'first-page' }, [
      h('h1', 'Skerrow Ferries, October 2026'),
      h('div.lead', [h('p', 'Opinion of Skerrow Ferries rose by 3.1 points (90 % interval 1.2 to 5.0).')]),
      h('div.keyfigures', ['Opinion', 'Change', 'Probability'].map((name) => h('div.keyfigure', [h('p', [`${name} `, h('strong', '+3.1'), ' 90 % interval 1.2 to 5.0'])]))),
      chart('opinion', 'first'),
      h('div.caveat.is-serious', [h('p', [h('strong', 'Serious: '), 'the pooled average misleads.'])]),
    ]),
    h('nav.contents', { ariaLabel: 'Contents' }, [h('ol', chapters.map(({ id, text }) => (
      h('li', [h('a', { href: `#${id}` }, [h('span.entry', text), h('span.page')])])
    )))]),
    ...chapters.flatMap(({ id, text }, index) => [
      h('h2', { id }, text),
      h('p', ['As the ', h('a', { href: 'https://example.org/method' }, 'method'), ` says. ${'A sentence that fills the page and says nothing else. '.repeat(6)}`]),
      chart(chartNames[index], 'again'),
    ]),
    h('p', [h('a.made', { href: '#tables' }, ['Where tables stand', h('span.on-paper', [', page ', h('span.page')])])]),
    h('h2', { id: 'tables' }, 'Tables'),
    tableOf(tables, 'opinion', ['step', 'adjusted', 'low', 'high', 'raw', 'mentions']),
    tableOf(tables, 'venues', ['label', 'mentions', 'authors', 'share', 'raw', 'level', 'level_low', 'level_high', 'drift', 'drift_low', 'drift_high', 'slope', 'slope_low', 'slope_high', 'probability_drift_down', 'spread', 'venue', 'label', 'level']),
  ] }
  return { tree, title: 'Skerrow Ferries: brand health review, October 2026', lang: 'en-GB', headings: [{ depth: 2, id: 'tables', text: 'Tables' }] }
}

function chart(name: string, part: string) {
  return h('figure.chart', { role: 'group', dataChart: name, dataAlt: `Text alternative of "${name}", ${part}` }, [
    h('figcaption', [h('strong.finding', `What ${name} found`), ' ', h('span.reading', 'Bands are 90 % intervals.')]),
  ])
}

/** As compose makes them: a region that can take the focus, caption, header cells, a class for each column's kind. */
function tableOf(tables: readonly Table[], name: string, keys: readonly string[]) {
  const table = tables.find((candidate) => candidate.name === name)
  if (table === undefined) throw new Error(`no table ${name}`)
  const columns = keys.map((key) => table.columns.find((column) => column.key === key) ?? { key, kind: 'text' as const })
  return h('div.table', { role: 'region', ariaLabel: `Figures of ${name}`, tabIndex: 0, dataTable: name }, [
    h('table', { className: [`table-${name}`] }, [
      h('caption', `Figures of ${name}`),
      h('thead', [h('tr', columns.map(({ key, kind }) => h('th', { scope: 'col', className: [`kind-${kind}`] }, key.replaceAll('_', ' '))))]),
      h('tbody', table.rows.map((row) => h('tr', columns.map(({ key, kind }, index) => {
        const cell = row[key] ?? null
        const text = typeof cell === 'number' && kind !== 'count' ? cell.toFixed(1) : String(cell ?? '\u2013')
        return index === 0 ? h('th', { scope: 'row', className: [`kind-${kind}`] }, text) : h('td', { className: [`kind-${kind}`] }, text)
      })))),
    ]),
  ])
}

export const axeSource = (): string => readFileSync(fileURLToPath(import.meta.resolve('axe-core')), 'utf8')
