import type { Directive } from './directive.ts'

/** `::notes`: the place of the analyst's general note of the period; nothing where there is none. */
export const notes: Directive = {
  type: 'leafDirective', name: 'notes', needs: [], may: [],
  check: ({ node }, scope, { calls, inSection }, reporter) => {
    if (calls.notes.length > 0) reporter.fault(node, 'notes-twice', {})
    calls.notes.push(inSection)
    return scope
  },
  fill: (_use, _scope, { note }) => note(null),
}
