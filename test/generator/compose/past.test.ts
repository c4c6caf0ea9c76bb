import { toString } from 'hast-util-to-string'
import { describe, expect, test } from 'vitest'
import type { Document } from '../../../generator/compose/document.ts'
import { loadWords } from '../../../generator/words/load-words.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { definitionParts } from '../../../model/past/definition.ts'
import { composeHouse, elementsOf, sectionText } from '../../support/house-composition.ts'
import { templatesFolder } from '../../support/house-words.ts'
import { sampleFindings } from '../../support/sample-findings.ts'
import { composeIn } from '../../support/worded-findings.ts'

type Revisions = NonNullable<Findings['revisions']>
type FollowUp = NonNullable<Findings['follow_up']>
type Followed = FollowUp['advice'][number]

const sample = sampleFindings()
const usual = composeHouse(sample)
const revisions = sample.revisions!
const followUp = sample.follow_up!
const revised = (change: Partial<Revisions>) => composeHouse({ ...sample, revisions: { ...revisions, ...change } })
const typically = (change: Partial<NonNullable<Revisions['typical']>>) => sectionText(revised({ typical: { ...revisions.typical!, ...change } }), 'revisions')
const followed = (change: Partial<FollowUp>) => sectionText(composeHouse({ ...sample, follow_up: { ...followUp, ...change } }), 'follow-up')
const told = (change: Partial<Followed>) => followed({ advice: [{ ...followUp.advice[0]!, ...change }] })
const charts = (document: Document) => elementsOf(document, 'figure').map(({ properties }) => properties['dataChart'])
const estimate = (mean: number) => ({ mean, low: mean - 4, high: mean + 4, sd: 2.4 })

describe('before the first seal', () => {
  const bare = composeHouse({ ...sample, revisions: null, follow_up: null, opinion: { ...sample.opinion, previous_sealed: null } })
  test('nothing is said of earlier reviews, nor how it is made, nor in the glossary', () => {
    expect([sectionText(bare, 'revisions'), sectionText(bare, 'follow-up')]).toEqual(['', ''])
    expect(`${sectionText(bare, 'first-page')}${sectionText(bare, 'made')}${sectionText(bare, 'glossary')}`).not.toMatch(/sealed (review|at)|Late mentions|Signed off/)
    expect(charts(bare)).not.toContain('revisions')
  })
  test('it can fail: afterwards it is', () => {
    expect(sectionText(usual, 'made')).toContain('A sealed review is never changed')
    expect(sectionText(usual, 'glossary')).toContain('Signed off and put into the archive')
    expect(charts(usual)).toContain('revisions')
  })
  test('advice that hardly helped is not followed up, and leaves no section', () => {
    expect(followed({ advice: [], met: 0, partly: 0, not_met: 0, unknown: 0 })).toBe('')
  })
})

describe('the first page', () => {
  const page = (now: number, sealed: number) => sectionText(composeHouse({ ...sample, opinion: { ...sample.opinion, previous: estimate(now), previous_sealed: estimate(sealed) } }), 'first-page')
  test('tells the period before as sealed and as it stands now', () => {
    expect(page(23.6, 24.3)).toContain('The period before (September 2026) was sealed at 24.3 points and now stands at 23.6.')
  })
  test.each([[24.04, 24.06], [24.06, 24.14], [24.1, 24.1]])('says nothing of a move that one decimal does not show: %d, %d', (now, sealed) => {
    expect(page(now, sealed)).not.toContain('was sealed at')
  })
})

describe('how earlier figures have changed', () => {
  const text = sectionText(usual, 'revisions')
  test('leads with the typical move, against what was told, and who left the interval', () => {
    expect(text).toMatch(/^How earlier figures have changed Earlier figures have typically moved by 0\.6 points, within the ±4\.1 points told with them; none has left its interval\. Changes on the period before have typically moved by 0\.4 points; ±1\.5 points were told with them\. 435 mentions of sealed periods came in after the seal, and 2 are gone since\./)
    expect(typically({ outside: 1 })).toContain('one has left its interval')
    expect(typically({ level: 5, outside: 4 })).toContain('moved by 5.0 points, more than the ±4.1 points told with them; 4 have left their intervals')
    expect(typically({ level: 0.01 })).toContain('moved by less than 0.1 points')
    expect(typically({ periods: 1 })).toMatch(/Its change on the period before has moved by 0\.4 points; .*The earlier figure has moved by 0\.6 points; it has not left its interval/)
    expect(typically({ periods: 1, change: null, change_half_width: null })).toMatch(/The one earlier figure that still stands has moved by 0\.6 points, within the ±4\.1 points told with it\. (?!Changes on)/)
  })
  test('where no sealed period is part of the history any more, that is said, and no picture is drawn', () => {
    const gone = revisions.periods.map((of) => ({ ...of, level_now: null, change_now: null, moved: null, moved_change: null, parts: null }))
    const document = revised({ typical: null, periods: gone })
    expect(sectionText(document, 'revisions')).toContain('No period that was sealed is part of the history any more')
    expect(sectionText(document, 'revisions')).toContain('A dash under the figures of now')
    expect(charts(document)).not.toContain('revisions')
    expect(sectionText(document, 'revisions')).not.toContain('Why earlier figures moved')
  })
  test('two tables, the newest period first, the latest twelve; the reasons sum to the whole', () => {
    expect(text).toMatch(/September 2026 4 Oct 2026 24\.3 20\.2 to 28\.4 23\.6 −0\.8 −0\.5 −0\.2 August 2026/)
    expect(text).toMatch(/Why earlier figures moved, in points Period Late mentions Late posts Account file Program Later posts Moved in all September 2026 105 −0\.2 0\.0 0\.0 −0\.5 −0\.8/)
    const many = Array.from({ length: 36 }, (_, i) => ({ ...revisions.periods[0]!, period: `${2023 + Math.floor(i / 12)}-${String(i % 12 + 1).padStart(2, '0')}` }))
    const tables = elementsOf(revised({ periods: many }), 'table').filter(({ properties }) => String(properties['className']).includes('table-revisions'))
    expect(tables.map((table) => elementsOf({ ...usual, tree: { type: 'root', children: [table] } }, 'tr').length)).toEqual([13, 13])
    expect(toString(tables[0]!)).toMatch(/told(?:.*?)December 2025/)
    expect(toString(tables[0]!)).not.toContain('December 2024')
  })
  test('late posts that can’t be told apart are said to be so, and only then', () => {
    const [first, ...others] = revisions.periods
    expect(sectionText(revised({ periods: [{ ...first!, parts: { ...first!.parts!, late_posts: null } }, ...others] }), 'revisions')).toContain('A dash under late posts')
    expect(text).not.toMatch(/A dash under/)
  })
  test('a replaced review with its reason', () => {
    expect(text).toContain('The review of May 2026 was sealed again on 20 August 2026, as 2026-05.r2, at 22.6 points. Reason given: “A board was counted twice”')
  })
  test('a break: what changed, between which periods, bridged or not, and how to read across it', () => {
    expect(text).toContain('Between June 2026 and July 2026 this changed: which posts belong to which venue. The earlier figures could be worked out again')
    const open = sectionText(revised({ breaks: [{ after: '2026-09', before: '2026-10', parts: ['base', 'target_mix'], bridged: false }] }), 'revisions')
    expect(open).toContain('Between September 2026 and October 2026 this changed: the base and the fixed mix that opinion is stated at. The earlier figures can’t be worked out again')
    expect(open).toContain('Across such a change, compare figures as they stand now')
    expect(sectionText(revised({ breaks: [] }), 'revisions')).not.toMatch(/this changed|Across such a change|Dashed/)
  })
  test('the text alternative names span, largest move and breaks', () => {
    const alt = String(elementsOf(usual, 'figure').find(({ properties }) => properties['dataChart'] === 'revisions')!.properties['dataAlt'])
    expect(alt).toBe('Chart of mix-adjusted opinion in 6 sealed periods, April 2026 to September 2026: as first sealed, with its interval, and as it stands now. Moved most: September 2026, from 24.3 to 23.6 points. No figure has left the interval told with it. What the figures mean changed before July 2026.')
  })
})

describe('what became of advice', () => {
  const text = sectionText(usual, 'follow-up')
  test('leads with how many were met', () => {
    expect(text).toContain('Of 4 pieces of advice in the review of September 2026, one has been met and one is on its way; one has not been met; of one it can’t be told.')
    expect(followed({ met: 0, partly: 2, not_met: 2, unknown: 0 })).toContain('none has been met and 2 are on their way; 2 have not been met.')
    const one = (outcome: Followed['outcome']) => followed({ advice: [{ ...followUp.advice[0]!, outcome }], met: Number(outcome === 'met'), partly: Number(outcome === 'partly'), not_met: Number(outcome === 'not-met'), unknown: Number(outcome === 'unknown') })
    expect((['met', 'partly', 'not-met', 'unknown'] as const).map((outcome) => /The one piece of advice in the review of September 2026 (.*?)\./.exec(one(outcome))?.[1]))
      .toEqual(['has been met', 'is on its way', 'has not been met', 'has an outcome that can’t be told'])
  })
  test('each piece verbatim, with its outcome first, what was to be seen and what is', () => {
    expect(text).toContain('On its way. Blogs: 120 voices on top, by open call. What was to be seen: Blogs with livelier threads. What is seen now: Authors heard in Blogs: 210 then, 330 sought, 268 now. The interval of the change of opinion was expected to be about ±1.30 points; now it is ±1.40 points.')
    expect(text).toContain('Not met. Freight: 424 hauliers on top. What was to be seen: Hauliers nearer 16%. What is seen now: Share of “freight” among the authors heard: 4% then, 16% sought, 4% now.')
    expect(text).toContain('Share of the mentions that the most active 1% of the authors wrote: 27% then, less sought, not known now.')
    expect(told({ width: { expected: 2.6, now: null } })).toContain('what it is now can’t be told.')
    expect(told({ counts: null, shares: null, width: null })).toContain('The review of then holds no figure to measure it by.')
  })
  test.each([
    ['hear-venue', 'Authors heard in Blogs: 3 then'], ['survey-start', 'Waves of the survey: 3 then'], ['survey-waves', 'Waves that can be compared with the posts: 3 then'], ['survey-interviews', 'Interviews in the last wave: 3 then'],
    ['audit-start', 'Mentions judged by people: 3 then'], ['audit-more', 'Mentions of Blogs judged by people: 3 then'],
  ])('%s is measured by a count', (code, start) => {
    expect(told({ code, counts: { before: 3, sought: 1200, now: 5 }, shares: null, width: null })).toContain(`${start}, 1,200 sought, 5 now.`)
  })
  test.each([
    ['hear-topic', 'Share of the talk that is about “Blogs”: 4% then, more sought'], ['invite-everyone', 'Share of the mentions at either end of the scale: 4% then, less sought'],
    ['standing-way-in', 'Share of the mentions that the most active 1% of the authors wrote: 4% then, less sought'],
  ])('%s is measured by a share that is to move one way', (code, start) => {
    expect(told({ code, counts: null, shares: { before: 0.04, sought: null, now: 0.061 }, width: null })).toContain(`${start}, 6% now.`)
  })
})

test('texts of another review that try to be HTML or Markdown stay text', () => {
  const hostile = '<img src=x onerror=alert(1)> {n} **b** [x](javascript:alert(1)) :figure{of="brand" as="text"}'
  const document = composeHouse({
    ...sample, revisions: { ...revisions, periods: revisions.periods.map((of) => ({ ...of, revised: of.revised && { ...of.revised, reason: hostile } })) },
    follow_up: { ...followUp, advice: followUp.advice.map((piece) => ({ ...piece, action: hostile, success: hostile, where: hostile })) },
  })
  expect(elementsOf(document, 'img')).toEqual([])
  expect(sectionText(document, 'revisions')).toContain(`Reason given: “${hostile}”`)
  expect(sectionText(document, 'follow-up')).toContain(`On its way. ${hostile} What was to be seen: ${hostile} What is seen now: Authors heard in ${hostile}: 210 then`)
  expect(elementsOf(document, 'a').filter(({ properties }) => String(properties['href']).startsWith('javascript'))).toEqual([])
})

describe.each(['en-GB', 'de-DE', 'fr-FR', 'pt-BR'])('in %s', (locale) => {
  test('every outcome, measure, part and bridge has words of its own', async () => {
    const words = await loadWords(`${templatesFolder}/words`, locale)
    const codes = ['hear-venue', 'survey-start', 'survey-waves', 'survey-interviews', 'audit-start', 'audit-more']
    const ofShares = ['hear-topic', 'hear-segment', 'invite-everyone', 'standing-way-in']
    const outcomes = ['met', 'partly', 'not-met', 'unknown'] as const
    const piece = { ...followUp.advice[0]!, width: null, action: 'ACTION', success: 'SUCCESS', where: 'PLACE' }
    const advice = [
      ...codes.map((code, i) => ({ ...piece, code, outcome: outcomes[i % 4]!, counts: { before: 1, sought: 2, now: 3 } })),
      ...ofShares.map((code, i) => ({ ...piece, code, outcome: outcomes[i % 4]!, counts: null, shares: { before: 0.1, sought: null, now: 0.2 } })),
    ]
    const breaks = definitionParts.map((part, i) => ({ after: '2026-06', before: '2026-07', parts: [part], bridged: i % 2 === 0 }))
    const document = composeIn(words, { ...sample, revisions: { ...revisions, breaks }, follow_up: { ...followUp, advice } })
    const items = (name: string) => elementsOf({ ...document, tree: { type: 'root', children: elementsOf(document, 'section').filter(({ properties }) => properties['id'] === name) as never } }, 'li').map(toString)
    const measures = items('follow-up').map((item) => item.replace(/\s+/g, ' ').trim())
    expect(measures).toHaveLength(advice.length)
    expect(new Set(measures.map((item) => item.split('SUCCESS')[1])).size).toBe(advice.length)
    expect(new Set(measures.map((item) => item.split('ACTION')[0])).size).toBe(outcomes.length)
    const changes = items('revisions').slice(0, breaks.length)
    expect(new Set(changes).size).toBe(definitionParts.length)
    for (const text of [...measures, ...changes, sectionText(document, 'revisions'), sectionText(document, 'follow-up')]) expect(text).not.toMatch(/undefined|NaN|\{|\}|definition-|target_mix/)
  })
})
