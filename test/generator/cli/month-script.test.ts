import { spawnSync } from 'node:child_process'
import { chmod, cp, mkdir, mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { delimiter, join } from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'

const root = join(import.meta.dirname, '../../..')
let place: string
/** The script as README.md has it, beside a stand-in for npm that runs the program from its sources. */
beforeAll(async () => {
  place = await mkdtemp(join(tmpdir(), 'month-'))
  const script = /```sh\n(#!\/bin\/sh\n# month\.sh [^]*?)```/.exec(await readFile(join(root, 'README.md'), 'utf8'))
  await writeFile(join(place, 'month.sh'), script![1]!)
  await mkdir(join(place, 'bin'))
  await writeFile(join(place, 'bin', 'npm'), `#!/bin/sh\n[ "$1 $2 $3 $4" = "run --silent tareline --" ] || exit 9\nshift 4\ncd "${root}" && exec "${process.execPath}" --import tsx generator/cli/main.ts "$@"\n`)
  await chmod(join(place, 'bin', 'npm'), 0o755)
  for (const name of ['sound', 'faulty']) await cp(join(root, 'test/generator/intake/fixtures/open-cells'), join(place, 'accounts', name), { recursive: true, filter: (path) => !/cache|drafts/.test(path.slice(root.length)) })
  await writeFile(join(place, 'accounts/faulty/account.yaml'), 'account: faulty\n')
})
afterAll(() => rm(place, { recursive: true, force: true }))

function month(): { readonly code: number | null; readonly err: string } {
  const { status, stderr } = spawnSync('sh', ['month.sh', join(place, 'accounts'), join(place, 'month.log')], { cwd: place, encoding: 'utf8', env: { ...process.env, PATH: `${join(place, 'bin')}${delimiter}${process.env['PATH']}` } })
  return { code: status, err: stderr }
}

test('the script of the README builds every account, says by its exit code that one is faulty, and names it', async () => {
  expect(month()).toEqual({ code: 1, err: '' })
  expect(await readFile(join(place, 'month.log'), 'utf8')).toMatch(/faulty +not built: [^]*sound[^]*review\.pdf[^]*2 accounts, 1 built, 1 not built/)
  await rm(join(place, 'accounts/faulty'), { recursive: true })
  expect(month()).toEqual({ code: 0, err: '' })
  expect(await readFile(join(place, 'month.log'), 'utf8')).toMatch(/1 account, 1 unchanged/)
}, 120_000)

test('and by it that an archive is not as it was sealed', async () => {
  await mkdir(join(place, 'accounts/sound/archive/2025-08'), { recursive: true })
  expect(month().code).toBe(1)
  expect(await readFile(join(place, 'month.log'), 'utf8')).toContain('manifest-unreadable')
}, 120_000)
