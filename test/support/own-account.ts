import { mkdirSync, mkdtempSync, realpathSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { compose, requireSound } from '../../generator/compose/compose.ts'
import type { Document } from '../../generator/compose/document.ts'
import { loadTemplate } from '../../generator/compose/load-template.ts'
import { isRead, readOwnFile } from '../../generator/compose/own-file.ts'
import { InputFault } from '../../generator/faults/fault.ts'
import type { Fault } from '../../generator/faults/fault.ts'
import { ownPlace } from '../../generator/render/charts/chart-spec.ts'
import { loadOwnCharts } from '../../generator/render/load-charts.ts'
import { tablesOf } from '../../generator/tables/tables-of.ts'
import { loadWords } from '../../generator/words/load-words.ts'
import { houseCharts } from './house-composition.ts'
import { templatesFolder } from './house-words.ts'
import { sampleFindings } from './sample-findings.ts'

type Files = Readonly<Record<string, string>>

/** A folder with files of an account, for as long as `use` takes. */
async function withAccount<T>(files: Files, use: (folder: string) => Promise<T>): Promise<T> {
  const folder = realpathSync(mkdtempSync(join(tmpdir(), 'own-')))
  try {
    for (const [path, text] of Object.entries(files)) {
      mkdirSync(dirname(join(folder, path)), { recursive: true })
      writeFileSync(join(folder, path), text)
    }
    return await use(folder)
  } finally {
    rmSync(folder, { recursive: true })
  }
}

const findings = sampleFindings()
const tables = tablesOf(findings)

/** Compose what stands in an account folder, for the sample findings. */
async function composeFolder(folder: string, notes: string | null = 'notes'): Promise<Document> {
  const ownWords = await readOwnFile(folder, 'words.yaml')
  const words = await loadWords(`${templatesFolder}/words`, 'en-GB', isRead(ownWords) ? ownWords : undefined)
  const own = { folder, template: 'template.md', notes, reporting: 'month' as const }
  const [template, charts] = [await loadTemplate(templatesFolder, own), await loadOwnCharts(own, { tables, words })]
  const ownCharts = new Map([...charts].map(([name, chart]) => [name, chart[ownPlace] ?? name]))
  const composition = { template, words, findings, tables, charts: [...houseCharts, ...charts.keys()], ownCharts }
  requireSound(composition)
  return compose(composition)
}

export async function composeFiles(files: Files): Promise<Document> {
  return withAccount(files, (folder) => composeFolder(folder))
}

/** What is wrong with the files of an account: code and place of each fault, and the fault. */
export async function faultsOf(files: Files, prepare: (folder: string) => void = () => undefined): Promise<readonly Fault[]> {
  return withAccount(files, async (folder) => {
    prepare(folder)
    try {
      await composeFolder(folder)
    } catch (error) {
      if (error instanceof InputFault) return error.faults
      throw error
    }
    return []
  })
}
