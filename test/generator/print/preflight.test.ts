import { spawnSync } from 'node:child_process'
import { existsSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { PDFDocument, PDFName } from '@cantoo/pdf-lib'
import { describe, expect, test } from 'vitest'
import { openBrowser } from '../../../generator/print/open-browser.ts'
import { print } from '../../../generator/print/print.ts'
import { smallFacts, smallFiles, smallReview } from './small-review.ts'

/*
 * Apache PDFBox' preflight, an independent validator, for PDF/A-1b: no registry carries one for PDF/A-3. Debian: libpdfbox2-java, libactivation-java,
 * libjaxb-api-java, a Java runtime. It runs only where they are.
 */
const jars = ['preflight', 'pdfbox2', 'fontbox2', 'xmpbox', 'commons-logging', 'javax.activation', 'jaxb-api'].map((name) => `/usr/share/java/${name}.jar`)
const installed = jars.every((jar) => existsSync(jar)) && spawnSync('java', ['-version']).status === 0

/** What PDF/A-1 alone forbids, by the validator's codes, and PDF/A-3 allows. */
const onlyInPart1 = [
  /^1\.4 : .*cross reference streams are not allowed/, /^1\.4\.7 : .*EmbeddedFile entry is present in the Names/, /^1\.2\.9 : .*EmbeddedFile entry is present/,
  /^2\.2\.1 : .*Group has a transparency S entry/, /^4\.1\.2 : .*c?C?a?A? entry in a ExtGState is invalid/, /^3\.1\.11 : .*CIDSet entry is missing/, /^7\.11\.2 : .*part must be 1/,
]

function faults(pdf: Uint8Array): readonly string[] {
  const folder = mkdtempSync(join(tmpdir(), 'preflight-'))
  try {
    writeFileSync(join(folder, 'review.pdf'), pdf)
    const { stdout, stderr } = spawnSync('java', ['-cp', jars.join(':'), 'org.apache.pdfbox.preflight.Validator_A1b', join(folder, 'review.pdf')], { encoding: 'utf8' })
    const lines = `${stdout}\n${stderr}`.split('\n').filter((line) => line.trim() !== '')
    if (!lines.some((line) => /is (not )?a valid PDF\/A-1b file/.test(line))) throw new Error(`Unexpected answer of the validator: ${lines.slice(0, 3).join(' ')}`)
    return lines.filter((line) => /^\d[\d.]* : /.test(line) && !onlyInPart1.some((pattern) => pattern.test(line)))
  } finally { rmSync(folder, { recursive: true }) }
}

async function printed(): Promise<Uint8Array> {
  const browser = await openBrowser()
  try { return await print(smallReview, browser, smallFacts, smallFiles) } finally { await browser.close() }
}

describe.skipIf(!installed)('preflight (only where Java and its jars are installed)', () => {
  test('finds nothing but what PDF/A-1 alone forbids', async () => { expect(faults(await printed())).toEqual([]) })

  test('it can fail: without output intent, and with other metadata than the file’s', async () => {
    const document = await PDFDocument.load(await printed(), { updateMetadata: false })
    document.catalog.delete(PDFName.of('OutputIntents'))
    document.setTitle('Another')
    const found = faults(await document.save({ updateFieldAppearances: false }))
    expect(found.some((fault) => fault.startsWith('2.4'))).toBe(true)
    expect(found.some((fault) => fault.startsWith('7.'))).toBe(true)
  })
})
