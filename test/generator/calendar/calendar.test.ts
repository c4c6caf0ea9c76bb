import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { dayWindow } from '../../../generator/calendar/day-window.ts'
import { dayNumber, isDate, isoDate, mondayOf } from '../../../generator/calendar/days.ts'
import { midpointDay, nextStep, stepIndex, stepsBetween, stepStart } from '../../../generator/calendar/grid.ts'
import { lastWholePeriod, periodAfter, periodBefore, periodHolding, periodNamed } from '../../../generator/calendar/periods.ts'
import { timeline } from '../../../generator/calendar/timeline.ts'

const day = fc.integer({ min: dayNumber('1900-01-01'), max: dayNumber('2199-12-31') })
const reporting = fc.constantFrom('month' as const, 'quarter' as const, 'week' as const)
const grid = fc.constantFrom('day' as const, 'week' as const, 'month' as const)

describe('days', () => {
  test('dates that do not exist are none', () => {
    expect(['2024-02-29', '2025-02-29', '2025-13-01', '2025-1-1', 'yesterday'].map(isDate)).toEqual([true, false, false, false, false])
  })

  test('day numbers and dates are each other turned round', () => {
    fc.assert(fc.property(day, (number) => dayNumber(isoDate(number)) === number))
  })

  test('a week begins on the Monday on or before', () => {
    expect(['2026-11-01', '2026-11-02', '1969-12-31'].map((date) => isoDate(mondayOf(dayNumber(date))))).toEqual(['2026-10-26', '2026-11-02', '1969-12-29'])
  })
})

describe('steps', () => {
  test('midpoints: noon of the day, Thursday of the week, the middle of the month', () => {
    expect(isoDate(midpointDay('day', dayNumber('2026-10-05')))).toBe('2026-10-05')
    expect(isoDate(midpointDay('week', dayNumber('2026-10-05')))).toBe('2026-10-08')
    expect(isoDate(midpointDay('month', dayNumber('2026-10-01')))).toBe('2026-10-16')
    expect(isoDate(midpointDay('month', dayNumber('2026-02-01')))).toBe('2026-02-15')
  })

  test('steps follow one another without gap, and hold their days', () => {
    fc.assert(fc.property(grid, day, fc.integer({ min: 0, max: 400 }), (width, first, length) => {
      const steps = stepsBetween(width, first, first + length)
      expect(steps[0]).toBeLessThanOrEqual(first)
      expect(nextStep(width, steps.at(-1)!)).toBeGreaterThan(first + length)
      for (const [index, start] of steps.entries()) {
        expect(stepStart(width, start)).toBe(start)
        if (index > 0) expect(nextStep(width, steps[index - 1]!)).toBe(start)
      }
    }))
  })
})

describe('windows of days', () => {
  const length = fc.integer({ min: 1, max: 400 })
  const windowOf = (width: 'day' | 'week' | 'month', first: number, start: number, days: number) => dayWindow(width, stepStart(width, first), isoDate(start), isoDate(start + days - 1))

  test('by hand: a fortnight about the end of a month', () => {
    const first = { day: '2026-08-31', week: '2026-08-31', month: '2026-08-01' } as const
    const found = (['day', 'week', 'month'] as const).map((width) => dayWindow(width, dayNumber(first[width]), '2026-09-24', '2026-10-06'))
    expect(found.map(({ startStep, days }) => [startStep, [...days]])).toEqual([[24, Array(13).fill(1)], [3, [4, 7, 2]], [1, [7, 6]]])
    expect(found[0]).toMatchObject({ start: '2026-09-24', end: '2026-10-06' })
  })

  test('days sum to the length of the window, and each step has at least one and no more than it holds', () => {
    fc.assert(fc.property(grid, day, day, length, (width, first, start, days) => {
      const window = windowOf(width, first, start, days)
      expect(window.days.reduce((sum, each) => sum + each, 0)).toBe(days)
      let step = stepStart(width, start)
      for (const each of window.days) {
        expect(each).toBeGreaterThan(0)
        expect(each).toBeLessThanOrEqual(nextStep(width, step) - step)
        step = nextStep(width, step)
      }
    }))
  })

  test('the first step holds the first day: counting steps from the grid leads there, and back', () => {
    fc.assert(fc.property(grid, day, fc.integer({ min: 0, max: 900 }), (width, first, ahead) => {
      const steps = stepsBetween(width, first, first + ahead)
      expect(stepIndex(width, steps[0]!, first + ahead)).toBe(steps.length - 1)
      expect(stepIndex(width, steps.at(-1)!, first)).toBe(0 - (steps.length - 1))
    }))
  })

  test('a grid that begins a step earlier moves the window a step, and its days stay', () => {
    fc.assert(fc.property(grid, day, day, length, (width, first, start, days) => {
      const [here, before] = [windowOf(width, first, start, days), windowOf(width, stepStart(width, first) - 1, start, days)]
      expect([before.startStep - here.startStep, before.days]).toEqual([1, here.days])
    }))
  })
})

describe('periods', () => {
  test('weeks are named by ISO 8601', () => {
    // Days about new year, as ISO 8601:2004 counts them: 2026 has 53 weeks, 2024-12-30 belongs to 2025.
    expect(['2027-01-03', '2027-01-04', '2024-12-30', '2026-10-28'].map((date) => periodHolding('week', dayNumber(date)).name))
      .toEqual(['2026-W53', '2027-W01', '2025-W01', '2026-W44'])
  })

  test('names that are none are refused', () => {
    expect([periodNamed('month', '2026-13'), periodNamed('month', '2026-Q1'), periodNamed('quarter', '2026-Q5'), periodNamed('week', '2025-W53'),
      periodNamed('week', '2026-10'), periodNamed('month', '')]).toEqual(Array(6).fill(undefined))
  })

  test('a period holds its days, is found by its name and has neighbours', () => {
    fc.assert(fc.property(reporting, day, (kind, number) => {
      const period = periodHolding(kind, number)
      expect(dayNumber(period.start)).toBeLessThanOrEqual(number)
      expect(dayNumber(period.end)).toBeGreaterThanOrEqual(number)
      expect(periodNamed(kind, period.name)).toEqual(period)
      expect(periodBefore(kind, periodAfter(kind, period))).toEqual(period)
    }))
  })

  test('a period is whole from its last day on', () => {
    expect(lastWholePeriod('month', dayNumber('2026-10-31')).name).toBe('2026-10')
    expect(lastWholePeriod('month', dayNumber('2026-10-30')).name).toBe('2026-09')
    expect(lastWholePeriod('quarter', dayNumber('2026-10-30')).name).toBe('2026-Q3')
    expect(lastWholePeriod('week', dayNumber('2026-11-01')).name).toBe('2026-W44')
  })
})

describe('timeline', () => {
  const input = { grid: 'week', reporting: 'month', base: null, firstDay: dayNumber('2025-03-05'), lastDay: dayNumber('2026-07-31'),
    review: periodNamed('month', '2026-07')! } as const

  test('a step belongs to the period that holds its midpoint', () => {
    const axis = timeline(input)
    const named = (step: string): string => axis.periods[axis.periodOf[axis.steps.indexOf(step)]!]!.name
    expect(axis.steps[0]).toBe('2025-03-03')
    expect([named('2026-03-30'), named('2026-06-29'), named('2026-07-27')]).toEqual(['2026-04', '2026-07', '2026-07'])
    expect(axis.periods[axis.current]!.name).toBe('2026-07')
  })

  test('the base is the first twelve months unless the account says otherwise', () => {
    // The first mention is of a Wednesday: its week, whose midpoint is the Thursday, is in the base.
    const axis = timeline(input)
    expect([axis.base, axis.inBase[0]]).toEqual([{ from: '2025-03-05', to: '2026-03-04' }, 1])
    expect(axis.steps.filter((_, index) => axis.inBase[index] === 1).at(-1)).toBe('2026-02-23')
    expect(timeline({ ...input, review: periodNamed('month', '2025-09')! }).base.to).toBe('2025-09-30')
    const sunday = timeline({ ...input, firstDay: dayNumber('2025-03-09') })
    expect([sunday.base, sunday.steps[0], sunday.inBase[0], sunday.inBase[1]]).toEqual([{ from: '2025-03-09', to: '2026-03-08' }, '2025-03-03', 0, 1])
    const given = timeline({ ...input, base: { from: '2025-04-03', to: '2025-04-16' } })
    expect(given.steps.filter((_, index) => given.inBase[index] === 1)).toEqual(['2025-03-31', '2025-04-07'])
  })

  test('a history of one step is its own base, whatever day it begins on', () => {
    const axis = timeline({ ...input, firstDay: dayNumber('2025-03-09'), lastDay: dayNumber('2025-03-09'), review: periodNamed('month', '2025-03')! })
    expect([axis.base, [...axis.inBase]]).toEqual([{ from: '2025-03-03', to: '2025-03-31' }, [1]])
  })

  test('a period without a step is under review all the same', () => {
    const axis = timeline({ ...input, review: periodNamed('month', '2026-12')! })
    expect(axis.current).toBe(-1)
    expect(axis.review.start).toBe('2026-12-01')
  })
})
