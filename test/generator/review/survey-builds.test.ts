import { cp, mkdir, mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import type { Findings } from '../../../model/findings/schema.ts'
import { readAccount } from '../../../generator/account/read-account.ts'
import { thisProgram } from '../../../generator/program/program.ts'
import { buildReview } from '../../../generator/review/build-review.ts'
import { silent } from '../../../generator/review/stages.ts'

/** 26 weeks of cells, March to August 2025; what varies is the survey beside them. */
const cells = join(import.meta.dirname, '../intake/fixtures/open-cells')
let scratch: string
beforeAll(async () => { scratch = await mkdtemp(join(tmpdir(), 'survey-')) })
afterAll(async () => { await rm(scratch, { recursive: true, force: true }) })

const day = (number: number) => new Date(Date.UTC(2025, 2, 10 + number)).toISOString().slice(0, 10)
interface Wave { readonly name: string; readonly from: number; readonly to: number; readonly metrics?: readonly string[] }
const row = ({ name, from, to }: Wave, metric: string, w: number) => `${name},${day(from)},${day(to)},${metric},,400,360,${(0.5 + 0.04 * Math.sin(1.7 * w)).toFixed(3)},share,`
const fortnightly = (count: number, length = 7): readonly Wave[] => Array.from({ length: count }, (_, w) => ({ name: `wave ${w + 1}`, from: 14 * w, to: 14 * w + length - 1 }))

/** Build the review of August 2025 with these waves; null: without a survey. */
async function review(waves: readonly Wave[] | null): Promise<{ readonly findings: Findings; readonly html: string }> {
  const folder = await mkdtemp(join(scratch, 'account-'))
  await cp(cells, folder, { recursive: true })
  if (waves !== null) {
    const rows = waves.flatMap((wave, w) => (wave.metrics ?? ['favourability', 'trust']).map((metric) => row(wave, metric, w)))
    await mkdir(join(folder, 'survey'))
    await writeFile(join(folder, 'survey/waves.csv'), `wave,field_start,field_end,metric,segment,base,effective_base,value,kind,sd\n${rows.join('\n')}\n`)
    await writeFile(join(folder, 'account.yaml'), `${await readFile(join(folder, 'account.yaml'), 'utf8')}survey: { files: survey/*.csv, headline: favourability, lags: [-2, 6] }\n`)
  }
  const { findings } = await buildReview(thisProgram(), await readAccount(folder), { out: join(folder, 'draft'), period: '2025-08', seed: 1, browser: null, progress: silent })
  return { findings, html: await readFile(join(folder, 'draft/review.html'), 'utf8') }
}

const codes = ({ caveats }: Findings) => caveats.map(({ code }) => code)
const heading = 'id="survey-heading"'

test('with no survey there is none in the review, and a caveat says what that means', async () => {
  const { findings, html } = await review(null)
  expect(findings.survey).toBeNull()
  expect(codes(findings)).toContain('survey-absent')
  expect(html).not.toContain(heading)
})

test('with three waves the survey’s own figures are shown, and the verdict is that there are too few', async () => {
  const { findings, html } = await review(fortnightly(3))
  expect(findings.survey).toMatchObject({ verdict: 'too-few-waves', pairs: 3, pairs_needed: 8, forecast: null, next_wave: null, lag_weights: [], departures: [] })
  expect(findings.survey!.candidates.every(({ best, adjusted_p: p }) => best === null && p === null)).toBe(true)
  expect(findings.survey!.waves).toHaveLength(3)
  expect(codes(findings)).toContain('survey-too-few')
  expect(html).toContain(heading)
})

test('a wave in the future is not read, and named', async () => {
  const waves = fortnightly(14)
  const { findings, html } = await review(waves)
  // the 13th begins on 25 August and ends within the month, the 14th does not
  expect(findings.survey).toMatchObject({ later_waves: ['wave 14'] })
  expect(findings.survey!.waves.map(({ wave }) => wave)).not.toContain('wave 14')
  expect(codes(findings)).toContain('survey-waves-later')
  expect(html).toContain('wave 14')
  const { findings: without } = await review(waves.slice(0, 13))
  expect(without.survey!.candidates).toEqual(findings.survey!.candidates)
})

test('with overlapping fieldwork no wave is compared, or forecast, with what was not known yet', async () => {
  const { findings } = await review(fortnightly(12, 20))
  const { survey } = findings
  expect(survey!.overlapping_waves).toEqual(survey!.waves.slice(1).map(({ wave }) => wave))
  expect(survey!.waves.map(({ change }) => change?.from ?? null)).toEqual([null, null, ...survey!.waves.slice(0, -2).map(({ wave }) => wave)])
  // of eleven waves within August the first with eight over before it began is the tenth
  expect(survey!.forecast!.waves.map(({ wave }) => wave)).toEqual(['wave 10', 'wave 11', 'wave 12'].slice(0, survey!.waves.length - 9))
  expect(codes(findings)).toContain('survey-waves-overlap')
})

test('a metric that some waves lack is compared where it was asked, and the gap is told', async () => {
  const waves = fortnightly(12).map((wave, w) => (w === 4 ? { ...wave, metrics: ['trust'] } : w === 6 ? { ...wave, metrics: ['favourability'] } : wave))
  const { findings, html } = await review(waves)
  const { survey } = findings
  expect(survey!.waves.map(({ wave }) => wave)).toEqual(waves.map(({ name }) => name).filter((name) => name !== 'wave 5'))
  expect(survey!.metrics.map(({ metric, missing }) => [metric, missing])).toEqual([['favourability', ['wave 5']], ['trust', ['wave 7']]])
  expect(codes(findings)).toContain('survey-metric-missing')
  expect(html).toContain('wave 5')
})
