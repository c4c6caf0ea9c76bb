import { copyFile, mkdtemp, realpath, rm, writeFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { PDFDocument } from '@cantoo/pdf-lib'
import type { Browser } from 'puppeteer'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { openBrowser } from '../../../generator/print/open-browser.ts'
import { isolatedPage } from '../../../generator/print/isolate-page.ts'
import { render } from '../../../generator/render/render.ts'
import { loadTheme } from '../../../generator/theme/load-theme.ts'
import { axeSource, sampleDocument, sampleRendering, templates } from './sample-document.ts'

const yaml = `colours: { accent: '#7a2e5d', ink: '#2b1f2a', paper: '#fffdf8', highlight: '#fbe9e2', loss: '#a8741a' }
logo: { file: logo.svg, alt: 'Skerrow "Ferries" <b>' }
typeface: { regular: regular.woff2, bold: bold.woff2 }
paper: letter
cover: true
running: { head: "{brand} · {period}", foot: "{page} / {pages}" }
`
let browser: Browser
let html: string
let folder: string

beforeAll(async () => {
  browser = await openBrowser()
  folder = await realpath(await mkdtemp(join(tmpdir(), 'tareline-themed-')))
  await writeFile(join(folder, 'theme.yaml'), yaml)
  await writeFile(join(folder, 'logo.svg'), '<svg viewBox="0 0 30 10"><rect width="30" height="10" fill="#7a2e5d"/></svg>')
  const file = (weight: number) => createRequire(import.meta.url).resolve(`@fontsource/source-serif-4/files/source-serif-4-latin-${weight}-normal.woff2`)
  await Promise.all([copyFile(file(400), join(folder, 'regular.woff2')), copyFile(file(700), join(folder, 'bold.woff2'))])
  const theme = await loadTheme(`${templates}theme`, { folder, path: 'theme.yaml', place: 'account.yaml theme' })
  html = await render(sampleDocument(), { ...await sampleRendering(), theme })
})
afterAll(async () => {
  await browser.close()
  await rm(folder, { recursive: true })
})

describe('a review in an account\u2019s looks', () => {
  test('shows its logo and typeface past its own policy, and asks for nothing', async () => {
    const { page, refused } = await isolatedPage(browser)
    await page.setContent(html, { waitUntil: 'load' })
    await page.evaluate('document.fonts.ready.then(() => undefined)')
    expect(refused).toEqual([])
    expect(await page.$$eval('img', (all) => all.map((image) => [image.naturalWidth / image.naturalHeight, image.alt]))).toEqual(Array.from({ length: 2 }, () => [3, 'Skerrow "Ferries" <b>']))
    expect(await page.evaluate('[...document.fonts].filter(({ family, status }) => family.includes("Account Typeface") && status === "loaded").length')).toBeGreaterThanOrEqual(2)
    expect(await page.evaluate('getComputedStyle(document.documentElement).backgroundColor')).toBe('rgb(255, 253, 248)')
    expect(await page.$$eval('.cover', (all) => all.map((cover) => cover.getBoundingClientRect().height))).toEqual([0])
    await page.browserContext().close()
  })

  test('its policy lets pictures in only as data, and only where there is a logo', async () => {
    expect(html.includes('font-src data:; img-src data:; base-uri')).toBe(true)
    expect((await render(sampleDocument(), await sampleRendering())).includes('img-src')).toBe(false)
    expect(/<script|https?:\/\/(?!example\.org)/.exec(html)).toBeNull()
  })

  test('prints on letter paper, the cover on a page of its own', async () => {
    const { page } = await isolatedPage(browser)
    await page.setContent(html, { waitUntil: 'load' })
    const pdf = await PDFDocument.load(await page.pdf({ preferCSSPageSize: true, printBackground: true }))
    expect(pdf.getPage(0).getSize()).toEqual({ width: 612, height: 792 })
    await page.emulateMediaType('print')
    expect(await page.$eval('.cover', (cover) => cover.textContent)).toBe('Skerrow FerriesBrand health reviewOctober 2026By Ines Carrow,')
    expect(await page.evaluate('getComputedStyle(document.querySelector(".cover")).breakAfter')).toBe('page')
    // 232 mm of the 233.4 between the margins
    expect(await page.$eval('.cover', (cover) => cover.getBoundingClientRect().height / 96 * 25.4)).toBeCloseTo(232, 1)
    await page.browserContext().close()
  })

  test('has no finding of axe-core', async () => {
    const page = await browser.newPage()
    await page.setBypassCSP(true)
    await page.setContent(html, { waitUntil: 'load' })
    await page.evaluate(axeSource())
    expect(await page.evaluate('axe.run().then((results) => results.violations.map(({ id }) => id))')).toEqual([])
    await page.close()
  })
})
