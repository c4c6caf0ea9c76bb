import { readFileSync, writeFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { openSync, type Font } from 'fontkit'
import { shipped, shippedNames, shippedSubsets, shippedWeights, type ShippedName } from '../typeface/shipped.ts'
import { advanceTable } from './advances.ts'

/**
 * Writes templates/theme/advances/NAME.json: how far each character of the shipped faces moves the pen. Run it again when a font's version changes:
 * `npx tsx generator/theme/metrics/make-advances.ts`. Charts are laid out on a server without any font; without these tables labels are
 * measured 73 % too wide on average.
 */
for (const name of shippedNames) {
  const { version } = JSON.parse(readFileSync(createRequire(import.meta.url).resolve(`@fontsource/${name}/package.json`), 'utf8')) as { readonly version: string }
  const table = advanceTable(Object.fromEntries(shippedWeights.map((weight) => [weight, shippedSubsets.map((subset) => face(name, weight, subset))])))
  writeFileSync(new URL(`../../../templates/theme/advances/${name}.json`, import.meta.url), `${JSON.stringify({ font: shipped[name].family, version, ...table })}\n`)
}

function face(name: ShippedName, weight: number, subset: string): Font {
  const path = createRequire(import.meta.url).resolve(`@fontsource/${name}/files/${name}-${subset}-${weight}-normal.woff2`)
  const font = openSync(path)
  if (!('unitsPerEm' in font)) throw new Error(`Unexpected collection in ${path}, expected one face`)
  return font
}
