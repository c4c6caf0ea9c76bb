import fc from 'fast-check'
import { expect, test } from 'vitest'
import { lookUp, parsePath } from '../../../generator/compose/path.ts'
import { findingsScope, kindOf, typeAt } from '../../../generator/compose/path-types.ts'
import { selected } from '../../../generator/compose/selection.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const findings = { list: [{ key: 'a', n: 2 }, { key: 'b.c', n: -9 }, { key: 'd', n: null }], which: 'b.c', own: 1 }
const at = (text: string, names = {}, item?: unknown) => lookUp(parsePath(text)!, { findings, names, item })

test('a path leads to its value, picks an item by a field, and looks a field up', () => {
  expect(at('list[key=a].n')).toBe(2)
  expect(at('list[key=b.c].n')).toBe(-9)
  expect(at('list[key=@which].n')).toBe(-9)
  expect(at('list[key=none].n')).toBeUndefined()
  expect(at('list.n.x')).toBeUndefined()
})

test('names go before the findings, the item at hand before both', () => {
  expect(at('own', { own: 2 })).toBe(2)
  expect(at('own', { own: 2 }, { own: 3 })).toBe(3)
  expect(at('own', {}, { other: 3 })).toBe(1)
})

test('no prototype is reached', () => {
  for (const text of ['constructor', 'list.length.constructor', '__proto__.x', 'which.length']) expect(at(text), text).toBeUndefined()
})

test('the two ends of a list', () => {
  const scope = { findings: { waves: [{ name: 'first', parts: [1, 2] }, { name: 'second', parts: [] }], none: [], one: 1 }, names: {} }
  const found = (text: string) => lookUp(parsePath(text)!, scope)
  expect(['waves[first].name', 'waves[last].name', 'waves[first].parts[last]'].map(found)).toEqual(['first', 'second', 2])
  for (const text of ['none[last]', 'none[first].name', 'waves[last].parts[last]', 'one[last]', 'absent[first]']) expect(found(text), text).toBeUndefined()
  expect(typeAt(parsePath('survey.waves[last].change.movement')!, findingsScope)).toMatchObject({ known: true })
  expect(typeAt(parsePath('survey.waves[last].chnge')!, findingsScope)).toEqual({ known: false, unknown: 'chnge', mend: 'Write "change", if that is meant.' })
  expect(typeAt(parsePath('brand[last]')!, findingsScope)).toMatchObject({ known: false, unknown: 'brand[last]' })
})

test('every item of a list, and the lists inside them as one', () => {
  const scope = { findings: { margins: [{ name: 'age', levels: [1, 2] }, { name: 'region', levels: [] }, { name: 'segment', levels: [3] }], one: 1 }, names: {} }
  const found = (text: string) => lookUp(parsePath(text)!, scope)
  expect(found('margins[all].levels')).toEqual([1, 2, 3])
  expect(found('margins[all].name')).toEqual(['age', 'region', 'segment'])
  expect(found('one[all].name')).toBeUndefined()
  const kind = (text: string) => {
    const type = typeAt(parsePath(text)!, findingsScope)
    return type.known ? kindOf(type.type) : type.unknown
  }
  expect(['benchmark.margins[all].levels', 'benchmark.margins[all].margin', 'benchmark.margins[all].lvels', 'brand[all].x'].map(kind)).toEqual(['list', 'list', 'lvels', 'brand[all]'])
})

test.each(['', '.', 'a.', 'a[b]', 'a[middle]', 'a[b=]', 'a b', 'a[b=@]'])('no path: "%s"', (text) => {
  expect(parsePath(text)).toBeUndefined()
})

test('total: looking up never throws', () => {
  fc.assert(fc.property(fc.string(), fc.jsonValue(), (text, value) => {
    const path = parsePath(text)
    if (path) lookUp(path, { findings: value, names: {} })
  }))
})

test('the type of the findings knows each path that the sample has', () => {
  const scope = findingsScope
  const walk = (value: unknown, path: readonly string[]): void => {
    if (path.length > 0) expect(typeAt(path.map((key) => ({ key })), scope), path.join('.')).toMatchObject({ known: true })
    if (typeof value === 'object' && value !== null && !Array.isArray(value)) for (const [key, inner] of Object.entries(value)) walk(inner, [...path, key])
  }
  walk(sampleFindings(), [])
  expect(typeAt(parsePath('opinion.chang')!, scope)).toEqual({ known: false, unknown: 'chang', mend: 'Write "change", if that is meant.' })
})

test('kinds: what a value may be written as, null left aside', () => {
  const kind = (text: string) => {
    const found = typeAt(parsePath(text)!, findingsScope)
    return found.known ? kindOf(found.type) : 'unknown'
  }
  expect(['opinion.change', 'opinion.raw', 'opinion.mentions', 'venues', 'brand', 'opinion.movement', 'method.prepared_by', 'diagnostics.passed', 'scales.venue_drift.any'].map(kind))
    .toEqual(['estimate', 'number', 'number', 'list', 'string', 'string', 'string', 'boolean', 'estimate'])
})

test('a selection filters, sorts and cuts; items without a figure come last', () => {
  const of = parsePath('list')!
  const by = parsePath('n')!
  const keys = (rest: object) => selected({ of, ...rest }, { findings, names: {} }).map((item) => (item as { key: string }).key)
  expect(keys({})).toEqual(['a', 'b.c', 'd'])
  expect(keys({ by })).toEqual(['a', 'b.c', 'd'])
  expect(keys({ by, order: 'least' })).toEqual(['b.c', 'a', 'd'])
  expect(keys({ by, order: 'size', most: 1 })).toEqual(['b.c'])
  expect(keys({ last: 2 })).toEqual(['b.c', 'd'])
  expect(selected({ of: parsePath('which')! }, { findings, names: {} })).toEqual([])
})
