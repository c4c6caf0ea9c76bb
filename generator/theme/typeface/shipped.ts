import { readFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { join } from 'node:path'
import { z } from 'zod'
import type { Face, Typeface } from '../theme.ts'

/** The typefaces that come with the program, by the name of their package; both under the SIL Open Font Licence. */
export const shipped = {
  'source-sans-3': { family: 'Source Sans 3', generic: 'sans-serif' },
  'source-serif-4': { family: 'Source Serif 4', generic: 'serif' },
} as const satisfies Readonly<Record<string, Pick<Typeface, 'family' | 'generic'>>>

export type ShippedName = keyof typeof shipped
export const shippedNames = Object.keys(shipped) as readonly ShippedName[]
export const shippedSubsets = ['latin', 'latin-ext'] as const
export const shippedWeights = [400, 600, 700] as const

const shippedAdvances = z.strictObject({
  font: z.string(), version: z.string(), perEm: z.number(), characters: z.string(), advances: z.record(z.string(), z.array(z.number())),
})

/** @param folder - of the house's theme; holds `advances/NAME.json` */
export async function shippedTypeface(name: ShippedName, folder: string): Promise<Typeface> {
  const { perEm, characters, advances } = shippedAdvances.parse(JSON.parse(await readFile(join(folder, 'advances', `${name}.json`), 'utf8')))
  return { ...shipped[name], faces: await readFaces(name), advances: { perEm, characters, advances } }
}

async function readFaces(name: ShippedName): Promise<readonly Face[]> {
  const find = createRequire(import.meta.url)
  const ranges = z.record(z.string(), z.string()).parse(JSON.parse(await readFile(find.resolve(`@fontsource/${name}/unicode.json`), 'utf8')))
  return Promise.all(shippedWeights.flatMap((weight) => shippedSubsets.map(async (subset): Promise<Face> => ({
    weight, range: ranges[subset], form: 'woff2',
    bytes: await readFile(find.resolve(`@fontsource/${name}/files/${name}-${subset}-${weight}-normal.woff2`)),
  }))))
}
