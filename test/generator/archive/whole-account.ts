import { copyFile, mkdir, mkdtemp, realpath, rm, writeFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { createGenerator } from '../../../model/random/generator.ts'
import { quotedCsv } from '../intake/temporary-account.ts'

/** 700 posts by 250 authors in 26 weeks, and 200 about a competitor. */
function posts(): string {
  const random = createGenerator(31, 0)
  const any = <T>(...of: readonly T[]) => of[random.integer(of.length)]
  const rows = Array.from({ length: 700 }, (_, i) => [
    `p${i}`, new Date(Date.UTC(2025, 2, 3) + random.uniform() * 182 * 86_400_000).toISOString(), any('boards', 'blogs'), `author ${random.integer(250)}`,
    any('bad', 'fair', 'good', 'good'), any('fares', 'crew'), any('islander', 'visitor'), `post ${i} with words that only its author has written`,
  ])
  // more of them, about a competitor
  const beside = Array.from({ length: 200 }, (_, i) => [
    `q${i}`, new Date(Date.UTC(2025, 2, 3) + random.uniform() * 182 * 86_400_000).toISOString(), any('boards', 'blogs'), `author ${random.integer(150)}`,
    any('bad', 'fair', 'good'), any('fares', 'crew'), any('islander', 'visitor'), `post ${i} on another line with words that only its author has written`,
  ])
  return quotedCsv(['id', 'at', 'place', 'who', 'tone', 'theme', 'kind', 'body', 'about'], [...rows.map((row) => [...row, 'Skerrow Ferries']), ...beside.map((row) => [...row, 'Tarrin Line'])])
}

const account = `account: whole
brand: Skerrow Ferries
competitors: [Tarrin Line, '../Nobody: at all']
mentions:
  - files: posts/*.csv
    columns: { id: id, posted_at: at, venue: place, author: who, score: tone, topic: theme, segment: kind, text: body, brand: about }
    score: { labels: { bad: -1, fair: 0, good: 1 } }
survey: { files: survey/*.csv }
events: { files: events.csv }
outcome: { files: outcome.csv }
benchmark: { files: benchmark.csv }
coding_audit: { files: audit.csv }
importance: { files: importance.csv }
template: looks/template.md
words: words.yaml
theme: theme.yaml
notes: notes
prepared_by: Ana Reis
reviewed_by: Bo Lund
`

const chart = { data: { name: 'periods' }, mark: 'bar', encoding: { x: { field: 'start', type: 'ordinal' }, y: { field: 'mentions', type: 'quantitative' } } }

const files: Readonly<Record<string, string>> = {
  'account.yaml': account,
  'posts/posts.csv': posts(),
  'survey/waves.csv': `wave,field_start,field_end,metric,segment,base,value,kind\n${[3, 5, 7].map((month, w) => `w${w},2025-0${month}-10,2025-0${month}-16,favourability,,400,0.${51 + w},share`).join('\n')}\n`,
  'events.csv': 'date,label\n2025-06-10,New timetable\n',
  'outcome.csv': 'date,value\n2025-03-01,100\n2025-04-01,104\n2025-05-01,98\n2025-06-01,101\n',
  'benchmark.csv': 'margin,level,share\nsegment,islander,0.7\nsegment,visitor,0.3\n',
  'audit.csv': `venue,true_label,coded_label,count\n${['boards', 'blogs'].flatMap((venue) => ['bad', 'fair', 'good'].flatMap((truth) => ['bad', 'fair', 'good'].map((coded) => `${venue},${truth},${coded},${truth === coded ? 30 : 3}`))).join('\n')}\n`,
  'importance.csv': 'topic,weight\nfares,0.6\ncrew,0.4\n',
  'looks/template.md': '::section{name="opinion"}\n\n::notes\n\n::section{name="own"}\n\n::section{name="competitors"}\n\n::section{name="made"}\n\n::section{name="glossary"}\n',
  'looks/sections/own.md': '## Our own\n\n::chart{name="months" title="Posts by month" alt="Bars: posts by month."}\n\n::include{file="texts/origin.md"}\n',
  'looks/charts/months.json': JSON.stringify(chart),
  'texts/origin.md': 'Where the posts come from.\n',
  'words.yaml': 'term-venue: Place\nsaid-earlier: Words of an earlier month.\n',
  'theme.yaml': `logo: { file: logo.svg, alt: Skerrow }\ntypeface: { regular: fonts/400.woff2, bold: fonts/700.woff2 }\n`,
  'logo.svg': '<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 2 1"><rect width="2" height="1"/></svg>',
  'notes/2025-07.md': '::say{message="said-earlier"}\n',
  'notes/2025-08.md': 'The month was quiet.\n',
}

/** Files that a build of 2025-08 reads, and whether a seal keeps them. */
export const inputsOf2025August: Readonly<Record<string, boolean>> = {
  ...Object.fromEntries(Object.keys(files).filter((path) => path !== 'notes/2025-07.md').map((path) => [path, !path.startsWith('posts/')])),
  'fonts/400.woff2': true, 'fonts/700.woff2': true,
}

/** An account folder with every kind of file that an account may name. */
export async function wholeAccount(): Promise<{ readonly folder: string; readonly remove: () => Promise<void> }> {
  const folder = await realpath(await mkdtemp(join(tmpdir(), 'tareline-whole-')))
  for (const [path, content] of Object.entries(files)) {
    await mkdir(dirname(join(folder, path)), { recursive: true })
    await writeFile(join(folder, path), content)
  }
  await mkdir(join(folder, 'fonts'))
  for (const weight of [400, 700]) {
    await copyFile(createRequire(import.meta.url).resolve(`@fontsource/source-serif-4/files/source-serif-4-latin-${weight}-normal.woff2`), join(folder, 'fonts', `${weight}.woff2`))
  }
  return { folder, remove: () => rm(folder, { recursive: true, force: true }) }
}
