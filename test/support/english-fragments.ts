import { literalsOf } from './pseudo-words.ts'

/** Every three words in a row, in small letters. */
export const trigrams = (text: string): readonly string[] => {
  const wordsIn = text.match(/\p{L}+(?:’\p{L}+)?/gu) ?? []
  return wordsIn.slice(2).map((_, at) => wordsIn.slice(at, at + 3).join(' ').toLowerCase())
}

/** Names that stay English in every language: of laws and authorities. */
const names = ['Federal Trade Commission', 'Digital Markets Competition and Consumers Act', 'Unfair Commercial Practices Directive', 'Bayley and Hammersley', 'Unfair Commercial Practices']

/**
 * Three words in a row that only the English catalogue says.
 *
 * @param english - the texts of en.yaml, by key
 */
export function englishFragments(english: Readonly<Record<string, string>>): ReadonlySet<string> {
  const found = new Set(Object.values(english).flatMap(literalsOf).flatMap(trigrams).filter((three) => three.length >= 10))
  for (const name of names) for (const three of trigrams(name)) found.delete(three)
  return found
}
