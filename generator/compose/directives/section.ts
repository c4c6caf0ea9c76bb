import { nearest } from '../faults.ts'
import type { Directive } from './directive.ts'
import { wrapped } from './elements.ts'

/**
 * `::section{name="opinion"}`: a file of the folder `sections`, and the analyst's note beside it. Only the review itself lists sections, each
 * once; one in which nothing applies this time is left out.
 */
export const section: Directive = {
  type: 'leafDirective', name: 'section', needs: ['name'], may: [],
  check: ({ node, attributes }, scope, context, reporter) => {
    const name = attributes['name'] ?? ''
    if (context.inSection !== null) {
      reporter.report(node, 'section-nested', `section "${name}" inside a section`, 'it in the list of the review', 'Move it there.')
    } else if (!context.sections.includes(name)) {
      reporter.report(node, 'section-unknown', `section "${name}"`, 'a file of the folder sections', nearest(name, context.sections))
    } else if (context.calls.sections.has(name)) reporter.fault(node, 'section-twice', { name })
    else context.calls.sections.add(name)
    return scope
  },
  fill: ({ attributes }, _scope, context) => {
    const name = attributes['name'] ?? ''
    const content = [...context.section(name), ...context.note(name)]
    return content.length === 0 ? [] : [wrapped('section', { id: name, className: ['section', `section-${name}`] }, content)]
  },
}
