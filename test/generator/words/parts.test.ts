import { expect, test } from 'vitest'
import { partName } from '../../../generator/words/labels.ts'
import { languagesIn, loadWords } from '../../../generator/words/load-words.ts'
import { otherParts } from '../../../model/reading/decomposition.ts'
import { templatesFolder } from '../../support/house-words.ts'

/** Every part that the model can tell of an account without factors of its own: the compiler holds it to `otherParts` and mixes. */
const parts = [...otherParts, 'venue_mix', 'topic_mix', 'poster_mix']

test.each(await languagesIn(`${templatesFolder}/words`))('each part of what moved the raw average has its message in %s', async (language) => {
  const words = await loadWords(`${templatesFolder}/words`, language)
  expect(parts.filter((part) => !words.has(`part-${part}`))).toEqual([])
  expect(parts.filter((part) => partName(part, words) === part)).toEqual([])
  // only the mix of a factor that the account adds is worded by the factor's own name
  expect(partName('country_mix', words)).toBe(words.say('part-factor_mix', { factor: 'country' }))
})

test('what is a reason of its own is said by its own words', async () => {
  const words = await loadWords(`${templatesFolder}/words`, 'en')
  const args = { same: 'none', movement: 'none', dir: 'up', shift: 'none', known: 'none', level: 'none', label: '', lead_low: 'none', lead_high: 'none', share_from: '', share_to: '', factor: 'FACTOR' }
  const said = otherParts.filter((part) => part !== 'opinion').map((largest) => words.say('raw-reason', { ...args, largest }))
  expect(new Set(said).size).toBe(otherParts.length - 1)
  expect(said.filter((reason) => reason.includes('FACTOR'))).toEqual([])
})
