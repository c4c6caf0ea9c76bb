import { mkdir, readdir, readFile, writeFile } from 'node:fs/promises'
import { basename, join } from 'node:path'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import { readFacts } from './facts.ts'
import { unflattenIntake, type FlatIntake } from './flatten-intake.ts'
import { readParquet, writeParquet } from './parquet.ts'

const factsName = 'facts.json'

/** Write the intake tables into a folder, which is made: a Parquet file for each long table, and `facts.json`. The same tables give the same bytes. */
export async function writeIntake(folder: string, { numbers, facts }: FlatIntake): Promise<void> {
  await mkdir(folder)
  await writeParquet(folder, numbers)
  await writeFile(join(folder, factsName), `${JSON.stringify(facts)}\n`)
}

/**
 * Read them back, bit for bit.
 *
 * @throws {Error} where a file is missing, or is not as it was written
 */
export async function readIntakeFiles(folder: string): Promise<IntakeTables> {
  const names = (await readdir(folder)).filter((name) => name.endsWith('.parquet')).map((name) => basename(name, '.parquet')).sort()
  const facts = readFacts(await readFile(join(folder, factsName), 'utf8'))
  const numbers = []
  for (const name of names) numbers.push(await readParquet(folder, name))
  return unflattenIntake({ numbers, facts })
}
