import { copyFile, mkdir, mkdtemp, readFile, realpath, rm, symlink, writeFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { InputFault } from '../../../generator/faults/fault.ts'
import { textWidth } from '../../../generator/render/charts/text-metrics.ts'
import { loadTheme } from '../../../generator/theme/load-theme.ts'
import type { Theme } from '../../../generator/theme/theme.ts'
import { templates } from '../render/sample-document.ts'

const drawing = '<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 2 1"><rect width="2" height="1"/></svg>'
const face = (weight: number, name = 'source-serif-4') => createRequire(import.meta.url).resolve(`@fontsource/${name}/files/${name}-latin-${weight}-normal.woff2`)

let folder: string
let away: string
beforeAll(async () => {
  [folder, away] = await Promise.all(['looks', 'away'].map(async (name) => realpath(await mkdtemp(join(tmpdir(), `tareline-${name}-`)))))
  await mkdir(join(folder, 'fonts'))
  await Promise.all([400, 600, 700].map((weight) => copyFile(face(weight), join(folder, 'fonts', `${weight}.woff2`))))
  const files: Readonly<Record<string, string | Uint8Array>> = {
    'logo.svg': drawing, 'evil.svg': drawing.replace('<rect', '\n<script>1</script><rect'), 'logo.gif': 'GIF89a', 'fake.png': drawing, 'big.svg': drawing + ' '.repeat(300_000),
    'fonts/fake.woff2': 'wOF2 and nothing more than that', 'fonts/page.ttf': '<html>', 'fonts/bomb.woff2': Buffer.concat([Buffer.from('wOF2'), Buffer.alloc(12), Buffer.from([0x7f, 0xff, 0xff, 0xff]), Buffer.alloc(60)]),
  }
  await Promise.all(Object.entries(files).map(([name, content]) => writeFile(join(folder, name), content)))
  await writeFile(join(away, 'logo.svg'), drawing)
  await symlink(join(away, 'logo.svg'), join(folder, 'linked.svg'))
})
afterAll(async () => { await Promise.all([folder, away].map((made) => rm(made, { recursive: true }))) })

async function load(yaml: string | Uint8Array): Promise<Theme> {
  await writeFile(join(folder, 'theme.yaml'), yaml)
  return loadTheme(`${templates}theme`, { folder, path: 'theme.yaml', place: 'account.yaml:9:1 theme' })
}
async function faultsOf(yaml: string | Uint8Array): Promise<InputFault['faults']> {
  const error: unknown = await load(yaml).then(() => undefined, (reason: unknown) => reason)
  if (!(error instanceof InputFault)) throw new Error(`no fault in:\n${String(yaml)}`, { cause: error })
  return error.faults
}

describe('a theme', () => {
  test('that says nothing is the house\u2019s', async () => {
    const { css, chart, paper, cover, logo, running } = await load('{}')
    const house = await loadTheme(`${templates}theme`)
    expect({ css, chart }).toEqual({ css: house.css, chart: house.chart })
    expect({ paper, cover, logo, running }).toEqual({ paper: 'A4', cover: false, logo: null, running: { head: null, foot: null } })
  })

  test('has its colours in the style sheet and in the looks of charts', async () => {
    const { css, chart } = await load("colours: { accent: '#7A2E5D', paper: '#fffdf8' }")
    expect(css).toContain('--accent: #7a2e5d;')
    expect(css).toContain('--paper: #fffdf8;')
    expect(chart.styles).toMatchObject({ adjusted: { color: '#7a2e5d' }, band: { color: '#7a2e5d' }, 'share-leading': { color: '#7a2e5d', stroke: '#fffdf8' }, 'bar-opinion': { color: '#7a2e5d' } })
    expect(JSON.stringify(chart)).not.toContain('#0a5674')
    // what a theme decides stands in the custom properties alone
    expect(css.split('\n').slice(1).join('\n')).not.toMatch(/#[0-9a-f]{3,6}\b|Source Sans|rgb\(/)
  })

  test('has its logo inside, clean, with its text', async () => {
    const { logo, css } = await load('logo: { file: logo.svg, alt: Skerrow Ferries, height_mm: 9.5 }')
    expect(logo).toMatchObject({ alt: 'Skerrow Ferries', heightMm: 9.5 })
    expect(Buffer.from(logo!.address.replace('data:image/svg+xml;base64,', ''), 'base64').toString()).toContain('<rect width="2" height="1">')
    expect(css).toContain('--logo: 9.5mm;')
  })

  test('may have another of the typefaces that come along, and charts measure by it', async () => {
    const { chart, faces, advances } = await load('typeface: source-serif-4')
    expect(chart.font).toBe('Source Serif 4')
    expect(faces.map(({ weight }) => weight)).toEqual([400, 400, 600, 600, 700, 700])
    const own = await load('typeface: { regular: fonts/400.woff2, semibold: fonts/600.woff2, bold: fonts/700.woff2 }')
    for (const fontWeight of [400, 600, 700]) expect(textWidth('Mix-adjusted \u2212 caf\u00e9', { fontWeight }, own.advances)).toBe(textWidth('Mix-adjusted \u2212 caf\u00e9', { fontWeight }, advances))
    expect(textWidth('adjusted', {}, advances)).toBeGreaterThan(textWidth('adjusted', {}, (await loadTheme(`${templates}theme`)).advances))
  })

  test('may bring font files, under a name that no machine has', async () => {
    const { chart, faces, css } = await load('typeface: { regular: fonts/400.woff2, bold: fonts/700.woff2 }')
    expect(chart.font).toBe('Account Typeface')
    expect(css).toContain('--typeface: "Account Typeface", sans-serif;')
    expect(faces.map(({ weight, form, range }) => [weight, form, range])).toEqual([[400, 'woff2', 'U+0-10FFFF'], [600, 'woff2', 'U+0-10FFFF'], [700, 'woff2', 'U+0-10FFFF']])
    expect(faces[1]!.bytes).toEqual(faces[2]!.bytes)
  })

  test('may say what runs in the margins, the paper, and a cover', async () => {
    expect(await load('paper: letter\ncover: true\nrunning: { head: "{brand}, {period}", foot: "" }\n')).toMatchObject({
      paper: 'letter', cover: true, running: { head: [{ place: 'brand' }, { text: ', ' }, { place: 'period' }], foot: [] },
    })
  })
})

test('the example of the README loads, every key of it', async () => {
  const readme = await readFile(join(templates, '..', 'README.md'), 'utf8')
  const [, example] = /### Looks of your own[\s\S]*?```yaml\n([\s\S]*?)```/.exec(readme) ?? []
  const { css, chart, paper, cover, logo, running } = await load(example!)
  expect(css).toContain('--accent: #7a2e5d;')
  expect([chart.font, paper, cover, logo?.alt, running.foot?.length]).toEqual(['Source Serif 4', 'letter', true, 'Our brand', 3])
})

describe('what is wrong is told at its line and column', () => {
  test.each([
    ['an unknown key', 'colors: {}', 'account-key-unknown', 'theme.yaml:1:1 colors', /Did you mean `colours`/],
    ['an unknown colour', "colours:\n  acent: '#123456'", 'account-key-unknown', 'theme.yaml:2:3 colours.acent', /Did you mean `accent`/],
    ['a colour by name', 'colours: { ink: black }', 'account-value', 'theme.yaml:1:12 colours.ink', /'#0a5674', in quotes/],
    ['a colour that YAML takes for a comment', 'colours:\n  ink: #123456', 'account-value', 'theme.yaml:2:3 colours.ink', /in quotes/],
    ['a logo without text', 'logo: { file: logo.svg }', 'account-key-absent', 'theme.yaml:1:1 logo.alt', /Add `alt:`/],
    ['a logo too high', 'logo: { file: logo.svg, alt: x, height_mm: 200 }', 'account-value', 'theme.yaml:1:33 logo.height_mm', /5 to 30 mm/],
    ['an unknown typeface', 'typeface: comic', 'account-value', 'theme.yaml:1:1 typeface', /source-sans-3 or source-serif-4/],
    ['a typeface without bold', 'typeface: { regular: fonts/400.woff2 }', 'account-key-absent', 'theme.yaml:1:1 typeface.bold', /Add `bold:`/],
    ['an unknown paper', 'paper: A3', 'account-value', 'theme.yaml:1:1 paper', /A4 or letter/],
    ['a cover by a word', 'cover: maybe', 'account-value', 'theme.yaml:1:1 cover', /cover/],
    ['an unknown place in a running head', 'running: { head: "{author}" }', 'account-value', 'theme.yaml:1:12 running.head', /\{brand\}, \{period\}/],
    ['a head of two lines', 'running: { head: "a\\nb" }', 'account-value', 'theme.yaml:1:12 running.head', /one line/],
    ['a faint accent', "colours:\n  accent: '#e8a33d'", 'theme-contrast', 'theme.yaml:2:3 colours.accent', /nearest colour that passes/],
    ['ground that makes the house\u2019s grey faint', "colours: { highlight: '#c9b98f' }", 'theme-contrast', 'theme.yaml:1:12 colours.highlight', /`quiet` #55636b and `highlight` #c9b98f/],
    ['an anchor', 'paper: &p A4', 'account-alias', 'theme.yaml:1:11', /anchor/],
    ['a key that reaches into every object', 'running:\n  __proto__: { head: x }', 'account-key-reserved', 'theme.yaml:2:3', /__proto__/],
    ['broken YAML', 'paper: [', 'account-unreadable', 'theme.yaml:1:9', /YAML/],
    ['a list', '- a', 'account-value', 'theme.yaml', /map of keys/],
  ])('%s', async (_what, yaml, code, place, wording) => {
    const faults = await faultsOf(yaml)
    const fault = faults.find((candidate) => candidate.code === code && candidate.place === place)
    expect(fault, JSON.stringify(faults, null, 1)).toBeDefined()
    expect(`${fault!.message} ${fault!.mend}`).toMatch(wording)
  })
})

describe('a hostile theme is refused', () => {
  const logo = (file: string) => `logo: { file: "${file}", alt: x }`
  const font = (file: string) => `typeface: { regular: "${file}", bold: fonts/700.woff2 }`
  test.each([
    ['a style in a colour', "colours: { accent: 'red;} body{background:url(https://x.example/)}' }", 'account-value'],
    ['an address for a typeface', 'typeface: "https://x.example/a.woff2"', 'account-value'],
    ['a logo from the net', logo('https://x.example/logo.svg'), 'account-file-absent'],
    ['a logo by its address of data', logo('data:image/svg+xml,<svg/>'), 'account-file-absent'],
    ['a logo by a file address', logo('file:///etc/passwd'), 'account-file-absent'],
    ['a logo above the folder', logo('../logo.svg'), 'account-path-outside'],
    ['a logo from the root', logo('/etc/passwd'), 'account-path-outside'],
    ['a logo by a link that leads out', logo('linked.svg'), 'account-path-outside'],
    ['a logo of another kind', logo('logo.gif'), 'account-file-kind'],
    ['all logos at once', logo('*.svg'), 'account-path-outside'],
    ['a drawing called a picture', logo('fake.png'), 'theme-picture'],
    ['a drawing with a script', logo('evil.svg'), 'theme-drawing'],
    ['a drawing that is too large', logo('big.svg'), 'theme-file-large'],
    ['a font above the folder', font('../../a.woff2'), 'account-path-outside'],
    ['a page called a font', font('fonts/page.ttf'), 'theme-typeface'],
    ['a broken font', font('fonts/fake.woff2'), 'theme-typeface'],
    ['a font that unpacks to gigabytes', font('fonts/bomb.woff2'), 'theme-typeface'],
    ['a theme file that is too large', `# ${'x'.repeat(70_000)}`, 'theme-file-large'],
  ])('%s', async (_what, yaml, code) => {
    expect((await faultsOf(yaml)).map((fault) => fault.code)).toEqual([code])
  })

  test('the script is told at its line in the drawing', async () => {
    expect((await faultsOf(logo('evil.svg'))).map(({ place }) => place)).toEqual(['evil.svg:2:1'])
  })

  test('bytes that are not UTF-8', async () => {
    expect((await faultsOf(Uint8Array.of(0x61, 0xff))).map(({ code }) => code)).toEqual(['account-unreadable'])
  })

  test('a font without the letters of a review', async () => {
    const font = createRequire(import.meta.url).resolve('@fontsource/source-serif-4/files/source-serif-4-greek-400-normal.woff2')
    await copyFile(font, join(folder, 'fonts', 'greek.woff2'))
    expect((await faultsOf('typeface: { regular: fonts/greek.woff2, bold: fonts/700.woff2 }'))[0]!.message).toMatch(/absence of "!".* in `fonts\/greek.woff2` at theme.yaml:1:13 typeface.regular/)
  })
})
