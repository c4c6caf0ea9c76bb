import { describe, expect, test } from 'vitest'
import type { Json } from '../../../../generator/render/charts/chart-spec.ts'
import { ownChartFaults } from '../../../../generator/render/charts/check-own-chart.ts'
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

/** Bars and ticks on one axis of names, each with an order of its own. */
const layered = (first?: Json, second?: Json) => ({
  data: { name: 'venues' },
  layer: ([['bar', 'share', first], ['tick', 'mentions', second]] as const).map(([mark, field, sort]) => ({
    transform: [{ filter: `datum.${field} >= 0` }], mark,
    encoding: { y: { field: 'label', type: 'nominal', ...(sort === undefined ? {} : { sort }) }, x: { field, type: 'quantitative', axis: null, scale: { type: 'sqrt' } } },
  })),
}) satisfies Json

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
    ['a misspelt key', { data: { name: 'venues' }, mark: 'bar', encodng: {} }, 'chart-key-unknown', /^charts\/mine\.json:6:\d+ encodng$/],
    ['a misspelt channel', { ...sound, encoding: { ...sound.encoding, colr: { value: 'red' } } }, 'chart-key-unknown', / encoding\.colr$/],
    ['a misspelt key of an axis', { ...sound, encoding: { ...sound.encoding, x: { ...sound.encoding.x, axis: { titel: 'Share' } } } }, 'chart-key-unknown', / encoding\.x\.axis\.titel$/],
    ['a misspelt key for a phone', { ...sound, usermeta: { narrow: { encoding: { x: { axs: null } } } } }, 'chart-key-unknown', / usermeta\.narrow\.encoding\.x\.axs$/],
    ['what Vega-Lite warns of', { ...sound, encoding: { ...sound.encoding, x: { field: 'share', type: 'quantitative', scale: { wobble: 1 } } } }, 'chart-key-unknown', / encoding\.x\.scale\.wobble$/],
    ['a misspelt mark', { ...sound, mark: 'baar' }, 'chart-value', / mark$/],
    ['a misspelt mark in an object', { ...sound, mark: { type: 'baar' } }, 'chart-value', / mark\.type$/],
    ['a misspelt type', { ...sound, encoding: { x: { field: 'share', type: 'quantitativ' } } }, 'chart-value', / encoding\.x\.type$/],
    ['a text where a list stands', { ...sound, transform: 'none' }, 'chart-value', / transform$/],
    ['a list where an object stands', { ...sound, encoding: [] }, 'chart-value', / encoding$/],
    ['a format of figures', { ...sound, encoding: { ...sound.encoding, x: { ...sound.encoding.x, axis: { format: '.0%%' } } } }, 'chart-format', / encoding\.x\.axis\.format$/],
    ['a format of dates on figures', { ...sound, encoding: { ...sound.encoding, x: { ...sound.encoding.x, axis: { format: '%b %Y' } } } }, 'chart-format', / encoding\.x\.axis\.format$/],
    ['a format of dates', { data: { name: 'opinion' }, mark: 'line', encoding: { x: { field: 'step', type: 'temporal', axis: { format: '%K' } } } }, 'chart-format', / encoding\.x\.axis\.format$/],
    ['a field of a filter', { ...sound, transform: [{ filter: 'datum.labl == 1' }] }, 'chart-field', / transform\[0\]\.filter$/],
    ['a field in brackets, in one of two conditions', { ...sound, transform: [{ filter: { and: ['datum.share > 0', 'datum[\'shere\'] > 0'] } }] }, 'chart-field', / transform\[0\]\.filter\.and\[1\]$/],
    ['a field of a calculation', { ...sound, transform: [{ calculate: 'datum.shere * 2', as: 'twice' }] }, 'chart-field', / transform\[0\]\.calculate$/],
    ['a field that is grouped by', { ...sound, transform: [{ aggregate: [{ op: 'count', as: 'number' }], groupby: ['labl'] }] }, 'chart-field', / transform\[0\]\.groupby\[0\]$/],
    ['an expression that is none', { ...sound, transform: [{ filter: 'datum.share > (' }] }, 'chart-expression-invalid', / transform\[0\]\.filter$/],
    ['a function that there is not', { ...sound, transform: [{ filter: 'alert(1)' }] }, 'chart-function', / transform\[0\]\.filter$/],
    ['layers ordered against each other', layered({ field: 'rank' }, { field: 'share' }), 'chart-sort', / layer\[1\]\.encoding\.y\.sort$/],
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
  ['what Vega-Lite warns of', { ...sound, encoding: { ...sound.encoding, x: { field: 'share', type: 'quantitative', scale: { type: 'band' } } } }],
  ['a link put together while drawing', { ...sound, mark: { type: 'bar', cursor: 'pointer', tooltip: true, fill: { expr: '"ur" + "l(https://example.org/a.svg)"' } } }],
] satisfies readonly (readonly [string, Json])[])('%s is a fault of the chart, not of the program', async (_what, spec) => {
  expect(await faultsOf(() => draw(spec))).toMatchObject([{ code: 'chart-undrawable', place: 'charts/mine.json' }])
})

test('layers are in the order that one of them gives', async () => {
  const names = rendering.tables.find(({ name }) => name === 'venues')!.rows.map(({ label }) => String(label).split(' ')[0]!).reverse()
  const place = { field: 'place' }
  const reversed = (spec: ReturnType<typeof layered>) => ({ ...spec, transform: [{ calculate: '-datum.rank', as: 'place' }] })
  for (const spec of [layered(place), layered(undefined, place), layered(place, place), layered({ ...place, op: 'min' }, place)]) {
    const svg = await draw(reversed(spec))
    const places = names.map((name) => svg.indexOf(`>${name}`))
    expect(places.every((at, index) => at > (places[index - 1] ?? 0)), String(places)).toBe(true)
  }
  const alphabetical = await draw(layered())
  expect(names.map((name) => alphabetical.indexOf(`>${name}`))).not.toEqual(names.map((name) => alphabetical.indexOf(`>${name}`)).sort((a, b) => a - b))
})

test('nothing is wrong with the charts of the house but that some draw values of their own', () => {
  for (const [name, spec] of rendering.charts) {
    const codes = new Set(ownChartFaults(spec, rendering, (path) => path.join('.')).map(({ code, place }) => `${code} ${place}`))
    expect([...codes].filter((told) => !/^chart-data layer\.\d+\.data$|^chart-key usermeta\.narrow\.usermeta$/.test(told)), name).toEqual([])
  }
})

test('what an encoding makes of a column may be read in an expression', () => {
  const color = { condition: { test: 'datum.mean_share > 0 && datum.__count > 1', value: 'red' }, value: 'blue' }
  expect(() => read({ ...sound, encoding: { ...sound.encoding, x: { aggregate: 'mean', field: 'share', type: 'quantitative' }, color } })).not.toThrow()
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
