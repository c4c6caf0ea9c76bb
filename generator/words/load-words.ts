import { readdir, readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { parse } from 'yaml'
import { z } from 'zod'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import { readOwnWords } from './own-words.ts'
import { createWords } from './words.ts'
import type { Words } from './words.ts'

const catalogue = z.record(z.string().regex(/^[a-z0-9_-]+$/i), z.string())

/**
 * Read the catalogue of a locale's language, `FOLDER/LANGUAGE.yaml`; the region only decides how figures are written (`de-AT`, `pt-PT`).
 *
 * @param own - the account's words.yaml: its text, and how faults name it
 * @param asked - where the locale is named
 * @throws {InputFault} `language-unknown` where there is no such catalogue, `words-invalid` where it is no list of ICU messages, and what is wrong in the account's own
 */
export async function loadWords(folder: string, locale: string, own?: { readonly place: string, readonly text: string }, asked = 'account.yaml locale'): Promise<Words> {
  const { language } = new Intl.Locale(locale)
  const place = `templates/words/${language}.yaml`
  const languages = await languagesIn(folder)
  if (!languages.includes(language)) throw new InputFault([faultOf('language-unknown', asked, { locale, languages })])
  const messages = parsed(await readFile(join(folder, `${language}.yaml`), 'utf8'), place)
  const house = created(place, () => createWords(messages, language, locale))
  if (own === undefined) return house
  const mine = readOwnWords(own, house)
  return createWords({ ...messages, ...mine.messages }, language, locale, mine)
}

/** Languages that have a catalogue, sorted. */
export async function languagesIn(folder: string): Promise<readonly string[]> {
  const files = await readdir(folder)
  return files.filter((file) => file.endsWith('.yaml')).map((file) => file.replace(/\.yaml$/, '')).sort()
}

function parsed(text: string, place: string): Readonly<Record<string, string>> {
  return created(place, () => catalogue.parse(parse(text)))
}

function created<T>(place: string, make: () => T): T {
  try {
    return make()
  } catch (error) {
    throw new InputFault([faultOf('words-invalid', place, { reason: error instanceof Error ? error.message : String(error) })])
  }
}
