import { lookUp, parsePath } from './path.ts'
import type { Path, Scope } from './path.ts'

/**
 * Conditions on the findings, all that a template may ask:
 *
 *     CLAUSE                        opinion.previous exists
 *     CLAUSE and CLAUSE and ...     opinion.movement is up and venues exists
 *     CLAUSE or CLAUSE or ...       (`and` and `or` are not mixed)
 *     some LIST: CLAUSE             some caveats: severity is serious
 *     no LIST: CLAUSE               no caveats: severity is serious
 *
 * A clause is `PATH exists`, `PATH missing`, or `PATH OPERATOR VALUE`; operators are `is`, `is not`, `<`, `<=`, `>`, `>=`;
 * a value is a number, true, false, a word, 'words in quotes', or `@PATH`. Null, an empty list and an empty text do not exist.
 * Every condition has an answer: comparing with what does not exist, or a word with a number, is false.
 */
export interface Condition {
  readonly joined: 'and' | 'or'
  readonly clauses: readonly Clause[]
}

export interface Clause {
  readonly over?: { readonly every: 'some' | 'no', readonly list: Path }
  readonly path: Path
  readonly operator: Operator
  readonly operand: Operand
}

type Operator = 'exists' | 'missing' | 'is' | 'is not' | '<' | '<=' | '>' | '>='
export type Operand = { readonly literal: string | number | boolean | null } | { readonly path: Path }

/** Read a condition; undefined where the text is none. */
export function parseCondition(text: string): Condition | undefined {
  const words = text.match(/'[^']*'|<=|>=|<|>|:|(?:[^\s:<>'[]|\[[^\]]*\])+/g) ?? []
  const joins = new Set(words.filter((word) => word === 'and' || word === 'or'))
  if (joins.size > 1) return undefined
  const joined = joins.has('or') ? 'or' : 'and'
  const clauses = splitAt(words, joined).map(parseClause)
  return clauses.every((clause) => clause !== undefined) ? { joined, clauses } : undefined
}

function splitAt(words: readonly string[], join: string): readonly (readonly string[])[] {
  return words.reduce<string[][]>((groups, word) => {
    if (word === join) return [...groups, []]
    groups.at(-1)?.push(word)
    return groups
  }, [[]])
}

function parseClause(words: readonly string[]): Clause | undefined {
  const [every, list, colon, ...rest] = words
  if ((every === 'some' || every === 'no') && list !== undefined && colon === ':') {
    const [inner, path] = [parseClause(rest), parsePath(list)]
    return inner && path && !inner.over ? { ...inner, over: { every, list: path } } : undefined
  }
  const path = parsePath(words[0] ?? '')
  if (!path) return undefined
  const [, verb, ...after] = words
  if ((verb === 'exists' || verb === 'missing') && after.length === 0) return { path, operator: verb, operand: { literal: null } }
  const operator = verb === 'is' && after[0] === 'not' ? 'is not' : verb
  const operand = parseOperand(operator === 'is not' ? after.slice(1) : after)
  return operand && isComparison(operator) ? { path, operator, operand } : undefined
}

function isComparison(word: string | undefined): word is Operator {
  return word !== undefined && ['is', 'is not', '<', '<=', '>', '>='].includes(word)
}

function parseOperand(words: readonly string[]): Operand | undefined {
  const [word] = words
  if (word === undefined || words.length > 1) return undefined
  if (word.startsWith('@')) {
    const path = parsePath(word.slice(1))
    return path && { path }
  }
  if (word.startsWith('\'')) return { literal: word.slice(1, -1) }
  if (word === 'true' || word === 'false') return { literal: word === 'true' }
  return { literal: Number.isNaN(Number(word)) ? word : Number(word) }
}

/** Whether a condition holds. */
export function holds(condition: Condition, scope: Scope): boolean {
  const answers = condition.clauses.map((clause) => clauseHolds(clause, scope))
  return condition.joined === 'and' ? answers.every(Boolean) : answers.some(Boolean)
}

function clauseHolds(clause: Clause, scope: Scope): boolean {
  if (!clause.over) return compares(clause, scope)
  const list = lookUp(clause.over.list, scope)
  const some = Array.isArray(list) && list.some((item: unknown) => compares(clause, { ...scope, item }))
  return clause.over.every === 'some' ? some : !some
}

function compares({ path, operator, operand }: Clause, scope: Scope): boolean {
  const value = lookUp(path, scope)
  const there = exists(value)
  if (operator === 'exists' || operator === 'missing') return there === (operator === 'exists')
  const other = 'path' in operand ? lookUp(operand.path, scope) : operand.literal
  if (operator === 'is') return there && value === other
  if (operator === 'is not') return there && value !== other
  if (typeof value !== 'number' || typeof other !== 'number') return false
  if (operator === '<') return value < other
  if (operator === '<=') return value <= other
  return operator === '>' ? value > other : value >= other
}

function exists(value: unknown): boolean {
  return value !== undefined && value !== null && value !== '' && !(Array.isArray(value) && value.length === 0)
}
