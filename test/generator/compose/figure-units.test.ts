import { expect, test } from 'vitest'
import { compose } from '../../../generator/compose/compose.ts'
import { InputFault } from '../../../generator/faults/fault.ts'
import type { Fault } from '../../../generator/faults/fault.ts'
import { smallComposition } from '../../support/small-template.ts'

function faultsOf(input: string, given: Parameters<typeof smallComposition>[1] = {}): readonly Fault[] {
  try {
    compose(smallComposition(input, given))
  } catch (error) {
    if (error instanceof InputFault) return error.faults
    throw error
  }
  return []
}

test.each([
  ['opinion.change.mean', 'share', 'points, change, size'],
  ['opinion.mentions', 'share', 'count'],
  ['opinion.mentions', 'points', 'count'],
  ['opinion.probability_up', 'points', 'probability'],
  ['survey.next_wave.forecast.mean', 'share', 'measure'],
  ['survey.next_wave.forecast', 'interval', 'measure-interval'],
  ['survey.pairs', 'share', 'count'],
  ['survey.candidates[series=adjusted].best_lag', 'share', 'steps'],
  ['decomposition.raw_change', 'share', 'change'],
  ['decomposition.parts[part=opinion].estimate.mean', 'probability', 'change'],
  ['venues[first].share', 'points', 'share'],
  ['venues[first].level', 'number-interval', ''],
  ['topics[first].share_base', 'count', 'share'],
  ['posters[first].offset.mean', 'share', 'change'],
  ['speaking.concentration.period.top_share', 'points', 'share'],
  ['speaking.pull[first].slope.mean', 'share', 'number'],
  ['benchmark.margins[first].levels[first].gap', 'share', 'change'],
  ['benchmark.raking.design_effect', 'share', 'number'],
  ['accounting.modelled', 'share', 'count'],
])('%s as %s', (of, as, fitting) => {
  const faults = faultsOf(`:figure{of="${of}" as="${as}"}`)
  if (fitting === '') expect(faults).toEqual([])
  else {
    expect(faults).toMatchObject([{ code: 'form-unit', place: 'review.md:1:1' }])
    expect(faults[0]!.mend).toContain(fitting)
  }
})

test('the same figures in forms that fit are no fault', () => {
  const fitting = [
    ['opinion.change.mean', 'change'], ['opinion.mentions', 'count'], ['opinion.probability_up', 'probability'], ['venues[first].share', 'share'], ['survey.pairs', 'count'],
    ['benchmark.margins[first].levels[first].gap', 'change'], ['program.seed', 'digits'],
  ]
  expect(faultsOf(fitting.map(([of, as]) => `:figure{of="${of}" as="${as}"}`).join(' '))).toEqual([])
})

test('a sentence is checked by the same rule: its figure, and what it picks of a list', () => {
  const of = (spec: string) => faultsOf(':say{message="named"}', { sentencesText: `document-title: { brand: { of: brand, as: text } }\nnamed: { label: { ${spec} } }` }).map(({ code }) => code)
  expect(of('of: opinion.change.mean, as: share')).toEqual(['form-unit'])
  expect(of('of: venues, pick: share, write: points, as: list')).toEqual(['form-unit'])
  expect(of('of: venues, pick: share, as: count-range')).toEqual(['form-unit'])
  expect(of('of: venues, pick: mentions, as: count-range')).toEqual([])
})

test('a figure may say what it is counted in', () => {
  expect(faultsOf(':figure{of="survey.next_wave.last" as="measure" unit="survey.kind"}')).toEqual([])
  expect(faultsOf(':figure{of="survey.next_wave.last" as="measure" unit="survey.knd"}')).toMatchObject([{ code: 'path-unknown', mend: 'Write "kind", if that is meant.' }])
  expect(faultsOf(':figure{of="survey.next_wave.last" as="measure"}')[0]!.mend).toContain('survey.kind')
})
