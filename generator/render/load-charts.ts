import { readdir, readFile } from 'node:fs/promises'
import { join, posix } from 'node:path'
import type { Account } from '../account/account.ts'
import { readOwnFolder } from '../compose/own-file.ts'
import { InputFault } from '../faults/fault.ts'
import type { Fault } from '../faults/fault.ts'
import type { ChartContext } from './charts/check-own-chart.ts'
import type { ChartSpec, JsonObject } from './charts/chart-spec.ts'
import { readOwnChart } from './charts/own-chart.ts'

export type Charts = ReadonlyMap<string, ChartSpec>

/** The largest specification of an account, bytes. */
const mostBytes = 100_000

/**
 * Read every chart specification of a folder.
 *
 * @returns name -> specification, sorted by name; the name is the file's
 * @throws {SyntaxError} naming the file that is no JSON
 */
export async function loadCharts(folder: string): Promise<Charts> {
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

/**
 * Read the charts of an account: those in the folder `charts` beside its template.
 *
 * @throws {InputFault} with everything that is wrong in them, each fault at its file and path
 */
export async function loadOwnCharts({ folder, template }: Pick<Account, 'folder' | 'template'>, context: ChartContext): Promise<Charts> {
  if (template === null) return new Map()
  const found = await readOwnFolder(folder, posix.join(posix.dirname(template), 'charts'), '.json', mostBytes)
  const [charts, faults]: [Map<string, ChartSpec>, Fault[]] = [new Map(), [...found.faults]]
  for (const [name, { place, text }] of found.files) {
    try {
      charts.set(name, readOwnChart(name, place, text, context))
    } catch (error) {
      if (!(error instanceof InputFault)) throw error
      faults.push(...error.faults)
    }
  }
  if (faults.length > 0) throw new InputFault(faults)
  return charts
}
