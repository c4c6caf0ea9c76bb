/**
 * Makes the data of the second demo account, a small one:
 *
 *   story ──▶ cells/wochen.csv, truth.csv
 *     └─────▶ survey/wellen.csv
 *
 *   npx tsx sample-data/make-pellwick-cycles.ts [FOLDER]
 *
 * FOLDER is sample-data/pellwick-cycles if not given.
 */
import { mkdirSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { argv } from 'node:process'
import { pathToFileURL } from 'node:url'
import { text, type ExportFile } from './making/export-files.ts'
import { seededDraws } from './making/seeded-draws.ts'
import { cellLines } from './making-pellwick/cells.ts'
import { tellStory, type Week } from './making-pellwick/story.ts'
import { waveLines } from './making-pellwick/waves.ts'

/** Paths and bytes of everything the program writes; the same on every run. Posts and survey have a stream of draws each. */
export function makePellwick(cellSeed = 1, surveySeed = 1): readonly ExportFile[] {
  const story = tellStory()
  return [
    { path: 'cells/wochen.csv', bytes: text(cellLines(story, seededDraws(cellSeed))) },
    { path: 'survey/wellen.csv', bytes: text(waveLines(seededDraws(surveySeed))) },
    { path: 'truth.csv', bytes: text(['week,opinion', ...story.map(truthLine)]) },
  ]
}

/** Opinion in points. */
function truthLine({ monday, opinion }: Week): string {
  return `${monday},${(100 * opinion).toFixed(3)}`
}

if (argv[1] !== undefined && import.meta.url === pathToFileURL(argv[1]).href) {
  const folder = argv[2] ?? join('sample-data', 'pellwick-cycles')
  for (const { path, bytes } of makePellwick()) {
    mkdirSync(dirname(join(folder, path)), { recursive: true })
    writeFileSync(join(folder, path), bytes)
  }
}
