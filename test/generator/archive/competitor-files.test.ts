import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, expect, test } from 'vitest'
import { readCompetitorFiles, writeCompetitors } from '../../../generator/archive/competitor-files.ts'
import type { CompetitorTables } from '../../../model/competitors/competitor-tables.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

let folder: string
beforeEach(async () => { folder = await mkdtemp(join(tmpdir(), 'tareline-competitors-')) })
afterEach(() => rm(folder, { recursive: true }))

const tablesWith = (seed: number) => simulateCells({
  steps: 9, venues: 2, topics: 2, posters: 2, mentionsPerStep: 40, sigmas: { mu: 0.02, venueDrift: [0.01, 0.02], venue: 0.2, topic: 0.2, poster: 0.1, tau: 0.03 },
}, createGenerator(seed, 0)).tables

// names are no one's to trust
const competitors: CompetitorTables = {
  told: 'all', brands: [{ brand: '../../escape', tables: tablesWith(1) }, { brand: 'Nobody', tables: null }, { brand: 'con: "Línea"\u202E\n', tables: tablesWith(2) }],
}

test('the tables of competitors come back as they were written, bit for bit, whatever the brands are called', async () => {
  await writeCompetitors(folder, competitors)
  expect(await readCompetitorFiles(folder)).toStrictEqual(competitors)
  expect((await readdir(join(folder, 'competitors'))).sort()).toEqual(['1', '3', 'brands.json'])
})

test('where the account gives none nothing is written, and null comes back', async () => {
  await writeCompetitors(folder, null)
  expect(await readdir(folder)).toEqual([])
  expect(await readCompetitorFiles(folder)).toBeNull()
})

test('a list that is not as it was written, or tables that are gone, are an error', async () => {
  await writeCompetitors(folder, competitors)
  const list = join(folder, 'competitors', 'brands.json')
  await writeFile(list, (await readFile(list, 'utf8')).replace('"all"', '"most"'))
  await expect(readCompetitorFiles(folder)).rejects.toThrow()
  await rm(join(folder, 'competitors'), { recursive: true })
  await writeCompetitors(folder, competitors)
  await rm(join(folder, 'competitors', '3'), { recursive: true })
  await expect(readCompetitorFiles(folder)).rejects.toThrow()
})
