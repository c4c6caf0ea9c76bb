import { checkSelection } from '../check-paths.ts'
import { readSelection, selectionKeys } from '../read-selection.ts'
import { selected } from '../selection.ts'
import { createReporter } from '../faults.ts'
import type { Directive } from './directive.ts'

/** `:::each{of="venues" as="venue" where="movement is down" by="mentions" most=3}`: its block once per item. */
export const each: Directive = {
  type: 'containerDirective', name: 'each', needs: ['of', 'as'], may: selectionKeys.filter((key) => key !== 'of'),
  check: ({ node, attributes }, scope, _context, reporter) => {
    const name = attributes['as'] ?? ''
    const selection = readSelection(attributes, node, reporter)
    if (!/^[a-z][a-z-]*$/.test(name) || scope.findings.properties?.[name]) {
      reporter.report(node, 'attribute-invalid', `name "${name}" of an item`, 'a word in lower case that the findings do not use', 'Write it like as="venue".')
    }
    const item = selection && checkSelection(selection, scope, node, reporter)
    return { ...scope, names: { ...scope.names, [name]: item ?? anything } }
  },
  fill: ({ node, attributes }, scope, _context, children) => {
    const selection = readSelection(attributes, node, createReporter('', []))
    const items = selection ? selected(selection, scope) : []
    return items.flatMap((item) => children({ ...scope, names: { ...scope.names, [attributes['as'] ?? '']: item } }))
  },
}

/** After a fault in the list itself its items are not faulted again: every name below is taken as known. */
const anything: { readonly additionalProperties: object } = { additionalProperties: {} }
