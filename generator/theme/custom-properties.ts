import { bytesOf } from './colour/srgb.ts'
import { type Palette, roles } from './palette.ts'
import type { Logo, Typeface } from './theme.ts'

/** What the style sheets ask of a theme, as custom properties. */
export function customProperties(palette: Palette, { family, generic }: Pick<Typeface, 'family' | 'generic'>, logo: Logo | null): string {
  const colours = roles.map((role) => `--${role.replaceAll('_', '-')}: ${palette[role]};`)
  const others = [`--shade: rgb(${bytesOf(palette.ink).join(' ')} / 30%);`, `--typeface: "${family}", ${generic};`, ...(logo === null ? [] : [`--logo: ${logo.heightMm}mm;`])]
  return `:root { ${[...colours, ...others].join(' ')} }`
}
