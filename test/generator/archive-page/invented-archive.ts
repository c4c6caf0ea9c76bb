import { mkdir, mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { chainEndName, manifestName, sealName, sha256Of, writtenManifest, type Manifest } from '../../../generator/archive/manifest.ts'
import type { PageLooks } from '../../../generator/archive-page/archive-page.ts'
import { loadCharts } from '../../../generator/render/load-charts.ts'
import { loadTheme } from '../../../generator/theme/load-theme.ts'
import { loadWords } from '../../../generator/words/load-words.ts'
import type { Estimate } from '../../../model/findings/schema.ts'
import { templatesFolder } from '../../support/house-words.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

/** What is sealed, in the order of sealing. `findings` are written as they are where they are given. */
export interface Invented {
  readonly period: string
  readonly level: number
  readonly change?: number | null
  readonly reason?: string
  readonly version?: string
  readonly model?: string
  readonly caveats?: readonly object[]
  readonly interval?: number
  readonly prepared?: string
  readonly findings?: string
}

const around = (mean: number, half: number): Estimate => ({ mean, low: mean - half, high: mean + half, sd: half / 1.645 })
const sample = sampleFindings()

/** Real findings, as far as the page reads them, with the level and change that are asked for. */
function findingsOf({ period, level, change = 0.8, caveats, interval = 0.9 }: Invented): string {
  const end = new Date(Date.UTC(Number(period.slice(0, 4)), Number(period.slice(5, 7)), 0)).toISOString().slice(0, 10)
  const series = sample.opinion.series.map((at, i) => ({ ...at, adjusted: around(level + 2 * Math.sin(i / 3) - 1, 2.4) })).filter(({ step }) => step <= end)
  return JSON.stringify({
    ...sample, period: { name: period, start: `${period}-01`, end }, interval, caveats: caveats ?? sample.caveats,
    opinion: { ...sample.opinion, series, period: around(level, 2), change: change === null ? null : around(change, 1.2), probability_up: change === null ? null : change > 0 ? 0.93 : 0.04 },
  })
}

/** An archive of seals as `seal` leaves it, chain and all, of a few files each. */
export async function inventedArchive(seals: readonly Invented[]): Promise<{ readonly folder: string; readonly remove: () => Promise<void> }> {
  const folder = await mkdtemp(join(tmpdir(), 'tareline-archive-'))
  const revisions = new Map<string, number>()
  let previous: string | null = null
  for (const [at, invented] of seals.entries()) {
    const { period, reason = null, version = '1.2.3', model = 'a', prepared = 'Ana Reis' } = invented
    const revision = (revisions.get(period) ?? 0) + 1
    revisions.set(period, revision)
    const place = join(folder, sealName({ period, revision }))
    await mkdir(place)
    const contents = { 'findings.json': invented.findings ?? findingsOf(invented), 'review.html': `<p>${period}</p>`, 'review.pdf': '%PDF' }
    for (const [name, text] of Object.entries(contents)) await writeFile(join(place, name), text)
    const manifest: Manifest = {
      schema: 'tareline-manifest/1', account: 'invented', period, revision, reason, sequence: at + 1, previous, sealed_at: `2026-12-${String(at % 28 + 1).padStart(2, '0')}T09:00:00.000Z`,
      prepared_by: prepared, reviewed_by: 'Bo Lund', program: { version, model: model.repeat(64), code: 'b'.repeat(64), runtime: 'node 20', browser: 'Any/1.0' }, seed: 1,
      files: Object.entries(contents).map(([path, text]) => ({ path, bytes: Buffer.byteLength(text), sha256: sha256Of(text) })),
    }
    previous = sha256Of(writtenManifest(manifest))
    await writeFile(join(place, manifestName), writtenManifest(manifest))
    await writeFile(join(folder, chainEndName), JSON.stringify({ schema: 'tareline-chain-end/1', sequence: at + 1, manifest: previous }))
  }
  return { folder, remove: () => rm(folder, { recursive: true }) }
}

/** Five periods, the third revised twice, the last two by a later version of the program. */
export const fivePeriods: readonly Invented[] = [
  { period: '2026-06', level: 18.2, change: null, caveats: [] },
  { period: '2026-07', level: 19.4, change: 1.2 },
  { period: '2026-08', level: 17.1, change: -2.3, caveats: [] },
  { period: '2026-08', level: 17.6, change: -1.8, reason: 'Late posts of two boards', caveats: [] },
  { period: '2026-09', level: 20.3, change: 2.7, version: '1.3.0' },
  { period: '2026-08', level: 18, change: -1.4, reason: 'Coding audit of August repeated with 400 posts a venue', version: '1.3.0' },
  { period: '2026-10', level: 21.9, change: 1.6, version: '1.3.0' },
]

/** How a page looks and speaks in the house's looks. */
export async function looksIn(locale = 'en-GB', brand = 'Skerrow Ferries'): Promise<PageLooks> {
  const [words, theme, charts, css] = await Promise.all([
    loadWords(`${templatesFolder}/words`, locale), loadTheme(`${templatesFolder}/theme`), loadCharts(`${templatesFolder}/archive`), readFile(`${templatesFolder}/archive/archive.css`, 'utf8'),
  ])
  return { brand, words, theme, charts, css }
}
