import { fileURLToPath } from 'node:url'
import { loadWords } from '../../generator/words/load-words.ts'
import type { Words } from '../../generator/words/words.ts'

export const templatesFolder = fileURLToPath(new URL('../../templates', import.meta.url))

/** The house catalogue, English, figures as in the United Kingdom unless said otherwise. */
export function houseWords(locale = 'en-GB'): Promise<Words> {
  return loadWords(`${templatesFolder}/words`, locale)
}
