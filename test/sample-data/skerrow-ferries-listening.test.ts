import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { readAccount } from '../../generator/account/read-account.ts'
import { readSmallInputs } from '../../generator/inputs/read-small-inputs.ts'
import { confusionShares, rescoring } from '../../model/statistics/misclassification.ts'
import { neweyWest } from '../../model/statistics/newey-west.ts'
import { quantiles } from '../../model/statistics/quantile.ts'
import { makeDemo } from '../../sample-data/make-skerrow-ferries.ts'
import { isoDate } from '../../sample-data/making/calendar.ts'
import { driverLines, drivers } from '../../sample-data/making/drivers.ts'
import { auditLines, codedPosts, codedVenues, coder, meantShares, sharesOf, type CodedVenue } from '../../sample-data/making/hand-coding.ts'
import { brand, type Post } from '../../sample-data/making/posts.ts'
import { seededDraws } from '../../sample-data/making/seeded-draws.ts'
import { topics } from '../../sample-data/making/story.ts'

const folder = join(import.meta.dirname, '../../sample-data/skerrow-ferries')
const account = await readAccount(folder)
const { benchmark, audit, importance } = await readSmallInputs(account)
const told = readFileSync(join(folder, 'TRUTH.md'), 'utf8').replace(/\s+/g, ' ')
const october = makeDemo().rows.filter(({ flaw, post }) => flaw === 'none' && post.brand === brand && isoDate(post.wall).startsWith('2026-10')).map(({ post }) => post)
const scores = [-1, 0, 1]
const mean = (shares: readonly number[]) => 100 * shares.reduce((sum, share, label) => sum + share * scores[label], 0)

describe('the customers', () => {
  const [margin] = benchmark!
  const authorsOf = (level: string) => new Set(october.filter(({ segment }) => segment === level).map(({ venue, handle }) => `${venue} ${handle}`)).size
  const known = margin.levels.reduce((sum, { level }) => sum + authorsOf(level), 0)
  const heard = (level: string) => authorsOf(level) / known
  const share = (level: string) => margin.levels.find((each) => each.level === level)!.share

  test('are of the types that the posts know, and no other', () => {
    expect([benchmark!.length, margin.margin, account.customers]).toEqual([1, 'segment', 310_000])
    expect(margin.levels.map(({ level }) => level).sort()).toEqual([...new Set(october.map(({ segment }) => segment))].filter((segment) => segment !== '').sort())
  })

  test('are not those who post: holiday makers are heard too little, students and freight hardly at all, as TRUTH.md tells', () => {
    expect(heard('holiday') / share('holiday')).toBeLessThan(0.8)
    expect(heard('freight') / share('freight')).toBeLessThan(0.33)
    expect(heard('student') / share('student')).toBeLessThan(0.5)
    const percent = (value: number) => `${Math.round(100 * value)} %`
    expect(told).toContain(`${percent(share('islander'))} islanders, ${percent(share('commuter'))} commuters, ${percent(share('holiday'))} holiday makers, ${percent(share('student'))} students, ${percent(share('freight'))} in freight`)
    expect(told).toContain(`${percent(heard('islander'))} are islanders, ${percent(heard('commuter'))} commuters, ${percent(heard('holiday'))} holiday makers, ${percent(heard('student'))} students and ${percent(heard('freight'))} in freight`)
  })
})

describe('the coder', () => {
  const countsOf = (lines: readonly string[], venue: CodedVenue) => lines.map((line) => line.split(',')).filter((fields) => fields[0] === venue).map((fields) => Number(fields[3]))
  const committed = readFileSync(join(folder, 'audit/coding.csv'), 'utf8').split('\n')

  test('is audited by 360 posts in each venue whose scores are labels, and in no other', () => {
    const codings = new Map<string, number>()
    for (const { venue, count } of audit!) codings.set(venue, (codings.get(venue) ?? 0) + count)
    expect([...codings]).toEqual([['blogs', 360], ['boards', 360], ['microblogs', 360], ['videos', 360]])
  })

  test.each(codedVenues)('%s: what was meant, coded so, is what the posts say', (venue) => {
    const coded = sharesOf(codedPosts(october, venue))
    const meant = meantShares(coded, venue)
    for (const [label, share] of coded.entries()) expect(meant.reduce((sum, of, t) => sum + of * coder[venue][t][label], 0)).toBeCloseTo(share, 9)
    for (const row of coder[venue]) expect(row[0] + row[1] + row[2]).toBeCloseTo(1, 12)
  })

  test.each([['blogs', 'blogs'], ['boards', 'discussion boards'], ['microblogs', 'microblogs'], ['videos', 'video comments']] as const)('%s: its figures are those that TRUTH.md tells', (venue, name) => {
    const coded = sharesOf(codedPosts(october, venue))
    const meant = meantShares(coded, venue)
    const right = meant.reduce((sum, share, label) => sum + share * coder[venue][label][label], 0)
    const points = (value: number) => `${value > 0.05 ? '+' : ''}${value.toFixed(1)}`
    expect(told).toContain(`| ${name} | ${Math.round(100 * right)} % | ${points(mean(coded))} | ${points(mean(meant))} | ${points(mean(meant) - mean(coded))} |`)
    const kept = (mean(coder[venue][2]) - mean(coder[venue][0])) / 2
    expect(kept).toBeGreaterThan(85.9)
    expect(kept).toBeLessThan(88.1)
  })

  /** Pearson's statistic of the audit's counts against a coder who codes what was meant in a venue. */
  const misfit = (venue: CodedVenue, rows: readonly (readonly number[])[]) => {
    const meant = meantShares(sharesOf(codedPosts(october, venue)), venue)
    return countsOf(committed, venue).reduce((sum, count, at) => {
      const expected = 360 * meant[Math.floor(at / 3)] * rows[Math.floor(at / 3)][at % 3]
      return sum + (count - expected) ** 2 / expected
    }, 0)
  }

  test('is the one that the audit shows: eight degrees of freedom a venue', () => {
    // upper 1 % of chi-square with 8 degrees of freedom: 20.09 (Abramowitz and Stegun 1964, table 26.8; from memory)
    for (const venue of codedVenues) expect(misfit(venue, coder[venue]), venue).toBeLessThan(20.09)
  })

  test('it can fail: an audit of boards does not fit a coder that errs the other way', () => {
    const other = [coder.boards[0], [0.05, 0.84, 0.11], coder.boards[2]]
    expect(misfit('boards', other)).toBeGreaterThan(20.09)
  })

  test('an audit of that size leaves chance of 1 to 3 points in a venue, 1 to 2 in all, as TRUTH.md tells', () => {
    const posts = codedVenues.map((venue) => codedPosts(october, venue))
    const coded = posts.map(sharesOf)
    const all: readonly Post[] = posts.flat()
    const corrections = Array.from({ length: 200 }, (_, seed) => {
      const lines = auditLines(all, seededDraws(seed + 1))
      return codedVenues.map((venue, at) => {
        const { weights } = rescoring(confusionShares(countsOf(lines, venue)), scores, 0)
        return 100 * coded[at].reduce((sum, share, label) => sum + share * (weights![label] - scores[label]), 0)
      })
    })
    // Not the standard deviation: of heavy tails it never settles.
    const middle = (values: readonly number[]) => {
      const [low, high] = quantiles(values, [1 / 6, 5 / 6])
      return (high - low) / 2
    }
    for (const at of codedVenues.keys()) {
      expect(middle(corrections.map((each) => each[at]))).toBeGreaterThan(1)
      expect(middle(corrections.map((each) => each[at]))).toBeLessThan(3)
    }
    const pooled = middle(corrections.map((each) => each.reduce((sum, value, at) => sum + (value * posts[at].length) / all.length, 0)))
    expect(pooled).toBeGreaterThan(1)
    expect(pooled).toBeLessThan(2)
  })
})

describe('what matters', () => {
  /** By how many standard errors the effect of each topic is missed by least squares on the complete rows. */
  const misses = (lines: readonly string[]) => {
    const complete = lines.slice(1).map((line) => line.split(',')).filter((fields) => !fields.includes('')).map((fields) => fields.map(Number))
    const column = (at: number) => Float64Array.from(complete, (row) => row[at])
    const { coefficients, standardErrors } = neweyWest([new Float64Array(complete.length).fill(1), ...topics.map((_, at) => column(at + 1))], column(0), 0)
    return topics.map((topic, at) => Math.abs(coefficients[at + 1] - drivers[topic].effect) / standardErrors[at + 1])
  }

  test('is asked of 400, most of whom answer everything', () => {
    if (importance?.input.kind !== 'respondents') throw new Error('not of respondents')
    expect([importance.input.topics, importance.input.overall.length + importance.incomplete]).toEqual([[...topics], 400])
    expect(importance.incomplete).toBeGreaterThan(3)
    expect(importance.incomplete).toBeLessThan(30)
    for (const values of [importance.input.overall, ...importance.input.ratings]) expect(values.every((value) => Number.isInteger(value) && value >= 1 && value <= 10)).toBe(true)
  })

  test('is what was built in; the seed is the first that makes it so, as TRUTH.md says', () => {
    // 2.64: upper 1/240 of the normal distribution, for six effects at once
    expect([1, 2].map((seed) => Math.max(...misses(driverLines(seededDraws(seed)))) < 2.64)).toEqual([false, true])
    expect(readFileSync(join(folder, 'importance/drivers.csv'), 'utf8').trimEnd().split('\n')).toEqual(driverLines(seededDraws(2)))
    expect(told).toContain(`1 does not, by ${Math.max(...misses(driverLines(seededDraws(1)))).toFixed(1)}.`)
  })

  test('its effects are those that TRUTH.md tells, and not the shares of talk', () => {
    const effect = (topic: (typeof topics)[number]) => drivers[topic].effect.toFixed(2)
    expect(told).toContain(`on board ${effect('onboard')}, crew and staff ${effect('staff')}, fares ${effect('fares')}, punctuality ${effect('punctuality')}, bad weather ${effect('weather')}, booking and app ${effect('booking')}`)
    const talk = (topic: string) => october.filter((post) => post.topic === topic).length / october.length
    expect(talk('punctuality')).toBeGreaterThan(0.45)
    expect(Math.abs(talk('onboard') - 1 / 8)).toBeLessThan(0.02)
    expect(drivers.onboard.effect).toBeGreaterThan(2 * drivers.punctuality.effect)
  })
})
