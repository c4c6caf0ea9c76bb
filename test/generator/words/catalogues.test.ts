import { readFileSync } from 'node:fs'
import { visit } from 'unist-util-visit'
import { describe, expect, test } from 'vitest'
import { parse } from 'yaml'
import { loadTheme } from '../../../generator/theme/load-theme.ts'
import { textWidth } from '../../../generator/render/charts/text-metrics.ts'
import type { Document } from '../../../generator/compose/document.ts'
import { languagesIn, loadWords } from '../../../generator/words/load-words.ts'
import { createWords } from '../../../generator/words/words.ts'
import type { WordArguments, Words } from '../../../generator/words/words.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import { englishFragments, trigrams } from '../../support/english-fragments.ts'
import { houseCharts, houseTemplate } from '../../support/house-composition.ts'
import { templatesFolder } from '../../support/house-words.ts'
import { literalsOf, pseudoWords } from '../../support/pseudo-words.ts'
import { postsAlone, readyMade, sampleFindings, withCoder, withVerdict } from '../../support/sample-findings.ts'
import { composeIn } from '../../support/worded-findings.ts'

const folder = `${templatesFolder}/words`
const textsOf = (language: string) => parse(readFileSync(`${folder}/${language}.yaml`, 'utf8')) as Readonly<Record<string, string>>
const english = textsOf('en')
const inEnglish = await loadWords(folder, 'en')
const languages = await languagesIn(folder)
const translated = languages.filter((language) => language !== 'en')
const samples: Readonly<Record<string, () => Findings>> = {
  'everything there': sampleFindings, 'posts alone': postsAlone, 'a ready-made table': readyMade, 'a survey that contradicts': () => withVerdict('contradicts'), 'an audit': () => withCoder('applied'),
}

/** Messages whose words are the same in another language. */
const same: Readonly<Record<string, readonly string[]>> = {
  all: ['column-crps', 'column-gini'],
  de: ['column-base', 'column-segment', 'term-drift', 'term-segment', 'term-survey-base'],
  fr: ['column-date', 'column-direction', 'column-effective_base', 'column-importance', 'column-mentions', 'column-segment', 'importance-heading', 'label-importance', 'severity-notes', 'span-base', 'term-base', 'term-importance', 'term-mention', 'term-points', 'term-segment', 'when-base'],
  pt: ['span-base', 'term-base', 'when-base'],
}

/** Messages of the families that the program calls by a name, which nobody calls: no such chart, column, table, term or level. */
function uncalled(keys: readonly string[]): readonly string[] {
  const sections = Object.values(houseTemplate.sections).map(({ text }) => text).join('\n')
  const tables = tablesOf(sampleFindings())
  const columns = new Set([...tables.flatMap((table) => table.columns.map(({ key }) => key)), 'interval', 'change-interval', 'told-interval'])
  const called: Readonly<Record<string, (name: string) => boolean>> = {
    'chart': (name) => houseCharts.includes(name.replace(/-(title|note|alt)$/, '')),
    'column': (name) => columns.has(name),
    // also of a table that only an account's template prints
    'table': (name) => tables.some((table) => table.name === name) || sections.includes(`"table-${name}"`),
    'term': (name) => keys.includes(`term-${name.replace(/-means$/, '')}`) && keys.includes(`term-${name.replace(/-means$/, '')}-means`),
  }
  return keys.filter((key) => {
    const [, family = '', name = ''] = /^([a-z]+)-(.+)$/.exec(key) ?? []
    return Object.hasOwn(called, family) && called[family]?.(name) === false
  })
}

test('each title, column, caption and term is that of something there is', () => {
  expect(uncalled(inEnglish.keys)).toEqual([])
})

test('it can fail: captions and columns of nothing are found', () => {
  expect(uncalled(['chart-none-title', 'column-none', 'table-none', 'term-none', 'term-base', 'term-base-means'])).toEqual(['chart-none-title', 'column-none', 'table-none', 'term-none'])
})

/** Where a catalogue has other messages or arguments than the English one. */
function unequal(words: Words): readonly string[] {
  return [...new Set([...words.keys, ...inEnglish.keys])].flatMap((key) => {
    if (!words.has(key) || !inEnglish.has(key)) return [`${key}: ${words.has(key) ? 'only here' : 'missing'}`]
    const [here, there] = [words.argumentsOf(key).join(), inEnglish.argumentsOf(key).join()]
    const counts = words.countsOf(key).filter((name) => !inEnglish.countsOf(key).includes(name))
    return [...(here === there ? [] : [`${key}: ${here} for ${there}`]), ...counts.map((name) => `${key}: plural of ${name}`)]
  })
}

test('it can fail: a message too few, one too many, an argument left out and a plural of a text are told', () => {
  const others = Object.fromEntries(Object.entries(english).filter(([key]) => key !== 'contents'))
  const words = createWords({ ...others, extra: 'x', title: '{brand}', 'keyfigure-change-label': '{previous, plural, other {#}}' }, 'en', 'en')
  expect([...unequal(words)].sort()).toEqual(['contents: missing', 'extra: only here', 'keyfigure-change-label: plural of previous', 'title: brand for brand,period'])
})

describe.each(translated)('the catalogue %s', (language) => {
  const texts = textsOf(language)
  test('has each message of the English one and no other, with its arguments; what decides a plural is a number', async () => {
    expect(unequal(await loadWords(folder, language))).toEqual([])
  })
  test('repeats no English message', () => {
    const alike = Object.keys(texts).filter((key) => texts[key] === english[key] && /\p{L}{2}/u.test(literalsOf(texts[key] ?? '').join(' ')))
    expect(alike.filter((key) => !same['all']?.includes(key) && !same[language]?.includes(key))).toEqual([])
  })
  test('has a place for what a chart puts into a label', () => {
    for (const key of ['label-survey', 'label-survey-percent', 'label-posts-later', 'label-posts-earlier']) expect(texts[key]?.split('…').length, key).toBe(2)
  })
})

test('every language that is asked for has its catalogue', () => {
  expect(languages).toEqual(['de', 'en', 'fr', 'pt'])
})

/** Room, px, that a legend's first label has before the sign of the second. */
const rooms = { 'label-customers': 97, 'label-importance': 97, 'label-forecast': 80, 'label-first-sealed': 115 }

test.each(languages)('the legends of charts have room for their labels: %s', async (language) => {
  const [{ chart, advances }, texts] = [await loadTheme(`${templatesFolder}/theme`), textsOf(language)]
  for (const [key, room] of Object.entries(rooms)) expect(textWidth(texts[key] ?? '', { fontSize: chart.font_size }, advances), key).toBeLessThan(room)
})

/** All that is read or heard of a document. */
function textIn(document: Document): readonly string[] {
  const found: string[] = []
  visit(document.tree, (node) => {
    if (node.type === 'text') found.push(node.value)
    else if (node.type === 'element') found.push(...[node.properties['ariaLabel'], node.properties['dataAlt']].filter((text) => typeof text === 'string'))
  })
  return found
}

const englishOnly = englishFragments(english)

function englishIn(document: Document): readonly string[] {
  return textIn(document).flatMap(trigrams).filter((three) => englishOnly.has(three))
}

describe.each(translated)('a whole review in %s', (language) => {
  test.each(Object.entries(samples))('of %s holds no English', async (_name, make) => {
    const words = await loadWords(folder, language)
    expect([...new Set(englishIn(composeIn(words, make())))]).toEqual([])
  })
})

test('it can fail: the English review is found to be English', () => {
  expect(englishIn(composeIn(inEnglish, sampleFindings())).length).toBeGreaterThan(1000)
})

/** Words of the findings that the account, its files or its survey give. */
function givenIn(findings: Findings): ReadonlySet<string> {
  const found = new Set<string>()
  const collect = (value: unknown, key: string): void => {
    if (typeof value === 'string' && /^(label|reason|brand|wave|values|names|prepared_by|reviewed_by|path|segment|segments|metric|margin|level|account|time_zone|from|event|sha256)$/.test(key)) for (const word of wordsOf(value)) found.add(word.toLowerCase())
    else if (Array.isArray(value)) value.forEach((item) => { collect(item, key) })
    else if (typeof value === 'object' && value !== null) Object.entries(value).forEach(([name, item]) => { collect(item, name) })
  }
  collect(findings, '')
  // verbatim from a sealed review, in the words of then
  for (const { action, success, where } of findings.follow_up?.advice ?? []) collect([action, success, where], 'label')
  return found
}

const wordsOf = (text: string) => text.match(/[A-Za-zÀ-ÿ]{2,}/g) ?? []
const intl = new Set(Array.from({ length: 12 }, (_, month) => new Intl.DateTimeFormat('de', { month: 'long' }).format(Date.UTC(2000, month, 15)).toLowerCase()))
for (const text of ['und', ...Array.from({ length: 12 }, (_, month) => new Intl.DateTimeFormat('de', { day: 'numeric', month: 'short', year: 'numeric' }).format(Date.UTC(2000, month, 15)))]) for (const word of wordsOf(text)) intl.add(word.toLowerCase())

/** Words of a review that no message, no account and not Intl can have said; fingerprints are none. */
function strayIn(document: Document, findings: Findings): readonly string[] {
  const given = givenIn(findings)
  const said = textIn(document).filter((text) => !/^[0-9a-f]{12}$/.test(text)).flatMap(wordsOf)
  return [...new Set(said.filter((word) => !given.has(word.toLowerCase()) && !intl.has(word.toLowerCase())))]
}

test.each(Object.entries(samples))('every word of a review of %s is a message’s, the account’s or Intl’s', (_name, make) => {
  expect(strayIn(composeIn(pseudoWords(english, 'de-DE'), make()), make())).toEqual([])
})

test('it can fail: a word that stands in no message is found', () => {
  const words = pseudoWords(english, 'de-DE')
  const stray = { ...words, say: (key: string, args?: WordArguments) => key === 'contents-heading' ? 'Stray' : words.say(key, args) }
  expect(strayIn(composeIn(stray, postsAlone()), postsAlone())).toEqual(['Stray'])
})
