import { describe, expect, test } from 'vitest'
import { adviseCoder, adviseEveryone, adviseSurvey } from '../../../model/advice/standing-advice.ts'
import type { Grounds } from '../../../model/advice/read-advice.ts'
import type { Reading } from '../../../model/reading/context.ts'

const codes = (advice: readonly { readonly code: string }[]) => advice.map(({ code }) => code)

describe('of the survey', () => {
  const waves = (base: number) => Array.from({ length: 20 }, (_, i) => ({ value: 50 + 6 * Math.sin(i), base }))
  const survey = (verdict: string, r: number, p: number, base = 400) => ({
    survey: {
      verdict, pairs: 20, pairs_needed: 8, waves: waves(base), sampling_error: 50 / Math.sqrt(base),
      candidates: [{ series: 'adjusted', adjusted_p: p, best: { r, pairs: 20, effective_pairs: 15 } }],
    },
  }) as unknown as Grounds

  test('one is advised where there is none, and not where there is', () => {
    expect(codes(adviseSurvey({ survey: null } as Grounds))).toEqual(['survey-start'])
    expect(adviseSurvey(survey('leads', 0.7, 0.01))).toEqual([])
    expect(adviseSurvey(survey('tracks', 0.7, 0.08))).toEqual([])
    expect(adviseSurvey(survey('contradicts', -0.7, 0.01))).toEqual([])
  })
  test('more waves, as many as are missing', () => {
    const few = { survey: { verdict: 'too-few-waves', pairs: 3, pairs_needed: 8, candidates: [], waves: [] } } as unknown as Grounds
    expect(adviseSurvey(few)).toMatchObject([{ code: 'survey-waves', how_many: 5 }])
  })
  test('more waves where a correlation as close as this one would reach a verdict with power 0.8', () => {
    const advice = adviseSurvey(survey('not-established', 0.45, 0.3)).find(({ code }) => code === 'survey-waves')!
    // Fisher's scale, without what many lags cost: n* = ((1.645 + 0.842) / atanh 0.45)^2 + 3, at 20 pairs to 15 independent ones
    const plain = 20 / 15 * (((1.645 + 0.842) / Math.atanh(0.45)) ** 2 + 3) - 20
    expect(advice.how_many).toBeGreaterThan(plain - 1)
    expect(advice.how_many).toBeLessThan(3 * plain)
  })
  test('the closer the correlation, the fewer', () => {
    const needed = (r: number) => adviseSurvey(survey('not-established', r, 0.3)).find(({ code }) => code === 'survey-waves')?.how_many ?? 0
    expect(needed(0.3)).toBeGreaterThan(needed(0.45))
  })
  test('none where posts and survey do not go together at all, or the wrong way', () => {
    expect(adviseSurvey(survey('not-established', -0.4, 0.2))).toEqual([])
    expect(codes(adviseSurvey(survey('not-established', 0.02, 0.99)))).not.toContain('survey-waves')
  })
  test('more interviews where their error keeps the correlation down, and not where it does not', () => {
    const advice = adviseSurvey(survey('not-established', 0.4, 0.3, 400)).find(({ code }) => code === 'survey-interviews')!
    const values = waves(400).map(({ value }) => value)
    const centre = values.reduce((a, b) => a + b, 0) / 20
    const signal = values.reduce((sum, value) => sum + (value - centre) ** 2, 0) / 19 - 2.5 ** 2
    // at the advised size the reliability is 0.81, so that the correlation is kept down by a tenth
    expect(signal / (signal + 2500 / advice.how_many)).toBeCloseTo(0.81, 2)
    expect(codes(adviseSurvey(survey('not-established', 0.4, 0.3, 4000)))).not.toContain('survey-interviews')
  })
})

describe('of the coder', () => {
  const coder = (more: object) => ({ coder: { status: 'absent', reason: null, venues: [], correction: null, movement: null, audit_size: null, ...more } }) as unknown as Grounds
  test('an audit where there is none, and not where scores have no labels, or one is applied', () => {
    expect(adviseCoder(coder({ audit_size: { width: 5, accuracy: 0.85, codings_per_venue: 120, codings: 600 } }))).toMatchObject([{ code: 'audit-start', how_many: 600 }])
    expect(adviseCoder(coder({}))).toEqual([])
    expect(adviseCoder(coder({ status: 'applied', venues: [{ label: 'Blogs', codings: 200 }] }))).toEqual([])
  })
  test('more of it where it was too small, and not where it was too poor', () => {
    const venues = [{ label: 'Blogs', codings: 30 }, { label: 'Boards', codings: 80 }]
    expect(adviseCoder(coder({ status: 'refused', reason: 'too-few', venues }))).toMatchObject([{ code: 'audit-more', where: 'Blogs', how_many: 20 }])
    expect(adviseCoder(coder({ status: 'refused', reason: 'too-poor', venues }))).toEqual([])
  })
})

describe('of whom to ask', () => {
  const reading = (extremes: number) => ({ tables: { timeline: { current: 2 }, extremes: [{ period: 2, venue: 0, mentions: 100, extremes }, { period: 1, venue: 0, mentions: 100, extremes: 100 }] } }) as unknown as Reading
  const speaking = (top: number, gap: string) => ({ speaking: { concentration: { period: { top_share: top } }, staying: { middle_gap: { movement: gap }, middle_gap_change: null } } }) as unknown as Grounds
  const calm = speaking(0.1, 'not-established')
  test('everyone, wherever anyone is asked or most scores are extreme; else nothing', () => {
    expect(codes(adviseEveryone(reading(20), calm, true))).toEqual(['invite-everyone'])
    expect(codes(adviseEveryone(reading(60), calm, false))).toEqual(['invite-everyone'])
    expect(adviseEveryone(reading(20), calm, false)).toEqual([])
  })
  test('a standing way in where few speak for many, or the middling leave; else none', () => {
    expect(codes(adviseEveryone(reading(20), speaking(0.3, 'not-established'), false))).toEqual(['standing-way-in'])
    expect(codes(adviseEveryone(reading(20), speaking(0.1, 'down'), false))).toEqual(['standing-way-in'])
    expect(adviseEveryone(reading(20), speaking(0.1, 'up'), false)).toEqual([])
  })
})
