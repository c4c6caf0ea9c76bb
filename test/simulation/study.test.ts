import { describe, expect, test } from 'vitest'
import { againstTheMix, mixOnly, runScenario, type Run } from './study.ts'

// A few runs of what `npm run simulate` does in hundreds.
async function runs(scenario: typeof mixOnly, count: number): Promise<readonly Run[]> {
  const found: Run[] = []
  for (let run = 0; run < count; run++) found.push(await runScenario(scenario, 11, run))
  return found
}

describe('simulated truth', () => {
  test('adjusted opinion follows it where drift and mix work against it, and the raw average does not', async () => {
    const found = await runs(againstTheMix, 5)
    const median = found.map(({ adjusted }) => adjusted).sort((a, b) => a - b)[2]
    expect(median).toBeGreaterThan(0.95)
    for (const { adjusted, raw } of found) {
      expect(raw).toBeLessThan(0.95)
      expect(adjusted).toBeGreaterThan(raw)
    }
  })

  test('where only the mix moves, no change is announced', async () => {
    const found = await runs(mixOnly, 5)
    // at a true rate of one in ten, three or more of five come up in less than one of a hundred
    expect(found.filter(({ announced }) => announced).length).toBeLessThan(3)
  })
})
