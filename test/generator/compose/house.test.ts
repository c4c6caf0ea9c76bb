import { toString } from 'hast-util-to-string'
import { expect, test } from 'vitest'
import type { Document } from '../../../generator/compose/document.ts'
import { blankFindings } from '../../../model/findings/blank.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { composeHouse, elementsOf, houseCharts, sectionText } from '../../support/house-composition.ts'
import { hostileFindings } from '../../support/small-template.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const sample = sampleFindings()
const usual = composeHouse(sample)
const firstPage = (document: Document) => sectionText(document, 'first-page')
const lead = (document: Document) => toString(elementsOf(document, 'div').find((div) => String(div.properties['className']) === 'lead')!).trim()
const withOpinion = (opinion: Partial<Findings['opinion']>): Findings => ({ ...sample, opinion: { ...sample.opinion, ...opinion } })
const estimate = (mean: number, low: number, high: number) => ({ mean, low, high, sd: (high - low) / 3.29 })

test('raw and adjusted part: the headline says both, and the reason follows', () => {
  expect(lead(usual)).toBe('Opinion of Skerrow Ferries rose by 2.2 points in October 2026 compared with September 2026 (90% interval 0.8 to 3.6). Yet the raw average of all mentions fell by 2.3 points. The main reason: mentions in Discussion boards, less kind than the rest, went from 33% to 40% of all.')
  expect(firstPage(usual)).toContain('Where people posted lowered it by 1.7 points (90% interval 1.3 to 2.1). Opinion itself raised it by 2.2 points (90% interval 0.8 to 3.6). The others together: ')
})

test('what the first page says of the parts adds up to the change of the raw average, but for the last digit', () => {
  const [, sign, lowered, raised, rest] = /raw average of all mentions (fell|rose) by [\d.]+ points, from.*lowered it by ([\d.]+) .*itself raised it by ([\d.]+) .*The others together: ([−+][\d.]+)\. /.exec(firstPage(usual))!
  expect(sign).toBe('fell')
  expect(-Number(lowered) + Number(raised) + Number(rest.replace('−', '-'))).toBeCloseTo(sample.decomposition!.raw_change, 0)
})

test('where opinion moved the same way, the reason is one beside it', () => {
  const parts = sample.decomposition!.parts.map((part) => part.part === 'opinion' ? { ...part, estimate: estimate(-1.2, -2, -0.4), movement: 'down' as const } : part)
  expect(firstPage(composeHouse({ ...sample, decomposition: { ...sample.decomposition!, parts } }))).toContain('The main reason other than opinion: mentions in Discussion boards')
})

test('what works against the change is not called its reason', () => {
  const parts = sample.decomposition!.parts.map((part) => part.part === 'venue_mix'
    ? { ...part, estimate: estimate(1.7, 1.3, 2.1), movement: 'up' as const, leading: { ...part.leading!, share_from: 0.4, share_to: 0.33, estimate: estimate(1.2, 1, 1.4) } } : part)
  expect(firstPage(composeHouse({ ...sample, decomposition: { ...sample.decomposition!, parts } })))
    .toContain('What held it up most: mentions in Discussion boards, less kind than the rest, went from 40% to 33% of all.')
})

/** The first page where one mix did most, and one level did most of it. */
function withLargest(part: string, leading: Partial<NonNullable<NonNullable<Findings['decomposition']>['parts'][number]['leading']>> | null): string {
  const parts = sample.decomposition!.parts.map((of) => of.part === 'venue_mix' ? { ...of, part, leading: leading && { ...of.leading!, ...leading } } : of.part === part ? { ...of, part: 'venue_mix' } : of)
  return firstPage(composeHouse({ ...sample, decomposition: { ...sample.decomposition!, parts, largest: part } }))
}

test('what moved is named: the venue, the topic, the poster class', () => {
  expect(withLargest('topic_mix', { level: 'none', label: 'none' })).toContain('mentions without a topic, less kind than the rest, went from 33% to 40% of all')
  expect(withLargest('topic_mix', { level: 'punctuality', label: 'Punctuality' })).toContain('mentions of Punctuality, less kind than the rest,')
  expect(withLargest('poster_mix', { level: 'prolific', label: 'prolific' })).toContain('mentions by prolific posters, less kind than the rest,')
  expect(withLargest('poster_mix', { share_from: 0.4, share_to: 0.33 })).toContain('mentions by Discussion boards, kinder than the rest, went from 40% to 33% of all')
})

test('of a level whose interval supports no kindness none is told; where nothing is named the part is', () => {
  expect(withLargest('topic_mix', { estimate: estimate(-0.4, -1, 0.2) })).toContain('mentions of Discussion boards went from 33% to 40% of all')
  expect(withLargest('venue_drift', null)).toContain('The main reason: some venues drifted down, away from the rest.')
  expect(withLargest('topic_mix', { share_from: 0.401, share_to: 0.404 })).toContain('The main reason: the mix of topic shifted towards less kind mentions.')
})

test('a part that rounds to nothing is told as such, once, and as no bullet', () => {
  const parts = sample.decomposition!.parts.map((part) => part.part === 'poster_mix' ? { ...part, estimate: estimate(-0.02, -0.03, -0.01) } : part)
  const text = sectionText(composeHouse({ ...sample, decomposition: { ...sample.decomposition!, parts } }), 'moved')
  expect(text).toContain('No noticeable effect, rounding to nothing: Who posted.')
  expect(text).not.toContain('Who posted. Prolific posters: from')
})

/** An announcement that opinion moved. */
const announced = /[Oo]pinion (of Skerrow Ferries )?(rose|fell|has risen|has fallen|itself raised|itself lowered|itself: (raised|lowered))/

test('no change is announced that its interval does not support', () => {
  const findings = withOpinion({ change: estimate(2.2, -0.4, 4.8), movement: 'not-established', probability_up: 0.91, movement_since_base: 'not-established', since_base: estimate(1, -1.1, 3.1) })
  const parts = sample.decomposition!.parts.map((part) => part.part === 'opinion' ? { ...part, movement: 'not-established' as const, estimate: estimate(2.2, -0.4, 4.8) } : part)
  const document = composeHouse({ ...findings, decomposition: { ...sample.decomposition!, parts } })
  expect(lead(document)).toBe('No change in opinion of Skerrow Ferries can be established for October 2026: compared with September 2026 it moved by between −0.4 and +4.8 points (90% interval). The raw average of all mentions fell by 2.3 points, which by itself says nothing about opinion. The main reason: mentions in Discussion boards, less kind than the rest, went from 33% to 40% of all.')
  const told = `${firstPage(document)} ${sectionText(document, 'opinion')} ${sectionText(document, 'moved')}`.replace('Probability that opinion rose', '')
  expect(told).not.toMatch(announced)
  expect(`${firstPage(usual)} ${sectionText(usual, 'opinion')}`).toMatch(announced)
})

test('a fall is told as a fall, without double signs', () => {
  expect(lead(composeHouse(withOpinion({ change: estimate(-2.7, -4.1, -1.2), movement: 'down', raw_change: 1.1 }))))
    .toContain('Opinion of Skerrow Ferries fell by 2.7 points in October 2026 compared with September 2026 (90% interval 1.2 to 4.1). Yet the raw average of all mentions rose by 1.1 points.')
})

test('no previous period: the level is told, the change since the base stands for the change', () => {
  const document = composeHouse({
    ...withOpinion({ previous: null, change: null, probability_up: null, movement: null, raw_previous: null, raw_change: null }), previous_period: null, decomposition: null,
  })
  expect(lead(document)).toBe('Opinion of Skerrow Ferries stood at 25.8 points in October 2026 (90% interval 21.9 to 29.7); there is no earlier period to compare it with.')
  expect(firstPage(document)).toContain('Change since the base +6.8')
  expect(firstPage(document)).not.toContain('Probability that opinion rose')
  expect(firstPage(document)).toContain('There is no earlier period with mentions')
  expect(firstPage(document)).not.toContain('not known')
})

test('an empty period says so and quotes no raw average', () => {
  const document = composeHouse({ ...withOpinion({ raw: null, raw_change: null, mentions: 0, authors: 0, movement: 'not-established', change: estimate(0.1, -4, 4.2) }), decomposition: null })
  expect(lead(document)).toMatch(/^No mention of Skerrow Ferries was posted in October 2026: .* No change in opinion of Skerrow Ferries can be established for October 2026: .*\(90% interval\)\.$/)
  expect(firstPage(document)).toContain('No mention was posted in this period, so that there is no raw average')
})

test('failed diagnostics come first on the first page', () => {
  const document = composeHouse({ ...sample, diagnostics: { ...sample.diagnostics, passed: false } })
  expect(firstPage(document)).toMatch(/^\s*Brand health review Skerrow Ferries, October 2026 The checks of the computation failed for this period\./)
  expect(firstPage(usual)).not.toContain('checks of the computation failed')
})

test('unknown authors: said, and no concentration is told', () => {
  const document = composeHouse({ ...sample, speaking: { ...sample.speaking, concentration: { period: null, previous: null } } })
  expect(sectionText(document, 'speaking')).toContain('Authors are not known for this period')
  expect(sectionText(document, 'speaking')).not.toContain('most active 1%')
})

test('one venue only: no drift is told', () => {
  const [venue] = sample.venues
  const caveats = [{ code: 'one-venue', severity: 'serious' as const, figures: {}, evidence: '', meaning: '', remedy: '' }]
  const document = composeHouse({ ...sample, venues: [{ ...venue!, movement: 'not-established', share: 1 }], caveats })
  expect(sectionText(document, 'venues')).toContain('With one venue alone, its drift can’t be told from opinion.')
  expect(sectionText(document, 'venues')).not.toMatch(/[Dd]rifted|Drift since base/)
  expect(firstPage(document)).toContain('One venue only. All mentions come from one venue.')
})

test('of serious caveats the first page tells three, and how many more there are; the caveats section tells all', () => {
  const serious = ['authors-unknown', 'one-venue', 'survey-contradicts', 'no-previous-period', 'ready-made-authors'].map((code) => (
    { code, severity: 'serious' as const, figures: code === 'authors-unknown' ? { share: 0.6 } : code === 'survey-contradicts' ? { label: 'Favourability', correlation: -0.6, pairs: 20 } : {}, evidence: '', meaning: '', remedy: '' }
  ))
  const titles = ['Authors are not known', 'One venue only', 'The survey contradicts the posts', 'Nothing to compare with', 'Authors counted cell by cell']
  const parting = sample.caveats.find(({ code }) => code === 'pooled-average-misleads')!
  const told = (text: string) => titles.filter((title) => text.includes(`${title}.`))
  const withCaveats = (caveats: Findings['caveats']) => composeHouse({ ...sample, caveats })
  const [three, five, four] = [serious.slice(0, 3), serious, [...serious.slice(0, 3), parting]].map(withCaveats)
  expect(told(firstPage(three!))).toEqual(titles.slice(0, 3))
  expect(firstPage(three!)).not.toContain('more serious')
  expect(told(firstPage(five!))).toEqual(titles.slice(0, 3))
  expect(firstPage(five!)).toContain('And 2 more serious caveats. All caveats, what they mean and what you can do')
  // that raw average and opinion part ways stands first and counts
  expect(firstPage(four!)).toContain('The raw average and opinion part ways.')
  expect(told(firstPage(four!))).toEqual(titles.slice(0, 2))
  expect(firstPage(four!)).toContain('And 1 more serious caveat. All caveats')
  for (const title of titles) expect(sectionText(five!, 'caveats')).toContain(title)
  expect(elementsOf(four!, 'a').some((link) => link.properties['href'] === '#caveats-heading' && toString(link).startsWith('And 1 more serious caveat.'))).toBe(true)
})

test('why authors are fewer in one table than elsewhere is said where some are not known, and not where all are', () => {
  const text = (findings: Findings) => sectionText(composeHouse(findings), 'speaking')
  const known = sample.posters.filter(({ poster }) => poster !== 'unknown')
  const unknown = { ...known[0]!, poster: 'unknown', label: 'unknown' }
  expect(text({ ...sample, posters: [...known, unknown] })).toContain('Mentions whose author is not known are left out of this table.')
  expect(text({ ...sample, posters: known })).not.toContain('left out of this table')
})

test('without a serious caveat the first page shows the cautions, without either it says so', () => {
  const only = (...severities: string[]) => composeHouse({ ...sample, caveats: sample.caveats.filter(({ severity }) => severities.includes(severity)) })
  expect(firstPage(usual)).toContain('Serious caveats')
  expect(firstPage(usual)).not.toContain('Moderate voices fall behind')
  expect(firstPage(only('caution', 'note'))).toContain('Moderate voices fall behind')
  expect(firstPage(only('note'))).toContain('No serious caveat and no caution applies')
})

test('the mix of a factor that the account adds is named by it', () => {
  const parts = sample.decomposition!.parts.map((part) => part.part === 'venue_mix' ? { ...part, part: 'segment_mix', leading: null } : part)
  const document = composeHouse({ ...sample, decomposition: { ...sample.decomposition!, parts, largest: 'segment_mix' } })
  expect(firstPage(document)).toContain('The main reason: the mix of segment shifted towards less kind mentions')
  expect(firstPage(document)).toContain('The mix of segment lowered it by 1.7 points (90% interval 1.3 to 2.1).')
  expect(sectionText(document, 'moved')).toContain('The mix of segment −1.7 −2.1 to −1.3')
  expect(withLargest('segment_mix', { level: 'commuter', label: 'Commuters' })).toContain('mentions with Commuters as segment, less kind than the rest,')
})

test('findings without anything in them compose too, so that a template can be checked without a fit', () => {
  expect(sectionText(composeHouse(blankFindings), 'moved')).toContain('No mention was posted in this period')
})

test('small groups are left out of topics', () => {
  const topics = sample.topics.map((topic) => topic.topic === 'weather' ? { ...topic, authors: 9 } : topic)
  const section = sectionText(composeHouse({ ...sample, topics }), 'topics')
  expect(section).not.toContain('Crossings in bad weather')
  expect(section).toContain('Topics written about by fewer than 10 authors are not shown.')
})

test('no topics and no poster classes: their sections say so', () => {
  const document = composeHouse({ ...sample, topics: [], posters: [] })
  expect(sectionText(document, 'topics')).toContain('Topics are not told apart')
  expect(sectionText(document, 'speaking')).toContain('Poster classes are not told apart')
})

test('every chart appears once, with its finding as title and a text alternative with figures', () => {
  const figures = elementsOf(usual, 'figure')
  expect(figures.map((figure) => figure.properties['dataChart']).sort()).toEqual([...houseCharts].sort())
  for (const figure of figures) {
    expect(figure.properties).toMatchObject({ role: 'group', className: ['chart'] })
    expect(String(figure.properties['dataAlt'])).toMatch(/\d/)
    expect(toString(figure).length).toBeGreaterThan(40)
  }
})

test('headings skip no level, ids are unique, every link inside leads somewhere', () => {
  expect(usual.headings[0]?.depth).toBe(1)
  usual.headings.slice(1).forEach(({ depth }, at) => expect(depth - usual.headings[at]!.depth).toBeLessThanOrEqual(1))
  const ids = new Set([...elementsOf(usual, 'section').map((section) => section.properties['id']), ...usual.headings.map(({ id }) => id)])
  expect(ids.size).toBe(elementsOf(usual, 'section').length + usual.headings.length)
  for (const { properties } of elementsOf(usual, 'a')) expect(ids).toContain(String(properties['href']).slice(1))
})

test('nothing a client reads is left unworded', () => {
  const text = elementsOf(usual, 'section').map((section) => toString(section)).join(' ')
  expect(text).not.toMatch(/undefined|NaN|\[object|not-established|_mix|:figure|:say|\{[a-z]/)
})

test('a brand and labels that try to be HTML stay text', () => {
  const document = composeHouse(hostileFindings())
  expect(elementsOf(document, 'script')).toEqual([])
  expect(elementsOf(document, 'img')).toEqual([])
  expect(elementsOf(document, 'a').every(({ properties }) => String(properties['href']).startsWith('#'))).toBe(true)
  expect(firstPage(document)).toContain('<script>alert(1)</script>')
})

test('the same in, the same out', () => {
  expect(composeHouse(sampleFindings())).toEqual(usual)
})
