import { describe, expect, test } from 'vitest'
import { atSize, layoutOf, mergePatch, tablesIn, worded } from '../../../../generator/render/charts/chart-spec.ts'
import { sampleWords } from '../sample-document.ts'

// RFC 7396, appendix A: target, patch, result
test.each([
  [{ a: 'b' }, { a: 'c' }, { a: 'c' }], [{ a: 'b' }, { b: 'c' }, { a: 'b', b: 'c' }], [{ a: 'b' }, { a: null }, {}], [{ a: 'b', b: 'c' }, { a: null }, { b: 'c' }],
  [{ a: ['b'] }, { a: 'c' }, { a: 'c' }], [{ a: { b: 'c' } }, { a: { b: 'd', c: null } }, { a: { b: 'd' } }], [{ a: [{ b: 'c' }] }, { a: [1] }, { a: [1] }],
  [['a', 'b'], ['c', 'd'], ['c', 'd']], [{ a: 'foo' }, null, null], [{ a: 'foo' }, 'bar', 'bar'], [{ e: null }, { a: 1 }, { e: null, a: 1 }],
  [[1, 2], { a: 'b', c: null }, { a: 'b' }], [{}, { a: { bb: { ccc: null } } }, { a: { bb: {} } }],
])('merge patch: %j and %j give %j', (target, patch, result) => { expect(mergePatch(target, patch)).toEqual(result) })

describe('a specification', () => {
  const spec = { name: 'c', height: 10, usermeta: { narrow: { height: 20 } }, mark: { type: 'text', text: '@label-raw' }, layer: [{ data: { name: 'opinion' } }, { data: { name: 'spans' } }, { data: { name: 'opinion' } }] }

  test('differs on a phone as it says, and tells its expressions', () => {
    const asking = { ...spec, width: { expr: 'narrow ? 1 : 2' } }
    expect(atSize(asking, 'wide')).toMatchObject({ height: 10, params: [{ name: 'narrow', value: false }] })
    expect(atSize(asking, 'narrow')).toMatchObject({ height: 20, params: [{ name: 'narrow', value: true }] })
    expect(atSize(spec, 'narrow')).not.toHaveProperty('params')
  })
  test('gets its words from the catalogue', () => { expect(worded(spec, sampleWords)).toMatchObject({ mark: { type: 'text', text: 'Raw average' } }) })
  test('an unknown message is named', () => { expect(() => worded({ text: '@nothing-such' }, sampleWords)).toThrow('nothing-such') })
  test('names its tables, each once', () => { expect(tablesIn(spec)).toEqual(['opinion', 'spans']) })
  test('an unknown layout key is named', () => { expect(() => layoutOf({ name: 'c', usermeta: { wobble: 1 } })).toThrow(/chart c.*wobble/s) })
})
