import { expect, test } from 'vitest'
import { createReporter } from '../../../generator/compose/faults.ts'
import { argumentsFor, parseSentences } from '../../../generator/compose/sentences.ts'
import { InputFault } from '../../../generator/faults/fault.ts'
import type { Fault } from '../../../generator/faults/fault.ts'
import type { Findings, Movement } from '../../../model/findings/schema.ts'
import { houseTemplate } from '../../support/house-composition.ts'
import { houseWords } from '../../support/house-words.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const words = await houseWords()
const sample = sampleFindings()
const faults: Fault[] = []
const sentences = parseSentences(houseTemplate.sentences.text, createReporter('', faults))
if (faults.length > 0) throw new InputFault(faults)
const say = (message: string, findings: Findings) => words.say(message, argumentsFor(sentences.get(message), { findings, names: {} }, words))

const movements: readonly (Movement | null)[] = ['up', 'down', 'not-established', null]
const changes = { up: { mean: 3, low: 1, high: 5, sd: 1 }, down: { mean: -3, low: -5, high: -1, sd: 1 }, 'not-established': { mean: 3, low: -1, high: 7, sd: 2 } }

/** Every month that can be: opinion up, down, open or without a month before; the raw average up, down, still or unknown; with and without mentions. */
const months = movements.flatMap((movement) => [2, -2, 0.01, null].flatMap((rawChange) => [0, 40].map((mentions): [string, Findings] => [
  `${movement}, raw ${rawChange}, ${mentions} mentions`,
  { ...sample, opinion: { ...sample.opinion, movement, change: movement && changes[movement], previous: movement && sample.opinion.previous, raw_change: rawChange, mentions, movement_since_base: movement ?? 'not-established', since_base: movement ? changes[movement] : changes['not-established'] } },
])))

test.each(months)('what is said of opinion is what its interval supports: %s', (_name, findings) => {
  const { movement, mentions, raw_change: rawChange } = findings.opinion
  const headline = say('opinion-headline', findings)
  const raw = rawChange === null ? '' : `${say('raw-headline', findings)} ${say('two-facts', findings)}`
  expect(/Opinion of Skerrow Ferries rose by 3\.0 points/.test(headline)).toBe(movement === 'up')
  expect(/Opinion of Skerrow Ferries fell by 3\.0 points/.test(headline)).toBe(movement === 'down')
  expect(headline.includes('No change in opinion of Skerrow Ferries can be established')).toBe(movement === 'not-established')
  expect(headline.includes('there is no earlier period')).toBe(movement === null)
  expect(headline.startsWith('No mention of Skerrow Ferries was posted')).toBe(mentions === 0)
  const against = movement === 'up' ? rawChange === -2 : movement === 'down' && rawChange === 2
  expect(raw.startsWith('Yet the raw average')).toBe(against)
  expect(/^(The|Yet the) raw average of all mentions (rose|fell) by 2\.0 points/.test(raw)).toBe(Math.abs(rawChange ?? 0) === 2)
  expect(raw.includes('says nothing about opinion')).toBe(movement === 'not-established' && Math.abs(rawChange ?? 0) === 2)
  expect(headline).toContain('90% interval')
  expect(/people were (kinder|less kind)/.test(say('two-facts', findings))).toBe(movement === 'up' || movement === 'down')
  const since = say('opinion-finding', findings)
  expect(/has (risen|fallen)/.test(since)).toBe(movement === 'up' || movement === 'down')
  expect(/ (rose|fell) by/.test(say('chart-opinion-title', findings))).toBe(movement === 'up' || movement === 'down')
  expect([headline, raw, since].filter(Boolean).join(' ')).not.toMatch(/not known|undefined|NaN|[{}]| {2}| \./)
})
