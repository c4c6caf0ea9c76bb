import { expect, test } from 'vitest'
import { wordCaveat } from '../../../generator/words/caveats.ts'
import { houseWords } from '../../support/house-words.ts'

const words = await houseWords()

/** Every code that the program raises, with figures as it gives them. */
const raised: Readonly<Record<string, Readonly<Record<string, string | number>>>> = {
  'authors-unknown': { share: 0.93 }, 'authors-partly-unknown': { venue: 'Video comments', share: 0.29 }, 'one-venue': {},
  'uneven-history': { venue: 'Blogs', first: '2025-01-06', last: '2026-03-30' }, 'venue-vanished': { venue: 'Blogs', last: '2026-03-30' },
  'venue-appeared': { venue: 'Blogs', first: '2026-03-30' }, 'venue-thin': { venue: 'Blogs', authors: 7 }, 'thin-data': { mentions: 31 }, 'empty-steps': { steps: 1 },
  'level-unseen-in-base': { factor: 'topic', level: 'Strike' }, 'values-unmapped': { factor: 'topic', values: 'harbour works', mentions: 118 },
  'given-not-used': { keys: 'events' }, 'coder-unaudited': {}, 'survey-absent': {}, 'benchmark-absent': {}, 'no-sampling-error': {}, 'level-conventional': {},
  'pooled-average-misleads': { raw_change: -2.27, change: 2.21 }, concentration: { share: 0.31 }, 'mix-moved': { factor: 'venue', level: 'Boards', from: 0.24, to: 0.41 },
  'opinion-drift-entangled': { correlation: -0.87 }, 'fit-not-converged': { pareto_k: 0.83, ess: 212 }, 'model-misfit': { venue: 'Blogs' }, 'clock-times': { count: 9 }, 'uneven-volume': { least: 1543, most: 5676 }, 'period-unfinished': { last: '2026-10-20' }, 'many-rejected': { count: 549, share: 0.183 },
  'no-previous-period': {}, 'ready-made-authors': {}, 'sharp-move': { steps: 2 },
}

test.each(Object.entries(raised))('caveat %s is worded whole: evidence, meaning, remedy', (code, figures) => {
  const worded = wordCaveat(words, code, figures)
  for (const sentence of Object.values(worded)) expect(sentence).toMatch(/^(?!.*(NaN|undefined))[A-Z0-9“].*\.$/)
  for (const [name, figure] of Object.entries(figures)) {
    if (typeof figure === 'string' && name !== 'factor' && !/^\d/.test(figure)) expect(JSON.stringify([worded, words.say(`caveat-${code}-title`, { ...figures })])).toContain(figure)
  }
  expect(words.has(`caveat-${code}-title`)).toBe(true)
})

test('figures are written by their kind', () => {
  expect(wordCaveat(words, 'mix-moved', raised['mix-moved']!).evidence).toBe('Boards (venue) went from 24% to 41% of the mentions.')
  expect(wordCaveat(words, 'mix-moved', { factor: 'poster', level: 'prolific', from: 0.3, to: 0.4 }).evidence).toBe('Prolific posters (poster class) went from 30% to 40% of the mentions.')
  expect(wordCaveat(words, 'venue-vanished', raised['venue-vanished']!).evidence).toBe('The last mention of Blogs is of 30 March 2026.')
  expect(wordCaveat(words, 'pooled-average-misleads', raised['pooled-average-misleads']!).evidence)
    .toBe('At the same mix, opinion changed by an estimated +2.2 points. What was said in all changed by −2.3 points, because the raw average also follows who posts, where and about what.')
  expect(wordCaveat(words, 'empty-steps', { steps: 1 }).evidence).toBe('1 step of the time axis holds no mention.')
})

test('the catalogue words no caveat that is not raised', () => {
  const codes = words.keys.flatMap((key) => /^caveat-(.+)-evidence$/.exec(key)?.[1] ?? [])
  expect(codes.sort()).toEqual(Object.keys(raised).sort())
})

test('it can fail: an unknown code and a missing figure are refused', () => {
  expect(() => wordCaveat(words, 'no-such', {})).toThrow('caveat-no-such')
  expect(() => wordCaveat(words, 'authors-unknown', {})).toThrow('caveat-authors-unknown-evidence')
})
