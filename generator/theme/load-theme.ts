import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { parse } from 'yaml'
import { InputFault } from '../faults/fault.ts'
import { findNamed, type NamedFile } from './bounded-file.ts'
import { customProperties } from './custom-properties.ts'
import { chartThemeOf, houseLooks } from './house-looks.ts'
import { readLogo } from './logo/read-logo.ts'
import { type Palette, paletteOf, type Role } from './palette.ts'
import { paletteFaults } from './palette-faults.ts'
import { noThemeFile, readThemeFile, type ThemeFile } from './theme-file.ts'
import type { Logo, Theme, Typeface } from './theme.ts'
import { ownTypeface } from './typeface/own.ts'
import { shippedTypeface } from './typeface/shipped.ts'

const sheets = ['page.css', 'tables.css', 'figures.css', 'paper.css'] as const

/**
 * The looks of a review: the house's, and an account's in their place where it has any.
 *
 *     theme.yaml ─checked─▶ colours ─with the house's─▶ palette ─judged─▶ custom properties, looks of charts
 *                        └▶ logo, typeface ─checked, cleaned, measured─▶ what is embedded
 *
 * @param folder - of the house's theme: theme.yaml, `advances` and the style sheets
 * @param own - the account's theme.yaml
 * @throws {InputFault} with what is wrong in the account's theme, each fault with line and column
 * @throws {Error} from the file system, or naming the key of the house's own theme.yaml
 */
export async function loadTheme(folder: string, own?: NamedFile): Promise<Theme> {
  const [looks, ...css] = await Promise.all(['theme.yaml', ...sheets].map((name) => readFile(join(folder, name), 'utf8')))
  const house = houseLooks.parse(parse(looks))
  const file = own === undefined ? noThemeFile : await readThemeFile(own)
  const palette = judged(paletteOf(house.colours, file.colours), file)
  const root = own?.folder ?? ''
  const [typeface, logo] = [await typefaceOf(file, root, folder), await logoOf(file, root)]
  const { paper, cover, running } = file.entries
  return {
    css: [customProperties(palette, typeface, logo), ...css].join('\n'),
    faces: typeface.faces, advances: typeface.advances,
    chart: chartThemeOf(house, palette, typeface.family),
    paper, logo, cover, running: { head: running.head ?? null, foot: running.foot ?? null },
    files: own === undefined ? [] : await Promise.all([own, ...logoFiles(file, root), ...typefaceFiles(file, root)].map(findNamed)),
  }
}

function judged(palette: Palette, file: ThemeFile): Palette {
  const placeOf = (role: Role): string => file.placeOf(['colours', role])
  const faults = paletteFaults(palette, file.colours, placeOf)
  if (faults.length > 0) throw new InputFault(faults)
  return palette
}

async function typefaceOf(file: ThemeFile, folder: string, house: string): Promise<Typeface> {
  const { typeface } = file.entries
  if (typeof typeface === 'string') return shippedTypeface(typeface, house)
  const named = (key: FontKey, path: string): NamedFile => fontFile(file, folder, key, path)
  return ownTypeface({
    regular: named('regular', typeface.regular), semibold: typeface.semibold === undefined ? null : named('semibold', typeface.semibold), bold: named('bold', typeface.bold),
  })
}

const fontKeys = ['regular', 'semibold', 'bold'] as const
type FontKey = (typeof fontKeys)[number]

function fontFile({ placeOf }: ThemeFile, folder: string, key: FontKey, path: string): NamedFile {
  return { folder, path, place: placeOf(['typeface', key]) }
}

function typefaceFiles(file: ThemeFile, folder: string): readonly NamedFile[] {
  const { typeface } = file.entries
  if (typeof typeface === 'string') return []
  return fontKeys.flatMap((key) => (typeface[key] === undefined ? [] : [fontFile(file, folder, key, typeface[key])]))
}

async function logoOf(file: ThemeFile, folder: string): Promise<Logo | null> {
  const { logo } = file.entries
  const [named] = logoFiles(file, folder)
  return logo === undefined || named === undefined ? null : readLogo(named, logo.alt, logo.height_mm)
}

function logoFiles({ entries: { logo }, placeOf }: ThemeFile, folder: string): readonly NamedFile[] {
  return logo === undefined ? [] : [{ folder, path: logo.file, place: placeOf(['logo', 'file']) }]
}
