import type { Theme } from '../../theme/theme.ts'
import type { Datum } from './chart-data.ts'
import { type ChartSpec, isObject, type Json, type JsonObject, layoutOf, mergePatch } from './chart-spec.ts'
import { textWidth } from './text-metrics.ts'

type Datasets = Readonly<Record<string, readonly Datum[]>>

/** Between the end of a line and its label, px. */
const beforeLabel = 8

/**
 * Panels below each other on one axis of time: those that have rows, all of one width, dates written below the last one only.
 *
 * @param width - of the whole drawing, px
 * @returns the specification as it was where it asks for no such panels
 */
export function withStacked(spec: ChartSpec, datasets: Datasets, width: number, theme: Theme): ChartSpec {
  const { stacked } = layoutOf(spec)
  if (stacked === undefined || !Array.isArray(spec.vconcat)) return spec
  const room = Math.max(0, ...stacked.labels.map((label) => beforeLabel + textWidth(label, { fontSize: theme.chart.font_size, fontWeight: 600 }, theme.advances)))
  const drawn = (spec.vconcat as readonly Json[]).filter(isObject).filter((panel) => rowsOf(panel, datasets) > 0)
  const panels = drawn.length === 1 && stacked.alone !== undefined ? drawn.map((panel) => ({ ...panel, height: stacked.alone as Json })) : drawn
  return {
    ...spec, spacing: stacked.gap, bounds: 'flush', resolve: { scale: { x: 'shared' } },
    vconcat: panels.map((panel, at) => mergePatch({ ...panel, width: Math.floor(width - stacked.axis - room) }, at === panels.length - 1 ? {} : datesUnwritten)),
  }
}

const datesUnwritten: JsonObject = { encoding: { x: { axis: { labels: false, ticks: false } } } }

/** Rows of the table that a panel is drawn from. */
function rowsOf({ data }: JsonObject, datasets: Datasets): number {
  return isObject(data) && typeof data.name === 'string' ? datasets[data.name]?.length ?? 0 : 0
}
