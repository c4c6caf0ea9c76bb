import type { Browser, Page } from 'puppeteer'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { openBrowser } from '../../../generator/print/open-browser.ts'
import { render, type Rendering } from '../../../generator/render/render.ts'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import { axeSource, chartNames, sampleDocument, sampleRendering } from './sample-document.ts'
import { stretchedFindings } from './stretched-findings.ts'

let browser: Browser
let rendering: Rendering
let html: string

beforeAll(async () => {
  browser = await openBrowser()
  rendering = await sampleRendering()
  html = await render(sampleDocument(), rendering)
})
afterAll(async () => { await browser.close() })

async function opened(content: string, width: number, height = 900): Promise<{ readonly page: Page, readonly asked: readonly string[] }> {
  const page = await browser.newPage()
  await page.setViewport({ width, height })
  const asked: string[] = []
  page.on('request', (request) => { if (!request.url().startsWith('data:')) asked.push(request.url()) })
  await page.setContent(content, { waitUntil: 'load' })
  return { page, asked }
}

interface Violation { readonly id: string, readonly nodes: readonly { readonly html: string }[] }

async function violations(content: string, width: number): Promise<readonly string[]> {
  // The page's own policy lets no script in; the checker is put in past it.
  const page = await browser.newPage()
  await page.setBypassCSP(true)
  await page.setViewport({ width, height: 900 })
  await page.setContent(content, { waitUntil: 'load' })
  await page.evaluate(axeSource())
  const found = await page.evaluate('axe.run().then((results) => results.violations.map(({ id, nodes }) => ({ id, nodes: nodes.map(({ html }) => ({ html })) })))') as readonly Violation[]
  await page.close()
  return found.map(({ id, nodes }) => `${id}: ${nodes.slice(0, 3).map((node) => node.html.slice(0, 120)).join(' | ')}`)
}

describe('axe-core', () => {
  test.each([390, 1280])('finds nothing at %i px', async (width) => { expect(await violations(html, width)).toEqual([]) })
  test('it can fail: without the text alternative it objects', async () => {
    expect((await violations(html.replaceAll(/aria-label(?:ledby)?="[^"]*"/g, ''), 1280)).join()).toContain('svg-img-alt')
  })
})

describe.each([320, 390, 1280])('at %i px', (width) => {
  test('the page does not scroll sideways; a wide table does, in its own region', async () => {
    const { page } = await opened(html, width)
    expect(await page.evaluate('document.documentElement.scrollWidth')).toBeLessThanOrEqual(width)
    const regions = await page.$$eval('.table', (all) => all.map((region) => ({ scrolls: region.scrollWidth > region.clientWidth, reachable: region.getAttribute('tabindex') })))
    if (width < 600) expect(regions.some((region) => region.scrolls)).toBe(true)
    for (const region of regions) expect(region.reachable).toBe('0')
    await page.close()
  })

  test('each chart is shown once, in the drawing for this width', async () => {
    const { page } = await opened(html, width)
    const shown = await page.$$eval('.drawing svg', (all) => all.filter((svg) => svg.getBoundingClientRect().width > 0).map((svg) => svg.getAttribute('class')))
    expect(shown).toHaveLength(chartNames.length + 1)
    expect(new Set(shown)).toEqual(new Set([width < 600 ? 'for-narrow' : 'for-wide']))
    await page.close()
  })
})

test('labels on a phone are no smaller than 11 px', async () => {
  const { page } = await opened(html, 390)
  const scales = await page.$$eval('.drawing svg.for-narrow', (all) => all.map((svg) => svg.getBoundingClientRect().width / Number(svg.getAttribute('width'))))
  for (const scale of scales) expect(scale * rendering.theme.chart.font_size).toBeGreaterThanOrEqual(11)
  await page.close()
})

test('a review of twelve venues and long labels keeps to 320 px too', async () => {
  const findings = stretchedFindings({ venues: 12, topics: 20, steps: 104, grid: 'week' })
  const { page } = await opened(await render(sampleDocument(tablesOf(findings)), await sampleRendering(findings)), 320)
  expect(await page.evaluate('document.documentElement.scrollWidth')).toBeLessThanOrEqual(320)
  await page.close()
})

test('asks for nothing, and its own style and fonts pass its policy', async () => {
  const { page, asked } = await opened(html, 1280)
  await page.evaluate('document.fonts.ready.then(() => undefined)')
  expect(asked).toEqual([])
  expect(await page.evaluate('[...document.fonts].filter((face) => face.status === "loaded").length')).toBeGreaterThanOrEqual(2)
  expect(await page.evaluate('getComputedStyle(document.querySelector("h1")).fontWeight')).toBe('700')
  await page.close()
})

test('the first stop of the keyboard leads to the review', async () => {
  const { page } = await opened(html, 1280)
  await page.keyboard.press('Tab')
  expect(await page.evaluate('document.activeElement.className + document.activeElement.getAttribute("href")')).toBe('skip#review')
  await page.close()
})

test('holds no script, and the same document gives the same bytes', async () => {
  expect(html).not.toMatch(/<script|javascript:|<iframe|<link/)
  expect(await render(sampleDocument(), rendering)).toBe(html)
})

test('ids are unique, also where a chart is shown twice', () => {
  const ids = [...html.matchAll(/ id="([^"]+)"/g)].map((match) => match[1])
  expect(ids.length).toBeGreaterThan(10)
  expect(new Set(ids).size).toBe(ids.length)
})

test('a text alternative is written out once, escaped', () => {
  expect(html.split('Text alternative of &quot;venues&quot;, again')).toHaveLength(2)
})

test('an unknown chart is named', async () => {
  await expect(render(sampleDocument(), { ...rendering, charts: new Map() })).rejects.toThrow('"opinion"')
})
