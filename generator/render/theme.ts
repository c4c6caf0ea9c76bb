import { createRequire } from 'node:module'
import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { parse } from 'yaml'
import { z } from 'zod'

const colour = z.string().regex(/^#[0-9a-f]{6}$/)
const sizes = z.strictObject({ wide: z.number().positive(), narrow: z.number().positive() })

const chartTheme = z.strictObject({
  font: z.string(), font_size: z.number().positive(), widths: sizes, label_widths: sizes,
  ink: colour, quiet: colour, rule: colour, paper: colour,
  shares: z.array(colour).min(2),
  styles: z.record(z.string(), z.record(z.string(), z.union([z.string(), z.number()]))),
})
export type ChartTheme = z.infer<typeof chartTheme>

const advanceTable = z.strictObject({
  font: z.string(), version: z.string(), perEm: z.number(), characters: z.string(), advances: z.record(z.string(), z.array(z.number())),
})
export type AdvanceTable = z.infer<typeof advanceTable>

/** One embedded face: a static woff2 file, so that it prints as TrueType; a variable one would become Type 3. */
export interface Face {
  readonly weight: number
  /** Which characters it serves, as CSS writes it. */
  readonly range: string
  readonly woff2: Uint8Array
}

/** How a review looks: style sheets, faces, the charts' looks, and how wide the font's characters are. */
export interface Theme {
  readonly css: string
  readonly faces: readonly Face[]
  readonly chart: ChartTheme
  readonly advances: AdvanceTable
}

export type DrawingSize = 'wide' | 'narrow'

const sheets = ['page.css', 'tables.css', 'figures.css', 'paper.css'] as const
const subsets = ['latin', 'latin-ext'] as const
const weights = [400, 600, 700] as const

/**
 * Read the theme from its folder.
 *
 * @param folder - holds theme.yaml, advances.json and the style sheets
 * @throws {Error} from the file system or, naming the key, from the check of theme.yaml
 */
export async function loadTheme(folder: string): Promise<Theme> {
  const [chart, advances, ...css] = await Promise.all(['theme.yaml', 'advances.json', ...sheets].map((name) => readFile(join(folder, name), 'utf8')))
  return {
    css: css.join('\n'),
    faces: await readFaces(),
    chart: chartTheme.parse(parse(chart)),
    advances: advanceTable.parse(JSON.parse(advances)),
  }
}

async function readFaces(): Promise<readonly Face[]> {
  const find = createRequire(import.meta.url)
  const ranges = z.record(z.string(), z.string()).parse(JSON.parse(await readFile(find.resolve('@fontsource/source-sans-3/unicode.json'), 'utf8')))
  return Promise.all(weights.flatMap((weight) => subsets.map(async (subset) => ({
    weight,
    range: ranges[subset],
    woff2: await readFile(find.resolve(`@fontsource/source-sans-3/files/source-sans-3-${subset}-${weight}-normal.woff2`)),
  }))))
}
