import { expect, test } from 'vitest'
import { parseCondition } from '../../../generator/compose/condition.ts'
import { parsePath } from '../../../generator/compose/path.ts'
import { selected } from '../../../generator/compose/selection.ts'
import type { Selection } from '../../../generator/compose/selection.ts'

const list = [{ name: 'a', now: 0.5, then: 0.5 }, { name: 'b', now: 0.1, then: 0.4 }, { name: 'c', now: 0.3, then: 0.1 }, { name: 'd', now: 0.2, then: null }]
const path = (text: string) => parsePath(text)!
const names = (selection: Omit<Selection, 'of'>) => selected({ of: path('list'), ...selection }, { findings: { list }, names: {} }).map((item) => (item as { name: string }).name)

test('sorted by a number: largest first, smallest first', () => {
  expect(names({ by: path('now') })).toEqual(['a', 'c', 'd', 'b'])
  expect(names({ by: path('now'), order: 'least', most: 1 })).toEqual(['b'])
})

test('against another number: by how far it rose, or how far it moved; an item without one comes last', () => {
  expect(names({ by: path('now'), against: path('then') })).toEqual(['c', 'a', 'b', 'd'])
  expect(names({ by: path('now'), against: path('then'), order: 'size' })).toEqual(['b', 'c', 'a', 'd'])
  expect(names({ where: parseCondition('now > @then')!, by: path('now'), against: path('then'), most: 1 })).toEqual(['c'])
})

test('the last are those of the list as it stands, sorted after that', () => {
  expect(names({ last: 2 })).toEqual(['c', 'd'])
  expect(names({ last: 3, by: path('now'), most: 1 })).toEqual(['c'])
})
