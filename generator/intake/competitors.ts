import type { CompetitorBrand, CompetitorTables } from '../../model/competitors/competitor-tables.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import type { Account } from '../account/account.ts'
import type { Database } from './database.ts'
import { spanOfFate, type Dated } from './dated-mentions.ts'
import type { NoLabels } from '../../model/intake/intake-tables.ts'
import type { LabelSet } from './labels.ts'
import { levelNames } from './level-names.ts'
import { settleMentions } from './read-mentions.ts'
import { competitorFate } from './scan-mentions.ts'
import type { Spellings } from './spellings.ts'
import { tablesOf } from './tables.ts'

/** What the intake of the brand itself leaves behind for its competitors. */
export interface AfterBrand {
  /** The time zone's clocks, over all rows. */
  readonly zone: Dated['zone']
  readonly spellings: Spellings
  readonly labels: LabelSet | NoLabels | null
  readonly progress: (message: string) => void
}

/**
 * The competitors' tables, out of the rows of `scanned` that name them: settled, classed and grouped as the brand's own, each brand by itself. Files are
 * not read again. The period under review and the base are the brand's; nothing is counted that only the brand's own review tells.
 *
 * @param tables - of the brand itself
 */
export async function readCompetitors(database: Database, account: Account, tables: IntakeTables, after: AfterBrand): Promise<CompetitorTables | null> {
  if (account.competitors.length === 0) return null
  const brands: CompetitorBrand[] = []
  for (const [index, brand] of account.competitors.entries()) {
    after.progress(`Counting mentions of ${brand}`)
    brands.push({ brand, tables: await tablesOfFate(database, account, competitorFate(index), tables, after) })
  }
  const telling = account.mentions.filter((source) => source.kind === 'mentions' && source.columns['brand'] !== undefined).length
  return { told: telling === 0 ? 'none' : telling < account.mentions.length ? 'some' : 'all', brands }
}

async function tablesOfFate(
  database: Database, account: Account, fate: number, { timeline: { review, base } }: IntakeTables, { zone, spellings, labels, progress }: AfterBrand,
): Promise<IntakeTables | null> {
  await clearSettled(database)
  const span = await spanOfFate(database, zone, fate)
  if (span === null) return null
  const dated: Dated = { zone, span, nonexistent: 0, doubled: 0 }
  const names = levelNames(account)
  const settled = await settleMentions(database, account, dated, {
    fate, review, hindsightFrom: null, naming: { spellings, levelOf: names.levelOf, traits: [] }, labels: typeof labels === 'string' ? null : labels, margins: [], progress,
  })
  if (settled.grouped === null) return null
  const [rows] = await database.rows<{ rows: bigint }>(`SELECT count(*) AS rows FROM scanned WHERE fate = ${fate}`)
  // what the target mix names is of the brand: a competitor need not have it
  return tablesOf({ ...account, base, targetMix: [] }, {
    review, received: Number(rows!.rows), unread: [], rejected: {}, dated, settled, unmapped: names.unmapped(), ready: [], readyAfter: 0, inputs: [], labels, margins: [],
  })
}

/** Take away what the brand before was settled in: everything but `scanned`. */
async function clearSettled(database: Database): Promise<void> {
  const views = await database.rows<{ name: string }>('SELECT view_name AS name FROM duckdb_views() WHERE temporary AND NOT internal ORDER BY view_name DESC')
  // `mention` reads `kept`: a view goes before what it reads, though nothing minds
  for (const { name } of views) await database.run(`DROP VIEW ${name}`)
  const tables = await database.rows<{ name: string }>("SELECT table_name AS name FROM duckdb_tables() WHERE temporary AND table_name <> 'scanned' ORDER BY table_name")
  for (const { name } of tables) await database.run(`DROP TABLE ${name}`)
}
