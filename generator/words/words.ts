import { IntlMessageFormat } from 'intl-messageformat'
import { argumentsOf } from './message-arguments.ts'

/** What a message may be given: text is put in as it stands, never parsed; numbers decide plurals and exact cases. */
export type WordArgument = string | number
export type WordArguments = Readonly<Record<string, WordArgument>>

/** Everything a reader sees, in one language. */
export interface Words {
  /** BCP 47 tag that figures and dates are formatted by, e.g. `en-GB`. */
  readonly locale: string
  /** The catalogue's own language, e.g. `en`. */
  readonly language: string
  readonly keys: readonly string[]
  has(key: string): boolean
  /** Names of the arguments that a message uses, sorted. */
  argumentsOf(key: string): readonly string[]
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
 * @throws {Error} naming the message that is no ICU message
 */
export function createWords(catalogue: Readonly<Record<string, string>>, language: string, locale: string): Words {
  const messages = new Map(Object.entries(catalogue).map(([key, text]) => [key, compile(key, text, locale)]))
  const find = (key: string): IntlMessageFormat => {
    const message = messages.get(key)
    if (!message) throw new Error(`Unexpected message "${key}", expected one of the catalogue ${language}`)
    return message
  }
  return {
    locale, language, keys: [...messages.keys()],
    has: (key) => messages.has(key),
    argumentsOf: (key) => argumentsOf(find(key).getAst()),
    say: (key, args = {}) => spoken(key, find(key), args),
  }
}

function compile(key: string, text: string, locale: string): IntlMessageFormat {
  try {
    return new IntlMessageFormat(text, locale, undefined, { ignoreTag: true })
  } catch (error) {
    throw new Error(`Unexpected wording of message "${key}", expected an ICU message: ${error instanceof Error ? error.message : String(error)}`, { cause: error })
  }
}

function spoken(key: string, message: IntlMessageFormat, args: WordArguments): string {
  try {
    return String(message.format(args)).replace(/[ \n\t]+/g, ' ').trim()
  } catch (error) {
    throw new Error(`Unexpected arguments of message "${key}": ${error instanceof Error ? error.message : String(error)}`, { cause: error })
  }
}
