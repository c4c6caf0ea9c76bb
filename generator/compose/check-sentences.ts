import type { Words } from '../words/words.ts'
import { nearest } from './faults.ts'
import type { Reporter } from './faults.ts'
import type { Sentences } from './sentences.ts'

/** Check that sentences and catalogue agree: each sentence is worded, with just the arguments that it is given. */
export function checkSentences(sentences: Sentences, words: Words, reporter: Reporter): void {
  for (const [message, sentence] of sentences) {
    // what an account says otherwise may leave arguments out; that it adds none was checked when it was read
    if (words.own && Object.hasOwn(words.own.messages, message) && !words.own.added.includes(message)) continue
    if (!words.has(message)) {
      reporter.report(sentence, 'message-unknown', `message "${message}"`, `a message of the catalogue ${words.language}`, nearest(message, words.keys))
      continue
    }
    const [declared, used] = [Object.keys(sentence.arguments), words.argumentsOf(message)]
    for (const name of used.filter((name) => !declared.includes(name))) {
      reporter.report(sentence, 'argument-undeclared', `argument "${name}" in the wording of "${message}"`, `one of ${declared.join(', ') || 'none'}`, 'Declare it here, or word the message without it.')
    }
    for (const name of declared.filter((name) => !used.includes(name))) {
      reporter.report(sentence.arguments[name], 'argument-unused', `argument "${name}" that the wording of "${message}" does not use`, `one of ${used.join(', ') || 'none'}`, 'Remove it here, or use it in the wording.')
    }
  }
}
