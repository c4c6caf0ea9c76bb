import { cp, mkdir, mkdtemp, readFile, rename, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import type { Fault } from '../../../generator/faults/fault.ts'
import { thisProgram } from '../../../generator/program/program.ts'
import { livePageOf, watchReview } from '../../../generator/watch/watch-review.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const fixture = join(import.meta.dirname, '../intake/fixtures/open-cells')
const findings = sampleFindings()
let folder: string
let draft: string
const rounds: number[] = []
let faults: readonly Fault[] = []
let accountChanges = 0
let watched: Promise<void>
const ends = new AbortController()

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'tareline-watch-'))
  await cp(join(fixture, 'cells'), join(folder, 'cells'), { recursive: true })
  const text = await readFile(join(fixture, 'account.yaml'), 'utf8')
  await writeFile(join(folder, 'account.yaml'), `${text}\ntemplate: look/review.md\nwords: words.yaml\ntheme: theme.yaml\nnotes: notes\n`)
  await mkdir(join(folder, 'look'))
  await mkdir(join(folder, 'notes'))
  await mkdir(join(folder, 'drafts'))
  await writeFile(join(folder, 'look/review.md'), '::house{from="first-page" to="opinion"}\n')
  await writeFile(join(folder, 'words.yaml'), 'opinion-heading: What people think\n')
  await writeFile(join(folder, 'theme.yaml'), 'paper: A4\n')
  draft = join(folder, 'drafts', findings.period.name)
  watched = watchReview(thisProgram(), {
    account: await readAccount(folder), findings, folder: draft, stop: ends.signal,
    tell: { rendered: (_, milliseconds) => { rounds.push(milliseconds) }, faults: (found) => { faults = found }, accountChanged: () => { accountChanges++ } },
  })
})
afterAll(async () => {
  ends.abort()
  await watched
  await rm(folder, { recursive: true })
})

/** The page once it shows what is expected. */
async function showing(expected: RegExp): Promise<string> {
  const read = () => readFile(livePageOf(draft), 'utf8').catch(() => '')
  await expect.poll(async () => expected.test(await read()), { timeout: 20_000 }).toBe(true)
  return read()
}

async function afterWriting(file: string, text: string, expected: RegExp): Promise<string> {
  await writeFile(join(folder, file), text)
  return showing(expected)
}

test('the page is there, looks at itself again, and has no script', async () => {
  const html = await showing(/What people think/)
  expect(html).toMatch(/<meta http-equiv="refresh" content="\d+">/)
  expect(html).not.toContain('<script')
})

test('words, order, looks and notes show as soon as they are written', async () => {
  await afterWriting('words.yaml', 'opinion-heading: How people see it\n', /How people see it/)
  await afterWriting('look/review.md', '::section{name="opinion"}\n\nA sentence of our own.\n\n::notes\n', /A sentence of our own\./)
  await afterWriting('theme.yaml', 'colours: { accent: "#8a2c0d" }\n', /#8a2c0d/)
  await afterWriting(`notes/${findings.period.name}.md`, 'What the analyst thinks.\n', /What the analyst thinks\./)
  expect(faults).toEqual([])
})

test('an editor that writes beside and renames is followed, into a folder that was not there too', async () => {
  await mkdir(join(folder, 'look/sections'))
  await writeFile(join(folder, 'look/sections/.ours.md.swp'), 'A section of ours.\n')
  await rename(join(folder, 'look/sections/.ours.md.swp'), join(folder, 'look/sections/ours.md'))
  await afterWriting('look/review.md', '::section{name="opinion"}\n\n::section{name="ours"}\n\n::notes\n', /A section of ours\./)
})

test('a fault shows where it is, with the rest of the page; mended it is gone', async () => {
  const html = await afterWriting('look/sections/ours.md', 'Before :figure{of="opinion.nothing" as="points"}\n', /<pre><code>Unexpected/)
  await expect.poll(() => faults.map(({ place }) => place)).toContainEqual(expect.stringMatching(/sections\/ours\.md:1:/))
  expect(html).toContain('How people see it')
  await afterWriting('look/sections/ours.md', 'Mended.\n', /Mended\./)
  await expect.poll(() => faults).toEqual([])
})

test('what has no place in the page stands on top of the last good one, as text', async () => {
  const html = await afterWriting('theme.yaml', 'colours: { accnt: "<script>" }\n', /<pre role="alert">Unexpected[^<]*accnt/)
  expect(html).toContain('Mended.')
  expect(html).not.toContain('<script>')
  const mended = await afterWriting('theme.yaml', 'colours: { accent: "#0a5674" }\n', /^(?!.*role="alert")/s)
  expect(mended).toContain('Mended.')
})

test('each round is told with its time', () => {
  expect(rounds.length).toBeGreaterThan(6)
  expect(rounds.every((milliseconds) => milliseconds > 0)).toBe(true)
})

test('a change of the account file is told, and the draft is not touched', async () => {
  await writeFile(join(folder, 'account.yaml'), `${await readFile(join(folder, 'account.yaml'), 'utf8')}# more\n`)
  await expect.poll(() => accountChanges).toBeGreaterThan(0)
  await expect(readFile(join(draft, 'review.html'))).rejects.toThrow('ENOENT')
})
