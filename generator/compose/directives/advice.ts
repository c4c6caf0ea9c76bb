import { adviceArguments, adviceParts } from '../../words/advice.ts'
import { checkPath } from '../check-paths.ts'
import { nearest } from '../faults.ts'
import { lookUp, parsePath } from '../path.ts'
import { readPath } from '../read-selection.ts'
import type { Directive } from './directive.ts'
import { text } from './elements.ts'

/** `:advice{of="piece" part="action"}`: the wording of a piece of advice, from its code and its figures. */
export const advice: Directive = {
  type: 'textDirective', name: 'advice', needs: ['of', 'part'], may: [],
  check: ({ node, attributes }, scope, _context, reporter) => {
    const part = attributes['part'] ?? ''
    if (!adviceParts.some((known) => known === part)) reporter.report(node, 'attribute-invalid', `part "${part}"`, adviceParts.join(', '), nearest(part, adviceParts))
    const path = readPath(attributes['of'] ?? '', node, reporter)
    const type = path && checkPath(path, scope, node, reporter)
    if (type && !(type.properties && 'how_many' in type.properties)) {
      reporter.report(node, 'path-not-advice', `path "${attributes['of']}"`, 'a piece of advice', 'Name the item of a block repeated over advice.')
    }
    return scope
  },
  fill: ({ attributes }, scope, { words }) => {
    const found = lookUp(parsePath(attributes['of'] ?? '') ?? [], scope)
    return isAdvice(found) ? [text(words.say(`advice-${found.code}-${attributes['part']}`, adviceArguments(found.code, found.figures, words)))] : []
  },
}

function isAdvice(value: unknown): value is { readonly code: string, readonly figures: Record<string, string | number> } {
  return typeof value === 'object' && value !== null && 'code' in value && 'how_many' in value && 'figures' in value
}
