import axe from 'axe-core'
import type { Browser, Page, SerializedAXNode } from 'puppeteer'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { archivePage } from '../../../generator/archive-page/archive-page.ts'
import { readReviews } from '../../../generator/archive-page/read-reviews.ts'
import { openBrowser } from '../../../generator/print/open-browser.ts'
import { literalsOf } from '../../support/pseudo-words.ts'
import { fivePeriods, inventedArchive, looksIn, type Invented } from './invented-archive.ts'

async function pageOf(seals: readonly Invented[], locale?: string, brand?: string): Promise<string> {
  const { folder, remove } = await inventedArchive(seals)
  try {
    return await archivePage(await readReviews(folder), await looksIn(locale, brand))
  } finally {
    await remove()
  }
}

let browser: Browser
let html: string
beforeAll(async () => {
  browser = await openBrowser()
  html = await pageOf(fivePeriods)
})
afterAll(() => browser.close())

async function open(content: string, width: number): Promise<Page> {
  const page = await browser.newPage()
  await page.setBypassCSP(true)
  await page.setViewport({ width, height: 900 })
  await page.setContent(content, { waitUntil: 'load' })
  return page
}

const violations = async (page: Page): Promise<readonly string[]> => {
  await page.evaluate(axe.source)
  return await page.evaluate('axe.run().then((found) => found.violations.map(({ id, nodes }) => `${id}: ${nodes[0].html}`))') as readonly string[]
}

const rowsOf = (page: Page) => page.evaluate(`[...document.querySelectorAll('tbody tr')].map((row) => [...row.children].map((cell) => cell.innerText.replace(/\\s+/g, ' ').trim()))`) as Promise<readonly (readonly string[])[]>
const withoutBytes = (content: string) => content.replace(/data:[^)"']+/g, '')

test('every review has its row, newest period first, with its figures; a rule stands where the program changed', async () => {
  const page = await open(html, 1280)
  const [october, september, third, rule, second, first, july, june, ...more] = await rowsOf(page)
  expect(october.slice(0, 5)).toEqual(['October 2026 PDF file All figures', '', '21.9 19.9 to 23.9', '+1.6 +0.4 to +2.8', '93%'])
  expect(october[5]).toMatch(/^2 The raw average and opinion part ways Who is heard is not who buys: segment$/)
  expect(third.slice(0, 7)).toEqual(['August 2026, revision 3 PDF file All figures', '', '18.0 16.0 to 20.0', '−1.4 −2.6 to −0.2', '4%', expect.stringMatching(/^2 /),
    'Revision 3 Coding audit of August repeated with 400 posts a venue Opinion against revision 2: +0.4 Opinion against the first review: +0.9'])
  expect(rule).toEqual(["Above, the reviews are by version 1.3.0 of the program; below, by version 1.2.3. Part of a difference may be the program's."])
  expect([september, second, first, july, june].map(([head]) => head.replace(' PDF file All figures', ''))).toEqual(['September 2026', 'August 2026, revision 2', 'August 2026, revision 1', 'July 2026', 'June 2026'])
  expect(june.slice(3, 6)).toEqual(['–', '–', '0'])
  expect(more).toEqual([])
  await page.close()
})

test('other code of the model under the same version is a break too', async () => {
  const broken = await pageOf([{ period: '2026-09', level: 1 }, { period: '2026-10', level: 1, model: 'c' }])
  expect(broken.includes('with other code of the model')).toBe(true)
})

test('holds no script and asks for nothing; its policy forbids the rest, and its style passes it', async () => {
  expect(withoutBytes(html).match(/<script|javascript:|<iframe|<link|https?:/g)).toBeNull()
  const page = await browser.newPage()
  const asked: string[] = []
  page.on('request', (request) => { if (!request.url().startsWith('data:')) asked.push(request.url()) })
  await page.setContent(html, { waitUntil: 'load' })
  await page.evaluate('document.fonts.ready.then(() => undefined)')
  expect(asked).toEqual([])
  expect(await page.$eval('meta[http-equiv="Content-Security-Policy"]', (meta) => meta.getAttribute('content'))).toMatch(/^default-src 'none'; style-src 'sha256-[^']+'; font-src data:; base-uri 'none'; form-action 'none'$/)
  expect(await page.evaluate('[...document.fonts].filter((face) => face.status === "loaded").length')).toBeGreaterThanOrEqual(2)
  expect(await page.evaluate('getComputedStyle(document.querySelector("main")).maxWidth')).toBe(`${74 * 17}px`)
  await page.close()
})

test('the same archive gives the same bytes', async () => { expect(await pageOf(fivePeriods) === html).toBe(true) })

test('ids are unique, and every picture has a text alternative', () => {
  const ids = [...html.matchAll(/ id="([^"]+)"/g)].map((match) => match[1])
  expect(new Set(ids).size).toBe(ids.length)
  const pictures = [...html.matchAll(/<svg [^>]*>/g)].map(([tag]) => tag)
  // one over all periods in two sizes, and a small one for each review
  expect(pictures).toHaveLength(2 + fivePeriods.length)
  for (const tag of pictures) expect(tag).toMatch(/role="img" aria-label(ledby)?="[^"]+"/)
})

test('says how to check the archive, names the last manifest, and claims nothing of whether it is sound', async () => {
  const { folder, remove } = await inventedArchive(fivePeriods)
  const { reviews } = await readReviews(folder)
  await remove()
  expect(html.includes('tareline verify')).toBe(true)
  expect(html.includes(`<code>${reviews[6].hash}</code>`)).toBe(true)
  expect(withoutBytes(html).match(/\b(sound|verified|intact|authentic)\b/g)).toBeNull()
})

describe.each([320, 390, 1280])('at %i px', (width) => {
  test('no violation that axe-core finds, no scrolling sideways, each picture shown once', async () => {
    const page = await open(html, width)
    expect(await violations(page)).toEqual([])
    expect(await page.evaluate('document.documentElement.scrollWidth')).toBeLessThanOrEqual(width)
    if (width < 600) expect(await page.evaluate('(({ scrollWidth, clientWidth }) => scrollWidth - clientWidth)(document.querySelector(".table"))')).toBe(0)
    expect(await page.$$eval('svg', (all) => all.filter((svg) => svg.getBoundingClientRect().width > 0).length)).toBe(1 + fivePeriods.length)
    await page.close()
  })
})

test('a phone still has a table of rows and cells for those who hear it', async () => {
  const page = await open(html, 390)
  const roles: string[] = []
  const walk = (node: SerializedAXNode | null): void => { if (node !== null) { roles.push(node.role); node.children?.forEach(walk) } }
  walk(await page.accessibility.snapshot({ interestingOnly: false }))
  const count = (role: string): number => roles.filter((one) => one === role).length
  expect([count('table'), count('columnheader'), count('rowheader'), count('row')]).toEqual([1, 8, fivePeriods.length, fivePeriods.length + 2])
  await page.close()
})

test('it can fail: without the text alternatives axe-core objects', async () => {
  const page = await open(html.replaceAll(/aria-label(?:ledby)?="[^"]*"/g, ''), 390)
  expect((await violations(page)).join()).toContain('svg-img-alt')
  await page.close()
})

test('all links are reached by keyboard, each showing where it is; the first leads past the head', async () => {
  const page = await open(html, 390)
  await page.keyboard.press('Tab')
  expect(await page.evaluate('document.activeElement.className + document.activeElement.textContent')).toBe('skipSkip to the archive')
  const seen: string[] = []
  for (let press = 0; press < 60; press++) {
    await page.keyboard.press('Tab')
    const { href, outlined } = await page.evaluate('({ href: document.activeElement.getAttribute("href"), outlined: getComputedStyle(document.activeElement).outlineStyle !== "none" })') as { readonly href: string | null; readonly outlined: boolean }
    if (await page.evaluate('document.activeElement === document.body')) break
    expect(outlined).toBe(true)
    if (href !== null) seen.push(href)
  }
  const names = ['2026-10', '2026-09', '2026-08.r3', '2026-08.r2', '2026-08', '2026-07', '2026-06']
  expect(seen).toEqual(names.flatMap((name) => ['review.html', 'review.pdf', 'findings.json'].map((file) => `${name}/${file}`)))
  await page.close()
})

describe.each(['de-DE', 'fr-FR', 'pt-BR'])('in %s', (locale) => {
  test('says its language, nothing in English and nothing of a missing figure, and keeps to a phone', async () => {
    const made = await pageOf([...fivePeriods, { period: '2026-11', level: 1, findings: '{}', reason: 'x' }, { period: '2026-12', level: 3, interval: 0.8, model: 'c', version: '1.3.0' }], locale)
    expect(made.slice(0, 100)).toContain(`<html lang="${locale}"`)
    expect(withoutBytes(made).match(/undefined|\bNaN\b|\[object/g)).toBeNull()
    const english = (await looksIn()).words
    const page = await open(made, 320)
    const text = await page.evaluate('document.body.innerText + [...document.querySelectorAll("[aria-label]")].map((one) => one.getAttribute("aria-label")).join()') as string
    expect(text.match(/.{0,40}[#{}].{0,10}/g)).toBeNull()
    for (const key of english.keys.filter((name) => name.startsWith('archive-page-'))) {
      for (const said of literalsOf(`{x}${english.say(key, Object.fromEntries(english.argumentsOf(key).map((name) => [name, 1])))}`)) if (/\p{L}{4}.*\p{L}{4}/u.test(said)) expect(text, key).not.toContain(said.trim())
    }
    expect(await page.evaluate('document.documentElement.scrollWidth')).toBeLessThanOrEqual(320)
    expect(await violations(page)).toEqual([])
    await page.close()
  })
})

const hostile = '"><script>alert(1)</script><img src=x onerror=alert(1)>&amp;${x}{brand} data-drawing="steps-1"></title></style><!-- \' <div class="drawing" data-drawing="opinion">'

test('text that the account, people and findings give stays text', async () => {
  const made = await pageOf([
    { period: '2026-09', level: 1, prepared: hostile, caveats: [{ code: hostile, severity: 'serious', evidence: hostile, figures: {} }, { code: 'venue-thin', severity: 'serious', evidence: 'x', figures: { venue: hostile } }] },
    { period: '2026-09', level: 2, reason: hostile, version: hostile, caveats: [] },
  ], 'en-GB', hostile)
  const page = await open(made, 1280)
  expect(await page.evaluate('document.querySelectorAll("script, img, iframe").length')).toBe(0)
  expect(await page.evaluate('[...document.querySelectorAll("*")].flatMap((one) => [...one.attributes]).filter(({ name }) => name.startsWith("on")).length')).toBe(0)
  expect(await page.title()).toBe(`${hostile.replace(/\s+/g, ' ')}: archive of brand health reviews`)
  expect(await page.$eval('h1', (head) => head.textContent)).toBe(hostile)
  expect(await page.$$eval('.reason', (all) => all.map((reason) => reason.textContent))).toEqual([hostile])
  expect((await page.$$eval('li', (all) => all.map((item) => item.textContent))).slice(0, 2)).toEqual([hostile, expect.stringContaining(hostile)])
  expect(await page.$$eval('svg', (all) => all.length)).toBe(4)
  await page.close()
})

test('a review whose figures cannot be read stands there with what its manifest says', async () => {
  const page = await open(await pageOf([{ period: '2026-09', level: 1 }, { period: '2026-10', level: 1, findings: '{"schema":"tareline-findings/7"}' }]), 1280)
  const [october] = await rowsOf(page)
  expect(october).toEqual(['October 2026 PDF file All figures', '', 'Its figures are not told: findings.json has a form that this program does not know.', 'First review', expect.stringMatching(/^2 Dec 2026 Prepared by Ana Reis\. Reviewed by Bo Lund\. [0-9a-f]{12}$/)])
  await page.close()
})

test.each([
  ['none of which can be read', [{ period: '2026-10', level: 1, findings: '' }]], ['of one period', [{ period: '2026-10', level: 1 }]],
  ['of figures that are all one', [{ period: '2026-09', level: 0, change: 0 }, { period: '2026-10', level: 0, change: 0 }]],
] as const)('an archive %s has a page too', async (_, seals) => {
  const made = await pageOf(seals)
  const page = await open(made, 390)
  expect(await violations(page)).toEqual([])
  expect((await rowsOf(page)).length).toBe(seals.length)
  expect(withoutBytes(made).match(/undefined|\bNaN\b/g)).toBeNull()
  await page.close()
})

test('five years are drawn in less than five seconds of a processor', async () => {
  const months = Array.from({ length: 60 }, (_, i) => `${2022 + Math.floor(i / 12)}-${String(i % 12 + 1).padStart(2, '0')}`).filter((name) => name >= '2024-06' && name <= '2026-10')
  const more = Array.from({ length: 60 - months.length }, (_, i) => ({ period: months[i % months.length], level: 12 + i / 10, reason: 'again' }))
  const { folder, remove } = await inventedArchive([...months.map((period, i) => ({ period, level: 15 + 5 * Math.sin(i / 6) })), ...more])
  const looks = await looksIn()
  // not by the clock: that would measure what else the machine does
  const began = process.cpuUsage()
  const made = await archivePage(await readReviews(folder), looks)
  const { user, system } = process.cpuUsage(began)
  await remove()
  expect(made.match(/<svg /g)).toHaveLength(2 + 60)
  expect(made.length).toBeLessThan(500_000)
  expect((user + system) / 1e6).toBeLessThan(5)
})
