import { toString } from 'hast-util-to-string'
import { describe, expect, test } from 'vitest'
import type { Document } from '../../../generator/compose/document.ts'
import { blankFindings } from '../../../model/findings/blank.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { composeHouse, elementsOf, sectionText } from '../../support/house-composition.ts'
import { postsAlone, readyMade, sampleFindings, withCoder } from '../../support/sample-findings.ts'
import type { CoderState } from '../../support/sample-listening.ts'

const sample = sampleFindings()
const usual = composeHouse(sample)
const withFindings = (change: Partial<Findings>) => composeHouse({ ...sample, ...change })
const withSpeaking = (change: Partial<Findings['speaking']>) => sectionText(withFindings({ speaking: { ...sample.speaking, ...change } }), 'speaking')
const chartsOf = (document: Document) => elementsOf(document, 'figure').map(({ properties }) => String(properties['dataChart']))
const sectionsOf = (document: Document) => elementsOf(document, 'section').map(({ properties }) => String(properties['id']))
const altOf = (chart: string, document = usual) => String(elementsOf(document, 'figure').find(({ properties }) => properties['dataChart'] === chart)?.properties['dataAlt'])
const unworded = /undefined|NaN|\[object|not known|not-established|not_established|Infinity|:say|:advice|\{[a-z]|\(\)|null/
const ofListening = ['customers', 'volume', 'coder', 'advice']

describe('the parts stand in the order of the document, each with its picture, and all is worded', () => {
  test('sections', () => {
    expect(sectionsOf(usual)).toEqual(['first-page', 'contents', 'opinion', 'moved', 'venues', 'topics', 'speaking', 'customers', 'survey', 'volume', 'coder', 'competitors', 'advice', 'follow-up', 'revisions', 'caveats', 'made', 'glossary', 'tables'])
    expect(chartsOf(usual)).toEqual(expect.arrayContaining(['staying', 'spread', 'pull', 'benchmark', 'importance', 'tipping', 'coder', 'hearing']))
  })
  test.each(['speaking', 'topics', ...ofListening])('%s', (name) => { expect(sectionText(usual, name)).not.toMatch(unworded) })
  test('text alternatives hold figures and are worded', () => {
    for (const chart of ['staying', 'spread', 'pull', 'benchmark', 'importance', 'tipping', 'coder', 'hearing']) expect(altOf(chart)).toMatch(/^(?!.*(undefined|not known|NaN|null)).*\d/)
  })
})

describe('what is not given is not there: no section, no heading, no chart', () => {
  const cases: readonly (readonly [string, Document, readonly string[], readonly string[]])[] = [
    ['posts alone', composeHouse(postsAlone()), ['customers'], ['benchmark', 'importance', 'pull']],
    ['ready-made cells', composeHouse(readyMade()), ['customers', 'volume', 'coder', 'advice'], ['benchmark', 'importance', 'pull', 'staying', 'spread', 'tipping', 'coder', 'hearing']],
    ['nothing at all', composeHouse(blankFindings), ['customers', 'volume', 'coder', 'advice'], ['benchmark', 'importance', 'pull', 'staying', 'spread', 'tipping', 'coder', 'hearing']],
  ]
  test.each(cases)('%s', (_name, document, sections, charts) => {
    for (const section of sections) expect(sectionsOf(document)).not.toContain(section)
    for (const chart of charts) expect(chartsOf(document)).not.toContain(chart)
    const followed = document.headings.map(({ id }) => id)
    expect(new Set(followed).size).toBe(followed.length)
    expect(followed).not.toEqual(expect.arrayContaining(['importance-heading']))
    expect(followed.some((id) => /^(pull|customers)-/.test(id))).toBe(false)
  })
  test('without advice the first page has none; with it the first three, one line each', () => {
    expect(sectionText(composeHouse(readyMade()), 'first-page')).not.toContain('What to do first')
    expect(sectionText(usual, 'first-page')).toMatch(/What to do first Least heard, for their share of the customers: 55 and over, islander and freight\. Hear 200 more authors in Video comments: invite everyone to post there, never only the content\. Ask 150 people, drawn at random, about “On board”\. Hear 385 more authors of “islander” \(segment\): invite all of them, or a random sample\.$/)
  })
  test('no heading stands alone', () => {
    for (const [, document] of cases) {
      for (const section of elementsOf(document, 'section')) {
        const elements = section.children.filter((child) => child.type === 'element')
        elements.forEach((element, at) => {
          if (/^h[2-4]$/.test(element.tagName)) expect(elements[at + 1]?.tagName, toString(element)).not.toMatch(/^(undefined|h2)$/)
        })
      }
    }
  })
})

describe('who stays', () => {
  const staying = sample.speaking.staying!
  test('moderate voices that leave are said to', () => {
    expect(sectionText(usual, 'speaking')).toContain('Authors who speak in the middle come back less often than the others: by 15.2 percentage points (90% interval 11.5 to 18.9). Against the base they have fallen behind by 13.4 percentage points (90% interval 8.7 to 18.1): moderate voices are heard less and less beside them.')
  })
  test.each([
    ['up', 'moderate voices stay more than they did.'], ['not-established', 'so that it stays open whether moderate voices are leaving.'],
  ] as const)('a change that is %s', (movement, words) => {
    const text = withSpeaking({ staying: { ...staying, middle_gap_change: { ...staying.middle_gap_change!, movement } } })
    expect(text).toContain(words)
    expect(text).not.toContain('): moderate voices are heard less and less beside them.')
  })
  test('without a base to compare with nothing is said of leaving; without the gap the picture stands alone', () => {
    expect(withSpeaking({ staying: { ...staying, middle_gap_change: null } })).not.toMatch(/moderate|unworded|not known/)
    const bare = withSpeaking({ staying: { ...staying, middle_gap: null, middle_gap_change: null } })
    expect(bare).toContain('Who stays Authors are sorted by')
    expect(bare).toContain('How many authors posted again, by how kindly they spoke')
  })
})

describe('spread and pull', () => {
  test('where it widened, with both figures', () => {
    expect(sectionText(usual, 'speaking')).toMatch(/Opinions lie further apart than in the base in Discussion boards \(usual distance from the average: \d\d\.\d points then, \d\d\.\d now\)\./)
    const none = withSpeaking({ spread: sample.speaking.spread.map((of) => ({ ...of, movement: 'not-established' as const })) })
    expect(none).toContain('In no venue can opinions be shown to lie further apart than in the base.')
    const down = withSpeaking({ spread: sample.speaking.spread.map((of) => ({ ...of, movement: 'down' as const })) })
    expect(down).toContain('They lie closer together in')
  })
  test('ends of the scale that are not known are not told', () => {
    expect(sectionText(usual, 'speaking')).toMatch(/all praise or all blame, are most frequent in Video comments: \d\d% of the mentions there/)
    expect(withSpeaking({ spread: sample.speaking.spread.map((of) => ({ ...of, series: of.series.map((at) => ({ ...at, extremes: null })) })) })).not.toContain('at either end of the scale, all praise')
  })
  test('replies towards, away and open, each by its venue', () => {
    expect(sectionText(usual, 'speaking')).toContain('In Discussion boards, replies lean towards the thread before them: for each point that the thread is kinder than usual, replies are kinder by 0.24 of a point. In Microblogs, replies lean away from the thread before them: for each point that the thread is kinder than usual, replies are less kind by 0.13 of a point. In Video comments neither can be established.')
    const open = withSpeaking({ pull: sample.speaking.pull.map((of) => ({ ...of, movement: 'not-established' as const })) })
    expect(open).toContain('can’t be established in any venue')
    expect(open).not.toMatch(/replies lean towards the thread before them:|In .* neither/)
  })
})

describe('whom the posts stand for', () => {
  const benchmark = sample.benchmark!
  const customers = (change: Partial<typeof benchmark>) => sectionText(withFindings({ benchmark: { ...benchmark, ...change } }), 'customers')
  const text = sectionText(usual, 'customers')
  test('the three groups least heard come first, over all margins, one of them too small to show', () => {
    expect(text).toMatch(/^Whom the posts stand for Least heard, for their share of the customers: 55 and over, islander and freight\./)
    expect(text).toContain('Islander: 34% of the customers, 21% of the authors heard. Plan for 385 more authors. 240 would do if this group alone were heard more.')
    expect(text).toContain('Freight: 8% of the customers, fewer than 10 of the authors heard. Plan for 151 more authors. 99 would do if this group alone were heard more.')
    expect(text).toContain('55 and over: 43% of the customers, 24% of the authors heard. Plan for 416 more authors. Islander')
    expect(text).toContain('To bring all groups by segment up to their shares at once takes 675 more authors: islander, freight, school parties and commuter (385, 151, 76 and 63). These are the numbers to plan for')
    // of ages only one is heard too little, and is asked for by itself
    expect(text).not.toContain('To bring all groups by age')
  })
  test('of one, of two, of none', () => {
    const only = (count: number) => customers({ margins: benchmark.margins.map((margin, m) => ({ ...margin, levels: margin.levels.map((level, l) => ({ ...level, shortfall: m === 0 && l < count ? 10 - l : 0 })) })) })
    expect(only(0)).toContain('No group of customers is heard less than its share.')
    expect(only(1)).toContain('One group of customers is heard less than its share: islander.')
    expect(only(2)).toContain('Two groups of customers are heard less than their share: islander and commuter.')
    expect(customers({ margins: benchmark.margins.map((of) => ({ ...of, dissimilarity: null, needed_jointly: null, levels: of.levels.map((level) => ({ ...level, shortfall: null, needed_jointly: null })) })) })).toMatch(/Too few authors are known by group to say who is heard too little\.(?!.*at once takes)/)
    expect(altOf('benchmark', withFindings({ benchmark: { ...benchmark, margins: [] } }))).not.toContain('Least heard')
  })
  test('dissimilarity by margin, weights and what they cost, and the groups that no weight brings in', () => {
    expect(text).toContain('By segment, 31% of the authors would have to belong to another group for the posts to be made up like the customers. The segment is known of 1,212 of 1,490 authors.')
    expect(text).toContain('Single authors then count between 0.31 and 4.20 times the average; 14 would have counted for more or less than we allow. That has a price, since a few then stand for many: the average of 1,187 authors counted so is no surer than that of 612 who are made up like the customers.')
    expect(text).toContain('As heard, the authors’ average is 17.2 points; counted by the customers’ shares it is 11.6 points (90% interval 8.2 to 15.0).')
    expect(text).toContain('School parties (segment): 4% of the customers, and none of the authors.')
  })
  test('what can’t be done is not told as done', () => {
    const bare = customers({ raking: null, weighted: null, unreachable: [], margins: benchmark.margins.map((of) => ({ ...of, dissimilarity: null })) })
    expect(bare).not.toMatch(/Counting each author|counted by the customers|no weight can bring|not known/)
    expect(bare).toContain('By age, too few authors are known to tell how unlike the customers they are.')
    expect(customers({ raking: { ...benchmark.raking!, converged: false } })).toContain('does not quite bring the authors to the customers’ shares')
  })
})

describe('what the volume is worth', () => {
  const volume = sample.volume!
  const of = (change: Partial<typeof volume>) => sectionText(withFindings({ volume: { ...volume, ...change } }), 'volume')
  test('as many interviews, the gap, and the correlation behind it with its source', () => {
    expect(of({})).toContain('2,940 mentions by 1,490 authors are worth as much as a random sample of about 45 interviews.')
    expect(of({})).toContain('By the raw average 53.4% of what was said is favourable, a neutral mention counted as half; the survey found 45.6% (Favourability, wave 2026-10). They lie 7.8 percentage points apart')
    expect(of({})).toContain('because content customers are a little likelier to post than others. Heard were 1,490 authors, and there are 310,000 customers: as long as most do not post, even a small difference in who does moves the result that far.')
    expect(sectionText(usual, 'made')).toContain('Among 310,000 customers the data defect correlation comes to 0.011')
  })
  test('a sample of next to nothing, a gap within the survey’s own error, no number of customers', () => {
    expect(of({ equal_sample: 0.4 })).toContain('are worth no more than asking one or two customers at random')
    expect(of({ equal_sample: null })).toContain('What the volume is worth can’t be said')
    expect(of({ equal_sample: null })).not.toContain('percentage points apart')
    expect(of({ customers: null, defect_correlation: null })).toContain('They lie 7.8 percentage points apart')
    expect(of({ customers: null, defect_correlation: null })).not.toMatch(/Heard were|not known/)
    expect(sectionText(withFindings({ volume: { ...volume, customers: null, defect_correlation: null } }), 'made')).not.toContain('data defect correlation comes to')
  })
  test('the tipping point, for a rise and for a fall; it stands without a survey too', () => {
    expect(of({})).toContain('Had content customers become 1.05 times as likely to post as before, and unhappy ones not (90% interval 1.02 to 1.08), the reported change of +2.2 points would be nothing but that.')
    expect(altOf('tipping')).toContain('if content customers had become')
    const fell = withFindings({ tipping: { ...sample.tipping!, who: 'unhappy' } })
    expect(altOf('tipping', fell)).toContain('if unhappy customers had become')
    expect(sectionText(fell, 'volume')).toContain('Had unhappy customers become 1.05 times as likely to post as before, and content ones not')
    expect(sectionText(composeHouse(postsAlone()), 'volume')).toMatch(/^What would explain the change away Had content customers/)
    expect(sectionText(withFindings({ tipping: null }), 'volume')).not.toContain('explain the change away')
  })
})

describe('what the coder adds', () => {
  const text = (state: CoderState) => sectionText(composeHouse(withCoder(state)), 'coder')
  test('applied: which way it leans, how many were judged, where nothing was corrected', () => {
    expect(text('applied')).toContain('Checked against people, the coder is too kind: correcting lowers the average of all mentions by 1.9 points (90% interval 1.0 to 2.8).')
    expect(text('applied')).toContain('Review sites is left as it is: its scores come as a range, such as stars.')
    expect(text('applied')).toMatch(/Microblogs 155 84% −1\.1 −2\.7 to \+0\.5/)
    const coder = sample.coder
    expect(sectionText(withFindings({ coder: { ...coder, movement: 'up', correction: { mean: 2, low: 1, high: 3, sd: 0.6 } } }), 'coder')).toContain('too harsh: correcting raises the average of all mentions by 2.0 points')
    expect(sectionText(withFindings({ coder: { ...coder, movement: 'not-established', correction: { mean: 0.4, low: -1, high: 1.8, sd: 0.9 } } }), 'coder')).toContain('cannot be shown to be too kind or too harsh: correcting moves the average of all mentions by between −1.0 and +1.8 points')
  })
  test.each([['too-few', 'in Microblogs fewer than 50'], ['too-poor', 'agree so little'], ['ranges', 'such as stars'], ['ready-made', 'ready-made table']] as const)('refused, %s: the reason, and no picture', (state, words) => {
    expect(text(state)).toContain(words)
    expect(chartsOf(composeHouse(withCoder(state)))).not.toContain('coder')
    expect(text(state)).not.toMatch(unworded)
  })
  test('absent: what a check would take', () => {
    expect(text('absent')).toContain('350 mentions of each venue, 1,750 in all, drawn at random and judged by people. If the coder is right 85% of the time, what it adds to the interval of a level is then ±1.00 points.')
  })
  test('what intervals leave out goes by whether coding errors were corrected', () => {
    expect(sectionText(usual, 'first-page')).not.toContain('errors in how mentions were coded')
    expect(sectionText(composeHouse(withCoder('absent')), 'first-page')).toContain('cover errors in how mentions were coded')
    expect(sectionText(usual, 'made')).toContain('coder and people agree on 78% to 86% of them')
    expect(sectionText(composeHouse(withCoder('absent')), 'made')).not.toContain('coder and people agree')
  })
})

describe('talk against importance', () => {
  const importance = sample.importance!
  const topics = (change: Partial<typeof importance>) => sectionText(withFindings({ importance: { ...importance, ...change } }), 'topics')
  test('the two ends, where importance comes from, and opinion at topics as they matter', () => {
    expect(topics({})).toContain('Punctuality is talked about most for what it matters: 31% of the talk, 17% of the importance. On board is talked about least for what it matters: 16% of the talk, 27% of the importance.')
    expect(topics({})).toContain('400 customers who were asked about all of them; where customers differ in that opinion, the topics account for 58%')
    expect(topics({})).toContain('opinion would stand at 28.1 points (90% interval 24.1 to 32.1), +2.2 on the period before (90% interval +0.7 to +3.7).')
  })
  test('stated weights name no respondents; without a period before no change is told', () => {
    const stated = topics({ source: 'stated', respondents: null, explained: null, change: null })
    expect(stated).toContain('Importance is as the account states it.')
    expect(stated).not.toMatch(/relative weights|on the period before|not known/)
  })
})

describe('advice', () => {
  const text = sectionText(usual, 'advice')
  const worth = sample.advice.filter(({ helps }) => helps !== 'hardly')
  test('the first piece leads; every piece says what, why, at what cost and how it will show', () => {
    expect(text).toMatch(/^What to do First: Hear 200 more authors in Video comments: invite everyone to post there/)
    const lists = elementsOf(usual, 'ol').filter((list) => toString(list).includes('Hear 200') && toString(list).includes('Why:'))
    expect(lists).toHaveLength(1)
    expect(lists[0]!.children.filter((child) => child.type === 'element')).toHaveLength(worth.length)
    expect(text.match(/Why: /g)).toHaveLength(worth.length)
    expect(text.match(/How the next review will show it: /g)).toHaveLength(worth.length)
    expect(text.match(/Cost: /g)).toHaveLength(worth.filter(({ cost }) => cost !== null).length)
  })
  test('the chart names the venue where more authors tell most, unless they hardly tell anywhere', () => {
    const title = (document: Document) => toString(elementsOf(document, 'figure').find(({ properties }) => properties['dataChart'] === 'hearing')!)
    expect(title(usual)).toContain('One more author tells most in Video comments')
    expect(title(withFindings({ advice: sample.advice.map((piece) => ({ ...piece, helps: 'hardly' as const })) }))).toContain('In no venue would more authors narrow the interval by much')
  })
  test('what hardly helps is told as such, apart from the rest, and is not among the first things to do', () => {
    expect(text).toContain('What hardly helps More authors here would narrow the interval by less than 5%, too little to show in the next review. 125 more authors in Blogs: an interval narrower by 3%.')
    const hardly = [...sample.advice].sort((a, b) => Number(b.helps === 'hardly') - Number(a.helps === 'hardly'))
    expect(hardly[0]!.helps).toBe('hardly')
    expect(sectionText(withFindings({ advice: hardly }), 'first-page')).toMatch(/What to do first .* Hear 200 more authors in Video comments/)
    expect(sectionText(withFindings({ advice: hardly }), 'first-page')).not.toContain('in Blogs:')
    expect(sectionText(withFindings({ advice: worth }), 'advice')).not.toContain('What hardly helps')
  })
  test('costs are explained once, as no currency', () => {
    expect(text).toContain('Cost: 200 units.')
    expect(text.match(/no currency is meant/g)).toHaveLength(1)
  })
  test('cautions on asking: everyone, same words, same reward, a log, the law', () => {
    for (const words of ['Ask everyone, or a random sample', 'The same words and the same reward', '16 CFR Part 465', '23b and 23c', 'Keep a log of who was asked', 'Local law and your counsel decide']) expect(text).toContain(words)
  })
  test('names that try to be HTML stay text', () => {
    const hostile = '<img src=x onerror=alert(1)> {n} **b**'
    const document = withFindings({
      advice: sample.advice.map((piece) => ({ ...piece, figures: { ...piece.figures, ...('venue' in piece.figures && { venue: hostile }) } })),
      benchmark: { ...sample.benchmark!, margins: sample.benchmark!.margins.map((of) => ({ ...of, margin: hostile, levels: of.levels.map((level) => ({ ...level, level: hostile })) })) },
    })
    expect(elementsOf(document, 'img')).toEqual([])
    expect(sectionText(document, 'first-page')).toContain(`Hear 200 more authors in ${hostile}: invite`)
  })
})

describe('how it was made', () => {
  const made = (document = usual) => sectionText(document, 'made')
  test('each method with its source', () => {
    for (const source of ['Wilson 1927', 'Liang and Zeger 1986', 'Deming and Stephan 1940', 'Duncan and Duncan 1955', 'Kish 1965', 'Meng 2018', 'Rogan and Gladen 1978', 'Johnson 2000', 'Kallioinen and others 2023', 'Spearman 1904', 'Gneiting and Raftery 2007', 'Newey and West 1987', 'Holm 1979']) expect(made()).toContain(source)
  })
  test('methods of what is not there are not told', () => {
    const bare = made(composeHouse({ ...readyMade(), sensitivity: { scales: [], shift: 0, reliable: true } }))
    for (const source of ['Deming and Stephan', 'Meng 2018', 'Rogan and Gladen', 'Johnson 2000', 'Kallioinen', 'Liang and Zeger']) expect(bare).not.toContain(source)
  })
  test('disclosure of posts and of the survey, what is not known said to be so', () => {
    for (const part of ['Objectives:', 'How:', 'Who:', 'Coding:', 'Human coding:', 'Population:', 'Target against achieved: customers by segment and age', 'Sampling:', 'Dates:', 'Sizes:', 'Precision:', 'Weighting:', 'Quality:', 'Software:', 'Privacy:', 'Limits:']) expect(made()).toContain(part)
    expect(made()).toContain('Target against achieved sample: not known')
    expect(made(composeHouse(postsAlone()))).toContain('no picture of the customers was given')
  })
})
