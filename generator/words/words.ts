import { IntlMessageFormat } from 'intl-messageformat'
import { argumentsOf, usesOf } from './message-arguments.ts'
import { plainSpaces } from './spaces.ts'

/** What a message may be given: text is put in as it stands, never parsed; numbers decide plurals and exact cases. */
export type WordArgument = string | number
export type WordArguments = Readonly<Record<string, WordArgument>>

/** What an account words itself. */
export interface OwnWords {
  /** Its file, as faults name it, and its text. */
  readonly place: string
  readonly text: string
  readonly messages: Readonly<Record<string, string>>
  /** Keys that the house has no message of. */
  readonly added: readonly string[]
  /** Place of each message. */
  readonly places: Readonly<Record<string, string>>
}

/** Everything a reader sees, in one language. */
export interface Words {
  /** BCP 47 tag that figures and dates are formatted by, e.g. `en-GB`. */
  readonly locale: string
  /** The catalogue's own language, e.g. `en`. */
  readonly language: string
  readonly keys: readonly string[]
  /** The account's part, where it has one. */
  readonly own?: OwnWords | undefined
  has(key: string): boolean
  /** Names of the arguments that a message uses, sorted. */
  argumentsOf(key: string): readonly string[]
  /** Those among them that decide a plural. */
  countsOf(key: string): readonly string[]
  /**
   * The wording of a message.
   *
   * @throws {Error} when the catalogue lacks the message or an argument it uses: a fault of the program, since templates are checked first
   */
  say(key: string, args?: WordArguments): string
}

/**
 * Make the words of a catalogue of ICU messages.
 *
 * @param catalogue - message by key
 * @param language - the catalogue's language
 * @param locale - how figures are formatted
 * @param own - the account's part of the catalogue
 * @throws {Error} naming the message that is no ICU message
 */
export function createWords(catalogue: Readonly<Record<string, string>>, language: string, locale: string, own?: OwnWords): Words {
  const messages = new Map(Object.entries(catalogue).map(([key, text]) => [key, compile(key, text, locale)]))
  const find = (key: string): IntlMessageFormat => {
    const message = messages.get(key)
    if (!message) throw new Error(`Unexpected message "${key}", expected one of the catalogue ${language}`)
    return message
  }
  return {
    locale, language, own, keys: [...messages.keys()],
    has: (key) => messages.has(key),
    argumentsOf: (key) => argumentsOf(find(key).getAst()),
    countsOf: (key) => [...new Set(usesOf(find(key).getAst()).filter(({ use }) => use === 'plural').map(({ name }) => name))],
    say: (key, args = {}) => spoken(key, find(key), args),
  }
}

/** @throws {Error} for what is no ICU message; `cause` is the parser's own */
export function compile(key: string, text: string, locale: string): IntlMessageFormat {
  try {
    return new IntlMessageFormat(text, locale, undefined, { ignoreTag: true })
  } catch (error) {
    throw new Error(`Unexpected wording of message "${key}", expected an ICU message: ${error instanceof Error ? error.message : String(error)}`, { cause: error })
  }
}

function spoken(key: string, message: IntlMessageFormat, args: WordArguments): string {
  try {
    return plainSpaces(String(message.format(args))).replace(/[ \n\t]+/g, ' ').replace(/^ | $/g, '')
  } catch (error) {
    throw new Error(`Unexpected arguments of message "${key}": ${error instanceof Error ? error.message : String(error)}`, { cause: error })
  }
}
