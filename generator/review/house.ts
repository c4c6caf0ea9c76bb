import { join } from 'node:path'
import { blankFindings } from '../../model/findings/blank.ts'
import type { Account } from '../account/account.ts'
import { compose } from '../compose/compose.ts'
import { loadTemplate } from '../compose/load-template.ts'
import { isRead, readOwnFile, unreadFault } from '../compose/own-file.ts'
import type { Template } from '../compose/template.ts'
import { InputFault } from '../faults/fault.ts'
import type { Program } from '../program/program.ts'
import { ownPlace, type ChartSpec } from '../render/charts/chart-spec.ts'
import { drawChart } from '../render/charts/draw-chart.ts'
import { loadCharts, loadOwnCharts } from '../render/load-charts.ts'
import { tablesOf } from '../tables/tables-of.ts'
import { loadTheme } from '../theme/load-theme.ts'
import type { Theme } from '../theme/theme.ts'
import { loadWords } from '../words/load-words.ts'
import { unusedWords } from '../words/unused-words.ts'
import type { Words } from '../words/words.ts'

/** What the document is made with: the house's own parts, and the account's where it overrides them. */
export interface House {
  readonly template: Template
  readonly words: Words
  readonly charts: ReadonlyMap<string, ChartSpec>
  /** Names of those that are the account's. */
  readonly ownCharts: readonly string[]
  readonly theme: Theme
  /** What was read of the account, notes left out: relative to its folder, sorted. */
  readonly files: readonly string[]
}

/**
 * Read what a document is made with; whether template and charts fit the findings is looked at when they are used.
 *
 * @throws {InputFault} a language without a catalogue, files that can't be read, charts and a theme that are refused
 */
export async function readHouse(program: Program, account: Account): Promise<House> {
  const [template, words, houseCharts, theme] = await Promise.all([
    loadTemplate(program.templates, account),
    wordsOf(program, account),
    loadCharts(join(program.templates, 'charts')),
    loadTheme(join(program.templates, 'theme'), account.theme === null ? undefined : { folder: account.folder, path: account.theme, place: account.places['theme'] ?? 'account.yaml theme' }),
  ])
  const own = await loadOwnCharts(account, { tables: tablesOf(blankFindings), words })
  return { template, words, charts: new Map([...houseCharts, ...own]), ownCharts: [...own.keys()], theme, files: filesRead(account, template, words, own, theme) }
}

/** @throws {InputFault} what `readHouse` and `checkHouse` do */
export async function loadHouse(program: Program, account: Account): Promise<House> {
  const house = await readHouse(program, account)
  await checkHouse(house, account)
  return house
}

/**
 * A template that is wrong, a chart that can't be drawn, or words that nothing calls are told before anything is computed.
 *
 * @throws {InputFault} with whatever is wrong in the account's own part of it
 */
export async function checkHouse({ template, words, charts, ownCharts, theme }: House, account: Account): Promise<void> {
  const tables = tablesOf(blankFindings)
  requireUsed(words, template, charts, account)
  compose({ template, findings: blankFindings, tables, charts: [...charts.keys()], ownCharts: ownChartPlaces({ charts, ownCharts }), words })
  for (const name of ownCharts) await drawChart(charts.get(name) ?? { name }, tables, words, theme)
}

/** Name and file of each chart that is the account's. */
function ownChartPlaces({ charts, ownCharts }: Pick<House, 'charts' | 'ownCharts'>): ReadonlyMap<string, string> {
  return new Map(ownCharts.map((name) => [name, charts.get(name)?.[ownPlace] ?? name]))
}

function filesRead(account: Account, { review, sections, ownSections, included }: Template, words: Words, charts: ReadonlyMap<string, ChartSpec>, theme: Theme): readonly string[] {
  return [...new Set([
    ...(account.template === null ? [] : [review.place]), ...ownSections.map((name) => sections[name].place),
    ...Object.values(included).filter(isRead).map(({ place }) => place),
    ...[...charts.values()].flatMap((chart) => chart[ownPlace] ?? []),
    ...(words.own === undefined ? [] : [words.own.place]), ...theme.files,
  ])].sort()
}

async function wordsOf(program: Program, { folder, locale, words, places }: Account): Promise<Words> {
  const own = words === null ? undefined : await readOwnFile(folder, words)
  if (own !== undefined && !isRead(own)) throw new InputFault([unreadFault(own, places['words'] ?? own.place)])
  return loadWords(join(program.templates, 'words'), locale, own, places['locale'])
}

/** @throws {InputFault} own messages that nothing calls */
function requireUsed(words: Words, { review, sections, included, notes }: Template, charts: ReadonlyMap<string, ChartSpec>, { factors }: Account): void {
  const sources = [review, ...Object.values(sections), ...Object.values(included).filter(isRead), ...Object.values(notes)]
  const texts = [...sources.map(({ text }) => text), JSON.stringify([...charts.values()])]
  const faults = unusedWords(words, { texts, charts: [...charts.keys()], factors })
  if (faults.length > 0) throw new InputFault(faults)
}
