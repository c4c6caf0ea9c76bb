import { join } from 'node:path'
import { expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { readIntake } from '../../../generator/intake/read-intake.ts'

/** sample-data/skerrow-ferries/TRUTH.md: on boards a reply leans to the tone before it; video comments have threads and no such thing. */
test('of the demo is found on boards, where it was built in, and not under videos', async () => {
  const { pull, factors } = await readIntake(await readAccount(join(import.meta.dirname, '../../../sample-data/skerrow-ferries')))
  const all = pull.filter(({ poster }) => poster < 0).map(({ venue, slope, standardError }) => ({ venue: factors[0].levels[venue].name, slope, z: slope / standardError }))
  expect(all.map(({ venue }) => venue)).toEqual(['boards', 'videos'])
  // Grades weaken what was built in on the scale behind them, a quarter.
  expect(all[0].slope).toBeGreaterThan(0.05)
  expect(all[0].slope).toBeLessThan(0.25)
  expect(all[0].z).toBeGreaterThan(5)
  expect(Math.abs(all[1].z)).toBeLessThan(2)
})
