import { describe, expect, test } from 'vitest'
import { labelMeaning, readLabels, readRange, type Tally } from '../../../generator/start/score-forms.ts'

const tally = (...values: readonly string[]): Tally => values.map((value, index) => ({ value, rows: 100 - index }))
const scores = (...values: readonly string[]): Readonly<Record<string, number>> | null => {
  const reading = readLabels(tally(...values))
  return reading === null ? null : Object.fromEntries(reading.labels.map(({ label, score }) => [label, score]))
}

describe('labels', () => {
  test.each([
    [['negative', 'neutral', 'positive'], [-1, 0, 1]], [['negativ', 'neutral', 'positiv'], [-1, 0, 1]], [['négatif', 'neutre', 'positif'], [-1, 0, 1]], [['négative', 'neutre', 'positive'], [-1, 0, 1]],
    [['negativo', 'neutro', 'positivo'], [-1, 0, 1]], [['NEG', 'NEU', 'POS'], [-1, 0, 1]], [['-1', '0', '1'], [-1, 0, 1]], [['-', '0', '+'], [-1, 0, 1]],
    [['sehr negativ', 'negativ', 'neutral', 'positiv', 'sehr positiv'], [-1, -0.5, 0, 0.5, 1]], [['very_negative', 'negative', 'neutral', 'positive', 'very_positive'], [-1, -0.5, 0, 0.5, 1]],
  ] as const)('%j', (labels, expected) => {
    expect(scores(...labels)).toEqual(Object.fromEntries(labels.map((label, index) => [label, expected[index]])))
  })

  test('spellings that differ in case are one, the most frequent one; what is no label is told', () => {
    expect(readLabels(tally('Positive', 'positive', 'negative', 'mixed'))).toEqual({
      kind: 'labels', labels: [{ label: 'negative', score: -1, rows: 98 }, { label: 'Positive', score: 1, rows: 199 }], unknown: [{ value: 'mixed', rows: 97 }],
    })
  })

  test.each([[['fares', 'crew']], [['0', '1']], [['positive']], [['1', '2', '3']]])('%j are none', (values) => {
    expect(scores(...values)).toBeNull()
    expect(labelMeaning('very neutral')).toBeNull()
  })
})

test.each([
  [{ low: 1, high: 5, whole: true, distinct: 5 }, [1, 5]], [{ low: 2, high: 5, whole: true, distinct: 4 }, [1, 5]], [{ low: -0.93, high: 0.8, whole: false, distinct: 90 }, [-1, 1]],
  [{ low: 0, high: 10, whole: true, distinct: 11 }, [0, 10]], [{ low: 1, high: 10, whole: true, distinct: 10 }, [1, 10]], [{ low: 3, high: 98, whole: true, distinct: 80 }, [0, 100]], [{ low: 0.01, high: 0.99, whole: false, distinct: 80 }, [0, 1]],
  [{ low: -80, high: 75, whole: true, distinct: 60 }, [-100, 100]], [{ low: 0, high: 5000, whole: true, distinct: 900 }, null], [{ low: 3, high: 3, whole: true, distinct: 1 }, null],
] as const)('the scale of %j', (numbers, expected) => {
  const reading = readRange(numbers)
  expect(reading === null ? null : [reading.low, reading.high]).toEqual(expected)
})
