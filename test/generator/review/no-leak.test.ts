import { describe, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { firstForecast, placeInputs } from '../../../generator/inputs/place-inputs.ts'
import { readSmallInputs } from '../../../generator/inputs/read-small-inputs.ts'
import { readIntake } from '../../../generator/intake/read-intake.ts'
import { meanPath } from '../../../model/fit/mean-path.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { headlineWaves } from '../../../model/survey/headline.ts'
import { forecastWaves, type WaveForecast } from '../../../model/survey/rolling-forecast.ts'
import { plainAccount, plainHeader, quotedCsv, withAccount } from '../intake/temporary-account.ts'

const day = (number: number) => new Date(Date.UTC(2025, 0, 6 + number)).toISOString().slice(0, 10)
/** Twelve waves of ten days, three weeks apart, none of which begins on a Monday. */
const waveStart = (w: number) => 23 + 21 * w
const survey = `wave,field_start,field_end,metric,segment,base,effective_base,value,kind,sd\n${Array.from({ length: 12 }, (_, w) =>
  `w${w},${day(waveStart(w))},${day(waveStart(w) + 9)},favourability,,400,360,${(0.5 + 0.04 * Math.cos(w)).toFixed(3)},share,`).join('\n')}\n`

type Post = readonly [id: string, at: number, venue: string, author: string, tone: string, topic: string, text: string]

/** Forty weeks of posts by few authors, so that classes and clustering matter; a second source begins later. */
function posts(): readonly Post[] {
  const random = createGenerator(5, 0)
  const any = <T>(...of: readonly T[]) => of[random.integer(of.length)]
  return Array.from({ length: 2800 }, (_, i): Post => [
    `p${i}`, random.uniform() * 280, any('forum', 'blog', 'blog', 'film'), `author${random.integer(90)}`, any('negative', 'neutral', 'positive', 'positive'), any('fares', 'crew'), `post number ${i}, which says something of its own about it`,
  ])
}

const rowOf = ([id, at, venue, author, tone, topic, text]: Post): string[] =>
  [id, new Date(Date.UTC(2025, 0, 6) + at * 86_400_000).toISOString(), venue, author, tone, topic, 'Skerrow Ferries', text]

const account = `${plainAccount.replace('mentions:\n', 'grid: week\nmentions:\n')}survey: { files: survey.csv, lags: [-2, 8] }\n`
const twoSources = account.replace('venues:', `  - files: later.csv
    columns: { id: ref, posted_at: published, venue: source, author: handle, score: tone, topic: theme, brand: about, text: body }
    score: { labels: { negative: -1, neutral: 0, positive: 1 } }
venues:`)

/** The forecast of a wave, from the files. */
async function forecastOf(wave: number, all: readonly Post[], laterSource: readonly Post[] | null): Promise<WaveForecast | null> {
  const files = {
    'account.yaml': laterSource === null ? account : twoSources, 'survey.csv': survey, 'posts.csv': quotedCsv(plainHeader, all.map(rowOf)),
    ...(laterSource === null ? {} : { 'later.csv': quotedCsv(plainHeader, laterSource.map(rowOf)) }),
  }
  return withAccount(files, async (folder) => {
    const read = await readAccount(folder)
    const inputs = await readSmallInputs(read)
    const tables = await readIntake(read, { period: '2025-10', hindsightFrom: firstForecast(inputs) })
    const { survey: placed } = placeInputs(inputs, read, tables.timeline)
    const waves = headlineWaves(placed!)
    return (await forecastWaves(tables, waves, [waves[wave]], [-2, -1, 0, 1, 2, 3, 4, 5, 6, 7, 8], meanPath, 1))[0]
  })
}

/** Every post from a day on, said by others, elsewhere, of other things, and otherwise; some twice, and half of them gone. */
function changed(all: readonly Post[], from: number): readonly Post[] {
  return all.flatMap((post, i): readonly Post[] => {
    const [id, at] = post
    if (at < from) return [post]
    if (i % 2 === 0) return []
    const other: Post = [`x${id}`, at, ['forum', 'new place', 'film'][i % 3], `author${i % 7}`, 'negative', ['other', 'fares', 'crew', 'new topic'][i % 4], `another text altogether, number ${i % 50}, long enough to be found again`]
    return [other, [`y${id}`, ...other.slice(1)] as unknown as Post]
  })
}

describe('a forecast does not change by one bit when every post from the first day of fieldwork on is changed', () => {
  const all = posts()
  test.each([8, 9, 11])('wave %i', async (wave) => {
    const plain = await forecastOf(wave, all, null)
    expect(plain?.components.length).toBeGreaterThan(0)
    expect(await forecastOf(wave, changed(all, waveStart(wave)), null)).toEqual(plain)
  })
  test('nor where a source is in its first ninety days, whose poster classes look ahead', async () => {
    const begins = waveStart(9) - 50
    const [early, late] = [all.filter((_, i) => i % 3 > 0), all.filter((post, i) => i % 3 === 0 && post[1] >= begins)]
    const plain = await forecastOf(9, early, late)
    expect(await forecastOf(9, changed(early, waveStart(9)), changed(late, waveStart(9)))).toEqual(plain)
  })
  test('it can fail: a change a week earlier is seen', async () => {
    const plain = await forecastOf(9, all, null)
    expect(await forecastOf(9, changed(all, waveStart(9) - 10), null)).not.toEqual(plain)
  })
})
