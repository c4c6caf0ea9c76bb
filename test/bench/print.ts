import { readFileSync } from 'node:fs'
import { openBrowser } from '../../generator/print/open-browser.ts'
import { print } from '../../generator/print/print.ts'

/*
 * Printing against what the browser alone needs for the same HTML: npx tsx test/bench/print.ts [HTML]
 * Each run opens a browser, prints and closes it, in turn; medians.
 */
const html = readFileSync(process.argv[2] ?? 'demo/skerrow-ferries/review.html', 'utf8')
const runs = 5

async function alone(): Promise<void> {
  const browser = await openBrowser()
  const page = await browser.newPage()
  await page.setContent(html, { waitUntil: 'load' })
  await page.pdf({ preferCSSPageSize: true, printBackground: true, tagged: true, outline: true })
  await browser.close()
}

async function ours(): Promise<void> {
  const browser = await openBrowser()
  await print(html, browser, { title: 'Bench', author: 'Bench', date: '2026-10-31', language: 'en-GB' }, [])
  await browser.close()
}

async function seconds(work: () => Promise<void>): Promise<number> {
  const start = performance.now()
  await work()
  return (performance.now() - start) / 1000
}

const median = (values: readonly number[]) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)]

const times: { readonly alone: number; readonly ours: number }[] = []
for (let run = 0; run < runs; run++) times.push({ alone: await seconds(alone), ours: await seconds(ours) })
process.stdout.write(`print ${median(times.map((time) => time.ours)).toFixed(2)} s, the browser alone ${median(times.map((time) => time.alone)).toFixed(2)} s: ` +
  `${median(times.map((time) => time.ours / time.alone)).toFixed(2)} times\n`)
