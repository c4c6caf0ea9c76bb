import { join } from 'node:path'
import type { Account } from '../account/account.ts'
import { loadTemplate } from '../compose/load-template.ts'
import type { Template } from '../compose/template.ts'
import type { Program } from '../program/program.ts'
import type { ChartSpec } from '../render/charts/chart-spec.ts'
import { loadCharts } from '../render/load-charts.ts'
import { loadTheme, type Theme } from '../render/theme.ts'
import { loadWords } from '../words/load-words.ts'
import type { Words } from '../words/words.ts'

/** What the document is made with: the house's own parts, and the account's where it overrides them. */
export interface House {
  readonly template: Template
  readonly words: Words
  readonly charts: ReadonlyMap<string, ChartSpec>
  readonly theme: Theme
}

/** @throws {InputFault} a language without a catalogue, a template that can't be read */
export async function loadHouse(program: Program, account: Account): Promise<House> {
  const own = account.template === null ? undefined : join(account.folder, account.template)
  const [template, words, charts, theme] = await Promise.all([
    loadTemplate(program.templates, own),
    loadWords(join(program.templates, 'words'), account.locale),
    loadCharts(join(program.templates, 'charts')),
    loadTheme(join(program.templates, 'theme')),
  ])
  return { template, words, charts, theme }
}
