import type { IntlMessageFormat } from 'intl-messageformat'

type Ast = ReturnType<IntlMessageFormat['getAst']>

/** How a message uses an argument: put in as it stands, choosing a case by its text or by its number, or formatted by ICU itself. */
export type ArgumentUse = 'plain' | 'select' | 'plural' | 'formatted'

/** An argument of a message, once for each way it is used. */
interface UsedArgument {
  readonly name: string
  readonly use: ArgumentUse
}

/** Names of the arguments of a parsed ICU message, those inside the cases of select and plural too; sorted, each once. */
export function argumentsOf(ast: Ast): readonly string[] {
  return [...new Set(usesOf(ast).map(({ name }) => name))].sort()
}

/** Every use of an argument, in the order of the text. */
export function usesOf(ast: Ast): readonly UsedArgument[] {
  return ast.flatMap((element): readonly UsedArgument[] => {
    // plain text and the # of a plural name no argument
    if (element.type === 0 || element.type === 7) return []
    const used = { name: element.value, use: useOf(element.type) }
    return 'options' in element ? [used, ...Object.values(element.options).flatMap((option) => usesOf(option.value))] : [used]
  })
}

/** Types of the elements of @formatjs/icu-messageformat-parser. */
function useOf(type: Ast[number]['type']): ArgumentUse {
  return type === 1 ? 'plain' : type === 5 ? 'select' : type === 6 ? 'plural' : 'formatted'
}
