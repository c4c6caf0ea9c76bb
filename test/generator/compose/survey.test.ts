import { toString } from 'hast-util-to-string'
import { describe, expect, test } from 'vitest'
import type { Document } from '../../../generator/compose/document.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { composeHouse, elementsOf, sectionText } from '../../support/house-composition.ts'
import { postsAlone, sampleFindings, withVerdict } from '../../support/sample-findings.ts'
import { sampleSurvey, type Survey, type Verdict } from '../../support/sample-survey.ts'

const survey = (document: Document) => sectionText(document, 'survey')
const firstPage = (document: Document) => sectionText(document, 'first-page')
/** The section, and what of the survey stands in how it was made. */
const inFull = (document: Document) => `${survey(document)} ${sectionText(document, 'made')}`
const made = (document: Document) => sectionText(document, 'made')
const documents = Object.fromEntries((['leads', 'tracks', 'contradicts', 'not-established', 'too-few-waves'] as const).map((verdict) => [verdict, composeHouse(withVerdict(verdict))])) as Record<Verdict, Document>
const withSurvey = (change: (survey: Survey) => Partial<Survey>, verdict: Verdict = 'leads'): Document => {
  const of = sampleSurvey(verdict)
  return composeHouse({ ...sampleFindings(), survey: { ...of, ...change(of) } })
}
const captionsOf = (document: Document) => elementsOf(document, 'caption').map((caption) => toString(caption))
const chartsOf = (document: Document) => elementsOf(document, 'figure').map(({ properties }) => String(properties['dataChart']))
const altOf = (document: Document, chart: string) => String(elementsOf(document, 'figure').find(({ properties }) => properties['dataChart'] === chart)?.properties['dataAlt'])
const lines = (document: Document) => elementsOf(document, 'li').map((item) => toString(item).replace(/\s+/g, ' ').trim())
const unworded = /undefined|NaN|\[object|(?<!is )not known|not-established|not_established|Infinity|:say|\{[a-z]|\(\)|null/

describe('each verdict has its own words, and says whether to trust the posts and why', () => {
  test.each([
    ['leads', 'The posts lead the survey: Favourability has tended to follow mix-adjusted opinion by about 4 weeks (correlation 0.84, where 0 is no tie and 1 a perfect one), and forecasts from posts and past waves came closer than guessing the same as last time, or the usual average. So a movement of mix-adjusted opinion is an early sign of what the survey may find, but how much it adds to the waves themselves is not yet clear.'],
    ['tracks', 'The posts track the survey: Favourability has moved with mix-adjusted opinion, about 4 weeks after it (the closest of 25 time lags tried; correlation 0.55, where 0 is no tie and 1 or −1 a perfect one). That the posts foretell it is not shown. So a movement of mix-adjusted opinion can be taken to go with one of the survey, but not to tell it in advance.'],
    ['contradicts', 'The survey contradicts the posts: Favourability has moved against mix-adjusted opinion, about 4 weeks after it (the closest of 25 time lags tried; correlation −0.62, where 0 is no tie and 1 or −1 a perfect one). So mix-adjusted opinion can’t be trusted to say what customers think until it is known why the two part.'],
    ['not-established', 'Whether the survey goes with the posts is not established: 30 waves do not show whether Favourability goes with mix-adjusted opinion (correlation at the best time lag 0.31, where 0 is no tie and 1 or −1 a perfect one; 90% interval −0.12 to 0.64). So the survey is neither a reason to trust the posts nor one to distrust them, for now. An open question is not a disagreement.'],
    ['too-few-waves', 'There are too few waves to check the posts against the survey: 3 can be compared, and at least 8 are needed. So the survey is neither a reason to trust the posts nor one to distrust them, for now.'],
  ] as const)('%s', (verdict, lead) => {
    expect(survey(documents[verdict])).toContain(`The survey ${lead}`)
    for (const other of Object.keys(documents).filter((name) => name !== verdict)) expect(survey(documents[other as Verdict])).not.toContain(lead)
  })

  test.each([
    ['leads', 'The posts lead the survey: over 30 waves Favourability has tended to follow mix-adjusted opinion by about 4 weeks; whether it does after October 2026 too, later waves will show.'],
    ['tracks', 'The posts track the survey: Favourability has moved with mix-adjusted opinion, about 4 weeks after it (the closest of 25 time lags tried; correlation 0.55, where 0 is no tie and 1 or −1 a perfect one); that the posts foretell it is not shown.'],
    ['contradicts', 'The survey contradicts the posts: Favourability has moved against mix-adjusted opinion, about 4 weeks after it (the closest of 25 time lags tried; correlation −0.62, where 0 is no tie and 1 or −1 a perfect one); until it is known why, do not take what the posts say for what customers think.'],
    ['not-established', 'Whether the survey goes with the posts is not established: 30 waves do not show whether Favourability goes with mix-adjusted opinion.'],
    ['too-few-waves', 'There are too few waves to check the posts against the survey: 3 can be compared, and at least 8 are needed.'],
  ] as const)('%s, in one sentence of the first page', (verdict, sentence) => {
    expect(firstPage(documents[verdict])).toContain(sentence)
  })

  test.each(Object.entries(documents))('%s: everything is worded, and one line of the rule is marked', (verdict, document) => {
    expect(survey(document)).not.toMatch(unworded)
    const marked = lines(document).filter((line) => line.includes('(this is the case here)'))
    expect(marked).toHaveLength(1)
    expect(marked[0]).toMatch({ leads: /^The posts lead/, tracks: /^The posts track/, contradicts: /^The survey contradicts/, 'not-established': /^Not established/, 'too-few-waves': /^Too few waves/ }[verdict as Verdict])
    for (const figure of elementsOf(document, 'figure')) expect(`${String(figure.properties['dataAlt'])} ${toString(figure)}`).not.toMatch(unworded)
  })

  test('what is not established is not called a disagreement, nor agreement', () => {
    expect(survey(documents['not-established'])).not.toMatch(/contradicts the posts: Fav|has moved (with|against)|posts (lead|track) the survey: Fav/)
    expect(survey(documents['not-established'])).toContain('too blurred by chance, since each wave asks only some people (which blurs it by about 2.7 percentage points), to be seen in 30 waves')
  })

  test('where a serious caveat says that the survey contradicts, the first page says it once', () => {
    const findings = withVerdict('contradicts')
    const caveat = { code: 'survey-contradicts', severity: 'serious' as const, figures: { label: 'Favourability', correlation: -0.62, pairs: 30 }, evidence: '', meaning: '', remedy: '' }
    const page = firstPage(composeHouse({ ...findings, caveats: [...findings.caveats, caveat] }))
    expect(page.match(/The survey contradicts the posts/g)).toHaveLength(1)
    expect(page).toContain('The survey contradicts the posts. Favourability has moved against mix-adjusted opinion (correlation −0.62 over 30 waves, where −1 is always against each other).')
  })
})

describe('without a survey', () => {
  const document = composeHouse(postsAlone())
  test('there is no section, no heading, no chart, no table and no word of it but the caveat', () => {
    expect(elementsOf(document, 'section').map(({ properties }) => properties['id'])).not.toContain('survey')
    expect(document.headings.map(({ text }) => text).filter((text) => /survey|outcome/i.test(text))).toEqual([])
    expect(chartsOf(document)).not.toEqual(expect.arrayContaining(['tracker']))
    expect(chartsOf(document)).toContain('opinion')
    expect(captionsOf(document).join(' ')).not.toMatch(/Favourability|wave/)
    expect(`${firstPage(document)} ${made(document)} ${sectionText(document, 'glossary')}`).not.toMatch(/survey|wave/i)
    expect(sectionText(document, 'caveats')).toContain('We were not given a survey.')
  })
  test('it can fail: with one there are all of these', () => {
    expect(documents.leads.headings.map(({ text }) => text)).toEqual(expect.arrayContaining(['The survey', 'Do they agree?', 'The next wave', 'Disclosure: survey']))
    expect(chartsOf(documents.leads)).toEqual(expect.arrayContaining(['tracker', 'agreement', 'survey-lags', 'survey-forecasts', 'lag-weights']))
    expect(sectionText(documents.leads, 'glossary')).toContain('Fieldwork')
  })
})

describe('with three waves', () => {
  const document = documents['too-few-waves']
  test('the survey is still shown, and nothing is told that needs more', () => {
    expect(chartsOf(document)).toEqual(expect.arrayContaining(['tracker', 'agreement']))
    for (const chart of ['survey-lags', 'survey-forecasts', 'lag-weights']) expect(chartsOf(document)).not.toContain(chart)
    expect(survey(document)).toContain('There are 3 waves with fieldwork from 10 August 2026 to 21 October 2026, 399 to 409 interviews a wave')
    expect(survey(document)).toContain('Nothing has been forecast yet')
    expect(document.headings.map(({ text }) => text)).not.toContain('The next wave')
  })
  test('one wave alone has no change; none at all is said', () => {
    const one = withSurvey(({ metrics }) => {
      const first = metrics.map((of) => ({ ...of, waves: of.waves.slice(-1).map((wave) => ({ ...wave, change: null })) }))
      return { metrics: first, waves: first[0]!.waves, pairs: 1 }
    }, 'too-few-waves')
    expect(survey(one)).toContain('There is 1 wave with fieldwork from 10 October 2026 to 21 October 2026, 409 interviews a wave')
    expect(survey(one)).toContain('1 can be compared')
    expect(survey(one)).toContain('There is no wave before to compare with One panel a metric')
    expect(survey(one)).not.toMatch(/wave before \(2026|not known/)
    const none = withSurvey(({ metrics }) => ({ waves: [], metrics: metrics.map((of) => ({ ...of, waves: [] })), pairs: 0, later_waves: ['2026-11'] }), 'too-few-waves')
    expect(survey(none)).toContain('No wave that has Favourability ended in the period under review or before.')
    expect(survey(none)).toContain('none can be compared')
    expect(survey(none)).toContain('Left out, because fieldwork ended after 31 October 2026: 1 wave (2026-11).')
    expect(`${survey(none)} ${made(none).replaceAll(': not known', '')}`).not.toMatch(/from not known|Infinity|undefined/)
  })
})

describe('what the survey says', () => {
  test('the latest wave, with its base, interval and change; percentage points are explained once', () => {
    expect(survey(documents.leads)).toContain('In the latest wave (10 – 21 October 2026), Favourability stood at 45.6% (90% interval 41.2% to 50.0%), from 409 interviews.')
    expect(survey(documents.leads)).toContain('No change on the wave before (2026-09) can be established: −1.4 percentage points (90% interval −7.7 to +4.9).')
    expect(survey(documents.leads).match(/from 40% to 42% is a rise of 2/g)).toHaveLength(1)
  })

  const changed = (movement: 'up' | 'down', difference: number) => withSurvey(({ waves, metrics }) => {
    const change = { from: '2026-09', difference, low: difference - 2, high: difference + 2, p: 0.001, adjusted_p: 0.004, movement }
    const put = (list: Survey['waves']) => list.map((wave, at) => (at === list.length - 1 ? { ...wave, change } : wave))
    return { waves: put(waves), metrics: metrics.map((of, at) => (at === 0 ? { ...of, waves: put(of.waves) } : of)) }
  })
  test('a rise and a fall are told as such, in text, table and title', () => {
    expect(survey(changed('up', 4.2))).toContain('It rose by 4.2 percentage points on the wave before (2026-09; 90% interval +2.2 to +6.2).')
    expect(survey(changed('up', 4.2))).toContain('Favourability rose on the wave before One panel a metric')
    expect(survey(changed('down', -4.2))).toContain('It fell by 4.2 percentage points on the wave before (2026-09; 90% interval −6.2 to −2.2).')
    expect(survey(changed('down', -4.2))).toMatch(/Favourability 409 45\.6% 41\.2% to 50\.0% −4\.2 −6\.2 to −2\.2 0\.004 Fall/)
  })

  test('means stand in their own units, with two decimals and no percent', () => {
    expect(survey(documents.leads)).toMatch(/Satisfaction 409 6\.8\d 6\.\d\d to 6\.\d\d −0\.\d\d −0\.\d\d to \+0\.\d\d 1\.00 No/)
    const mean = withSurvey(({ metrics }) => {
      const of = metrics.find(({ kind, segment }) => kind === 'mean' && segment === null)!
      return { metric: of.metric, label: of.label, kind: 'mean', waves: of.waves, sampling_error: 0.11 }
    }, 'not-established')
    const [before] = survey(mean).split('How strongly')
    expect(before).toMatch(/Satisfaction stood at 6\.80 \(90% interval 6\.62 to 6\.97\), from 409 interviews\. No change on the wave before \(2026-09\) can be established: −0\.10 \(90% interval −0\.35 to \+0\.15\)/)
    expect(survey(mean)).toContain('only some people (which blurs it by about 0.11), to be seen')
  })

  test('what counts as a change is said with its level; a level of the account moves it', () => {
    expect(survey(documents.leads)).toContain('A change counts as established if chance alone would bring about one as large in at most 10% of cases though so many metrics are looked at; the intervals do not allow for that.')
    expect(survey(composeHouse({ ...sampleFindings(), interval: 0.95 }))).toContain('in at most 5% of cases')
  })

  test('the wave stands in the tables only where a metric’s latest is not that of the others', () => {
    expect(survey(documents.leads)).toContain('Metric Interviews Value 90% interval Change 90% interval of the change Adjusted p Established?')
    const uneven = withSurvey(({ metrics }) => ({ metrics: metrics.map((of) => (of.metric === 'satisfaction' ? { ...of, waves: of.waves.slice(0, -1) } : of)) }))
    expect(survey(uneven)).toContain('Metric Wave Interviews Value 90% interval Change 90% interval of the change Established?')
    expect(survey(uneven)).toMatch(/Satisfaction 2026-09 \d+ 6/)
    expect(survey(uneven)).toMatch(/Favourability 2026-10 409 45\.6%/)
  })

  test('small bases: flagged by a mark, hidden by a dash; both are explained only where there is one', () => {
    expect(survey(documents.leads)).toMatch(/Favourability, visitor 74 40\.8%\* 30\.6% to 51\.0% −2\.9 −17\.5 to \+11\.7/)
    expect(survey(documents.leads)).toMatch(/Favourability, islander 172 47\.8% /)
    expect(survey(documents.leads)).toContain('An asterisk marks a figure that few people stand behind: weighted, they are worth 30 to 74 interviews')
    const large = withSurvey(({ metrics }) => ({ metrics: metrics.filter(({ segment }) => segment !== 'visitor') }))
    expect(survey(large)).not.toContain('An asterisk')
    const hidden = withSurvey(({ metrics }) => ({ metrics: metrics.map((of) => (of.segment === 'visitor' ? { ...of, waves: of.waves.map((wave) => ({ ...wave, base: 21, shown: 'hidden' as const })) } : of)) }))
    expect(survey(hidden)).toContain('Favourability, visitor 21 – – – –')
    const headline = withSurvey(({ waves }) => ({ waves: waves.map((wave) => ({ ...wave, base: 21, shown: 'hidden' as const, value: null, low: null, high: null })) }))
    expect(survey(headline)).toContain('The latest wave (10 – 21 October 2026) rests on 21 interviews, too few to show its figures.')
  })

  test('what is missing is named: later waves, overlapping ones, metrics not asked', () => {
    const document = withSurvey(({ metrics }) => ({ later_waves: ['2026-11', '2026-12'], overlapping_waves: ['2026-03'], metrics: metrics.map((of, at) => (at === 0 ? { ...of, missing: ['2025-02', '2025-03'] } : of)) }))
    expect(lines(document)).toEqual(expect.arrayContaining([
      'Left out, because fieldwork ended after 31 October 2026: 2 waves (2026-11 and 2026-12).',
      'Fieldwork overlaps that of the wave before in 1 wave (2026-03); such waves are not compared with each other.',
      'Favourability is missing in 2 waves (2025-02 and 2025-03).', 'Recommendation is missing in 1 wave (2025-08).',
    ]))
    expect(lines(documents.leads).filter((line) => /^Left out, because|overlaps that/.test(line))).toEqual([])
  })
})

describe('lags', () => {
  const atLag = (lag: number, grid: Findings['grid'] = 'week') => {
    const of = sampleSurvey()
    const candidates = of.candidates.map((candidate) => (candidate.series === 'adjusted' ? { ...candidate, best_lag: lag, best: { ...candidate.best!, lag } } : candidate))
    return composeHouse({ ...sampleFindings(), grid, survey: { ...of, candidates, verdict: 'tracks' } })
  }
  test('are told in the unit of the grid, with plurals', () => {
    expect(inFull(atLag(1))).toContain('The picture moves the posts’ opinion 1 week later')
    expect(inFull(atLag(3, 'day'))).toContain('posts about 3 days ahead of the survey')
    expect(inFull(atLag(2, 'month'))).toContain('are tied most closely with the posts about 2 months ahead: correlation 0.84')
    expect(inFull(atLag(2, 'month'))).toContain('Best lag, months')
  })
  test('before, after and at once', () => {
    expect(inFull(atLag(-2))).toContain('The picture moves the posts’ opinion 2 weeks earlier')
    expect(inFull(atLag(-2))).toContain('The tie is closest with the posts about 2 weeks behind the survey: there')
    expect(inFull(atLag(-2))).toContain('has moved with mix-adjusted opinion, about 2 weeks before it (the closest of 25 time lags tried; correlation 0.84, where 0 is no tie and 1 or −1 a perfect one)')
    expect(inFull(atLag(-2))).toContain('The survey came first, not the posts.')
    expect(inFull(atLag(3))).not.toContain('The survey came first')
    expect(inFull(atLag(0))).toContain('has moved with mix-adjusted opinion, at the same time (the closest')
    expect(inFull(atLag(0))).toContain('The picture moves neither: at no time lag do the two go together more closely.')
    expect(inFull(atLag(0))).toContain('are tied most closely without a time lag: correlation 0.84')
  })
  test('the correlation comes with its interval, the number of independent waves, and the p that allows for all looks', () => {
    expect(inFull(documents.leads)).toContain('there mix-adjusted opinion has a correlation of 0.84 with Favourability (90% interval 0.66 to 0.93), where 1 is always together, 0 no tie and −1 always against each other. Each wave asks only some people, which as a rule makes a tie look weaker than it is.')
    expect(inFull(documents.leads)).toContain('There 30 of 30 waves find posts to be compared with; since neighbouring waves resemble each other, they tell no more than about 17 unrelated ones would. Picking the best of 25 time lags flatters.')
    expect(inFull(documents.leads)).toContain('under 1% of them did as well at their own best time lag. The interval does not allow for that picking, and the correlation uses opinion as known today')
    expect(inFull(documents.leads)).toContain('Blogs, raw 3 0.40')
    expect(inFull(documents.leads)).toContain('In all 175 comparisons were made: 7 series, each at 25 time lags.')
  })
  test('waves that do not differ go with nothing, and are not called too few', () => {
    const still = withSurvey(({ candidates }) => ({ candidates: candidates.map((of) => ({ ...of, best: null, best_lag: null, adjusted_p: null })) }), 'not-established')
    expect(inFull(still)).toContain('not established: the waves that can be compared do not differ, so that nothing can be said of how they go with the posts.')
    expect(inFull(still)).toContain('Waves that do not differ go with nothing. An open question')
    expect(survey(still)).not.toMatch(unworded)
    expect(inFull(documents['not-established'])).not.toContain('do not differ')
  })
  test('what can’t be told is left out: no interval, no correction, no raw average', () => {
    const document = withSurvey(({ candidates }) => ({
      candidates: candidates.map((of) => (of.series === 'adjusted' ? { ...of, best: { ...of.best!, low: null, high: null, corrected: null } } : of.series === 'raw' ? { ...of, best: null, best_lag: null, adjusted_p: null } : of)),
    }))
    expect(inFull(document)).toContain('a correlation of 0.84 with Favourability, where 1 is always together, 0 no tie and −1 always against each other.')
    expect(inFull(document)).toContain('Raw average – – – – –')
    expect(survey(document)).not.toMatch(unworded)
  })
})

describe('forecasts', () => {
  const withRivals = (change: Readonly<Record<string, object>>, verdict: Verdict = 'leads') => withSurvey(({ forecast }) => ({ forecast: { ...forecast!, rivals: forecast!.rivals.map((of) => ({ ...of, ...change[of.rival] })) } }), verdict)
  const sizes = 'Forecasts from posts and past waves missed by 1.5 percentage points as a rule; repeating the last wave missed by 3.0, taking the average of all earlier waves by 3.6. '
  test.each([
    [0.041, 0.018, 'Both differences are more than chance is likely to bring about.'],
    [0.05, 0.3, 'The advantage over the last wave is more than chance is likely to bring about; one as large as that over the average comes about by chance in 30% of cases.'],
    [0.06, 0.01, 'The advantage over the average is more than chance is likely to bring about; one as large as that over the last wave comes about by chance in 6% of cases.'],
    [0.2, 0.3, 'Either difference may be chance, which makes as large ones in 20% and 30% of cases.'],
    [null, 0.3, 'Whether both differences are more than chance can’t be told.'],
  ])('smaller misses with p %f and %f', (carry, mean, sentence) => {
    const document = withRivals({ 'carry-forward': { dm_p: carry }, 'past-mean': { dm_p: mean } })
    expect(inFull(document)).toContain(sizes + sentence)
    expect(inFull(document)).not.toContain('By the rule fixed')
  })
  test.each([[0.7, 1.2], [1.31, 0.998], [1, 0.9]])('ratios %f and %f: not less than both', (carry, mean) => {
    expect(inFull(withRivals({ 'carry-forward': { rmse_ratio: carry }, 'past-mean': { rmse_ratio: mean } }))).toContain(`${sizes}That is not less than both.`)
  })
  test('smaller misses do not pass for more than the verdict', () => {
    expect(inFull(withRivals({ 'carry-forward': { rmse_ratio: 0.8 }, 'past-mean': { rmse_ratio: 0.9 } }, 'tracks'))).toContain('more than chance is likely to bring about. By the rule fixed in advance that alone does not show that the posts foretell the survey.')
  })
  test.each([
    [0.55, 0.03, 'the posts add more to the waves than chance is likely to bring about (which adds as much in 3% of cases).', 'what the survey may find. '],
    [0.55, 0.12, 'what the posts add to the waves may be chance, which adds as much in 12% of cases.', 'what the survey may find, but how much it adds to the waves themselves is not yet clear. '],
    [1.1, 0.12, 'the posts add nothing to the waves that shows.', 'what the survey may find, though so far the waves alone foretold it no worse. '],
  ])('beside the same model without posts: ratio %f, p %f', (ratio, p, sentence, trust) => {
    const document = withRivals({ 'waves-alone': { rmse_ratio: ratio, dm_p: p } })
    expect(inFull(document)).toContain(`The same model without posts missed by 2.8: ${sentence}`)
    expect(inFull(document)).toContain(trust)
  })

  test('four rows of figures, the forecasts with posts first', () => {
    const rows = /Ratio of CRPS p (Posts and past waves .*?) The error is/.exec(inFull(documents.leads))?.[1]
    expect(rows).toMatch(/^Posts and past waves 1\.5 0\.9 95% – – – Last wave repeated 3\.0 1\.7 86% 0\.52 0\.54 0\.041 Average of earlier waves 3\.6 2\.0 86% 0\.44 0\.46 0\.018 Same model without posts 2\.8 1\.6 86% 0\.55 0\.57 0\.12$/)
  })

  test('the next wave: expected value, whether its dates are given, and a warning unless the posts lead', () => {
    expect(inFull(documents.leads)).toContain('Favourability is expected at 48.0% (90% interval 43.9% to 52.1%). Neither a rise nor a fall on the last wave, 45.6%, is foreseen with any certainty (90% interval of the difference −1.7 to +6.5 percentage points).')
    expect(inFull(documents.leads)).toContain('Fieldwork is assumed one usual spacing after the last wave: 10 – 21 November 2026.')
    expect(inFull(documents.leads)).not.toContain('do not rely on')
    expect(inFull(documents.tracks)).toContain('By the rule fixed in advance it is not shown that the posts foretell the survey: do not rely on this forecast.')
    const given = withSurvey(({ next_wave: next }) => ({ next_wave: { ...next!, dates: 'given', movement: 'up', difference: { mean: 5, low: 1.2, high: 8.8, sd: 2 } } }))
    expect(inFull(given)).toContain('That is a rise of 5.0 percentage points on the last wave, 45.6% (90% interval +1.2 to +8.8).')
    expect(inFull(given)).toContain('Fieldwork as the account gives it: 10 – 21 November 2026.')
  })

  test('the lags’ weights: the largest is named', () => {
    expect(inFull(documents.leads)).toContain('In the forecast of the next wave a lead of 4 weeks counts most, with 28% of the weight.')
    expect(altOf(documents.leads, 'lag-weights')).toBe('Bar chart of the weight of each lead from 1 week to 16 weeks. Largest: 28%, at 4 weeks.')
  })

  test('where no wave is to come the weights are those of the latest forecast; a rival that misses nothing can’t be compared with', () => {
    expect(inFull(withSurvey(() => ({ next_wave: null })))).toContain('A lead of 4 weeks counts most in the latest forecast')
    const perfect = withSurvey(({ forecast }) => ({ forecast: { ...forecast!, rivals: forecast!.rivals.map((rival) => ({ ...rival, rmse: 0, rmse_ratio: null, crps_ratio: null, dm_p: null })) } }), 'tracks')
    expect(inFull(perfect)).toContain('repeating the last wave missed by 0.0, taking the average of all earlier waves by 0.0. That is not less than both.')
    expect(survey(perfect)).not.toMatch(unworded)
  })

  test('departures stand beside the events, and chance is told', () => {
    expect(inFull(documents.leads)).toContain('1 wave of 22 came out outside the 95% interval of the forecast; chance alone would make it about 1.1.')
    expect(lines(documents.leads)).toContain('Fieldwork 10 – 21 July 2025: 35.5% found, below the 41.4% forecast. In the three months before: Timetable cut by a fifth (9 June 2025).')
    const alone = withSurvey(({ departures }) => ({ departures: departures.map((of) => ({ ...of, direction: 'above' as const, events: [] })) }))
    expect(inFull(alone)).toContain('above the 41.4% forecast. The account names no event in the three months before.')
    const none = survey(withSurvey(() => ({ departures: [] })))
    expect(none).toContain('No wave of 22 came out outside the 95% interval of the forecast; chance alone would make it about 1.1.')
    expect(none).not.toContain('proof that it was the cause')
  })
})

describe('the outcome', () => {
  const outcome = sampleFindings().outcome!
  const withOutcome = (change: Partial<typeof outcome>) => survey(composeHouse({ ...sampleFindings(), outcome: { ...outcome, ...change } }))
  test('is supporting evidence, with the number of looks', () => {
    expect(survey(documents.leads)).toContain('Where opinion rose by 1 point, the outcome grew by 0.21 percentage points more than otherwise, one month later (90% interval +0.07 to +0.35). Chance alone would bring about as close a tie in 6% of cases, allowing for all 4 time lags looked at.')
    expect(survey(documents.leads)).toContain('This is supporting evidence only')
    expect(survey(documents.leads)).toContain('market, whose growth of 1% goes with growth of +0.8% (90% interval +0.6 to +1.0)')
  })
  test('what does not stand the looks is not announced', () => {
    const open = withOutcome({ lags: outcome.lags.map((lag) => ({ ...lag, adjusted_p: 0.3 })), market: false, market_effect: null })
    expect(open).toContain('That the growth of the outcome goes with opinion can’t be established: at the best of 4 time lags looked at, a rise of opinion by 1 point goes with growth of +0.21 percentage points')
    expect(open).not.toMatch(/the outcome grew by|(?<!is )not known/)
    expect(open).toContain('No market was given')
  })
  test('how much later is told in months where spans are months, else in days', () => {
    expect(withOutcome({ best_lag: 1, span_days: 7 })).toContain('than otherwise, about 7 days later (')
    expect(withOutcome({ best_lag: 2, span_days: 31, lags: outcome.lags.map((lag) => ({ ...lag, adjusted_p: 0.02 })) })).toContain('than otherwise, 2 months later (')
    expect(withOutcome({ best_lag: 0, lags: outcome.lags.map((lag) => ({ ...lag, adjusted_p: 0.02 })) })).toContain('than otherwise in the same stretch of time (')
  })
  test('none, or one without a lag that could be computed: nothing is said', () => {
    expect(survey(composeHouse({ ...sampleFindings(), outcome: null }))).not.toContain('outcome')
    expect(withOutcome({ best_lag: null, lags: [] })).not.toContain('outcome')
  })
})

describe('how it was made', () => {
  test('method and disclosure of the survey, apart from those of the posts', () => {
    expect(made(documents.leads)).toContain('The survey is held out: it never enters the fit')
    expect(made(documents.leads)).toContain('Disclosure: survey How: a survey of people;')
    expect(made(documents.leads)).toContain('Metrics: Favourability, Consideration, Recommendation and Satisfaction.')
    expect(made(documents.leads)).toContain('these segments: islander and visitor.')
    expect(made(documents.leads)).toContain('Dates: 30 waves that have Favourability, fieldwork from 10 May 2024 to 21 October 2026.')
    expect(made(documents.leads)).toContain('Sizes: 383 to 415 interviews a wave, unweighted; worth 326 to 353 after weighting')
  })
  test('text alternatives are computed', () => {
    expect(altOf(documents.leads, 'opinion')).toMatch(/Below it, on the same time axis, 30 waves of the survey: Favourability, between 35\.5% and 49\.\d%\.$/)
    expect(altOf(documents.leads, 'tracker')).toMatch(/^Charts of 4 metrics of the survey by wave, with 90% intervals\. Favourability: from 35\.5% \(2025-07\) to 49\.\d% \(2026-08\)\. Latest wave: Favourability, Consideration, Recommendation and Satisfaction \(45\.6%, 33\.\d%, 27\.\d% and 6\.80\)\.$/)
    const opinion = sampleFindings().opinion.series.map(({ adjusted }) => adjusted.mean)
    expect(altOf(documents.leads, 'agreement')).toContain(`moved 4 weeks later, between ${Math.min(...opinion).toFixed(1)} and ${Math.max(...opinion).toFixed(1)} points; below, Favourability in 30 waves of the survey`)
    expect(altOf(documents['too-few-waves'], 'agreement')).toContain('No correlation can be told.')
    expect(altOf(documents.leads, 'survey-forecasts')).toContain('22 waves: 21 inside the 90% interval, outside it 2025-07. Usual size of a miss in percentage points: posts and past waves 1.5; last wave repeated 3.0, average of earlier waves 3.6, the same model without posts 2.8.')
  })
})

test('names of waves, metrics, segments and events that try to be HTML stay text', () => {
  const hostile = '<img src=x onerror=alert(1)> {n} **b**'
  const document = withSurvey(({ metrics, waves, departures }) => ({
    label: hostile, segments: [hostile], later_waves: [hostile], waves: waves.map((wave) => ({ ...wave, wave: hostile })),
    metrics: metrics.map((of) => ({ ...of, label: hostile, segment: of.segment && hostile })),
    departures: departures.map((of) => ({ ...of, events: [{ date: '2025-06-09', label: hostile, kind: hostile }] })),
  }))
  expect(elementsOf(document, 'img')).toEqual([])
  expect(survey(document)).toContain(`In the three months before: ${hostile} (9 June 2025).`)
})
