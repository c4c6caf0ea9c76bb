import { Error as ErrorsOnly, parse, randomLCG, resetSVGDefIds, setRandom, View } from 'vega'
import { expressionInterpreter } from 'vega-interpreter'
import type { Loader } from 'vega'
import { compile, type Config } from 'vega-lite'
import { faultOf } from '../../faults/catalogue.ts'
import { InputFault } from '../../faults/fault.ts'
import { drawEach, type Drawings } from '../drawings.ts'
import type { Table } from '../../tables/table.ts'
import type { Words } from '../../words/words.ts'
import type { DrawingSize, Theme } from '../../theme/theme.ts'
import { chartConfig } from './chart-config.ts'
import { chartData, type Datum } from './chart-data.ts'
import { vegaLocale } from './chart-locale.ts'
import { asVegaLite, atSize, type ChartSpec, type Json, layoutOf, ownPlace, type Panels, tablesIn, worded } from './chart-spec.ts'
import { cleanSvg } from './clean-svg.ts'
import { requirePlain } from './plain-svg.ts'
import { stackedShares } from './stack-ends.ts'
import { withStacked } from './stacked-panels.ts'
import { measureBy } from './text-metrics.ts'

/**
 * Draw a chart as static SVG:
 *
 *     specification ─at size─▶ ─worded─▶ ─with data─▶ vega-lite ─▶ vega ─▶ SVG ─cleaned─▶
 *
 * The same specification, tables, words and theme give the same bytes, in any time zone. Expressions are interpreted, never made into code; nothing
 * is loaded from anywhere; what is drawn holds nothing but plain shapes and text.
 *
 * @param spec - a specification of templates/charts, or of an account
 * @param size - for the page and paper, or for a phone
 * @param drawings - where the same picture may have been drawn before
 * @throws {Error} an unknown table or message, or whatever Vega-Lite warns of: a picture that is not as specified must not pass
 * @throws {InputFault} `chart-undrawable`: the same of a chart that is an account's own
 */
export async function drawChart(spec: ChartSpec, tables: readonly Table[], words: Words, theme: Theme, size: DrawingSize = 'wide', drawings: Drawings = drawEach): Promise<string> {
  try {
    return await draw(spec, tables, words, theme, size, drawings)
  } catch (error) {
    const place = spec[ownPlace]
    throw place === undefined ? error : new InputFault([faultOf('chart-undrawable', place, { reason: error instanceof Error ? error.message : String(error) })])
  }
}

async function draw(spec: ChartSpec, tables: readonly Table[], words: Words, theme: Theme, size: DrawingSize, drawings: Drawings): Promise<string> {
  const sized = worded(atSize(spec, size), words) as unknown as ChartSpec
  const read = readTables(sized, tables, words, theme, size)
  const { spec: roomy, datasets } = withStack(withRoom(laidOut(sized, read, theme, size), read), read)
  const config = { ...chartConfig(theme.chart), locale: vegaLocale(words.locale) }
  const whole = { ...roomy, datasets: datasets as unknown as Json }
  return drawings.remember(JSON.stringify([whole, config, theme.advances, size]), () => drawWhole(whole, config, theme, size))
}

async function drawWhole(whole: ChartSpec, config: Config, theme: Theme, size: DrawingSize): Promise<string> {
  const [warnings, errors]: [string[], string[]] = [[], []]
  measureBy(theme.advances)
  // a name would stand before that of every scale, and expressions call them as they are known
  const { name, ...nameless } = whole
  const { spec: compiled } = compile(asVegaLite(nameless), { config, logger: collector(warnings, warnings) })
  if (warnings.length > 0) throw new Error(`Unexpected warning while drawing chart ${name}: ${warnings.join('; ')}`)
  resetSVGDefIds()
  setRandom(randomLCG(1))
  // a layer without rows, such as labels' leaders where none had to move, has no extent, and vega would warn of it
  const options = { renderer: 'none', logLevel: ErrorsOnly, logger: collector(errors, []), loader: noLoader, expr: expressionInterpreter } as const
  const view = new View(parse(compiled, undefined, { ast: true }), options)
  try {
    const svg = await view.toSVG()
    if (errors.length > 0) throw new Error(`Unexpected error while drawing chart ${name}: ${errors.join('; ')}`)
    return cleanSvg(requirePlain(svg), `${name}-${size}`)
  } finally {
    view.finalize()
  }
}

/** Loads nothing, whatever is asked. */
const noLoader: Loader = { load: refuse, sanitize: refuse, http: refuse, file: refuse }

function refuse(address: string): Promise<never> {
  return Promise.reject(new Error(`Unexpected address ${address}, expected a table of the findings`))
}

type Datasets = Readonly<Record<string, readonly Datum[]>>

function readTables(spec: ChartSpec, tables: readonly Table[], words: Words, theme: Theme, size: DrawingSize): Datasets {
  const text = JSON.stringify(spec)
  const uses = (column: string): boolean => text.includes(column)
  const { ends, panels } = layoutOf(spec)
  const made = ends === undefined ? [] : ['stack', 'ends']
  const named = [...tablesIn(spec).filter((name) => !made.includes(name)), ...(ends ? ['mix'] : []), ...(panels ? [panels.table] : [])]
  return Object.fromEntries([...new Set(named)].map((name) => {
    const table = tables.find((candidate) => candidate.name === name)
    if (table === undefined) throw new Error(`Unexpected table "${name}" in chart ${spec.name}, expected one of ${tables.map((known) => known.name).join(', ')}`)
    return [name, chartData(table, { words, theme, size, uses })]
  }))
}

function laidOut(spec: ChartSpec, datasets: Datasets, theme: Theme, size: DrawingSize): ChartSpec {
  const { stacked, width = theme.chart.widths[size] } = layoutOf(spec)
  return stacked === undefined ? withPanels(spec, datasets, width) : withStacked(spec, datasets, width, theme)
}

/** A stack of shares gets its data, and the height that its labels need. */
function withStack(spec: ChartSpec, datasets: Datasets): { readonly spec: ChartSpec, readonly datasets: Datasets } {
  const { ends } = layoutOf(spec)
  if (ends === undefined) return { spec, datasets }
  const { stack, ends: labels, height } = stackedShares(datasets.mix, ends.factor, ends.height)
  return { spec: { ...spec, height }, datasets: { ...datasets, stack, ends: labels } }
}

/** A chart of rows gets rows high enough for the label with the most lines. */
function withRoom(spec: ChartSpec, datasets: Datasets): ChartSpec {
  const { height } = spec
  if (typeof height !== 'object' || height === null || !('step' in height)) return spec
  const labels = Object.values(datasets).flat().flatMap((row) => Object.values(row)).filter((cell) => typeof cell === 'string')
  const lines = Math.max(1, ...labels.map((label) => label.split('\n').length))
  return { ...spec, height: { step: Math.max(Number(height.step), lines * 14 + 8) } }
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

function collector(errors: string[], warnings: string[]) {
  const into = (list: string[]) => (...args: readonly unknown[]) => {
    const told = args.join(' ')
    if (told !== untrue) list.push(told)
    return logger
  }
  const logger = {
    level: () => logger,
    error: into(errors),
    warn: into(warnings),
    info: () => logger,
    debug: () => logger,
  }
  return logger
}
