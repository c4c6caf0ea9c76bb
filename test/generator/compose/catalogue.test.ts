import { readFileSync, readdirSync } from 'node:fs'
import { expect, test } from 'vitest'
import { houseTemplate } from '../../support/house-composition.ts'
import { houseWords, templatesFolder } from '../../support/house-words.ts'

const words = await houseWords()

/** Messages that are said by a name put together from a code of the findings or of a table. */
const composed = [/^caveat-.+-(title|evidence|meaning|remedy)$/, /^advice-.+-(action|evidence|success)$/, /^(part|stage|when|scope|scale|factor|level|name|span|shown|movement|rival|direction|grid|series|stance|leaning|poster|left_as_coded|status|definition)-/, /^outcome-(met|partly|not-met|unknown)$/, /^chart-.+-(title|note|alt)$/, /^column-/, /^table-/, /^term-/, /^period-(quarter|week)$/]

function filesIn(folder: string): readonly string[] {
  return readdirSync(folder, { withFileTypes: true, recursive: true }).filter((entry) => entry.isFile() && /\.(ts|json|md|css)$/.test(entry.name))
    .map((entry) => readFileSync(`${entry.parentPath}/${entry.name}`, 'utf8'))
}

function unused(keys: readonly string[]): readonly string[] {
  const sources = [...Object.values(houseTemplate.sections).map(({ text }) => text), ...filesIn(`${templatesFolder}/charts`), ...filesIn(`${templatesFolder}/../generator`)].join('\n')
  return keys.filter((key) => !composed.some((pattern) => pattern.test(key)) && !new RegExp(`["'@]${key}["']`).test(sources))
}

test('every message is used: by a section, a chart or the program', () => {
  expect(unused(words.keys)).toEqual([])
})

test('it can fail: a message that nobody says is found', () => {
  expect(unused([...words.keys, 'no-one-says-this'])).toEqual(['no-one-says-this'])
})

test('sections hold no wording of their own', () => {
  for (const { place, text } of Object.values(houseTemplate.sections)) {
    const prose = text.replace(/:{1,9}[a-z]+(\{[^}]*\})?/g, '').replace(/\]\(#[a-z-]+\)/g, '').replace(/[^\p{L}]/gu, '')
    expect(prose, place).toBe('')
  }
})
