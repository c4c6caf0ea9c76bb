import { expect, test } from 'vitest'
import { wordCaveat } from '../../../generator/words/caveats.ts'
import { definitionParts } from '../../../model/past/definition.ts'
import { houseWords } from '../../support/house-words.ts'

const words = await houseWords()

/** Every code that the program raises, with figures as it gives them. */
const raised: Readonly<Record<string, Readonly<Record<string, string | number>>>> = {
  'authors-unknown': { share: 0.93 }, 'authors-partly-unknown': { venue: 'Video comments', share: 0.29 }, 'one-venue': {},
  'uneven-history': { venue: 'Blogs', first: '2025-01-06', last: '2026-03-30' }, 'venue-vanished': { venue: 'Blogs', last: '2026-03-30' },
  'venue-appeared': { venue: 'Blogs', first: '2026-03-30' }, 'venue-thin': { venue: 'Blogs', authors: 7 }, 'thin-data': { mentions: 31 }, 'empty-steps': { steps: 1 },
  'level-unseen-in-base': { factor: 'topic', level: 'Strike' }, 'values-unmapped': { factor: 'topic', values: 'harbour works', mentions: 118 },
  'coder-unaudited': {},
  'competitors-unread': { brands: 'Tarrin Line, Corran Ferries' }, 'competitors-in-some-sources': {}, 'competitor-absent': { brand: 'Tarrin Line' }, 'competitor-thin': { brand: 'Tarrin Line', authors: 7, least: 10 },
  'competitor-other-mix': { brand: 'Tarrin Line', share: 0.74, levels: 'Blogs' }, 'competitor-not-converged': { brand: 'Tarrin Line' }, 'competitors-those-who-post': {},
  'survey-absent': {}, 'benchmark-absent': {}, 'no-sampling-error': {}, 'level-conventional': {},
  'pooled-average-misleads': { raw_change: -2.27, change: 2.21 }, concentration: { share: 0.31 }, 'mix-moved': { factor: 'venue', level: 'Boards', from: 0.24, to: 0.41 },
  'opinion-drift-entangled': { correlation: -0.87 }, 'fit-not-converged': { pareto_k: 0.83, ess: 212 }, 'model-misfit': { venue: 'Blogs' }, 'clock-times': { count: 9 }, 'uneven-volume': { least: 1543, most: 5676 }, 'period-unfinished': { last: '2026-10-20' }, 'many-rejected': { count: 549, share: 0.183 },
  'survey-too-few': { pairs: 3, needed: 8 }, 'survey-contradicts': { label: 'Favourability', correlation: -0.62, pairs: 30 }, 'survey-not-established': { label: 'Favourability', pairs: 12 },
  'survey-waves-overlap': { waves: 2, names: 'June, July' }, 'survey-waves-later': { waves: 1, names: 'November' }, 'survey-metric-missing': { label: 'Favourability', waves: 1, names: 'August' },
  'survey-bases-small': { hidden: 1, flagged: 26 }, 'survey-departs': { label: 'Favourability', kind: 'share', observed: 38.14, expected: 44.02 },
  'coverage-break': { scope: 'venue', venue: 'Blogs', mentions: 1204, usual: 388.2 }, 'moderates-leaving': { gap: -15.2, change: -13.4 }, 'spread-widening': { venue: 'Blogs', base: 58.1, now: 65.4 },
  'conversation-pull': { venue: 'Blogs', lean: 'away', slope: -0.13 }, 'benchmark-mismatch': { margin: 'segment', known: 'yes', share: 0.31, unreached: 1, names: 'freight' },
  'audit-refused': { scope: 'venue', venue: 'Blogs', reason: 'too-few' }, 'coder-biased': { correction: -1.9 }, 'talk-unlike-importance': { share: 0.24 }, 'prior-matters': { shift: 0.41 },
  'no-previous-period': {}, 'ready-made-authors': {}, 'sharp-move': { steps: 2 },
  'revisions-large': { of: 'change', typical: 0.84, half: 1.42 }, 'definition-break': { part: 'target_mix', after: '2026-09', before: '2026-10', bridged: 'no' }, 'late-posts': { late: 312, gone: 2, periods: 4 },
}

test.each(Object.entries(raised))('caveat %s is worded whole: evidence, meaning, remedy', (code, figures) => {
  const worded = wordCaveat(words, code, figures)
  for (const sentence of Object.values(worded)) expect(sentence).toMatch(/^(?!.*(NaN|undefined))[A-Z0-9“].*\.$/)
  for (const [name, figure] of Object.entries(figures)) {
    if (typeof figure === 'string' && !['factor', 'kind', 'scope', 'lean', 'known', 'reason', 'of', 'part', 'bridged'].includes(name) && !/^\d/.test(figure)) expect(JSON.stringify([worded, words.say(`caveat-${code}-title`, { ...figures })])).toContain(figure)
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

test('a survey’s figures are written by its kind, its bases counted in words', () => {
  expect(wordCaveat(words, 'survey-departs', raised['survey-departs']!).evidence)
    .toBe('Favourability came out at 38.1%, where posts and past waves had led to expect 44.0%; this is outside the 95% interval of the forecast.')
  expect(wordCaveat(words, 'survey-departs', { label: 'Satisfaction', kind: 'mean', observed: 6.814, expected: 7.1 }).evidence).toContain('came out at 6.81, where posts and past waves had led to expect 7.10;')
  expect(wordCaveat(words, 'survey-bases-small', { hidden: 0, flagged: 1 }).evidence).toBe('1 group is marked: weighted, it is worth 30 to 74 interviews.')
  expect(wordCaveat(words, 'survey-bases-small', { hidden: 2, flagged: 0 }).evidence).toBe('2 groups of people asked in a wave are not shown: weighted, they are worth fewer than 30 interviews.')
  expect(wordCaveat(words, 'survey-too-few', { pairs: 0, needed: 8 }).evidence).toBe('No wave can be compared with the posts; at least 8 are needed.')
})

test('coverage, conversation, customers, coder: each case has its words', () => {
  expect(wordCaveat(words, 'coverage-break', { scope: 'all', venue: '', mentions: 0, usual: 412.4 }).evidence).toBe('No mention was posted in this period; the periods before lead one to expect about 412.')
  expect(wordCaveat(words, 'coverage-break', raised['coverage-break']!).evidence).toBe('Blogs holds 1,204 mentions of this period; the periods before lead one to expect about 388.')
  expect(wordCaveat(words, 'conversation-pull', { venue: 'Boards', lean: 'towards', slope: 0.24 }).evidence).toBe('In Boards, replies lean towards the thread before them, by 0.24 of a point for each point.')
  expect(wordCaveat(words, 'conversation-pull', raised['conversation-pull']!).meaning).toContain('set themselves off')
  expect(wordCaveat(words, 'benchmark-mismatch', { ...raised['benchmark-mismatch']!, unreached: 0, names: '' }).evidence).toBe('By segment, 31% of the authors would have to belong to another group to be like the customers.')
  expect(wordCaveat(words, 'benchmark-mismatch', { ...raised['benchmark-mismatch']!, known: 'no', share: 0 }).evidence).toBe('Nobody was heard of: freight.')
  const reasons = ['too-few', 'too-poor', 'ranges', 'labels-differ', 'ready-made', 'no-audit'].map((reason) => Object.values(wordCaveat(words, 'audit-refused', { scope: 'all', venue: '', reason })).join(' '))
  expect(new Set(reasons).size).toBe(6)
  expect(wordCaveat(words, 'audit-refused', { scope: 'venue', venue: 'Blogs', reason: 'no-audit' }).evidence).toBe('In Blogs: no mention was judged by people.')
})

test('the catalogue words no caveat that is not raised', () => {
  const codes = words.keys.flatMap((key) => /^caveat-(.+)-evidence$/.exec(key)?.[1] ?? [])
  expect(codes.sort()).toEqual(Object.keys(raised).sort())
})

test('it can fail: an unknown code and a missing figure are refused', () => {
  expect(() => wordCaveat(words, 'no-such', {})).toThrow('caveat-no-such')
  expect(() => wordCaveat(words, 'authors-unknown', {})).toThrow('caveat-authors-unknown-evidence')
})

test('earlier reviews: levels or changes, each part that changed by its name, bridged or not, one late mention and many', () => {
  expect(wordCaveat(words, 'revisions-large', raised['revisions-large']!).evidence).toBe('Changes told earlier have typically moved by 0.8 points since; ±1.4 points were told with them.')
  expect(wordCaveat(words, 'revisions-large', { of: 'level', typical: 2.2, half: 4.1 }).evidence).toMatch(/^Levels told earlier have typically moved by 2\.2 points/)
  for (const part of definitionParts) expect(wordCaveat(words, 'definition-break', { ...raised['definition-break']!, part }).evidence).toBe(`Changed between September 2026 and October 2026: ${words.say(`definition-${part}`)}.`)
  expect(wordCaveat(words, 'definition-break', { ...raised['definition-break']!, bridged: 'yes' }).meaning).toContain('could be worked out again')
  expect(wordCaveat(words, 'definition-break', raised['definition-break']!).meaning).toContain('can’t be worked out again')
  expect(wordCaveat(words, 'late-posts', raised['late-posts']!).evidence).toBe('In 4 sealed periods, 312 mentions came in after the seal, and 2 are gone since.')
  expect(wordCaveat(words, 'late-posts', { late: 1, gone: 0, periods: 1 }).evidence).toBe('In 1 sealed period, 1 mention came in after the seal.')
})
