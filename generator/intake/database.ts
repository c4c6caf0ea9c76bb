import { DuckDBInstance, quotedIdentifier, quotedString, type DuckDBConnection } from '@duckdb/node-api'

/** An embedded database that reaches the given files and nothing else. */
export interface Database {
  run(sql: string): Promise<void>
  /** All rows of a small result; 64- and 128-bit integers come as bigint. */
  rows<T extends object>(sql: string): Promise<readonly T[]>
  close(): void
}

export interface DatabaseOptions {
  /** Absolute paths of the files that may be read. */
  readonly readable: readonly string[]
  /** Folder of one's own, for what does not fit into memory and for transcoded files. */
  readonly scratch: string
  readonly threads: number | undefined
}

/**
 * Open it shut: no network, no extension, no file but the named ones and the scratch folder, and no way to turn
 * that back on. Rows keep their order in the file, so that "the first row stays" means the same on every run.
 */
export async function openDatabase(options: DatabaseOptions): Promise<Database> {
  const instance = await DuckDBInstance.create(':memory:', options.threads === undefined ? {} : { threads: String(options.threads) })
  const connection = await instance.connect()
  const paths = options.readable.map(quotedString).join(', ')
  for (const setting of [
    'preserve_insertion_order = true',
    "TimeZone = 'UTC'",
    'autoinstall_known_extensions = false',
    'autoload_known_extensions = false',
    `temp_directory = ${quotedString(options.scratch)}`,
    `allowed_paths = [${paths}]`,
    `allowed_directories = [${quotedString(`${options.scratch}/`)}]`,
    'enable_external_access = false',
    'lock_configuration = true',
  ]) await connection.run(`SET ${setting}`)
  return database(instance, connection)
}

/** A name as SQL takes it, whatever it holds. */
export const identifier = (name: string): string => quotedIdentifier(name)

/** A text as SQL takes it, whatever it holds; SQL itself cannot hold a NUL. */
export const literal = (text: string): string =>
  (text.includes('\0') ? `(${text.split('\0').map(quotedString).join(' || chr(0) || ')})` : quotedString(text))

function database(instance: DuckDBInstance, connection: DuckDBConnection): Database {
  return {
    run: async (sql) => { await connection.run(sql) },
    rows: async <T extends object>(sql: string) => (await connection.runAndReadAll(sql)).getRowObjectsJS() as unknown as readonly T[],
    close: () => {
      connection.closeSync()
      instance.closeSync()
    },
  }
}
