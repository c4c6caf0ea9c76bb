import { DuckDBDataChunk, DuckDBInstance, DOUBLE, INTEGER, quotedIdentifier, quotedString, type DuckDBConnection } from '@duckdb/node-api'
import { join } from 'node:path'
import { rowsOf, type NumberTable } from './number-table.ts'

/** Rows that the database takes at once. */
const chunkRows = 2048

/** Write tables of numbers as NAME.parquet into a folder that is there: the same tables give the same bytes. */
export async function writeParquet(folder: string, tables: readonly NumberTable[]): Promise<void> {
  await withDatabase(async (connection) => {
    for (const table of tables) {
      await fill(connection, table)
      await connection.run(`COPY ${quotedIdentifier(table.name)} TO ${quotedString(join(folder, `${table.name}.parquet`))} (FORMAT parquet, COMPRESSION zstd)`)
    }
  })
}

/**
 * Read one back.
 *
 * @throws {Error} where the file is no Parquet, or holds anything but numbers
 */
export async function readParquet(folder: string, name: string): Promise<NumberTable> {
  return withDatabase(async (connection) => {
    const reader = await connection.runAndReadAll(`FROM read_parquet(${quotedString(join(folder, `${name}.parquet`))})`)
    // a table without rows has no columns there
    const columns: readonly (readonly unknown[])[] = reader.getColumnsJS()
    return {
      name,
      columns: Object.fromEntries(reader.columnNames().map((column, i) => [column, {
        kind: reader.columnType(i) === INTEGER ? 'whole' as const : 'real' as const,
        values: Float64Array.from(columns.at(i) ?? [], (value) => numberIn(value, `${name}.parquet ${column}`)),
      }])),
    }
  })
}

function numberIn(value: unknown, place: string): number {
  if (typeof value !== 'number') throw new Error(`Unexpected ${typeof value} in ${place}, expected numbers`)
  return value
}

async function fill(connection: DuckDBConnection, table: NumberTable): Promise<void> {
  const entries = Object.entries(table.columns)
  const types = entries.map(([, { kind }]) => (kind === 'whole' ? INTEGER : DOUBLE))
  await connection.run(`CREATE TABLE ${quotedIdentifier(table.name)} (${entries.map(([name], i) => `${quotedIdentifier(name)} ${types[i].toString()}`).join(', ')})`)
  const appender = await connection.createAppender(table.name)
  for (let from = 0, rows = rowsOf(table); from < rows; from += chunkRows) {
    const chunk = DuckDBDataChunk.create(types)
    chunk.setColumns(entries.map(([, { values }]) => Array.from({ length: Math.min(chunkRows, rows - from) }, (_, i) => values[from + i])))
    appender.appendDataChunk(chunk)
  }
  appender.closeSync()
}

/** One thread, so that rows keep their order and bytes are the same. */
async function withDatabase<T>(work: (connection: DuckDBConnection) => Promise<T>): Promise<T> {
  const instance = await DuckDBInstance.create(':memory:', { threads: '1' })
  const connection = await instance.connect()
  try {
    for (const setting of ['autoinstall_known_extensions = false', 'autoload_known_extensions = false']) await connection.run(`SET ${setting}`)
    return await work(connection)
  } finally {
    connection.closeSync()
    instance.closeSync()
  }
}
