import { readdir, readFile } from 'node:fs/promises'
import { join } from 'node:path'
import type { ChartSpec, JsonObject } from './charts/chart-spec.ts'

/**
 * Read every chart specification of a folder.
 *
 * @returns name -> specification, sorted by name; the name is the file's
 * @throws {SyntaxError} naming the file that is no JSON
 */
export async function loadCharts(folder: string): Promise<ReadonlyMap<string, ChartSpec>> {
  const files = (await readdir(folder)).filter((file) => file.endsWith('.json')).sort()
  const specs = await Promise.all(files.map((file) => readChart(folder, file)))
  return new Map(specs.map((spec) => [spec.name, spec]))
}

async function readChart(folder: string, file: string): Promise<ChartSpec> {
  const text = await readFile(join(folder, file), 'utf8')
  try {
    return { ...JSON.parse(text) as JsonObject, name: file.replace(/\.json$/, '') }
  } catch (fault) {
    throw new SyntaxError(`Unexpected content of ${file}, expected JSON: ${fault instanceof Error ? fault.message : String(fault)}`, { cause: fault })
  }
}
