import { join } from 'node:path'
import { blankFindings } from '../../model/findings/blank.ts'
import type { Account } from '../account/account.ts'
import { compose } from '../compose/compose.ts'
import { loadTemplate } from '../compose/load-template.ts'
import { isRead, readOwnFile, unreadFault } from '../compose/own-file.ts'
import type { Template } from '../compose/template.ts'
import { InputFault } from '../faults/fault.ts'
import type { Program } from '../program/program.ts'
import type { ChartSpec } from '../render/charts/chart-spec.ts'
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
  readonly theme: Theme
}

/** @throws {InputFault} a language without a catalogue, whatever is wrong in the account's template, sections and charts, a theme that is refused */
export async function loadHouse(program: Program, account: Account): Promise<House> {
  const [template, words, houseCharts, theme] = await Promise.all([
    loadTemplate(program.templates, account),
    wordsOf(program, account),
    loadCharts(join(program.templates, 'charts')),
    loadTheme(join(program.templates, 'theme'), account.theme === null ? undefined : { folder: account.folder, path: account.theme, place: account.places['theme'] ?? 'account.yaml theme' }),
  ])
  const tables = tablesOf(blankFindings)
  const own = await loadOwnCharts(account, { tables, words })
  const charts = new Map([...houseCharts, ...own])
  requireUsed(words, template, charts, account)
  // a template that is wrong, or a chart that can't be drawn, is told before anything is computed
  compose({ template, findings: blankFindings, tables, charts: [...charts.keys()], words })
  for (const chart of own.values()) await drawChart(chart, tables, words, theme)
  return { template, words, charts, theme }
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
