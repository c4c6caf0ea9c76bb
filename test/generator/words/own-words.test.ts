import { visit } from 'unist-util-visit'
import { toString } from 'hast-util-to-string'
import { describe, expect, test } from 'vitest'
import { compose } from '../../../generator/compose/compose.ts'
import { InputFault, type Fault } from '../../../generator/faults/fault.ts'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import { loadWords } from '../../../generator/words/load-words.ts'
import { unusedWords } from '../../../generator/words/unused-words.ts'
import type { Words } from '../../../generator/words/words.ts'
import { houseCharts, houseTemplate } from '../../support/house-composition.ts'
import { templatesFolder } from '../../support/house-words.ts'
import { postsAlone } from '../../support/sample-findings.ts'

const own = (text: string, locale = 'en-GB') => loadWords(`${templatesFolder}/words`, locale, { place: 'words.yaml', text })

async function faultsOf(text: string): Promise<readonly Fault[]> {
  try {
    await own(text)
  } catch (error) {
    if (error instanceof InputFault) return error.faults
    throw error
  }
  return []
}

const told = async (text: string) => (await faultsOf(text)).map(({ code, place }) => `${code} ${place}`)

describe('an account words single messages', () => {
  test('the house’s otherwise, arguments left out or put in another order; all else stays the house’s', async () => {
    const words = await own('term-venue: Place\ncaveat-thin-data-evidence: "Mentions: {mentions, plural, one {a single one} other {#}}."\nkeyfigure-opinion-note: points\n')
    expect([words.say('term-venue'), words.say('term-topic'), words.say('keyfigure-opinion-note', { interval: '90%', levels: '1 to 2' })]).toEqual(['Place', 'Topic', 'points'])
    expect(words.say('caveat-thin-data-evidence', { mentions: 1200 })).toBe('Mentions: 1,200.')
    expect(words.own).toMatchObject({ added: [], place: 'words.yaml' })
  })
  test('an empty file, or one of comments, changes nothing', async () => {
    expect((await own('# nothing yet\n')).say('term-venue')).toBe('Venue')
  })
  test('new messages for its own template, with figures of its own', async () => {
    const words = await own('our-heading: Ours\nour-line: { text: "Since last time: {change}.", arguments: { change: { of: opinion.change.mean, as: change } } }\n')
    expect(words.own?.added).toEqual(['our-heading', 'our-line'])
    expect([words.say('our-heading'), words.say('our-line', { change: '+2.1' })]).toEqual(['Ours', 'Since last time: +2.1.'])
  })
})

describe('what is wrong is told at its line and column', () => {
  test.each([
    ['an argument that the message has not', 'term-topic: Topic\nkeyfigure-opinion-note: "{intervall} interval"\n', 'words-argument-unknown words.yaml:2:1 keyfigure-opinion-note'],
    ['a brace that is left open', 'term-venue: "{n, plural, one {#}"\n', 'words-message-invalid words.yaml:1:1 term-venue'],
    ['a select without other', 'severity-notes: "x"\nraw-headline: "{raw, select, up {up} down {down}}"\n', 'words-message-invalid words.yaml:2:1 raw-headline'],
    ['a format of ICU’s own: figures come written', 'keyfigure-opinion-note: "{levels, number} {interval}"\n', 'words-argument-unfit words.yaml:1:1 keyfigure-opinion-note'],
    ['a plural of what is no number', 'keyfigure-opinion-note: "{levels, plural, one {one} other {#}} {interval}"\n', 'words-argument-unfit words.yaml:1:1 keyfigure-opinion-note'],
    ['something else than a text', 'term-venue: 12\n', 'words-value words.yaml:1:1 term-venue'],
    ['arguments for a message of the house', 'term-venue: { text: Place, arguments: {} }\n', 'words-value words.yaml:1:1 term-venue'],
    ['a part that no message has', 'our-line: { text: Ours, argument: {} }\n', 'words-value words.yaml:1:1 our-line'],
    ['a new message with an argument that it does not declare', 'our-line: "Of {brand}"\n', 'words-argument-unknown words.yaml:1:1 our-line'],
    ['a list', '- term-venue\n', 'words-value words.yaml'],
    ['a key twice', 'term-venue: A\nterm-venue: B\n', 'account-key-twice words.yaml:2:1'],
    ['a name that means something to the program', '__proto__: A\n', 'account-key-reserved words.yaml:1:1'],
    ['an alias', 'a: &x A\nb: *x\n', 'account-alias words.yaml:2:4'],
  ])('%s', async (_what, text, expected) => {
    expect(await told(text)).toContain(expected)
  })
  test('all at once, with the nearest name', async () => {
    const faults = await faultsOf('keyfigure-opinion-note: "{intervall}"\nterm-venue: 12\n')
    expect(faults.map(({ code }) => code)).toEqual(['words-argument-unknown', 'words-value'])
    expect(faults[0]?.mend).toContain('{interval}')
  })
})

describe('a message that nothing calls', () => {
  const unused = async (text: string, texts: readonly string[] = []) => unusedWords(await own(text), { texts, charts: ['ours'], factors: ['venue', 'segment'] })
  test('is told with the nearest of the house’s', async () => {
    const [fault] = await unused('# mine\nterm-venu: Place\n')
    expect(fault).toMatchObject({ code: 'words-key-unknown', place: 'words.yaml:2:1 term-venu' })
    expect(fault?.mend).toContain('`term-venue`')
  })
  test('is none where the template, a chart, a factor or a level calls it', async () => {
    expect(await unused('our-line: Ours\n', ['Then :say{message="our-line"}.'])).toEqual([])
    expect(await unused('our-line: Ours\n', ['Then :say{message="our-line-2"}.'])).toHaveLength(1)
    expect(await unused('chart-ours-title: Ours\nfactor-segment: Segment\npart-segment_mix: Who was asked\nlevel-freight: Freight\n')).toEqual([])
    expect(await unused('chart-theirs-title: Theirs\nfactor-region: Region\nlevel-ocasional: Now and then\n')).toHaveLength(3)
  })
})

describe('in a review', () => {
  const composed = (words: Words, text: string) => compose({
    template: { ...houseTemplate, review: { place: 'template.md', text } }, words, findings: postsAlone(), tables: tablesOf(postsAlone()), charts: houseCharts,
  })
  const line = (as: string, of = 'opinion.change.mean') => `our-line: { text: "Ours: {change}.", arguments: { change: { of: ${of}, as: ${as} } } }\n`
  test('an own sentence has its figures, and an override the house’s', async () => {
    const words = await own(`${line('change')}opinion-level: "Level {level}."\n`)
    expect(toString(composed(words, ':say{message="our-line"} :say{message="opinion-level"}\n').tree)).toMatch(/^Ours: [+−]\d+\.\d\. Level −?\d+\.\d\.$/)
  })
  test('its faults stand at the line of words.yaml', async () => {
    const fails = async (text: string, review = ':say{message="our-line"}\n') => {
      const words = await own(text)
      try {
        composed(words, review)
        return []
      } catch (error) {
        return error instanceof InputFault ? error.faults.map(({ code, place, mend }) => ({ code, place, mend })) : [error]
      }
    }
    const at = `words.yaml:1:${line('change').indexOf('{ of') + 1}`
    expect(await fails(line('change', 'opinon.change.mean'))).toEqual([expect.objectContaining({ code: 'path-unknown', place: at, mend: expect.stringContaining('opinion') as string })])
    expect(await fails(line('chnage'))).toContainEqual(expect.objectContaining({ code: 'form-unknown', place: at }))
    expect(await fails(line('change').replace('"Ours: {change}."', 'Ours'))).toContainEqual(expect.objectContaining({ code: 'argument-unused', place: at.replace(/\d+$/, String(line('change').replace('"Ours: {change}."', 'Ours').indexOf('{ of') + 1)) }))
    expect(await fails(line('change'))).toEqual([])
  })
  test('a message can bring in no markup', async () => {
    const words = await own('opinion-heading: "<script>alert(1)</script> [x](javascript:alert(1))"\n')
    const { tree } = composed(words, '# :say{message="opinion-heading"}\n')
    const tags: string[] = []
    visit(tree, 'element', ({ tagName }) => void tags.push(tagName))
    expect(tags).toEqual(['h1'])
    expect(toString(tree)).toContain('<script>')
  })
})
