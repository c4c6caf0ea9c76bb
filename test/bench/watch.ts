import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { cp } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { findingsSchema } from '../../model/findings/schema.ts'
import { readAccount } from '../../generator/account/read-account.ts'
import { thisProgram } from '../../generator/program/program.ts'
import { keepDrawings } from '../../generator/render/drawings.ts'
import { renderAgain } from '../../generator/watch/render-again.ts'

/*
 * How long a watch takes from an edit to the page: npx tsx test/bench/watch.ts [FINDINGS]
 * The ferry demo's findings, an account with a template and words of its own; medians of ten edits of each kind, after the first rendering.
 */
const findings = findingsSchema.parse(JSON.parse(readFileSync(process.argv[2] ?? 'demo/skerrow-ferries/findings.json', 'utf8')))
const folder = mkdtempSync(join(tmpdir(), 'tareline-bench-'))
await cp('sample-data/skerrow-ferries', folder, { recursive: true })
writeFileSync(join(folder, 'account.yaml'), `${readFileSync(join(folder, 'account.yaml'), 'utf8')}\ntemplate: template.md\nwords: words.yaml\ntheme: theme.yaml\n`)

const edits: readonly (readonly [what: string, file: string, text: (round: number) => string])[] = [
  ['template', 'template.md', (round) => `::house\n\nEdit ${round}.\n`],
  ['words', 'words.yaml', (round) => `opinion-heading: Opinion ${round}\n`],
  ['looks', 'theme.yaml', (round) => `running: { foot: 'Edit ${round}' }\n`],
  ['looks that change every picture', 'theme.yaml', (round) => `colours: { accent: '#0a567${round % 10}' }\n`],
]
for (const [, file, text] of edits) writeFileSync(join(folder, file), text(0))
const [program, drawings] = [thisProgram(), keepDrawings()]
const account = await readAccount(folder)

async function seconds(): Promise<number> {
  const start = performance.now()
  const { html } = await renderAgain(program, account, findings, drawings)
  if (html === null) throw new Error('expected a page')
  drawings.nextRound()
  return (performance.now() - start) / 1000
}

process.stdout.write(`first rendering ${(await seconds()).toFixed(2)} s\n`)
for (const [what, file, text] of edits) {
  const times: number[] = []
  for (let round = 1; round <= 10; round++) {
    writeFileSync(join(folder, file), text(round))
    times.push(await seconds())
  }
  process.stdout.write(`an edit of ${what}: ${[...times].sort((a, b) => a - b)[5].toFixed(2)} s\n`)
}
rmSync(folder, { recursive: true })
