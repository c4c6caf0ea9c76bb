/**
 * Intake of 5,000,000 posts from CSV against DuckDB's own time to group the same file, and the heap it takes.
 *
 *   npx tsx test/bench/intake.ts [POSTS] [THREADS]
 *
 * Two groupings are timed: by week, venue and topic with count and mean; and the same with the columns of a cell table
 * (distinct authors and variance besides), which is what intake yields at the least. Both are the plain SQL that anyone
 * would write, the types of the columns found by DuckDB itself, on as many threads as intake has. All are run in turn, a
 * few times over, and the best of each counts; processor time is shown beside the wall clock, since on a machine that does
 * other work only the former compares.
 */
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { DuckDBInstance, quotedString } from '@duckdb/node-api'
import { readAccount } from '../../generator/account/read-account.ts'
import { readIntake } from '../../generator/intake/read-intake.ts'

const accountFile = `account: bench
brand: Skerrow Ferries
time_zone: Europe/Lisbon
mentions:
  - files: posts.csv
    columns: { id: ref, posted_at: published, venue: source, author: handle, score: tone, topic: theme }
    score: { labels: { negative: -1, neutral: 0, positive: 1 } }
`

interface Timed {
  readonly wall: number
  readonly processor: number
}

async function timed(work: () => Promise<unknown>): Promise<Timed> {
  const [start, used] = [performance.now(), process.cpuUsage()]
  await work()
  const { user, system } = process.cpuUsage(used)
  return { wall: (performance.now() - start) / 1000, processor: (user + system) / 1e6 }
}

async function inDatabase(threads: number | undefined, use: (run: (sql: string) => Promise<unknown>) => Promise<void>): Promise<void> {
  const instance = await DuckDBInstance.create(':memory:', threads === undefined ? {} : { threads: String(threads) })
  const connection = await instance.connect()
  await use((sql) => connection.runAndReadAll(sql))
  connection.closeSync()
  instance.closeSync()
}

/** Three years of posts; handles with a long tail: few post often, most once or twice. One thread, so that the seed tells. */
async function writePosts(file: string, posts: number): Promise<void> {
  await inDatabase(1, async (run) => {
    await run('SELECT setseed(0.5)')
    await run(`COPY (SELECT 'p' || i AS ref, strftime(TIMESTAMP '2023-01-02' + to_microseconds((random() * 1092 * 86400e6)::BIGINT), '%Y-%m-%dT%H:%M:%S') AS published,
      (['forum', 'micro', 'blog', 'reviews', 'video'])[1 + floor(random() * 5)::INT] AS source, 'h' || (power(random(), 3) * ${posts * 0.16})::INT AS handle,
      (['negative', 'neutral', 'positive'])[1 + floor(random() * 3)::INT] AS tone,
      (['fares', 'punctuality', 'staff', 'booking', 'onboard', 'weather'])[1 + floor(random() * 6)::INT] AS theme FROM range(${posts}) t(i)) TO ${quotedString(file)} (HEADER)`)
  })
}

const score = "CASE tone WHEN 'negative' THEN -1 WHEN 'positive' THEN 1 ELSE 0 END"
const groupings = [
  { name: 'group: count, mean', columns: `count(*), avg(${score})` },
  { name: 'group: cell table', columns: `count(*), count(DISTINCT handle), avg(${score}), var_samp(${score})` },
]

const rounds = 3
const best = (times: readonly Timed[]): Timed => ({ wall: Math.min(...times.map(({ wall }) => wall)), processor: Math.min(...times.map(({ processor }) => processor)) })

async function main(posts: number, threads: number | undefined): Promise<void> {
  const folder = await mkdtemp(path.join(tmpdir(), 'tareline-bench-'))
  try {
    const file = path.join(folder, 'posts.csv')
    await writePosts(file, posts)
    await writeFile(path.join(folder, 'account.yaml'), accountFile)
    const account = await readAccount(folder)
    let heap = 0
    const grouped: Timed[][] = groupings.map(() => [])
    const read: Timed[] = []
    for (let round = 0; round < rounds; round++) {
      for (const [index, { columns }] of groupings.entries()) {
        await inDatabase(threads, async (run) => {
          const sql = `SELECT date_trunc('week', published), source, theme, ${columns} FROM read_csv(${quotedString(file)}) GROUP BY ALL`
          grouped[index]!.push(await timed(() => run(sql)))
        })
      }
      const watch = setInterval(() => { heap = Math.max(heap, process.memoryUsage().heapUsed) }, 20)
      read.push(await timed(() => readIntake(account, { threads })))
      clearInterval(watch)
    }
    const intake = best(read)
    const line = (name: string, { wall, processor }: Timed): string => `${name.padEnd(22)}${wall.toFixed(2).padStart(7)} s  processor ${processor.toFixed(2).padStart(6)} s`
    console.log(`${posts} posts, best of ${rounds} rounds`)
    for (const [index, { name }] of groupings.entries()) {
      const own = best(grouped[index]!)
      console.log(`${line(name, own)}  intake takes ${(intake.wall / own.wall).toFixed(1)} times as long (processor ${(intake.processor / own.processor).toFixed(1)})`)
    }
    console.log(`${line('intake', intake)}  heap at most ${(heap / 1e6).toFixed(0)} MB`)
  } finally {
    await rm(folder, { recursive: true, force: true })
  }
}

await main(Number(process.argv[2] ?? 5_000_000), process.argv[3] === undefined ? undefined : Number(process.argv[3]))
