import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { theDisk } from '../../../generator/archive/disk.ts'
import type { MadeWith } from '../../../generator/archive/manifest.ts'
import { readArchive, sealedInOrder } from '../../../generator/archive/read-archive.ts'
import { fingerprint, fingerprints, recordName, type BuildRecord } from '../../../generator/archive/record.ts'
import type { SealRequest } from '../../../generator/archive/seal-review.ts'
import { filesOf } from '../../../generator/archive/verify-archive.ts'

export const program: MadeWith = { version: '1.2.3', model: 'a'.repeat(64), code: 'b'.repeat(64), runtime: 'node 20', browser: 'Any/1.0' }

/** An account folder with inputs and a draft of one period, as a build leaves them, of a few bytes each. */
export async function fakeAccount(): Promise<{ readonly folder: string; readonly remove: () => Promise<void> }> {
  const folder = await mkdtemp(join(tmpdir(), 'tareline-account-'))
  await mkdir(join(folder, 'survey'))
  await mkdir(join(folder, 'posts'))
  await writeFile(join(folder, 'account.yaml'), 'account: fake\n')
  await writeFile(join(folder, 'survey', 'waves.csv'), 'wave,value\n1,0.4\n')
  await writeFile(join(folder, 'posts', 'posts.csv'), 'id,text\n1,secret words\n')
  return { folder, remove: () => rm(folder, { recursive: true }) }
}

/** Put a draft there; its content speaks of `what`. */
export async function fakeDraft(folder: string, period: string, what = 'first', changes: Partial<BuildRecord> = {}): Promise<string> {
  const draft = join(folder, 'drafts', period)
  await rm(draft, { recursive: true, force: true })
  await mkdir(join(draft, 'tables'), { recursive: true })
  await mkdir(join(draft, 'rejects'))
  await writeFile(join(draft, 'review.html'), `<p>${what} of ${period}</p>`)
  await writeFile(join(draft, 'review.pdf'), `%PDF ${what}`)
  await writeFile(join(draft, 'findings.json'), `{"period":"${period}"}`)
  await writeFile(join(draft, 'tables', 'opinion.csv'), 'step,value\n')
  await writeFile(join(draft, 'rejects', 'posts.csv'), 'file,line,reason\n')
  const record: BuildRecord = {
    schema: 'tareline-record/1', account: 'fake', period, default_period: true, program, seed: 1, prepared_by: 'Ana', reviewed_by: 'Bo', past: await lastSealed(folder), passed: true,
    inputs: [
      { ...await fingerprint(folder, 'account.yaml'), kept: true }, { ...await fingerprint(folder, 'survey/waves.csv'), kept: true },
      { ...await fingerprint(folder, 'posts/posts.csv'), kept: false },
    ],
    files: [...await fingerprints(draft, await filesOf(draft))],
    ...changes,
  }
  await writeFile(join(draft, recordName), JSON.stringify(record))
  return draft
}

/** Hash of the last manifest of an account's archive, as a build would record it. */
export async function lastSealed(folder: string): Promise<string | null> {
  return sealedInOrder(await readArchive(join(folder, 'archive'))).at(-1)?.hash ?? null
}

export const requestOf = (folder: string, period: string, more: Partial<SealRequest> = {}): SealRequest => ({
  folder, account: 'fake', period, inputs: ['account.yaml', 'posts/posts.csv', 'survey/waves.csv'], reason: null, onePerson: false, program, disk: theDisk, now: '2026-12-01T09:00:00.000Z', ...more,
})
