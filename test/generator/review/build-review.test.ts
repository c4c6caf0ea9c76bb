import { createHash } from 'node:crypto'
import { appendFile, cp, mkdir, mkdtemp, readFile, readdir, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { basename, join } from 'node:path'
import axe from 'axe-core'
import { PDFDocument, PDFName, PDFDict } from '@cantoo/pdf-lib'
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs'
import type { Browser } from 'puppeteer'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { findingsSchema } from '../../../model/findings/schema.ts'
import { readAccount } from '../../../generator/account/read-account.ts'
import { buildReview } from '../../../generator/review/build-review.ts'
import { silent } from '../../../generator/review/stages.ts'
import { InputFault } from '../../../generator/faults/fault.ts'
import { openBrowser } from '../../../generator/print/open-browser.ts'
import { thisProgram } from '../../../generator/program/program.ts'

const openCells = join(import.meta.dirname, '../intake/fixtures/open-cells')
let scratch: string
let account: string
let browser: Browser

/** A fortnightly survey beside the cells: twelve waves, of which the last four can be forecast. */
const waves = Array.from({ length: 12 }, (_, w) => {
  const day = (add: number) => new Date(Date.UTC(2025, 2, 10 + 14 * w + add)).toISOString().slice(0, 10)
  return `w${w + 1},${day(0)},${day(6)},favourability,,400,360,${(0.5 + 0.03 * Math.sin(w)).toFixed(3)},share,`
})

beforeAll(async () => {
  scratch = await mkdtemp(join(tmpdir(), 'build-'))
  account = await copyAccount('account')
  browser = await openBrowser()
})
afterAll(async () => {
  await browser.close()
  await rm(scratch, { recursive: true, force: true })
})

/** A copy of the account with its survey, and a cache of its own. */
async function copyAccount(name: string): Promise<string> {
  const folder = join(scratch, 'accounts', name)
  await cp(openCells, folder, { recursive: true })
  // other tests build where the fixture lies
  await rm(join(folder, 'cache'), { recursive: true, force: true })
  await mkdir(join(folder, 'survey'))
  await writeFile(join(folder, 'survey/waves.csv'), `wave,field_start,field_end,metric,segment,base,effective_base,value,kind,sd\n${waves.join('\n')}\n`)
  await appendFile(join(folder, 'account.yaml'), 'survey: { files: survey/*.csv, lags: [-2, 6] }\n')
  return folder
}

async function build(out: string, options: { readonly threads?: number; readonly seed?: number; readonly from?: string } = {}) {
  return buildReview(thisProgram(), await readAccount(options.from ?? account), {
    out: join(scratch, out), seed: options.seed ?? 1, threads: options.threads, browser: () => Promise.resolve(browser), progress: silent,
  })
}

/** Every file below a folder with its hash. */
async function hashes(folder: string): Promise<Record<string, string>> {
  const files = await readdir(folder, { recursive: true, withFileTypes: true })
  const entries = files.filter((file) => file.isFile()).map(async (file) => {
    const path = join(file.parentPath, file.name)
    return [path.slice(folder.length), createHash('sha256').update(await readFile(path)).digest('hex')] as const
  })
  return Object.fromEntries((await Promise.all(entries)).sort(([a], [b]) => (a < b ? -1 : 1)))
}

describe('a build', () => {
  test('with the same inputs and seed gives the same bytes, with one thread and with two', async () => {
    await build('one', { threads: 1 })
    await build('two', { threads: 2, from: await copyAccount('twin') })
    const one = await hashes(join(scratch, 'one'))
    expect(Object.keys(one)).toEqual(expect.arrayContaining(['/findings.json', '/review.html', '/review.pdf', '/tables/opinion.csv']))
    expect(await hashes(join(scratch, 'two'))).toEqual(one)
  })

  test('from what it remembers, is the same to the byte, and takes no fit', async () => {
    const remembered = await readdir(join(account, 'cache/forecasts'))
    // four waves and the next one
    expect(remembered).toHaveLength(5)
    await rm(join(account, 'cache/forecasts'), { recursive: true })
    await build('again', { threads: 1 })
    expect(await hashes(join(scratch, 'again'))).toEqual(await hashes(join(scratch, 'one')))
    await expect(readdir(join(account, 'cache/forecasts'))).rejects.toThrow('ENOENT')
  })

  test('does not mind a cache that was spoilt', async () => {
    const analyses = join(account, 'cache/analyses')
    for (const file of await readdir(analyses)) await writeFile(join(analyses, file), '{"survey":')
    await build('mended', { threads: 2 })
    expect(await hashes(join(scratch, 'mended'))).toEqual(await hashes(join(scratch, 'one')))
  })

  test('nor one that was forged, hash and all, and can’t be worded', async () => {
    const analyses = join(account, 'cache/analyses')
    for (const file of await readdir(analyses)) {
      const { result } = JSON.parse(await readFile(join(analyses, file), 'utf8')) as { result: { caveats: { code: string }[] } }
      result.caveats[0].code = 'no-such'
      await writeFile(join(analyses, file), JSON.stringify({ sha256: createHash('sha256').update(JSON.stringify(result)).digest('hex'), result }))
    }
    await build('mended', { threads: 2 })
    expect(await hashes(join(scratch, 'mended'))).toEqual(await hashes(join(scratch, 'one')))
  })

  test('it can fail: another seed gives other bytes', async () => {
    await build('other', { seed: 2 })
    const [one, other] = [await hashes(join(scratch, 'one')), await hashes(join(scratch, 'other'))]
    expect(other['/findings.json']).not.toBe(one['/findings.json'])
    expect(other['/review.pdf']).not.toBe(one['/review.pdf'])
  })

  test('writes findings of the shape that is shipped', async () => {
    const findings = findingsSchema.parse(JSON.parse(await readFile(join(scratch, 'one/findings.json'), 'utf8')))
    expect(findings.period.name).toBe('2025-08')
    expect(findings.program.seed).toBe(1)
  })

  test('replaces a draft, and leaves no unfinished folder behind', async () => {
    await build('one', { threads: 1 })
    expect((await readdir(scratch)).filter((entry) => entry.startsWith('.'))).toEqual([])
  })

  test('refuses a folder that holds anything else, and leaves it as it is', async () => {
    const folder = join(scratch, 'mine')
    await mkdir(folder)
    await writeFile(join(folder, 'letter.txt'), 'dear client')
    const fault = await build('mine').catch((error: unknown) => error)
    expect(fault).toBeInstanceOf(InputFault)
    expect((fault as InputFault).faults[0].code).toBe('out-not-a-draft')
    expect(await readdir(folder)).toEqual(['letter.txt'])
  })

  test('that fails on the way leaves the earlier draft untouched and no trace', async () => {
    const before = await hashes(join(scratch, 'one'))
    const broken = buildReview(thisProgram(), await readAccount(account), {
      out: join(scratch, 'one'), seed: 1, browser: () => Promise.reject(new Error('no browser')), progress: silent,
    })
    await expect(broken).rejects.toThrow('no browser')
    expect(await hashes(join(scratch, 'one'))).toEqual(before)
    expect((await readdir(scratch)).filter((entry) => entry.startsWith('.'))).toEqual([])
  })
})

describe('an account’s own template', () => {
  test('is used, and its fault is told at its line', async () => {
    const own = join(scratch, 'own')
    await cp(openCells, own, { recursive: true })
    const yaml = await readFile(join(own, 'account.yaml'), 'utf8')
    await writeFile(join(own, 'account.yaml'), `${yaml}template: template.md\n`)
    const run = async () => buildReview(thisProgram(), await readAccount(own), { out: join(scratch, 'own-draft'), seed: 1, browser: null, progress: silent })

    await writeFile(join(own, 'template.md'), '::section{name="opinion"}\n\n::section{name="glossary"}\n')
    await run()
    const html = await readFile(join(scratch, 'own-draft/review.html'), 'utf8')
    expect(html).toContain('id="opinion-heading"')
    expect(html).not.toContain('id="venues-heading"')

    await writeFile(join(own, 'template.md'), 'Opinion\n\n::section{name="opinoin"}\n')
    const fault = await run().catch((error: unknown) => error)
    expect((fault as InputFault).faults[0]).toMatchObject({ place: 'template.md:3:1' })
    expect((fault as InputFault).faults[0].mend).toContain('opinion')
  })
})

describe('the review itself', () => {
  test.each([390, 1280])('has no violation that axe-core finds, at %i px', async (width) => {
    const page = await browser.newPage()
    try {
      await page.setBypassCSP(true)
      await page.setViewport({ width, height: 900 })
      await page.setContent(await readFile(join(scratch, 'one/review.html'), 'utf8'), { waitUntil: 'load' })
      await page.evaluate(axe.source)
      const violations = await page.evaluate('axe.run().then((found) => found.violations.map(({ id, nodes }) => `${id}: ${nodes[0].html}`))')
      expect(violations).toEqual([])
      expect(await page.evaluate('document.documentElement.scrollWidth <= window.innerWidth')).toBe(true)
    } finally {
      await page.close()
    }
  })

  test('is a PDF to which findings and tables are attached, byte for byte', async () => {
    const document = await getDocument({ data: new Uint8Array(await readFile(join(scratch, 'one/review.pdf'))), verbosity: 0 }).promise
    const attached = await document.getAttachments() as Readonly<Record<string, { readonly content: Uint8Array }>>
    const files = ['findings.json', ...(await readdir(join(scratch, 'one/tables'))).map((name) => `tables/${name}`)]
    expect(Object.keys(attached).sort()).toEqual(files.map((file) => basename(file)).sort())
    for (const file of files) expect(Buffer.from(attached[basename(file)].content).equals(await readFile(join(scratch, 'one', file))), file).toBe(true)
    await document.destroy()
  })

  test('is a tagged PDF whose every figure has a text alternative', async () => {
    const pdf = await PDFDocument.load(await readFile(join(scratch, 'one/review.pdf')))
    expect(pdf.catalog.lookup(PDFName.of('MarkInfo'), PDFDict).get(PDFName.of('Marked'))?.toString()).toBe('true')
    const figures = pdf.context.enumerateIndirectObjects().map(([, object]) => object)
      .filter((object): object is PDFDict => object instanceof PDFDict && object.get(PDFName.of('S')) === PDFName.of('Figure'))
    expect(figures.length).toBeGreaterThan(5)
    for (const figure of figures) expect(figure.get(PDFName.of('Alt'))).toBeDefined()
  })
})
