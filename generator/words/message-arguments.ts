import type { IntlMessageFormat } from 'intl-messageformat'

type Ast = ReturnType<IntlMessageFormat['getAst']>

/** Names of the arguments of a parsed ICU message, those inside the cases of select and plural too; sorted, each once. */
export function argumentsOf(ast: Ast): readonly string[] {
  return [...new Set(ast.flatMap(namesOf))].sort()
}

function namesOf(element: Ast[number]): readonly string[] {
  if ('options' in element) return [element.value, ...Object.values(element.options).flatMap((option) => argumentsOf(option.value))]
  return isLiteral(element) ? [] : [element.value]
}

/** Plain text and the `#` of a plural name no argument. */
function isLiteral(element: Ast[number]): element is Extract<Ast[number], { readonly type: 0 | 7 }> {
  return element.type === 0 || element.type === 7
}
