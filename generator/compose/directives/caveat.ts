import { caveatArguments, caveatParts } from '../../words/caveats.ts'
import { checkPath } from '../check-paths.ts'
import { nearest } from '../faults.ts'
import { lookUp, parsePath } from '../path.ts'
import { readPath } from '../read-selection.ts'
import type { Directive } from './directive.ts'
import { text } from './elements.ts'

/** `:caveat{of="caveat" part="title"}`: the wording of a caveat, from its code and its figures. */
export const caveat: Directive = {
  type: 'textDirective', name: 'caveat', needs: ['of', 'part'], may: [],
  check: ({ node, attributes }, scope, _context, reporter) => {
    const part = attributes['part'] ?? ''
    if (!caveatParts.some((known) => known === part)) reporter.report(node, 'attribute-invalid', `part "${part}"`, caveatParts.join(', '), nearest(part, caveatParts))
    const path = readPath(attributes['of'] ?? '', node, reporter)
    const type = path && checkPath(path, scope, node, reporter)
    if (type && !(type.properties && 'severity' in type.properties)) {
      reporter.report(node, 'path-not-a-caveat', `path "${attributes['of']}"`, 'a caveat', 'Name the item of a block repeated over caveats.')
    }
    return scope
  },
  fill: ({ attributes }, scope, { words }) => {
    const found = lookUp(parsePath(attributes['of'] ?? '') ?? [], scope)
    if (!isCaveat(found)) return []
    return [text(words.say(`caveat-${found.code}-${attributes['part']}`, caveatArguments(found.figures, words)))]
  },
}

function isCaveat(value: unknown): value is { readonly code: string, readonly figures: Record<string, string | number> } {
  return typeof value === 'object' && value !== null && 'code' in value && 'figures' in value
}
