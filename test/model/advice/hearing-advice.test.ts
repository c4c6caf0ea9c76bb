import { describe, expect, test } from 'vitest'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { analyseHere, noInputs } from '../../support/analyse-reference.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

const simulated = (mentionsPerStep: number) => simulateCells({
  steps: 20, venues: 2, topics: 1, posters: 1, mentionsPerStep, sigmas: { mu: 0.03, venueDrift: [0.005, 0.005], venue: 0.1, topic: 0, poster: 0, tau: 0.001 },
}, createGenerator(6, 0)).tables

/** 200 authors known by segment, 180 islanders and 20 visitors, scores alike. */
const segmented = (tables: IntakeTables): IntakeTables => ({
  ...tables, segments: { margins: ['segment'], levels: [['islander', 'visitor']], rows: [{ levels: [0], authors: 180, sum: 0, squares: 60 }, { levels: [1], authors: 20, sum: 0, squares: 6 }] },
})
const benchmark = (visitors: number) => [{ margin: 'segment', levels: [{ level: 'islander', share: 1 - visitors }, { level: 'visitor', share: visitors }] }]

describe('where to hear more people', () => {
  test('venues whose posts would narrow the next interval are named, the best for its cost first', async () => {
    const { advice, hearing } = await analyseHere(simulated(40))
    const venues = advice.filter(({ code }) => code === 'hear-venue')
    expect(venues.length).toBeGreaterThan(0)
    const gains = venues.map((piece) => piece.gain_per_cost!)
    expect(gains).toEqual([...gains].sort((a, b) => b - a))
    for (const { gain, figures, how_many: authors } of venues) {
      expect(gain!.mean).toBeGreaterThan(0)
      expect(figures['width_after']).toBeLessThan(figures['width_before'] as number)
      expect(authors).toBeGreaterThan(0)
    }
    for (const { curve } of hearing!.venues) expect(curve.every(({ width }, i) => i === 0 || width < curve[i - 1].width)).toBe(true)
  })
  test('what takes away a twentieth of the interval clearly helps and comes first; what does not hardly helps and comes last', async () => {
    const { advice } = await analyseHere(simulated(5))
    const venues = advice.filter(({ code }) => code === 'hear-venue')
    for (const { helps, gain_share: part, figures } of venues) {
      expect(helps).toBe(part! >= 0.05 ? 'clearly' : 'hardly')
      expect(part).toBeCloseTo(1 - Number(figures['width_after']) / Number(figures['width_before']), 9)
    }
    expect(advice.map(({ helps }) => helps)).toEqual(['clearly', 'not-computed', 'not-computed', 'not-computed', 'hardly'])
  })
  test('none where posts are so many that more of them tell next to nothing', async () => {
    const { advice } = await analyseHere(simulated(20_000))
    expect(advice.filter(({ code }) => code === 'hear-venue')).toEqual([])
  })
  test('segments that are customers more than they are heard are named with the authors needed', async () => {
    const { advice } = await analyseHere(segmented(simulated(40)), {}, { ...noInputs, benchmark: benchmark(0.5) })
    const [segment] = advice.filter(({ code }) => code === 'hear-segment')
    expect(segment).toMatchObject({ where: 'visitor', how_many: 160, gain_of: 'customer-mean' })
    expect(segment).toMatchObject({ helps: 'clearly', figures: { authors: 160, alone: 0 } })
    expect(segment.figures['effective_after']).toBeGreaterThan(segment.figures['effective_before'] as number)
  })
  describe('of five groups', () => {
    const shares = [0.2, 0.25, 0.22, 0.2, 0.13]
    const names = ['islander', 'commuter', 'holiday', 'freight', 'student']
    const adviceFor = async (heard: readonly number[]) => {
      const tables: IntakeTables = { ...simulated(40), segments: { margins: ['segment'], levels: [names], rows: heard.map((authors, l) => ({ levels: [l], authors, sum: 0, squares: 0.3 * authors })) } }
      const { advice } = await analyseHere(tables, {}, { ...noInputs, benchmark: [{ margin: 'segment', levels: names.map((level, l) => ({ level, share: shares[l] })) }] })
      return advice.filter(({ code }) => code === 'hear-segment')
    }
    test('one among the three least heard is worth hearing, though the interval hardly narrows', async () => {
      const [student, ...others] = await adviceFor([230, 250, 220, 200, 100])
      expect(student).toMatchObject({ where: 'student', how_many: 35, helps: 'clearly' })
      expect(student.gain_share).toBeLessThan(0.05)
      expect(others).toEqual([])
    })
    test('the fourth is not, and stands last; the number is that for all groups, with that for it alone beside it', async () => {
      const advice = await adviceFor([390, 200, 160, 150, 100])
      expect(advice.map(({ where }) => where).sort()).toEqual(['commuter', 'freight', 'holiday', 'student'])
      // islanders, 390 at a share of 0.2: 1950 in all; alone (0.13 * 1000 - 100) / 0.87
      expect(advice.at(-1)).toMatchObject({ where: 'student', how_many: 154, helps: 'hardly', figures: { authors: 154, alone: 35 } })
      expect(advice.slice(0, -1).map(({ helps }) => helps)).toEqual(['clearly', 'clearly', 'clearly'])
    })
  })
  test('none where they are heard as they are customers', async () => {
    const { advice } = await analyseHere(segmented(simulated(40)), {}, { ...noInputs, benchmark: benchmark(0.1) })
    expect(advice.filter(({ code }) => code === 'hear-segment')).toEqual([])
  })
})
