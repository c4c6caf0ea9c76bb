import { z } from 'zod'
import { type Palette, roles } from './palette.ts'
import type { ChartTheme } from './theme.ts'

const colour = z.string().regex(/^#[0-9a-f]{6}$/)
const sizes = z.strictObject({ wide: z.number().positive(), narrow: z.number().positive() })
const role = z.enum(roles)

/** The house's theme.yaml: colours by role, and the looks of charts, which name roles and no colours. */
export const houseLooks = z.strictObject({
  colours: z.record(role, colour),
  font_size: z.number().positive(),
  widths: sizes,
  label_widths: sizes,
  shares: z.array(role).min(2),
  series: z.array(role).min(2),
  styles: z.record(z.string(), z.strictObject({ color: role.optional(), stroke: role.optional() }).catchall(z.union([z.string(), z.number()]))),
})
export type HouseLooks = z.infer<typeof houseLooks>

/** The looks of charts in the colours of a palette. */
export function chartThemeOf(looks: HouseLooks, palette: Palette, font: string): ChartTheme {
  const { ink, quiet, rule, paper, accent } = palette
  const coloured = ({ color, stroke, ...rest }: HouseLooks['styles'][string]) => ({
    ...(color === undefined ? {} : { color: palette[color] }), ...(stroke === undefined ? {} : { stroke: palette[stroke] }), ...rest,
  })
  return {
    font, font_size: looks.font_size, widths: looks.widths, label_widths: looks.label_widths, ink, quiet, rule, paper, accent,
    shares: looks.shares.map((name) => palette[name]),
    series: looks.series.map((name) => palette[name]),
    styles: Object.fromEntries(Object.entries(looks.styles).map(([name, style]) => [name, coloured(style)])),
  }
}
