import { toString } from 'hast-util-to-string'
import { describe, expect, test } from 'vitest'
import type { Document } from '../../../generator/compose/document.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { composeHouse, elementsOf, sectionText } from '../../support/house-composition.ts'
import { postsAlone, sampleFindings, withVerdict } from '../../support/sample-findings.ts'
import { sampleSurvey, type Survey, type Verdict } from '../../support/sample-survey.ts'

const survey = (document: Document) => sectionText(document, 'survey')
const firstPage = (document: Document) => sectionText(document, 'first-page')
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
const unworded = /undefined|NaN|\[object|not known|not-established|not_established|Infinity|:say|\{[a-z]|\(\)|null/

describe('each verdict has its own words, and says whether to trust the posts and why', () => {
  test.each([
    ['leads', 'The posts lead the survey: Favourability follows mix-adjusted opinion by 4 weeks (correlation 0.84), and forecasts made from the posts missed the waves by 48% less than the last wave carried forward and by 56% less than the mean of past waves. So the movement of mix-adjusted opinion can be trusted as an early sign'],
    ['tracks', 'The posts go with the survey: Favourability rises and falls with mix-adjusted opinion (correlation 0.55). That the posts foretell it is not shown. So the movement of mix-adjusted opinion can be taken to go with that of the survey, but not to tell it in advance.'],
    ['contradicts', 'The survey contradicts the posts: Favourability has moved against mix-adjusted opinion (correlation −0.62). So mix-adjusted opinion can’t be trusted to say what customers think until it is known why the two part.'],
    ['not-established', 'It is open whether the posts go with the survey: 30 waves neither show nor rule out that Favourability goes with mix-adjusted opinion. So the survey is neither a reason to trust the posts nor one to distrust them, for now. An open question is not a disagreement.'],
    ['too-few-waves', 'There are too few waves to check the posts against the survey: 3 can be compared, and at least 8 are needed. So the survey is neither a reason to trust the posts nor one to distrust them, for now.'],
  ] as const)('%s', (verdict, lead) => {
    expect(survey(documents[verdict])).toContain(`The survey ${lead}`)
    for (const other of Object.keys(documents).filter((name) => name !== verdict)) expect(survey(documents[other as Verdict])).not.toContain(lead)
  })

  test.each([
    ['leads', 'The survey bears the posts out: Favourability follows mix-adjusted opinion by 4 weeks, and forecasts from the posts missed its waves by 48% less than the last wave carried forward, by 56% less than the mean of past waves.'],
    ['tracks', 'The survey goes along with the posts: Favourability rises and falls with mix-adjusted opinion (correlation 0.55); that the posts foretell it is not shown.'],
    ['contradicts', 'The survey contradicts the posts: Favourability has moved against mix-adjusted opinion (correlation −0.62); until it is known why, do not take what the posts say for what customers think.'],
    ['not-established', 'Whether the survey bears the posts out is open: 30 waves neither show nor rule out that Favourability goes with mix-adjusted opinion.'],
    ['too-few-waves', 'Whether the survey bears the posts out can’t be said yet: 3 waves can be compared, and at least 8 are needed.'],
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
    expect(survey(documents['not-established'])).not.toMatch(/contradicts the posts: Fav|has moved against|rises and falls with|bears the posts out:/)
    expect(survey(documents['not-established'])).toContain('too blurred by the sampling error of the waves (about 2.7 percentage points), to be seen in 30 waves')
  })

  test('where a serious caveat says that the survey contradicts, the first page says it once', () => {
    const findings = withVerdict('contradicts')
    const caveat = { code: 'survey-contradicts', severity: 'serious' as const, figures: { label: 'Favourability', correlation: -0.62, pairs: 30 }, evidence: '', meaning: '', remedy: '' }
    const page = firstPage(composeHouse({ ...findings, caveats: [...findings.caveats, caveat] }))
    expect(page.match(/The survey contradicts the posts/g)).toHaveLength(1)
    expect(page).toContain('The survey contradicts the posts. Favourability has moved against mix-adjusted opinion (correlation −0.62 over 30 waves).')
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
    expect(survey(document)).toContain('3 waves with fieldwork from 10 August 2026 to 21 October 2026, 399 to 409 interviews a wave')
    expect(survey(document)).toContain('Nothing has been forecast yet')
    expect(document.headings.map(({ text }) => text)).not.toContain('The next wave')
  })
  test('one wave alone has no change; none at all is said', () => {
    const one = withSurvey(({ metrics }) => {
      const first = metrics.map((of) => ({ ...of, waves: of.waves.slice(-1).map((wave) => ({ ...wave, change: null })) }))
      return { metrics: first, waves: first[0]!.waves, pairs: 1 }
    }, 'too-few-waves')
    expect(survey(one)).toContain('1 wave with fieldwork from 10 October 2026 to 21 October 2026, 409 interviews a wave')
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
    expect(survey(changed('down', -4.2))).toMatch(/Favourability 2026-10 409 45\.6% 41\.2% to 50\.0% −4\.2 −6\.2 to −2\.2 Fall/)
  })

  test('means stand in their own units, with two decimals and no percent', () => {
    expect(survey(documents.leads)).toMatch(/Satisfaction 2026-10 409 6\.8\d 6\.\d\d to 6\.\d\d −0\.\d\d −0\.\d\d to \+0\.\d\d No/)
    const mean = withSurvey(({ metrics }) => {
      const of = metrics.find(({ kind, segment }) => kind === 'mean' && segment === null)!
      return { metric: of.metric, label: of.label, kind: 'mean', waves: of.waves, sampling_error: 0.11 }
    }, 'not-established')
    const [before] = survey(mean).split('How strongly')
    expect(before).toMatch(/Satisfaction stood at 6\.80 \(90% interval 6\.62 to 6\.97\), from 409 interviews\. No change on the wave before \(2026-09\) can be established: −0\.10 \(90% interval −0\.35 to \+0\.15\)/)
    expect(survey(mean)).toContain('sampling error of the waves (about 0.11), to be seen')
  })

  test('small bases: flagged by a mark and a word, hidden by a dash and a word', () => {
    expect(survey(documents.leads)).toMatch(/Favourability visitor 2026-10 74 few 40\.8%\* 30\.6% to 51\.0%/)
    expect(survey(documents.leads)).toMatch(/Favourability islander 2026-10 172 yes 47\.8% /)
    const hidden = withSurvey(({ metrics }) => ({ metrics: metrics.map((of) => (of.segment === 'visitor' ? { ...of, waves: of.waves.map((wave) => ({ ...wave, base: 21, shown: 'hidden' as const })) } : of)) }))
    expect(survey(hidden)).toContain('Favourability visitor 2026-10 21 too few – – –')
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
    expect(lines(documents.leads).join(' ')).not.toMatch(/Left out|overlaps/)
  })
})

describe('lags', () => {
  const atLag = (lag: number, grid: Findings['grid'] = 'week') => {
    const of = sampleSurvey()
    const candidates = of.candidates.map((candidate) => (candidate.series === 'adjusted' ? { ...candidate, best_lag: lag, best: { ...candidate.best!, lag } } : candidate))
    return composeHouse({ ...sampleFindings(), grid, survey: { ...of, candidates, verdict: 'tracks' } })
  }
  test('are told in the unit of the grid, with plurals', () => {
    expect(survey(atLag(1))).toContain('The picture moves the posts’ opinion 1 week later')
    expect(survey(atLag(3, 'day'))).toContain('posts 3 days ahead of the survey')
    expect(survey(atLag(2, 'month'))).toContain('correlate most at a lead of 2 months: 0.84')
    expect(survey(atLag(2, 'month'))).toContain('Best lag, months')
  })
  test('before, after and at once', () => {
    expect(survey(atLag(-2))).toContain('The picture moves the posts’ opinion 2 weeks earlier')
    expect(survey(atLag(-2))).toContain('(posts 2 weeks behind the survey)')
    expect(survey(atLag(0))).toContain('The picture moves neither: at no lag do the two go together more closely.')
    expect(survey(atLag(0))).toContain('correlate most without a lag: 0.84')
  })
  test('the correlation comes with its interval, the number of independent waves, and the p that allows for all looks', () => {
    expect(survey(documents.leads)).toContain('mix-adjusted opinion has a correlation of 0.84 with Favourability (90% interval 0.66 to 0.93). Had the waves no sampling error, it would be about 0.92 (Spearman 1904).')
    expect(survey(documents.leads)).toContain('they are worth about 17 independent ones. Picking the best of 25 lags flatters.')
    expect(survey(documents.leads)).toContain('under 1% of them did as well at their own best lag (adjusted p 0.003)')
    expect(survey(documents.leads)).toContain('In all 175 correlations were looked at: 7 series at 25 lags each.')
  })
  test('what can’t be told is left out: no interval, no correction, no raw average', () => {
    const document = withSurvey(({ candidates }) => ({
      candidates: candidates.map((of) => (of.series === 'adjusted' ? { ...of, best: { ...of.best!, low: null, high: null, corrected: null } } : of.series === 'raw' ? { ...of, best: null, best_lag: null, adjusted_p: null } : of)),
    }))
    expect(survey(document)).toContain('a correlation of 0.84 with Favourability. 30 waves have a partner')
    expect(survey(document)).toContain('For the raw average no correlation can be told.')
    expect(survey(document)).toContain('Raw average – – – – – –')
    expect(survey(document)).not.toMatch(unworded)
  })
})

describe('forecasts', () => {
  const withRatios = (carry: number, mean: number) => withSurvey(({ forecast }) => ({ forecast: { ...forecast!, rivals: forecast!.rivals.map((rival) => ({ ...rival, rmse_ratio: rival.rival === 'past-mean' ? mean : carry })) } }))
  test.each([
    [0.7, 0.8, 'The posts beat both rivals. Forecasts made from them missed the waves by 30% less than the last wave carried forward, and by 20% less than the mean of past waves.'],
    [0.7, 1.2, 'The posts do not beat both rivals. Forecasts made from them missed the waves by 30% less than the last wave carried forward, and by 20% more than the mean of past waves.'],
    [1.31, 0.998, 'The posts do not beat both rivals. Forecasts made from them missed the waves by 31% more than the last wave carried forward, and by under 1% less than the mean of past waves.'],
    [0.998, 0.9, 'The posts beat both rivals. Forecasts made from them missed the waves by under 1% less than the last wave carried forward, and by 10% less than the mean of past waves.'],
    [1, 0.9, 'The posts do not beat both rivals. Forecasts made from them missed the waves about as far as the last wave carried forward, and by 10% less'],
  ])('ratios %f and %f', (carry, mean, sentence) => { expect(survey(withRatios(carry, mean))).toContain(sentence) })

  test('three rows of figures, the posts first', () => {
    const rows = /Ratio of CRPS p (The posts .*?) The error is/.exec(survey(documents.leads))?.[1]
    expect(rows).toMatch(/^The posts 1\.5 0\.9 95% – – – Last wave carried forward 3\.0 1\.7 86% 0\.52 0\.54 0\.041 Mean of past waves 3\.6 2\.0 86% 0\.44 0\.46 0\.018$/)
  })

  test('the next wave: expected value, whether its dates are given, and a warning unless the posts lead', () => {
    expect(survey(documents.leads)).toContain('Favourability is expected at 48.0% (90% interval 43.9% to 52.1%). Neither a rise nor a fall on the last wave, 45.6%, is foreseen with any certainty (90% interval of the difference −1.7 to +6.5 percentage points).')
    expect(survey(documents.leads)).toContain('Fieldwork is assumed one usual spacing after the last wave: 10 – 21 November 2026.')
    expect(survey(documents.leads)).not.toContain('do not rely on it')
    expect(survey(documents.tracks)).toContain('Since it is not shown that the posts foretell the survey, do not rely on it.')
    const given = withSurvey(({ next_wave: next }) => ({ next_wave: { ...next!, dates: 'given', movement: 'up', difference: { mean: 5, low: 1.2, high: 8.8, sd: 2 } } }))
    expect(survey(given)).toContain('That is a rise of 5.0 percentage points on the last wave, 45.6% (90% interval +1.2 to +8.8).')
    expect(survey(given)).toContain('Fieldwork as the account gives it: 10 – 21 November 2026.')
  })

  test('the lags’ weights: the largest is named', () => {
    expect(survey(documents.leads)).toContain('one of 4 weeks counts most, with 28% of the weight')
    expect(altOf(documents.leads, 'lag-weights')).toBe('Bar chart of the weight of each lead from 0 weeks to 16 weeks. Largest: 28%, at 4 weeks.')
  })

  test('where no lead counts most, or a rival misses nothing, that is said', () => {
    const unled = withSurvey(({ lag_weights: weights }) => ({ lag_weights: weights.map(({ lag }) => ({ lag, weight: lag === 0 ? 1 : 0 })) }))
    expect(survey(unled)).toContain('having no lead counts most, with 100% of the weight. No lead counts most in the forecasts')
    const perfect = withSurvey(({ forecast }) => ({ forecast: { ...forecast!, rivals: forecast!.rivals.map((rival) => ({ ...rival, rmse: 0, rmse_ratio: null, crps_ratio: null, dm_p: null })) } }), 'tracks')
    expect(survey(perfect)).toContain('The posts do not beat both rivals. Forecasts made from them missed the waves by an amount that can’t be compared with the last wave carried forward')
    expect(survey(perfect)).not.toMatch(unworded)
  })

  test('departures stand beside the events, and chance is told', () => {
    expect(survey(documents.leads)).toContain('1 wave of 22 came out outside the 95% interval of the forecast; chance alone would bring about 1.1.')
    expect(lines(documents.leads)).toContain('Fieldwork 10 – 21 July 2025: 35.5% found, below the 41.4% forecast. In the three months before: Timetable cut by a fifth (9 June 2025).')
    const alone = withSurvey(({ departures }) => ({ departures: departures.map((of) => ({ ...of, direction: 'above' as const, events: [] })) }))
    expect(survey(alone)).toContain('above the 41.4% forecast. The account names no event in the three months before.')
    expect(survey(withSurvey(() => ({ departures: [] })))).not.toContain('otherwise than forecast')
  })
})

describe('the outcome', () => {
  const outcome = sampleFindings().outcome!
  const withOutcome = (change: Partial<typeof outcome>) => survey(composeHouse({ ...sampleFindings(), outcome: { ...outcome, ...change } }))
  test('is supporting evidence, with the number of looks', () => {
    expect(survey(documents.leads)).toContain('One span after opinion rose by 10 points, the outcome grew by 2.1 percentage points more than otherwise (90% interval +0.7 to +3.5; adjusted p 0.060, allowing for 4 lags looked at).')
    expect(survey(documents.leads)).toContain('This is supporting evidence only')
    expect(survey(documents.leads)).toContain('market, whose growth of 1% goes with growth of +0.8% (90% interval +0.6 to +1.0)')
  })
  test('what does not stand the looks is not announced', () => {
    const open = withOutcome({ lags: outcome.lags.map((lag) => ({ ...lag, adjusted_p: 0.3 })), market: false, market_effect: null })
    expect(open).toContain('That the growth of the outcome goes with opinion can’t be established: at the best of 4 lags looked at, a rise of opinion by 10 points goes with growth of +2.1 percentage points')
    expect(open).not.toMatch(/the outcome grew by|not known/)
    expect(open).toContain('No market was given')
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
    expect(altOf(documents.leads, 'tracker')).toMatch(/^Charts of 4 metrics of the survey by wave, with 90% intervals\. Latest wave: Favourability, Consideration, Recommendation and Satisfaction \(45\.6%, 33\.\d%, 27\.\d% and 6\.80\)\.$/)
    expect(altOf(documents.leads, 'agreement')).toContain('moved 4 weeks later; below, Favourability in 30 waves of the survey')
    expect(altOf(documents['too-few-waves'], 'agreement')).toContain('No correlation can be told.')
    expect(altOf(documents.leads, 'survey-forecasts')).toContain('22 waves: 21 inside the 90% interval. Usual size of a miss: 1.5; last wave carried forward 3.0, mean of past waves 3.6.')
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
