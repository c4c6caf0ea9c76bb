import { mkdir, readFile, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { z } from 'zod'
import type { CompetitorBrand, CompetitorTables } from '../../model/competitors/competitor-tables.ts'
import { flattenIntake } from './flatten-intake.ts'
import { readIntakeFiles, writeIntake } from './intake-files.ts'

/** Beside the brand's own tables: `competitors/brands.json` has the names, which are no names of files, and folders 1, 2, ... the tables. */
const inside = 'competitors'
const listName = 'brands.json'

const listSchema = z.strictObject({
  told: z.enum(['all', 'some', 'none']),
  /** `tables`: whether the competitor's folder, numbered by its place in this list, is there. */
  brands: z.array(z.strictObject({ brand: z.string(), tables: z.boolean() })),
})

/**
 * Write the competitors' tables into the folder of the intake tables; nothing where the account gives none.
 *
 * @param folder - of the brand's own tables, which is there
 */
export async function writeCompetitors(folder: string, competitors: CompetitorTables | null): Promise<void> {
  if (competitors === null) return
  const { told, brands } = competitors
  await mkdir(join(folder, inside))
  for (const [index, { tables }] of brands.entries()) if (tables !== null) await writeIntake(folderOf(folder, index), flattenIntake(tables))
  const list: z.infer<typeof listSchema> = { told, brands: brands.map(({ brand, tables }) => ({ brand, tables: tables !== null })) }
  await writeFile(join(folder, inside, listName), `${JSON.stringify(list)}\n`)
}

/**
 * Read them back, bit for bit.
 *
 * @returns null where none were written
 * @throws {Error} where a file is missing, or is not as it was written
 */
export async function readCompetitorFiles(folder: string): Promise<CompetitorTables | null> {
  const text = await readFile(join(folder, inside, listName), 'utf8').catch((error: NodeJS.ErrnoException) => {
    if (error.code === 'ENOENT') return null
    throw error
  })
  if (text === null) return null
  const { told, brands } = listSchema.parse(JSON.parse(text))
  const read: CompetitorBrand[] = []
  for (const [index, { brand, tables }] of brands.entries()) read.push({ brand, tables: tables ? await readIntakeFiles(folderOf(folder, index)) : null })
  return { told, brands: read }
}

function folderOf(folder: string, index: number): string {
  return join(folder, inside, String(index + 1))
}
