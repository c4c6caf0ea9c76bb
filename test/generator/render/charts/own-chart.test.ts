import { describe, expect, test } from 'vitest'
import type { Json } from '../../../../generator/render/charts/chart-spec.ts'
import { drawChart } from '../../../../generator/render/charts/draw-chart.ts'
import { readOwnChart } from '../../../../generator/render/charts/own-chart.ts'
import { requirePlain } from '../../../../generator/render/charts/plain-svg.ts'
import { InputFault } from '../../../../generator/faults/fault.ts'
import type { Fault } from '../../../../generator/faults/fault.ts'
import { sampleRendering } from '../sample-document.ts'

const rendering = await sampleRendering()
const sound = {
  data: { name: 'venues' }, mark: 'bar',
  encoding: { y: { field: 'label', type: 'nominal', axis: { title: null } }, x: { field: 'share', type: 'quantitative', axis: { title: 'Share' } } },
} satisfies Json

const read = (spec: Json | string, name = 'mine') => readOwnChart(name, `charts/${name}.json`, typeof spec === 'string' ? spec : JSON.stringify(spec, null, 2), rendering)
const draw = (spec: Json) => drawChart(read(spec), rendering.tables, rendering.words, rendering.theme)

async function faultsOf(work: () => unknown): Promise<readonly Fault[]> {
  try {
    await work()
  } catch (error) {
    if (error instanceof InputFault) return error.faults
    throw error
  }
  return []
}

test('a chart of the account is drawn, its own words stay text', async () => {
  const svg = await draw({ ...sound, encoding: { ...sound.encoding, x: { ...sound.encoding.x, axis: { title: '<script>alert(1)</script>' } } } })
  expect(svg).toContain('&lt;script&gt;')
  expect(svg).not.toContain('<script')
})

describe('is refused with its place', () => {
  const many: readonly [string, Json | string, string, RegExp][] = [
    ['no JSON', '{ "data": ', 'chart-no-json', /^charts\/mine\.json:1:\d+$/],
    ['data from the web', { ...sound, data: { url: 'https://example.org/x.csv' } }, 'chart-data', /^charts\/mine\.json:2:11 data$/],
    ['data of a file', { ...sound, data: { url: 'file:///etc/passwd', format: { type: 'csv' } } }, 'chart-data', / data$/],
    ['values of its own', { ...sound, data: { values: [{ a: 1 }] } }, 'chart-data', / data$/],
    ['no data', { mark: 'bar', encoding: {} }, 'chart-data', /^charts\/mine\.json:1:1$/],
    ['a table that is not there', { ...sound, data: { name: 'venus' } }, 'chart-table', / data$/],
    ['a table named constructor', { ...sound, data: { name: 'constructor' } }, 'chart-table', / data$/],
    ['a column that is not there', { ...sound, encoding: { ...sound.encoding, x: { field: 'shar', type: 'quantitative' } } }, 'chart-field', / encoding\.x\.field$/],
    ['a picture', { ...sound, mark: 'image' }, 'chart-mark', / mark$/],
    ['a picture in a layer', { data: { name: 'venues' }, layer: [{ mark: { type: 'image', url: 'https://example.org/x.png' } }] }, 'chart-mark', / layer\[0\]\.mark$/],
    ['a link', { ...sound, encoding: { ...sound.encoding, href: { value: 'https://example.org' } } }, 'chart-key', / encoding\.href$/],
    ['a look-up elsewhere', { ...sound, transform: [{ lookup: 'label', from: { data: { url: 'x.csv' }, key: 'a' } }] }, 'chart-data', / transform\[0\]\.from\.data$/],
    ['an address as a colour', { ...sound, mark: { type: 'bar', fill: 'URL(https://example.org/x.svg#a)' } }, 'chart-address', / mark\.fill$/],
    ['data for a phone only', { ...sound, usermeta: { narrow: { data: { url: 'x.csv' } } } }, 'chart-data', / usermeta\.narrow\.data$/],
    ['a key of usermeta', { ...sound, usermeta: { script: 'x' } }, 'chart-layout', / usermeta$/],
    ['a clock', { ...sound, transform: [{ calculate: 'now()', as: 'at' }] }, 'chart-expression', / transform\[0\]\.calculate$/],
    ['a message that is not there', { ...sound, title: '@axis-pionts' }, 'chart-message', / title$/],
    ['a name of the language', '{"data":{"name":"venues"},"mark":"bar","encoding":{"__proto__":{"field":"share"}}}', 'chart-key', /__proto__$/],
    ['a deep nest', `${'{"a":'.repeat(5000)}1${'}'.repeat(5000)}`, 'chart-deep', /^charts\/mine\.json$/],
  ]
  test.each(many)('%s', async (_what, spec, code, place) => {
    const fault = (await faultsOf(() => read(spec))).find((found) => found.code === code)
    expect(fault?.place).toMatch(place)
  })
  test('a name that could not stand in an id', async () => {
    expect(await faultsOf(() => read(sound, '__proto__'))).toMatchObject([{ code: 'chart-name' }])
  })
})

test('what a transform makes may be named', () => {
  expect(() => read({ ...sound, transform: [{ calculate: 'datum.share * 2', as: 'twice' }], encoding: { ...sound.encoding, x: { field: 'twice', type: 'quantitative' } } })).not.toThrow()
})

test.each([
  ['what Vega-Lite warns of', { ...sound, encoding: { ...sound.encoding, x: { field: 'share', type: 'quantitative', scale: { wobble: 1, type: 'band' } } } }],
  ['an expression that is none', { ...sound, transform: [{ filter: 'datum.share > (' }] }],
  ['a function that there is not', { ...sound, transform: [{ filter: 'alert(1)' }] }],
  ['a link put together while drawing', { ...sound, mark: { type: 'bar', cursor: 'pointer', tooltip: true, fill: { expr: '"ur" + "l(https://example.org/a.svg)"' } } }],
  ['a table of the wrong kind of mark', { ...sound, mark: 'cake' }],
] satisfies readonly (readonly [string, Json])[])('%s is a fault of the chart, not of the program', async (_what, spec) => {
  expect(await faultsOf(() => draw(spec))).toMatchObject([{ code: 'chart-undrawable', place: 'charts/mine.json' }])
})

test('dates are in UTC, and chance is the same every time', async () => {
  const spec = {
    data: { name: 'opinion' }, mark: 'point', transform: [{ sample: 20 }],
    encoding: { x: { field: 'step', type: 'temporal', timeUnit: 'yearmonth' }, y: { field: 'adjusted', type: 'quantitative' } },
  } satisfies Json
  expect(read(spec)).toMatchObject({ encoding: { x: { timeUnit: 'utcyearmonth', scale: { type: 'utc' } } } })
  expect(await draw(spec)).toBe(await draw(spec))
})

test.each(['<svg><image href="x"/></svg>', '<svg><a xlink:href="x"></a></svg>', '<svg><g onclick="x()"></g></svg>', '<svg><path fill="url(http://x)"/></svg>'])('no drawing: %s', (svg) => {
  expect(() => requirePlain(svg)).toThrow('in a drawing')
  expect(requirePlain('<svg><path fill="url(#a)" d="M0,0"/></svg>')).toContain('path')
})
