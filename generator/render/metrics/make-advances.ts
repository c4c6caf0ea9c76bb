import { readFileSync, writeFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { openSync, type Font } from 'fontkit'

/**
 * Writes templates/theme/advances.json: how far each character of the embedded faces moves the pen. Run it again when the font's version changes:
 * `npx tsx generator/render/metrics/make-advances.ts`. Charts are laid out on a server without any font; without this table labels are
 * measured 73 % too wide on average.
 */
const weights = [400, 600, 700] as const
const subsets = ['latin', 'latin-ext'] as const
const characters = [...span(0x20, 0x7e), ...span(0xa0, 0x17f), ...span(0x2010, 0x2026), 0x202f, 0x20ac, 0x2212]

function span(first: number, last: number): number[] {
  return Array.from({ length: last - first + 1 }, (_, index) => first + index)
}

function face(weight: number, subset: string): Font {
  const path = createRequire(import.meta.url).resolve(`@fontsource/source-sans-3/files/source-sans-3-${subset}-${weight}-normal.woff2`)
  const font = openSync(path)
  if (!('unitsPerEm' in font)) throw new Error(`Unexpected collection in ${path}, expected one face`)
  return font
}

function advances(weight: number): number[] {
  const faces = subsets.map((subset) => face(weight, subset))
  return characters.map((character) => {
    const owner = faces.find((font) => font.hasGlyphForCodePoint(character))
    return owner === undefined ? 0 : Math.round((owner.glyphForCodePoint(character).advanceWidth / owner.unitsPerEm) * 1000)
  })
}

const manifest = createRequire(import.meta.url).resolve('@fontsource/source-sans-3/package.json')
const { version } = JSON.parse(readFileSync(manifest, 'utf8')) as { readonly version: string }
writeFileSync(new URL('../../../templates/theme/advances.json', import.meta.url), `${JSON.stringify({
  font: 'Source Sans 3', version, perEm: 1000, characters: String.fromCodePoint(...characters),
  advances: Object.fromEntries(weights.map((weight) => [weight, advances(weight)])),
})}\n`)
