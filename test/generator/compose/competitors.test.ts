import { toString } from 'hast-util-to-string'
import { describe, expect, test } from 'vitest'
import type { Document } from '../../../generator/compose/document.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { languagesIn, loadWords } from '../../../generator/words/load-words.ts'
import { composeHouse, elementsOf, sectionText } from '../../support/house-composition.ts'
import { templatesFolder } from '../../support/house-words.ts'
import { oneCompetitor, sampleCompetitors, untoldCompetitors } from '../../support/sample-competitors.ts'
import { sampleFindings } from '../../support/sample-findings.ts'
import { composeIn } from '../../support/worded-findings.ts'

type Competitors = NonNullable<Findings['competitors']>

const withCompetitors = (competitors: Competitors | null): Findings => ({ ...sampleFindings(), competitors })
const section = (document: Document) => sectionText(document, 'competitors')
const chartsOf = (document: Document) => elementsOf(document, 'figure').map(({ properties }) => String(properties['dataChart']))
const titleOf = (document: Document, chart: string) => elementsOf(document, 'figure').flatMap((figure) => (figure.properties['dataChart'] === chart ? [toString(figure)] : [])).join()
const unworded = /undefined|NaN|\[object|(?<!is )not known|not-established|not_established|Infinity|:say|\{[a-z]|\(\)|null/
const statuses = ['thin', 'apart', 'absent', 'unread'] as const

describe('one competitor: the finding leads, and the chart’s title states it', () => {
  test.each([
    [6, 'stands above that of Tarrin Line in October 2026, by 6.0 points (90% interval 2.9 to 9.1)', 'stands above that of Tarrin Line'],
    [-6, 'stands below that of Tarrin Line in October 2026, by 6.0 points (90% interval 2.9 to 9.1)', 'stands below that of Tarrin Line'],
    [1, 'cannot be told apart from that of Tarrin Line in October 2026 (difference −2.1 to +4.1 points, 90% interval)', 'cannot be told apart from that of Tarrin Line'],
  ])('a difference of %d points', (lag, lead, title) => {
    const document = composeHouse(withCompetitors(oneCompetitor(lag)))
    expect(section(document)).toContain(`Competitors At the same mix, opinion of Skerrow Ferries ${lead}.`)
    expect(titleOf(document, 'competitors')).toContain(title)
    expect(section(document).includes('which leaves open which of the two stands higher')).toBe(lag === 1)
  })

  test('who is compared, and that no margin of sampling error applies, is said beside the figures', () => {
    const text = section(composeHouse(withCompetitors(oneCompetitor(3))))
    expect(text).toContain('Compared are the people who post about each brand in these venues, not the customers of each.')
    expect(text).toContain('It says nothing about customers.')
  })
})

describe('several competitors', () => {
  const document = composeHouse(sampleFindings())
  test('are told by what can be said of each', () => {
    expect(section(document)).toContain('At the same mix, opinion of Skerrow Ferries stands above that of Tarrin Line in October 2026.')
    expect(section(document)).toContain('At the same mix, opinion of Skerrow Ferries cannot be told apart from that of Corran Ferries in October 2026.')
    expect(section(document)).toContain('Corran Ferries: compared at 78% of the fixed mix only. Left out, since nobody writes of Corran Ferries there: Video comments.')
    expect(section(document)).toContain('Lowmoor Boats: 7 authors posted about it in October 2026. Of fewer than 10 we do not show what they think.')
    expect(titleOf(document, 'competitors')).toContain('Of 2 competitors, opinion of Skerrow Ferries stands above 1 and below 0')
  })

  test('a change of the share is announced where it is established, and only there', () => {
    expect(section(document)).toContain('66.7 percent are about Skerrow Ferries (90% interval 65.3 to 68.1): 3.6 percentage points more than in the period before (1.8 to 5.4).')
    expect(section(document)).toContain('it is 64.2 percent (62.7 to 65.7); that it changed cannot be shown (−1.5 to +2.4 percentage points).')
    expect(titleOf(document, 'mention-shares')).toContain('more than in the period before')
  })
})

describe('where nothing can be compared', () => {
  test.each([
    ['thin', 'Of fewer than 10 we do not show what they think.'], ['apart', 'it has no mention in any venue, or on any topic, that Skerrow Ferries is stated at.'],
    ['absent', 'no mention of it was found in the files.'], ['unread', 'none of the sources says which brand a row is about.'],
  ] as const)('%s: the section says so, and draws no picture of opinion', (status, why) => {
    const document = composeHouse(withCompetitors(untoldCompetitors(status)))
    expect(section(document)).toContain('Opinion of Skerrow Ferries cannot be set beside that of its competitors in October 2026.')
    expect(section(document)).toContain(why)
    expect(chartsOf(document)).not.toContain('competitors')
    expect(chartsOf(document).includes('mention-shares')).toBe(status === 'thin' || status === 'apart')
  })

  test('an account without competitors has no such section, nor a word of how it was made', () => {
    const document = composeHouse(withCompetitors(null))
    expect(section(document)).toBe('')
    expect(sectionText(document, 'made')).not.toContain('ompetitor')
  })
})

describe('in every language every state is worded whole', async () => {
  const folder = `${templatesFolder}/words`
  for (const language of await languagesIn(folder)) {
    const words = await loadWords(folder, language)
    const states: readonly (readonly [string, Competitors])[] = [['several', sampleCompetitors()], ...[6, -6, 1].map((lag) => [`by ${lag} points`, oneCompetitor(lag)] as const), ...statuses.map((status) => [status, untoldCompetitors(status)] as const)]
    test.each(states)(`${language}: %s`, (_, competitors) => {
      const text = section(composeIn(words, withCompetitors(competitors)))
      expect(text.length).toBeGreaterThan(80)
      expect(text).not.toMatch(unworded)
    })
  }
})
