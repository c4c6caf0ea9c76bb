import { beforeAll, describe, expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import type { Analysis } from '../../../model/analyse.ts'
import type { ImportanceInput } from '../../../model/inputs/small-inputs.ts'
import { analyseHere, noInputs } from '../../support/analyse-reference.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

const { tables } = simulateCells({
  steps: 20, venues: 2, topics: 3, posters: 1, mentionsPerStep: 80,
  sigmas: { mu: 0.02, venueDrift: [0.003, 0.003], venue: 0.1, topic: 0.3, poster: 0, tau: 0.02 },
  mix: { topic: { from: [0.65, 0.33, 0.02], to: [0.65, 0.33, 0.02] } },
}, createGenerator(2, 0))

const analyse = (importance: ImportanceInput) => analyseHere(tables, { seed: 1 }, { ...noInputs, importance })

describe('talk against importance', () => {
  let stated: Analysis
  beforeAll(async () => { stated = await analyse({ kind: 'stated', topics: [{ topic: 'topic-1', weight: 0.2 }, { topic: 'topic-2', weight: 0.3 }, { topic: 'topic-3', weight: 0.5 }] }) })

  test('shares of talk stand beside weights, and of few authors nothing is told', () => {
    const { topics, dissimilarity } = stated.importance!
    expect(topics.map(({ importance }) => importance)).toEqual([0.2, 0.3, 0.5])
    expect(topics[0].talk!).toBeGreaterThan(0.5)
    // the third topic has too few authors for its gap to be told: it is what the others leave
    expect(topics[2]).toMatchObject({ talk: null, gap: null, authors: null })
    const hidden = -topics[0].gap! - topics[1].gap!
    expect(dissimilarity).toBeCloseTo((Math.abs(topics[0].gap!) + Math.abs(topics[1].gap!) + Math.abs(hidden)) / 200, 9)
  })
  test('opinion at important topics is what opinion would be at that mix, and moves like it', () => {
    const offsets = stated.topics.map(({ offset }) => offset.mean)
    const expected = stated.opinion.period.mean + 0.2 * offsets[0] + 0.3 * offsets[1] + 0.5 * offsets[2]
    expect(stated.importance!.level.mean).toBeCloseTo(expected, 9)
    expect(stated.importance!.change!.mean).toBeCloseTo(stated.opinion.change!.mean, 9)
  })
  test('a topic that matters and is little talked of is advised to be asked about', () => {
    const topics = stated.advice.filter(({ code }) => code === 'hear-topic')
    expect(topics.map(({ where }) => where)).toEqual(['topic-3'])
    expect(topics[0].gain!.mean).toBeGreaterThan(0)
    expect(topics[0].gain_of).toBe('importance-level')
  })
  test('of respondents the weights are relative ones', async () => {
    const generator = createGenerator(5, 0)
    const draw = () => Float64Array.from({ length: 300 }, () => generator.normal())
    const ratings = [draw(), draw(), draw()]
    const overall = ratings[0].map((value, i) => 3 * value + ratings[1][i] + 0.01 * generator.normal())
    const { importance } = await analyse({ kind: 'respondents', topics: ['topic-1', 'topic-2', 'topic-3'], overall, ratings })
    expect(importance).toMatchObject({ source: 'relative-weights', respondents: 300 })
    expect(importance!.explained).toBeGreaterThan(0.99)
    // uncorrelated topics: shares of the squared effects, 9 to 1 to 0 (Johnson 2000)
    importance!.topics.forEach((topic, i) => { expect(topic.importance).toBeCloseTo([0.9, 0.1, 0][i], 1) })
  })
  test('answers that are all alike say nothing', async () => {
    const same = new Float64Array(40).fill(5)
    expect((await analyse({ kind: 'respondents', topics: ['topic-1', 'topic-2'], overall: same, ratings: [same, same] })).importance).toBeNull()
  })
})
