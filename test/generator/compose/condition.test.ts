import fc from 'fast-check'
import { expect, test } from 'vitest'
import { holds, parseCondition } from '../../../generator/compose/condition.ts'

const findings = { a: { b: 3, none: null, word: 'up', yes: true, empty: [] as number[], zero: 0 }, list: [{ n: 1, k: 'x' }, { n: 5, k: 'two words' }], limit: 4 }
const answer = (text: string) => holds(parseCondition(text)!, { findings, names: { item: { n: 7 } } })

test.each([
  ['a.b exists', true], ['a.none exists', false], ['a.none missing', true], ['a.empty exists', false], ['a.zero exists', true], ['nowhere.at.all missing', true],
  ['a.b is 3', true], ['a.b is not 3', false], ['a.b < 4', true], ['a.b <= 3', true], ['a.b > 3', false], ['a.b >= 3', true], ['a.word is up', true], ['a.word is \'up\'', true],
  ['a.yes is true', true], ['a.yes is false', false], ['a.b < @limit', true], ['item.n > @limit', true],
  ['a.none is not 3', false], ['a.none < 3', false], ['a.word < 3', false], ['a.b > @a.word', false],
  ['a.b is 3 and a.word is down', false], ['a.b is 3 or a.word is down', true],
  ['some list: n > 4', true], ['some list: n > @limit', true], ['some list: n > 5', false], ['no list: n > 5', true], ['some list: k is \'two words\'', true],
  ['some a.word: n > 1', false], ['no nowhere: n > 1', true], ['no list: n > 5 and a.b is 3', true], ['list[k=two words].n is 5', true],
])('%s: %s', (text, expected) => {
  expect(answer(text)).toBe(expected)
})

test.each(['', 'a.b', 'a.b is', 'a.b is not', 'a..b exists', 'a.b exists now', 'a.b is 1 2', 'x exists and y exists or z exists', 'some list n > 1', 'some list: some list: n > 1', 'a.b ~ 3', 'and'])(
  'no condition: "%s"', (text) => {
    expect(parseCondition(text)).toBeUndefined()
  },
)

test('total: whatever the text and the findings, there is an answer or no condition', () => {
  const word = fc.constantFrom('a', 'a.b', 'list', 'some', 'no', ':', 'is', 'not', 'and', 'or', '<', '>=', 'exists', 'missing', '3', 'true', '@a.b', '\'x y\'', '[', 'n')
  fc.assert(fc.property(fc.array(word, { maxLength: 8 }), fc.jsonValue(), (words, value) => {
    const condition = parseCondition(words.join(' '))
    return condition === undefined || typeof holds(condition, { findings: value, names: {} }) === 'boolean'
  }), { numRuns: 500 })
})
