/**
 * Makes the data of the demo account:
 *
 *   story ──▶ posts ──▶ blemished rows ──▶ posts/*.csv.gz, reviews/*.ndjson
 *     │       └──────────────────────────▶ audit/coding.csv
 *     ├──────────────────────────────────▶ survey/tracker.csv, outcome/passengers.csv
 *     └──────────────────────────────────▶ truth.csv
 *   drivers ─────────────────────────────▶ importance/drivers.csv
 *
 *   npx tsx sample-data/make-skerrow-ferries.ts [FOLDER] [--summary]
 *
 * FOLDER is sample-data/skerrow-ferries if not given. With --summary nothing is written; the months are printed.
 */
import { mkdirSync, rmSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { argv, stdout } from 'node:process'
import { pathToFileURL } from 'node:url'
import { blemish } from './making/blemishes.ts'
import type { Row } from './making/blemishes.ts'
import { driverLines } from './making/drivers.ts'
import { exportFiles, text } from './making/export-files.ts'
import type { ExportFile } from './making/export-files.ts'
import { auditLines } from './making/hand-coding.ts'
import { outcomeLines } from './making/outcome.ts'
import { brand, writePosts } from './making/posts.ts'
import type { Post } from './making/posts.ts'
import { seededDraws } from './making/seeded-draws.ts'
import { tellStory, venues } from './making/story.ts'
import type { Week } from './making/story.ts'
import { surveyLines } from './making/survey.ts'
import { intraclass, summarise } from './making/summary.ts'

export interface Demo {
  readonly story: readonly Week[]
  /** As written, in order of time, the rival's included. */
  readonly posts: readonly Post[]
  /** As exported. */
  readonly rows: readonly Row[]
  /** Paths and bytes of everything the program writes. */
  readonly files: readonly ExportFile[]
}

/** The whole demo in memory; the same on every run. Posts, survey, outcome, audit and drivers have a stream of draws each. */
export function makeDemo(storySeed = 2070, postSeed = 4, surveySeed = 7, outcomeSeed = 1, auditSeed = 1, driverSeed = 2): Demo {
  const story = tellStory(seededDraws(storySeed))
  const draws = seededDraws(postSeed)
  const posts = writePosts(story, draws)
  const rows = blemish(posts, draws)
  const sound = rows.filter(({ flaw, post }) => flaw === 'none' && post.brand === brand).map(({ post }) => post)
  return {
    story, posts, rows,
    files: [
      ...exportFiles(rows, draws),
      { path: 'survey/tracker.csv', bytes: text(surveyLines(story, seededDraws(surveySeed))) },
      { path: 'outcome/passengers.csv', bytes: text(outcomeLines(story, seededDraws(outcomeSeed))) },
      { path: 'audit/coding.csv', bytes: text(auditLines(sound, seededDraws(auditSeed))) },
      { path: 'importance/drivers.csv', bytes: text(driverLines(seededDraws(driverSeed))) },
      { path: 'truth.csv', bytes: truthTable(story) },
    ],
  }
}

/** In points: opinion itself, and each venue's drift, for every week. */
function truthTable(story: readonly Week[]): Uint8Array {
  const rows = story.map((week) => [week.monday, points(week.opinion), ...venues.map((venue) => points(week.drift[venue]))].join(','))
  return text([['week', 'opinion', ...venues.map((venue) => `drift_${venue}`)].join(','), ...rows])
}

function points(score: number): string {
  return (100 * score).toFixed(3)
}

function write(folder: string, files: readonly ExportFile[]): void {
  for (const part of ['posts', 'reviews']) rmSync(join(folder, part), { recursive: true, force: true })
  for (const file of files) {
    mkdirSync(dirname(join(folder, file.path)), { recursive: true })
    writeFileSync(join(folder, file.path), file.bytes)
  }
}

function printSummary({ posts, story, rows, files }: Demo): void {
  const own = posts.filter((post) => post.brand === brand)
  stdout.write('month     posts   truth     raw  standardised (points)\n')
  for (const month of summarise(own, story)) {
    const figures = [month.truth, month.raw, month.standardised].map((value) => value.toFixed(1).padStart(8)).join('')
    stdout.write(`${month.month}${String(month.posts).padStart(8)}${figures}\n`)
  }
  for (const venue of venues) stdout.write(`intraclass correlation by author, ${venue}: ${intraclass(own.filter((post) => post.venue === venue)).toFixed(3)}\n`)
  const bytes = files.reduce((sum, file) => sum + file.bytes.length, 0)
  stdout.write(`${rows.length} rows, ${own.length} posts about ${brand}, ${(bytes / 1e6).toFixed(1)} MB\n`)
}

if (argv[1] !== undefined && import.meta.url === pathToFileURL(argv[1]).href) {
  const demo = makeDemo()
  const folder = argv.slice(2).find((argument) => !argument.startsWith('--'))
  if (argv.includes('--summary')) printSummary(demo)
  else write(folder ?? join('sample-data', 'skerrow-ferries'), demo.files)
}
