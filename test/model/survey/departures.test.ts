import { expect, test } from 'vitest'
import { readDepartures } from '../../../model/survey/departures.ts'

const forecast = { components: [{ weight: 1, centre: 50, scale: 2, freedom: 20 }], models: [], known: [], wavesAlone: [], pending: 0 }
const wave = (value: number) => ({ forecast, wave: { name: 'May', start: '2026-05-04', end: '2026-05-17', startStep: 40, days: Float64Array.of(7, 7), value, standardError: 2.5 } })
const event = (step: number, date: string) => ({ step, date, label: date, kind: '' })

// 97.5 % point of Student's t with 20 degrees of freedom: 2.086 (Student's t, any printed table)
test('a wave departs where it lies outside the 95 % interval of its forecast', () => {
  const directions = [45.7, 45.9, 50, 54.1, 54.3].map((value) => readDepartures([wave(value)], [], 7, [0, 100]).departures.at(0)?.direction ?? null)
  expect(directions).toEqual(['below', null, null, null, 'above'])
})

test('beside it stand the events of the three months before and of the fieldwork, no earlier and no later ones', () => {
  const events = [event(26, '2026-01-26'), event(27, '2026-02-02'), event(41, '2026-05-17'), event(42, '2026-05-18')]
  expect(readDepartures([wave(60)], events, 7, [0, 100]).departures[0].events.map(({ date }) => date)).toEqual(['2026-02-02', '2026-05-17'])
})

test('as many as chance alone would bring are told', () => {
  expect(readDepartures(Array.from({ length: 20 }, () => wave(50)), [], 7, [0, 100])).toEqual({ departures: [], departures_expected: expect.closeTo(1, 12) as number })
})
