import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import type { Account } from '../account/account.ts'
import { timeline } from '../calendar/timeline.ts'
import { dayNumber } from '../calendar/days.ts'
import { summedAuthors } from './author-counts.ts'
import { cellColumns } from './cell-columns.ts'
import { openDatabase } from './database.ts'
import { lookOver, type InputFile } from './input-file.ts'
import { factorOf, levelNames } from './level-names.ts'
import { cellsWithin, daysOf, readReadyMade } from './ready-made.ts'
import { coveredPeriod, namedPeriod } from './review-period.ts'

export interface IntakeOptions {
  /** Name of the period under review; default: the last whole one that the mentions cover. */
  readonly period?: string
  /** Folder to write `mentions.csv` into: file, line and reason of every row that could not be read. */
  readonly rejects?: string
  readonly progress?: (message: string) => void
  readonly threads?: number
}

export async function readIntake(account: Account, options: IntakeOptions = {}): Promise<IntakeTables> {
  const scratch = await mkdtemp(path.join(tmpdir(), 'tareline-intake-'))
  try {
    const files = new Map<string, InputFile>()
    for (const file of account.mentions.flatMap((source) => source.files)) {
      options.progress?.(`Looking over ${file}`)
      if (!files.has(file)) files.set(file, await lookOver(account.folder, file, scratch))
    }
    const database = await openDatabase({ readable: [...files.values()].map((file) => file.readable), scratch, threads: options.threads })
    try {
      const names = levelNames(account)
      const ready = await readReadyMade(database, account, files, names.levelOf)
      const span = daysOf(ready.parts, account.grid)!
      const review = options.period === undefined ? coveredPeriod(account, span.first, span.last) : namedPeriod(account, options.period)
      const parts = cellsWithin(ready.parts, account.grid, review)
      const factors = account.factors.map((name, index) => factorOf(account, name, parts.map((part) => part.levels[index]!)))
      const days = daysOf(parts, account.grid)!
      const axis = timeline({ ...account, firstDay: days.first, lastDay: days.last, review })
      const cells = cellColumns(parts, axis.steps.map(dayNumber), factors)
      return {
        timeline: axis, factors, cells, variation: factors[0]!.levels.map(() => null), concentration: [],
        authors: summedAuthors(cells, axis, factors),
        accounting: {
          received: ready.parts.length, rejected: 0, duplicates: 0, outOfScope: ready.parts.length - parts.length, modelled: parts.length,
          reasons: ready.parts.length > parts.length ? { 'after-period': ready.parts.length - parts.length } : {}, unmapped: names.unmapped(), inputs: [...files.values()].map(({ path: name, sha256 }) => ({ path: name, sha256, rows: ready.rows.get(name) ?? 0 })),
          withAuthor: new Float64Array(factors[0]!.levels.length), readyMade: true,
        },
      }
    } finally {
      database.close()
    }
  } finally {
    await rm(scratch, { recursive: true, force: true })
  }
}
