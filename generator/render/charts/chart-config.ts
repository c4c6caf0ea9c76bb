import type { Config } from 'vega-lite'
import type { ChartTheme } from '../../theme/theme.ts'

/** The theme as Vega-Lite's configuration: one place for fonts, axes and named looks, so that specifications hold none. */
export function chartConfig(theme: ChartTheme): Config {
  const text = { font: theme.font, fontSize: theme.font_size }
  const axis = {
    labelFont: theme.font, labelFontSize: theme.font_size, labelColor: theme.quiet, labelFontWeight: 400, labelPadding: 5,
    titleFont: theme.font, titleFontSize: theme.font_size, titleColor: theme.quiet, titleFontWeight: 400,
    gridColor: theme.rule, gridWidth: 0.8, tickColor: theme.rule, domain: false, ticks: false,
  } as const
  return {
    background: 'transparent', font: theme.font, padding: 0,
    view: { stroke: null },
    axis,
    axisX: { grid: false, ticks: true, tickSize: 4, domain: true, domainColor: theme.quiet, tickColor: theme.quiet, labelFlush: false },
    axisXQuantitative: { tickCount: { signal: 'ceil(width / 80)' } },
    axisY: { grid: true, titleAngle: 0, titleAlign: 'left', titleAnchor: 'end', titleBaseline: 'bottom', titleX: 0, titleY: -9 },
    header: {
      labelFont: theme.font, labelFontSize: theme.font_size, labelFontWeight: 600, labelColor: theme.ink, labelAnchor: 'start', labelAlign: 'left',
      labelOrient: 'top', labelPadding: 4, title: null,
    },
    legend: { labelFont: theme.font, labelFontSize: theme.font_size, labelColor: theme.ink, title: null, symbolStrokeWidth: 2, orient: 'top', direction: 'horizontal', offset: 8, padding: 0 },
    text: { ...text, color: theme.ink, lineBreak: '\n', lineHeight: theme.font_size * 1.12 },
    facet: { spacing: 20 },
    range: { ramp: [...theme.shares], category: [...theme.series] },
    style: theme.styles,
    rule: { color: theme.ink }, boxplot: { box: { color: theme.accent } }, errorband: { band: { color: theme.accent } },
    area: { opacity: 1 }, bar: { opacity: 1 }, point: { opacity: 1 }, rect: { opacity: 1 }, tick: { opacity: 1 },
    mark: { color: theme.accent, invalid: 'break-paths-show-path-domains' },
  }
}
