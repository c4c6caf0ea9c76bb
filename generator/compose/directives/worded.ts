import { adviceArguments, adviceParts } from '../../words/advice.ts'
import { caveatArguments, caveatParts } from '../../words/caveats.ts'
import type { WordArguments, Words } from '../../words/words.ts'
import { checkPath } from '../check-paths.ts'
import { nearest } from '../faults.ts'
import { lookUp, parsePath } from '../path.ts'
import { readPath } from '../read-selection.ts'
import type { Directive } from './directive.ts'
import { text } from './elements.ts'

/** Something of the findings that has a code and figures, and whose wording is a message for each part of it. */
interface Coded {
  readonly name: 'advice' | 'caveat'
  readonly parts: readonly string[]
  /** A key that nothing else of the findings has beside `code` and `figures`. */
  readonly mark: string
  readonly fault: { readonly code: string, readonly expected: string, readonly mend: string }
  readonly argumentsOf: (code: string, figures: Figures, words: Words) => WordArguments
}

type Figures = Readonly<Record<string, string | number>>

/** `:caveat{of="caveat" part="title"}`: the wording of a caveat, from its code and its figures. */
export const caveat = worded({
  name: 'caveat', parts: caveatParts, mark: 'severity', argumentsOf: (_code, figures, words) => caveatArguments(figures, words),
  fault: { code: 'path-not-a-caveat', expected: 'a caveat', mend: 'Name the item of a block repeated over caveats.' },
})

/** `:advice{of="piece" part="action"}`: the wording of a piece of advice, from its code and its figures. */
export const advice = worded({
  name: 'advice', parts: adviceParts, mark: 'how_many', argumentsOf: adviceArguments,
  fault: { code: 'path-not-advice', expected: 'a piece of advice', mend: 'Name the item of a block repeated over advice.' },
})

function worded({ name, parts, mark, fault, argumentsOf }: Coded): Directive {
  return {
    type: 'textDirective', name, needs: ['of', 'part'], may: [],
    check: ({ node, attributes }, scope, _context, reporter) => {
      const part = attributes['part'] ?? ''
      if (!parts.includes(part)) reporter.report(node, 'attribute-invalid', `part "${part}"`, parts.join(', '), nearest(part, parts))
      const path = readPath(attributes['of'] ?? '', node, reporter)
      const type = path && checkPath(path, scope, node, reporter)
      if (type && !(type.properties && mark in type.properties)) reporter.report(node, fault.code, `path "${attributes['of']}"`, fault.expected, fault.mend)
      return scope
    },
    fill: ({ attributes }, scope, { words }) => {
      const found = lookUp(parsePath(attributes['of'] ?? '') ?? [], scope)
      return isCoded(found) ? [text(words.say(`${name}-${found.code}-${attributes['part']}`, argumentsOf(found.code, found.figures, words)))] : []
    },
  }
}

function isCoded(value: unknown): value is { readonly code: string, readonly figures: Figures } {
  return typeof value === 'object' && value !== null && 'code' in value && 'figures' in value
}
