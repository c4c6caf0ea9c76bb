import { expect, test } from 'vitest'
import type { Account } from '../../../generator/account/account.ts'
import type { InputFault } from '../../../generator/faults/fault.ts'
import { namedPeriod } from '../../../generator/intake/review-period.ts'

test.each([
  ['month', '2026-1', 'Write `2026-01`.'], ['month', '2026/10', 'Write `2026-10`.'], ['quarter', '2026q4', 'Write `2026-Q4`.'], ['week', '2026-w4', 'Write `2026-W04`.'],
  ['month', '2026-13', 'Name a period'], ['month', '2026-Q4', 'Name a period'], ['quarter', '2026-Q5', 'Name a period'], ['week', 'last', 'Name a period'],
] as const)('by %s, %s: %s', (reporting, name, mend) => {
  try {
    namedPeriod({ reporting } as Account, name)
    expect.unreachable()
  } catch (error) {
    expect((error as InputFault).faults[0]!.mend).toContain(mend)
  }
})
