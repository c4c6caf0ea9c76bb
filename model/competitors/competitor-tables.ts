import type { IntakeTables } from '../intake/intake-tables.ts'

/** What was read of the competitors of an account, out of the same files as the brand itself. */
export interface CompetitorTables {
  /** How many of the sources tell brands apart: of others every row is the brand's own. */
  readonly told: 'all' | 'some' | 'none'
  /** In the order of the account. */
  readonly brands: readonly CompetitorBrand[]
}

export interface CompetitorBrand {
  readonly brand: string
  /**
   * As of the brand itself, read by the same definitions over the same base and up to the same day, on its own time axis; `accounting` is of the readable rows
   * that name the competitor. null where none is left of them.
   */
  readonly tables: IntakeTables | null
}
