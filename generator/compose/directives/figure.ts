import { formNames, isFormName, write } from '../../words/forms.ts'
import { checkForm, checkUnit } from '../check-paths.ts'
import { nearest } from '../faults.ts'
import { lookUp, parsePath } from '../path.ts'
import { readPath } from '../read-selection.ts'
import type { Directive } from './directive.ts'
import { text } from './elements.ts'

/** `:figure{of="opinion.change.mean" as="change"}`: one figure of the findings, written in a form. */
export const figure: Directive = {
  type: 'textDirective', name: 'figure', needs: ['of', 'as'], may: [],
  check: ({ node, attributes }, scope, _context, reporter) => {
    const form = attributes['as'] ?? ''
    const path = readPath(attributes['of'] ?? '', node, reporter)
    if (!isFormName(form)) reporter.report(node, 'form-unknown', `form "${form}"`, 'a known form', nearest(form, formNames))
    else {
      if (path) checkForm(path, form, scope, node, reporter)
      checkUnit([form], undefined, scope, node, reporter)
    }
    return scope
  },
  fill: ({ attributes }, scope, { words }) => {
    const form = attributes['as'] ?? ''
    return [text(isFormName(form) ? write(lookUp(parsePath(attributes['of'] ?? '') ?? [], scope), form, words) : '')]
  },
}
