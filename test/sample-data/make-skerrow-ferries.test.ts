import { readdirSync, readFileSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { gunzipSync } from 'node:zlib'
import { describe, expect, test } from 'vitest'
import { makeDemo } from '../../sample-data/make-skerrow-ferries.ts'
import { brand } from '../../sample-data/making/posts.ts'
import { venues } from '../../sample-data/making/story.ts'
import { intraclass, posterClasses, summarise } from '../../sample-data/making/summary.ts'

const folder = join(import.meta.dirname, '../../sample-data/skerrow-ferries')
const demo = makeDemo()
const own = demo.posts.filter((post) => post.brand === brand)
const months = summarise(own, demo.story)
const month = (name: string) => months.find((each) => each.month === name)!

/** What a file says: gzip streams may differ between builds of zlib, their contents may not. */
function contents(path: string, bytes: Uint8Array): Buffer {
  return path.endsWith('.gz') ? gunzipSync(bytes) : Buffer.from(bytes)
}

describe('the committed files', () => {
  test('are what the program makes, byte for byte', () => {
    for (const { path, bytes } of demo.files) {
      expect(contents(path, readFileSync(join(folder, path))).equals(contents(path, bytes)), path).toBe(true)
    }
    for (const part of ['posts', 'reviews']) {
      expect(readdirSync(join(folder, part)).map((name) => `${part}/${name}`).sort()).toEqual(demo.files.map(({ path }) => path).filter((path) => path.startsWith(`${part}/`)).sort())
    }
  })

  test('carry no time of making in their gzip headers', () => {
    for (const { path } of demo.files.filter((file) => file.path.endsWith('.gz'))) {
      const bytes = readFileSync(join(folder, path))
      expect([...bytes.subarray(0, 10)], path).toEqual([31, 139, 8, 0, 0, 0, 0, 0, 2, 255])
    }
  })

  test('it can fail: another seed makes other files', () => {
    // drivers are asked of customers, whatever the story
    const told = (made: ReturnType<typeof makeDemo>) => made.files.filter(({ path }) => path !== 'importance/drivers.csv')
    const other = told(makeDemo(2027))
    expect(other.map(({ path }) => path)).toEqual(told(demo).map(({ path }) => path))
    for (const [i, { path, bytes }] of other.entries()) {
      expect(contents(path, bytes).equals(contents(path, told(demo)[i].bytes)), path).toBe(false)
    }
  })

  test('posts, survey, outcome, audit and drivers have a stream of draws each: another seed of one changes nothing of the others', () => {
    const changed = (other: ReturnType<typeof makeDemo>) => other.files.filter(({ path, bytes }, i) => !contents(path, bytes).equals(contents(path, demo.files[i].bytes))).map(({ path }) => path)
    expect(changed(makeDemo(undefined, undefined, 99, undefined))).toEqual(['survey/tracker.csv'])
    expect(changed(makeDemo(undefined, undefined, undefined, 99))).toEqual(['outcome/passengers.csv'])
    expect(changed(makeDemo(undefined, undefined, undefined, undefined, 99, 99))).toEqual(['audit/coding.csv', 'importance/drivers.csv'])
  })

  test('stay small', () => {
    // what builds leave behind is not committed
    const sizes = readdirSync(folder, { recursive: true, encoding: 'utf8' }).filter((path) => !/^(cache|drafts)(\/|$)/.test(path)).map((path) => statSync(join(folder, path))).filter((stat) => stat.isFile()).map((stat) => stat.size)
    expect(sizes.reduce((sum, size) => sum + size, 0)).toBeLessThan(4_000_000)
  })
})

describe('the rows', () => {
  const flawed = (flaw: string) => demo.rows.filter((row) => row.flaw === flaw).length

  test('are as many as the account needs, 30 months long', () => {
    expect(own.length).toBeGreaterThan(70_000)
    expect(months).toHaveLength(30)
    expect([months[0].month, months[29].month]).toEqual(['2024-05', '2026-10'])
    expect(Math.min(...months.map(({ posts }) => posts))).toBeGreaterThan(1500)
  })

  test('have flaws of every kind, few of them', () => {
    const unreadable = flawed('time') + flawed('score') + flawed('venue')
    expect(unreadable / demo.rows.length).toBeGreaterThan(0.003)
    expect(unreadable / demo.rows.length).toBeLessThan(0.008)
    for (const flaw of ['time', 'score', 'venue', 'id-repeated']) expect(flawed(flaw), flaw).toBeGreaterThan(15)
    expect(flawed('repost')).toBeGreaterThan(900)
    expect(demo.rows.length - demo.posts.length).toBe(flawed('id-repeated') + flawed('repost') + 1)
  })

  test('name every post once but for the repeated ids', () => {
    const refs = demo.rows.filter((row) => row.flaw !== 'id-repeated').map((row) => row.post.ref)
    expect(new Set(refs).size).toBe(refs.length)
  })

  test('hold local times in the hours that are skipped or come twice', () => {
    const at = (start: string) => own.filter((post) => post.venue === 'boards' && new Date(post.wall).toISOString().startsWith(start)).length
    const changes = ['2025-03-30', '2026-03-29', '2024-10-27', '2025-10-26', '2026-10-25'].map((date) => at(`${date}T01`))
    const weekBefore = ['2025-03-23', '2026-03-22', '2024-10-20', '2025-10-19', '2026-10-18'].map((date) => at(`${date}T01`))
    const sum = (counts: readonly number[]) => counts.reduce((total, count) => total + count, 0)
    expect(Math.min(...changes)).toBeGreaterThan(0)
    expect(sum(changes)).toBeGreaterThan(5 * sum(weekBefore))
  })

  test('reply only to posts of the same thread that came before', () => {
    const seen = new Map<string, string>()
    let replies = 0
    for (const post of demo.posts) {
      if (post.parent !== '') {
        expect(seen.get(post.parent)).toBe(post.thread)
        replies += 1
      }
      if (post.venue === 'boards') seen.set(post.ref, post.thread)
    }
    expect(replies).toBeGreaterThan(10_000)
  })
})

describe('the story', () => {
  test('opinion rises in the last month and year, the raw average falls', () => {
    const [last, before, yearBefore] = [month('2026-10'), month('2026-09'), month('2025-10')]
    expect(last.truth - before.truth).toBeGreaterThan(3)
    expect(last.truth - yearBefore.truth).toBeGreaterThan(5.5)
    expect(last.raw - before.raw).toBeLessThan(-2)
    expect(last.raw - yearBefore.raw).toBeLessThan(-5)
    expect(last.standardised - before.standardised).toBeGreaterThan(2)
    expect(last.standardised - yearBefore.standardised).toBeGreaterThan(1)
  })

  test('its figures are those that TRUTH.md tells', () => {
    const told = readFileSync(join(folder, 'TRUTH.md'), 'utf8').replace(/\s+/g, ' ')
    const kept = summarise(demo.rows.filter(({ flaw, post }) => flaw === 'none' && post.brand === brand).map(({ post }) => post), demo.story)
    const [last, before, yearBefore] = [kept[29], kept[28], kept[17]]
    const points = (change: number) => `${Math.abs(change).toFixed(1)} points`
    expect(told).toContain(`October 2026 stands ${points(last.truth - yearBefore.truth)} above October 2025`)
    expect(told).toContain(`${points(last.truth - before.truth)} from September to October 2026, comes`)
    expect(told).toContain(`It falls by ${points(last.raw - before.raw)} from September to October 2026, and by ${points(last.raw - yearBefore.raw)} in the year`)
  })

  test('it is the mix and the boards that pull the raw average down: without them it rises', () => {
    const rest = summarise(own.filter((post) => post.venue !== 'boards' && post.topic !== 'punctuality'), demo.story)
    expect(rest[29].raw - rest[28].raw).toBeGreaterThan(0)
  })

  test('boards drift and grow, the others nearly stand still', () => {
    const last = demo.story[demo.story.length - 1]
    expect(Math.abs(last.drift.boards + 0.15)).toBeLessThan(0.01)
    for (const venue of venues.filter((name) => name !== 'boards')) for (const week of demo.story) expect(Math.abs(week.drift[venue])).toBeLessThan(0.005)
    expect(Math.abs(share(months[0].month, (i) => own[i].venue === 'boards') - 0.2)).toBeLessThan(0.03)
    expect(Math.abs(share('2026-10', (i) => own[i].venue === 'boards') - 0.4)).toBeLessThan(0.03)
  })

  test('punctuality flares up, prolific posters gain share', () => {
    expect(share('2026-08', (i) => own[i].topic === 'punctuality')).toBeLessThan(0.22)
    expect(share('2026-10', (i) => own[i].topic === 'punctuality')).toBeGreaterThan(0.4)
    const classes = posterClasses(own)
    expect(share('2026-10', (i) => classes[i] === 'prolific') - share('2025-04', (i) => classes[i] === 'prolific')).toBeGreaterThan(0.08)
  })

  test.each(venues)('authors differ as is usual in %s', (venue) => {
    const correlation = intraclass(own.filter((post) => post.venue === venue))
    expect(correlation).toBeGreaterThan(0.1)
    expect(correlation).toBeLessThan(0.3)
  })

  const share = (name: string, holds: (index: number) => boolean): number => {
    const indices = own.map((_, i) => i).filter((i) => new Date(own[i].wall).toISOString().startsWith(name))
    return indices.filter(holds).length / indices.length
  }
})
