import { expect, test } from 'vitest'
import { InputFault } from '../../../generator/faults/fault.ts'
import { date } from '../../../generator/words/dates.ts'
import { languagesIn, loadWords } from '../../../generator/words/load-words.ts'
import { count } from '../../../generator/words/numbers.ts'
import { createWords } from '../../../generator/words/words.ts'
import { templatesFolder } from '../../support/house-words.ts'

const words = createWords({
  plain: 'A < b & "c"',
  nested: '{side, select, up {{n, plural, one {# step} other {# steps}} for {who}} other {none}}',
}, 'en', 'en-GB')

test('a message is said, with cases, plurals and grouped numbers', () => {
  expect(words.say('plain')).toBe('A < b & "c"')
  expect(words.say('nested', { side: 'up', n: 1200, who: 'us' })).toBe('1,200 steps for us')
  expect(words.say('nested', { side: 'down', n: 1, who: 'us' })).toBe('none')
})

test('arguments are found inside cases too', () => {
  expect(words.argumentsOf('nested')).toEqual(['n', 'side', 'who'])
  expect(words.argumentsOf('plain')).toEqual([])
})

test('an argument is put in as it stands, never read as a message', () => {
  expect(createWords({ m: 'Of {x}.' }, 'en', 'en-GB').say('m', { x: '{n, plural, other {#}} <b> \'{\'' })).toBe('Of {n, plural, other {#}} <b> \'{\'.')
})

test('an unknown message, a missing argument and a broken message are named', () => {
  expect(() => words.say('absent')).toThrow('Unexpected message "absent"')
  expect(() => words.say('nested', {})).toThrow('message "nested"')
  expect(() => createWords({ broken: '{n, plural, one {#}' }, 'en', 'en-GB')).toThrow('message "broken"')
})

test('a locale without a catalogue is a fault of the input, which lists the languages that there are', async () => {
  const refused = await loadWords(`${templatesFolder}/words`, 'xx-GB', undefined, 'account.yaml:4:1 locale').catch((error: unknown) => error)
  expect(refused).toMatchObject({ faults: [{ code: 'language-unknown', place: 'account.yaml:4:1 locale' }] })
  const [fault] = refused instanceof InputFault ? refused.faults : []
  for (const language of await languagesIn(`${templatesFolder}/words`)) expect(fault?.message).toMatch(new RegExp(`\\b${language}\\b`))
})

test('a region writes its figures in the words of its language', async () => {
  const says = async (locale: string) => {
    const regional = await loadWords(`${templatesFolder}/words`, locale)
    return [regional.language, regional.locale, count(1234567, regional.locale), date('2026-01-05', regional.locale)]
  }
  expect(await says('en-US')).toEqual(['en', 'en-US', '1,234,567', 'January 5, 2026'])
  expect(await says('en-ZA')).toEqual(['en', 'en-ZA', '1\u00a0234\u00a0567', '5 January 2026'])
})

test('narrow and thin spaces of Intl become no-break spaces, which every typeface has', () => {
  expect(createWords({ m: '{n, plural, other {# mentions}}' }, 'fr', 'fr-FR').say('m', { n: 12345 })).toBe('12\u00a0345 mentions')
  // it can fail: Intl itself writes a narrow one
  expect(new Intl.NumberFormat('fr-FR').format(12345)).toBe('12\u202f345')
})
