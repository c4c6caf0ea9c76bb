import { parse, resetSVGDefIds, View, Warn } from 'vega'
import { compile } from 'vega-lite'
import type { Table } from '../../tables/table.ts'
import type { Words } from '../../words/words.ts'
import type { DrawingSize, Theme } from '../theme.ts'
import { chartConfig } from './chart-config.ts'
import { chartData, type Datum } from './chart-data.ts'
import { vegaLocale } from './chart-locale.ts'
import { asVegaLite, atSize, type ChartSpec, type Json, layoutOf, type Panels, tablesIn, worded } from './chart-spec.ts'
import { cleanSvg } from './clean-svg.ts'
import { stackedShares } from './stack-ends.ts'
import { measureBy } from './text-metrics.ts'

/**
 * Draw a chart as static SVG:
 *
 *     specification ─at size─▶ ─worded─▶ ─with data─▶ vega-lite ─▶ vega ─▶ SVG ─cleaned─▶
 *
 * The same specification, tables, words and theme give the same bytes, in any time zone.
 *
 * @param spec - a specification of templates/charts
 * @param size - for the page and paper, or for a phone
 * @throws {Error} an unknown table or message, or whatever Vega-Lite warns of: a picture that is not as specified must not pass
 */
export async function drawChart(spec: ChartSpec, tables: readonly Table[], words: Words, theme: Theme, size: DrawingSize = 'wide'): Promise<string> {
  const sized = worded(atSize(spec, size), words) as unknown as ChartSpec
  const datasets = datasetsOf(sized, tables, words, theme, size)
  const panelled = withPanels(sized, datasets, theme.chart.widths[size])
  const warnings: string[] = []
  const config = { ...chartConfig(theme.chart), locale: vegaLocale(words.locale) }
  measureBy(theme.advances)
  const { spec: compiled } = compile(asVegaLite({ ...panelled, datasets: datasets as unknown as Json }), { config, logger: collector(warnings) })
  if (warnings.length > 0) throw new Error(`Unexpected warning while drawing chart ${spec.name}: ${warnings.join('; ')}`)
  resetSVGDefIds()
  const view = new View(parse(compiled), { renderer: 'none', logLevel: Warn })
  try {
    return cleanSvg(await view.toSVG(), `${spec.name}-${size}`)
  } finally {
    view.finalize()
  }
}

type Datasets = Readonly<Record<string, readonly Datum[]>>

function datasetsOf(spec: ChartSpec, tables: readonly Table[], words: Words, theme: Theme, size: DrawingSize): Datasets {
  const text = JSON.stringify(spec)
  const uses = (column: string): boolean => text.includes(column)
  const { ends, panels } = layoutOf(spec)
  const made = ends === undefined ? [] : ['stack', 'ends']
  const named = [...tablesIn(spec).filter((name) => !made.includes(name)), ...(ends ? ['mix'] : []), ...(panels ? [panels.table] : [])]
  const read = Object.fromEntries([...new Set(named)].map((name) => {
    const table = tables.find((candidate) => candidate.name === name)
    if (table === undefined) throw new Error(`Unexpected table "${name}" in chart ${spec.name}, expected one of ${tables.map((known) => known.name).join(', ')}`)
    return [name, chartData(table, { words, theme, size, uses })]
  }))
  return ends === undefined ? read : { ...read, ...stackedShares(read.mix, ends.factor, ends.height) }
}

/** Small multiples share the drawing's width: as many beside each other as there are, up to what the chart allows. */
function withPanels(spec: ChartSpec, datasets: Datasets, width: number): ChartSpec {
  const { panels } = layoutOf(spec)
  if (panels === undefined) return { ...spec, width }
  const columns = Math.max(1, Math.min(panels.columns, new Set(datasets[panels.table].map((row) => row[panels.by])).size))
  const inner = spec.spec as { readonly [key: string]: Json }
  return { ...spec, columns, spacing: panels.gap, spec: { ...inner, width: panelWidth(panels, columns, width) } }
}

function panelWidth(panels: Panels, columns: number, width: number): number {
  return Math.floor((width - panels.axis - panels.gap * (columns - 1)) / columns)
}

/** Said also of `fit-x`, which a chart of steps asks for and gets: nothing is dropped then. */
const untrue = 'Dropping "fit-y" because spec has discrete height.'

function collector(warnings: string[]) {
  const collect = (...args: readonly unknown[]) => {
    const warning = args.join(' ')
    if (warning !== untrue) warnings.push(warning)
    return logger
  }
  const logger = {
    level: () => logger,
    error: collect,
    warn: collect,
    info: () => logger,
    debug: () => logger,
  }
  return logger
}
