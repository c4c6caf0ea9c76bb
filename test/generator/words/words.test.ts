import { expect, test } from 'vitest'
import { loadWords } from '../../../generator/words/load-words.ts'
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

test('a locale without a catalogue is a fault of the input, with the mend', async () => {
  await expect(loadWords(`${templatesFolder}/words`, 'xx-GB')).rejects.toMatchObject({ faults: [{ code: 'language-unknown', place: 'templates/words/xx.yaml' }] })
})
