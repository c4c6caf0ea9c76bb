import { expect, test } from 'vitest'
import { periodStart } from '../../../generator/tables/period-start.ts'

// ISO 8601 weeks checked against a printed calendar: 2026 begins on a Thursday, so W01 begins on 29 December 2025.
test.each([['2026-10', '2026-10-01'], ['2026-Q4', '2026-10-01'], ['2026-Q1', '2026-01-01'], ['2026-W01', '2025-12-29'], ['2026-W44', '2026-10-26'], ['2020-W53', '2020-12-28']])(
  '%s begins on %s', (name, start) => { expect(periodStart(name)).toBe(start) })

test.each(['2026', '2026-Q5', 'October'])('%s is no period', (name) => { expect(() => periodStart(name)).toThrow(RangeError) })
