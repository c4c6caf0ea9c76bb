import { describe, expect, test } from 'vitest'
import { wordAdvice } from '../../../generator/words/advice.ts'
import { houseWords } from '../../support/house-words.ts'

const words = await houseWords()

/** Every code that the program advises by, with figures as it gives them. */
const advised: Readonly<Record<string, Readonly<Record<string, string | number>>>> = {
  'hear-venue': { venue: 'Blogs', authors: 200, heard: 118, width_before: 3.6, width_after: 3, cost: 600 },
  'hear-topic': { topic: 'On board', authors: 150, talk: 0.16, importance: 0.27, width_before: 4.2, width_after: 3.7, cost: 150 },
  'hear-segment': { margin: 'segment', segment: 'islander', authors: 385, alone: 240, heard: 0.21, customers: 0.34, effective_before: 611.6, effective_after: 940.8, cost: 385 },
  'invite-everyone': { extremes: 0.61 }, 'standing-way-in': { share: 0.27 },
  'survey-start': { waves: 8 }, 'survey-waves': { waves: 11, waves_now: 30, correlation: 0.31 }, 'survey-interviews': { interviews: 900, interviews_now: 400, correlation: 0.31 },
  'audit-start': { codings: 1750, per_venue: 350, width: 2 }, 'audit-more': { venue: 'Blogs', codings: 22, needed: 50 },
}

test.each(Object.entries(advised))('advice %s is worded whole, with its figures and in sentences', (code, figures) => {
  const worded = wordAdvice(words, code, figures)
  for (const sentence of Object.values(worded)) expect(sentence).toMatch(/^(?!.*(NaN|undefined|[{}]| {2}))[A-Z0-9“].*\.$/)
  const all = Object.values(worded).join(' ')
  for (const figure of Object.values(figures)) if (typeof figure === 'string') expect(all).toContain(figure)
  // the first thing to do is told in a line
  expect(worded.action.length).toBeLessThan(100)
})

test('the catalogue words no advice that is not given', () => {
  const codes = words.keys.flatMap((key) => /^advice-(.+)-action$/.exec(key)?.[1] ?? [])
  expect(codes.sort()).toEqual(Object.keys(advised).sort())
})

describe('figures', () => {
  const evidence = (code: string, change: Readonly<Record<string, string | number>> = {}) => wordAdvice(words, code, { ...advised[code], ...change }).evidence
  test('widths are told as plus or minus half of them; where they are written alike nothing narrows', () => {
    expect(evidence('hear-venue')).toBe('118 authors were heard there in this period. With so many more in the next one, the interval of the next change of opinion narrows from ±1.80 to ±1.50 points.')
    expect(evidence('hear-venue', { width_after: 3.595 })).toContain('stays at about ±1.80 points')
    expect(evidence('hear-venue', { heard: 0 })).toContain('No author was heard there')
    expect(evidence('audit-start')).toContain('about ±1.00 points')
  })
  test('what was heard is a share of a segment and a number of a venue', () => {
    expect(evidence('hear-segment')).toBe('They are 34% of the customers and 21% of the authors heard. So many bring them to their share if the other groups heard too little are filled up as well; 240 would do for this group alone. About all customers, those heard tell as much as 612 would who are made up like the customers; with so many more of this group, as much as 941.')
    expect(evidence('hear-segment', { alone: 0 })).toContain('the authors heard. So many bring them to their share. About all customers')
  })
  test('what is not known is left out: no correlation yet, no mention at either end', () => {
    expect(evidence('survey-waves')).toContain('30 waves can be compared')
    expect(evidence('survey-waves')).toContain('correlation 0.31 of at most 1')
    expect(evidence('survey-waves', { correlation: 0, waves_now: 0 })).toBe('No wave can be compared with the posts now, too few for a verdict.')
    expect(evidence('invite-everyone')).toContain('61% of the mentions')
    expect(evidence('invite-everyone', { extremes: 0 })).toBe('Whoever asks only some people hears what these think, not what customers think.')
  })
  test('one is not many', () => {
    expect(wordAdvice(words, 'hear-venue', { ...advised['hear-venue'], authors: 1 }).action).toBe('Hear 1 more author in Blogs: invite everyone to post there, never only the content.')
    expect(wordAdvice(words, 'hear-topic', { ...advised['hear-topic'], authors: 1500 }).action).toBe('Ask 1,500 people, drawn at random, about “On board”.')
  })
})

test('it can fail: an unknown code and a missing figure are refused', () => {
  expect(() => wordAdvice(words, 'no-such', {})).toThrow('advice-no-such')
  expect(() => wordAdvice(words, 'hear-venue', { venue: 'Blogs' })).toThrow('advice-hear-venue-action')
})
