import { shortened, type Wording } from './wording.ts'

/** Faults of catalogues and of an account's own words. */
export const wordWordings = {
  'language-unknown': (details: { readonly locale: string; readonly languages: readonly string[] }): Wording => ({
    unexpected: `locale ${details.locale}`, expected: `one of a language that has a catalogue: ${details.languages.join(', ')}`,
    mend: `Set \`locale\` to one of these languages, such as ${details.languages[0] ?? 'en'}; a region may follow, such as en-GB.`,
  }),
  'words-invalid': (details: { readonly reason: string }): Wording => ({
    unexpected: `catalogue (${details.reason})`, expected: 'messages by key',
    mend: 'Mend the message named; its syntax is ICU MessageFormat.',
  }),
  'words-value': (details: { readonly actual: string; readonly expected: string }): Wording => ({
    unexpected: shortened(details.actual), expected: details.expected, mend: `Give ${details.expected}.`,
  }),
  'words-message-invalid': (details: { readonly key: string; readonly reason: string }): Wording => ({
    unexpected: `wording of \`${details.key}\` (${details.reason})`, expected: 'an ICU message',
    mend: 'Close every brace, and give every select and plural a case `other`; a brace that is meant as such stands between apostrophes.',
  }),
  'words-argument-unknown': (details: { readonly key: string; readonly name: string; readonly known: readonly string[]; readonly nearest: string | null }): Wording => ({
    unexpected: `argument \`${details.name}\` of \`${details.key}\``, expected: details.known.length === 0 ? 'a text without arguments' : `one of ${details.known.join(', ')}`,
    mend: details.nearest === null ? 'Word it without; a new message may declare figures under `arguments`.' : `Did you mean \`{${details.nearest}}\`?`,
  }),
  'words-argument-unfit': (details: { readonly key: string; readonly name: string; readonly counts: readonly string[] }): Wording => ({
    unexpected: `plural or format of \`${details.name}\` in \`${details.key}\``, expected: details.counts.length === 0 ? 'none: its figures come written' : `one of ${details.counts.join(', ')}, which are numbers`,
    mend: `Write {${details.name}} alone.`,
  }),
  'words-key-unknown': (details: { readonly key: string; readonly nearest: string }): Wording => ({
    unexpected: `message \`${details.key}\``, expected: 'one of the house, or one that the account’s own template calls',
    mend: `Did you mean \`${details.nearest}\`? Otherwise call it in the template, or take it out.`,
  }),
}
