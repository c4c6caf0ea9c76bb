import { IntlMessageFormat } from 'intl-messageformat'
import { createWords } from '../../generator/words/words.ts'
import type { Words } from '../../generator/words/words.ts'

type Ast = ReturnType<IntlMessageFormat['getAst']>

/** Stands for every letter of a message. */
const letter = '\u0436'

/**
 * A catalogue in which every letter that a message holds is another one, for finding words that are in no message.
 *
 * @param catalogue - text of each message
 */
export function pseudoWords(catalogue: Readonly<Record<string, string>>, locale: string): Words {
  const disguised = Object.entries(catalogue).map(([key, text]) => [key, printed(new IntlMessageFormat(text, 'en', undefined, { ignoreTag: true }).getAst())] as const)
  return createWords(Object.fromEntries(disguised), 'xx', locale)
}

/** The text that a message holds outside its arguments, each stretch for itself. */
export function literalsOf(text: string): readonly string[] {
  return literals(new IntlMessageFormat(text, 'en', undefined, { ignoreTag: true }).getAst())
}

function literals(ast: Ast): readonly string[] {
  return ast.flatMap((element) => element.type === 0 ? [element.value] : 'options' in element ? Object.values(element.options).flatMap(({ value }) => literals(value)) : [])
}

function printed(ast: Ast): string {
  return ast.map((element) => {
    if (element.type === 0) return element.value.replace(/\p{L}/gu, letter).replace(/[{}']/g, '')
    if (element.type === 7) return '#'
    if (!('options' in element)) return `{${element.value}}`
    const cases = Object.entries(element.options).map(([name, { value }]) => `${name} {${printed(value)}}`)
    return `{${element.value}, ${element.type === 6 ? 'plural' : 'select'}, ${cases.join(' ')}}`
  }).join('')
}
