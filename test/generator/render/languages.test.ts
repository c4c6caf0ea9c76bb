import { readdirSync } from 'node:fs'
import axe from 'axe-core'
import type { Browser, Page } from 'puppeteer'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { compose } from '../../../generator/compose/compose.ts'
import { openBrowser } from '../../../generator/print/open-browser.ts'
import { imprintOf } from '../../../generator/render/imprint.ts'
import { loadCharts } from '../../../generator/render/load-charts.ts'
import { render } from '../../../generator/render/render.ts'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import { loadTheme } from '../../../generator/theme/load-theme.ts'
import { loadWords } from '../../../generator/words/load-words.ts'
import { wordFindings } from '../../../generator/words/word-findings.ts'
import { houseTemplate } from '../../support/house-composition.ts'
import { templatesFolder } from '../../support/house-words.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

let browser: Browser
beforeAll(async () => { browser = await openBrowser() })
afterAll(() => browser.close())

/** The house's whole review in a language, with everything in it. */
async function reviewIn(locale: string): Promise<string> {
  const [words, charts, theme] = await Promise.all([loadWords(`${templatesFolder}/words`, locale), loadCharts(`${templatesFolder}/charts`), loadTheme(`${templatesFolder}/theme`)])
  const findings = wordFindings(sampleFindings(), words)
  const tables = tablesOf(findings)
  return render(compose({ template: houseTemplate, words, findings, tables, charts: [...charts.keys()] }), { tables, charts, words, theme, imprint: imprintOf(findings, words) })
}

async function open(html: string, width: number): Promise<Page> {
  const page = await browser.newPage()
  await page.setBypassCSP(true)
  await page.setViewport({ width, height: 900 })
  await page.setContent(html, { waitUntil: 'load' })
  return page
}

const locales = ['en-GB', 'de-DE', 'fr-FR', 'pt-BR'] as const

test('every catalogue that is there is tried here', () => {
  const catalogues = readdirSync(`${templatesFolder}/words`).map((file) => file.replace(/\.yaml$/, '')).sort()
  expect(locales.map((locale) => locale.slice(0, 2)).sort()).toEqual(catalogues)
})

describe.each(locales)('the review in %s', (locale) => {
  let html: string
  beforeAll(async () => { html = await reviewIn(locale) })

  test('has no violation that axe-core finds', async () => {
    const page = await open(html, 1280)
    await page.evaluate(axe.source)
    expect(await page.evaluate('axe.run().then((found) => found.violations.map(({ id, nodes }) => `${id}: ${nodes[0].html}`))')).toEqual([])
    await page.close()
  })

  test.each([320, 390])('needs no scrolling sideways at %i px', async (width) => {
    const page = await open(html, width)
    const wide = await page.evaluate(`[...document.querySelectorAll('main *')]
      .filter((element) => element.getBoundingClientRect().right > innerWidth + 1 && element.closest('.table, svg') === null).map((element) => element.outerHTML.slice(0, 120))`)
    expect(wide).toEqual([])
    expect(await page.evaluate('document.documentElement.scrollWidth')).toBeLessThanOrEqual(width)
    await page.close()
  })

  test('can be gone through by keyboard: the way past the head, links, and tables that scroll, each showing where it is', async () => {
    const page = await open(html, 390)
    await page.keyboard.press('Tab')
    expect(await page.evaluate('document.activeElement.className')).toBe('skip')
    const seen = new Set<string>()
    for (let press = 0; press < 60; press++) {
      await page.keyboard.press('Tab')
      const { what, shown } = await page.evaluate(`(() => {
        const element = document.activeElement
        const { outlineStyle, outlineWidth } = getComputedStyle(element)
        return { what: element.tagName + (element.classList.contains('table') ? '.table' : ''), shown: outlineStyle !== 'none' && outlineWidth !== '0px' }
      })()`) as { readonly what: string; readonly shown: boolean }
      if (what === 'BODY') break
      expect(shown, what).toBe(true)
      seen.add(what)
    }
    expect([...seen].sort()).toEqual(['A', 'DIV.table'])
    await page.close()
  })

  test('says its language and nothing of a missing figure', () => {
    expect(html).toContain(`<html lang="${locale}"`)
    expect(html.replace(/data:[^)"']+/g, '')).not.toMatch(/undefined|\bNaN\b|\[object/)
  })
})
