import { blocks } from './blocks.ts'
import { chart } from './chart.ts'
import { contents } from './contents.ts'
import type { Directive, DirectiveNode } from './directive.ts'
import { each } from './each.ts'
import { figure } from './figure.ts'
import { glossary } from './glossary.ts'
import { house } from './house.ts'
import { include } from './include.ts'
import { made } from './made.ts'
import { notes } from './notes.ts'
import { say } from './say.ts'
import { section } from './section.ts'
import { table } from './table.ts'
import { when } from './when.ts'
import { advice, caveat } from './worded.ts'

/** The template language: every word it has. */
const directives: readonly Directive[] = [section, house, include, notes, figure, say, made, caveat, advice, chart, table, contents, glossary, when, each, ...blocks]

export function directiveOf(node: DirectiveNode): Directive | undefined {
  return directives.find(({ type, name }) => type === node.type && name === node.name)
}

/** Every name, whatever its type. */
export const allNames: readonly string[] = [...new Set(directives.map(({ name }) => name))]

/** How a directive of a name is begun: `:figure`, `::chart`, `:::note`; undefined where there is none. */
export function formOf(name: string): string | undefined {
  const found = directives.find((directive) => directive.name === name)
  return found && `${colonsOf[found.type]}${name}`
}

const colonsOf = { textDirective: ':', leafDirective: '::', containerDirective: ':::' } as const

/** Names that a directive of the type may have. */
export function namesOf(type: Directive['type']): readonly string[] {
  return directives.filter((directive) => directive.type === type).map(({ name }) => name)
}
