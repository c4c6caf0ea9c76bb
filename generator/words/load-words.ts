import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { parse } from 'yaml'
import { z } from 'zod'
import { InputFault } from '../faults/fault.ts'
import { createWords } from './words.ts'
import type { Words } from './words.ts'

const catalogue = z.record(z.string().regex(/^[a-z0-9_-]+$/i), z.string())

/**
 * Read the catalogue of a locale's language, `FOLDER/LANGUAGE.yaml`.
 *
 * @throws {InputFault} `language-unknown` where there is no such catalogue, `words-invalid` where it is no list of ICU messages
 */
export async function loadWords(folder: string, locale: string): Promise<Words> {
  const { language } = new Intl.Locale(locale)
  const place = `templates/words/${language}.yaml`
  const text = await readFile(join(folder, `${language}.yaml`), 'utf8').catch(() => {
    throw new InputFault([{
      code: 'language-unknown', place, message: `Unexpected locale ${locale}, expected one whose language has a catalogue`,
      mend: `Set \`locale\` to one of English, such as en-GB, or add ${place}.`,
    }])
  })
  try {
    return createWords(catalogue.parse(parse(text)), language, locale)
  } catch (error) {
    throw new InputFault([{
      code: 'words-invalid', place, message: `Unexpected catalogue, expected messages by key: ${error instanceof Error ? error.message : String(error)}`,
      mend: 'Mend the message named; its syntax is ICU MessageFormat.',
    }])
  }
}
