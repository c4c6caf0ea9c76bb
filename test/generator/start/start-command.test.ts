import { mkdirSync, writeFileSync } from 'node:fs'
import { chmod, mkdir, mkdtemp, readFile, readdir, rm, symlink, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { runCommand as run } from '../../support/run-command.ts'
import { startAccount } from '../../../generator/start/start-account.ts'
import { Stopped } from '../../../generator/review/stopping.ts'
import { exportedPosts, separated } from './export-files.ts'

let scratch: string
let from: string
const at = (name: string): string => path.join(scratch, name)
beforeEach(async () => {
  scratch = await mkdtemp(path.join(tmpdir(), 'start-command-'))
  from = at('export.csv')
  await writeFile(from, separated(',', ['ref', 'posted', 'site', 'user', 'sentiment'], exportedPosts().map((post) => [`p${post.number}`, new Date(post.at).toISOString(), post.venue, post.user, post.tone])))
})
afterEach(async () => { await rm(scratch, { recursive: true, force: true }) })

/** Everything beside the export. */
const left = async (): Promise<readonly string[]> => (await readdir(scratch, { recursive: true })).filter((name) => name !== 'export.csv').sort()

describe('with a file', () => {
  test('lays out, checks, says what comes next: exit code 0', async () => {
    const { code, out } = await run('start', at('new/account'), '--from', from)
    expect(code).toBe(0)
    expect(out).toMatch(/^account laid out in .*new\/account\n/)
    expect(out).toMatch(/received +400\n/)
    expect(out).toMatch(/next: read .*account\.yaml line by line, then: tareline build .*new\/account\n$/)
    expect(await left()).toEqual(['new', 'new/account', 'new/account/account.yaml', 'new/account/mentions', 'new/account/mentions/export.csv'])
    expect(await readFile(at('new/account/mentions/export.csv'))).toEqual(await readFile(from))
    expect((await run('check', at('new/account'))).code).toBe(0)
  })

  test('--json: one object; --quiet: nothing', async () => {
    const { code, out } = await run('start', at('a'), '--from', from, '--json')
    expect([code, out.trimEnd().split('\n').length]).toEqual([0, 1])
    expect(JSON.parse(out)).toMatchObject({
      ok: true, faults: [], folder: at('a'), mentions: 'mentions/export.csv', accounting: { received: 400, rejected: 0 }, undecided: [],
      proposed: { columns: expect.arrayContaining([expect.objectContaining({ ours: 'posted_at', theirs: 'posted', sure: true })]) as object, score: { labels: { negative: -1, neutral: 0, positive: 1 } }, grid: 'week', time_format: null },
    })
    expect(await run('start', at('b'), '--from', from, '--quiet')).toEqual({ code: 0, out: '', err: '' })
  })

  test('an empty folder is filled as it stands', async () => {
    await mkdir(at('empty'))
    expect((await run('start', at('empty'), '--from', from, '--quiet')).code).toBe(0)
    expect(await left()).toEqual(['empty', 'empty/account.yaml', 'empty/mentions', 'empty/mentions/export.csv'])
  })

  test('faults of the data: exit code 1, and the folder stays to be mended', async () => {
    await writeFile(from, separated(',', ['posted', 'colour', 'shape', 'sentiment'], exportedPosts().map((post) => [new Date(post.at).toISOString(), ['red', 'green'][post.number % 2]!, ['round', 'square', 'flat'][post.number % 3]!, post.tone])))
    const { code, out, err } = await run('start', at('a'), '--from', from)
    expect(code).toBe(1)
    expect(err).toContain('account-combination')
    expect(out).toContain('the folder stays; mend')
    expect(await left()).toContain('a/account.yaml')
    expect(JSON.parse((await run('start', at('b'), '--from', from, '--json')).out)).toMatchObject({ ok: false, folder: at('b'), faults: [{ code: 'account-combination' }], undecided: [{ role: 'venue' }] })
  })
})

describe('without a file', () => {
  test('a skeleton, whose gaps are told as what is to be filled in: exit code 0', async () => {
    const { code, out, err } = await run('start', at('skerrow-ferries'))
    expect(code).toBe(0)
    expect(err).not.toContain('[')
    expect(out).toContain('to be filled in: Unexpected nothing at account.yaml')
    expect(await left()).toEqual(['skerrow-ferries', 'skerrow-ferries/account.yaml'])
    expect(await readFile(at('skerrow-ferries/account.yaml'), 'utf8')).toContain('account: skerrow-ferries   #')
    expect(JSON.parse((await run('start', at('b'), '--json')).out)).toMatchObject({ ok: true, faults: [], mentions: null, proposed: null, to_fill_in: ['posted_at', 'venue', 'score'].map((column) => ({ code: 'account-value', place: expect.stringContaining(`mentions.0.columns.${column}`) as string })) })
  })
})

describe('what leaves everything as it was', () => {
  test('a folder with something in it, a file, a link to nowhere: exit code 1', async () => {
    await mkdir(at('full'))
    await writeFile(at('full/notes.txt'), 'mine')
    await symlink(at('nowhere'), at('link'))
    const before = await left()
    for (const taken of ['full', 'full/notes.txt', 'full/notes.txt/deeper', 'link', '']) {
      const { code, err } = await run('start', at(taken), '--from', from, '--quiet')
      expect([taken, code === 1 || (taken.endsWith('deeper') && code === 3)]).toEqual([taken, true])
      expect(err).toMatch(/start-folder-taken|start-unwritable/)
    }
    expect(await left()).toEqual(before)
    expect(await readFile(at('full/notes.txt'), 'utf8')).toBe('mine')
  })

  test('a file that is not there, is a folder or is no table: no folder is made, nor the ones around it', async () => {
    await mkdir(at('empty'))
    await writeFile(at('one.csv'), 'a\n')
    const before = await left()
    for (const [file, fault] of [['none.csv', 'start-file-absent'], ['empty.csv/', 'start-file-absent'], ['one.csv', 'start-no-table'], ['export.xlsx', 'start-file-kind']] as const) {
      for (const folder of ['new', 'new/deep/er', 'empty']) {
        const { code, err } = await run('start', at(folder), '--from', at(file), '--quiet')
        expect([code, err]).toEqual([1, expect.stringContaining(fault)])
      }
    }
    expect(await left()).toEqual(before)
    expect(JSON.parse((await run('start', at('new'), '--from', at('none.csv'), '--json')).out)).toMatchObject({ ok: false, folder: null, faults: [{ code: 'start-file-absent', place: at('none.csv') }] })
  })

  test('a start that is stopped', async () => {
    for (const when of ['before', 'while it reads']) {
      const stopping = new AbortController()
      const stopNow = (): void => { stopping.abort(new Stopped('SIGTERM')) }
      if (when === 'before') stopNow()
      await expect(startAccount(at('new'), { from, progress: stopNow, stop: stopping.signal })).rejects.toThrow(Stopped)
      expect([when, await left()]).toEqual([when, []])
    }
  })

  test('somebody else fills the folder meanwhile', async () => {
    const fill = (): void => {
      mkdirSync(at('new'))
      writeFileSync(at('new/theirs.txt'), 'theirs')
    }
    await expect(startAccount(at('new'), { from, progress: fill })).rejects.toThrow('theirs.txt')
    expect(await left()).toEqual(['new', 'new/theirs.txt'])
  })

  test.skipIf(process.getuid?.() === 0)('a place that takes no folder: exit code 3', async () => {
    await mkdir(at('locked'))
    await chmod(at('locked'), 0o500)
    expect((await run('start', at('locked/new'), '--quiet')).code).toBe(3)
  })

  test('wrong usage: exit code 2', async () => {
    expect((await run('start')).code).toBe(2)
    expect((await run('start', at('a'), '--form', from)).code).toBe(2)
  })
})
