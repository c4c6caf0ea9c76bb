import { cp, mkdir, mkdtemp, readFile, readdir, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { asideName, restoreDrafts } from '../../../generator/review/restore-drafts.ts'
import { runCommand } from '../../support/run-command.ts'

let account: string
let drafts: string
beforeEach(async () => {
  account = await mkdtemp(join(tmpdir(), 'restore-'))
  drafts = join(account, 'drafts')
  await cp(join(import.meta.dirname, '../intake/fixtures/open-cells'), account, { recursive: true, filter: (path) => !path.endsWith('cache') })
})
afterEach(() => rm(account, { recursive: true }))

/** A draft as it stands aside while the new one is put in its place. */
async function aside(name: string, text: string, mark = '.unfinished-aB3xYz'): Promise<string> {
  const folder = join(drafts, asideName(mark, name))
  await mkdir(folder, { recursive: true })
  await writeFile(join(folder, 'review.html'), text)
  return folder
}

describe('a draft that stepped aside', () => {
  test('is put back where its place is free, whatever its name', async () => {
    await aside('2025-08', 'earlier')
    await aside('my-own-name', 'mine')
    await restoreDrafts(drafts)
    expect((await readdir(drafts)).sort()).toEqual(['2025-08', 'my-own-name'])
    expect(await readFile(join(drafts, '2025-08/review.html'), 'utf8')).toBe('earlier')
  })

  test('stays aside where the new one has its place, and so does an unfinished one', async () => {
    await aside('2025-08', 'earlier')
    await mkdir(join(drafts, '2025-08'))
    await mkdir(join(drafts, '.unfinished-Zz9Yx8'))
    const before = await readdir(drafts)
    await restoreDrafts(drafts)
    expect(await readdir(drafts)).toEqual(before)
  })

  test('a folder without drafts is no matter', async () => { await expect(restoreDrafts(join(account, 'nowhere'))).resolves.toBeUndefined() })
})

test.each([['check', (folder: string) => [folder]], ['seal', (folder: string) => [folder, '--period', '2025-08']], ['build', (folder: string) => [folder, '--period', '2025-07', '--no-pdf']]] as const)('the next %s puts it back', async (command, args) => {
  await aside('2025-08', 'earlier')
  await runCommand(command, ...args(account))
  expect(await readFile(join(drafts, '2025-08/review.html'), 'utf8')).toBe('earlier')
})
