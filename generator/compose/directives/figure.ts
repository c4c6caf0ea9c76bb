import { formNames, isFormName, write } from '../../words/forms.ts'
import { checkForm, checkUnit } from '../check-paths.ts'
import { nearest } from '../faults.ts'
import { lookUp, missingItem, parsePath } from '../path.ts'
import { readPath } from '../read-selection.ts'
import type { Directive } from './directive.ts'
import { text } from './elements.ts'

/**
 * `:figure{of="opinion.change.mean" as="change"}`: one figure of the findings, written in a form; `unit` is the path to what it is counted in, where
 * its form asks for that: `:figure{of="survey.next_wave.last" as="measure" unit="survey.kind"}`.
 */
export const figure: Directive = {
  type: 'textDirective', name: 'figure', needs: ['of', 'as'], may: ['unit'],
  check: ({ node, attributes }, scope, _context, reporter) => {
    const form = attributes['as'] ?? ''
    const path = readPath(attributes['of'] ?? '', node, reporter)
    if (!isFormName(form)) reporter.report(node, 'form-unknown', `form "${form}"`, 'a known form', nearest(form, formNames))
    else {
      if (path) checkForm(path, form, scope, node, reporter)
      const unit = attributes['unit'] === undefined ? undefined : readPath(attributes['unit'], node, reporter)
      if (attributes['unit'] === undefined || unit) checkUnit([form], unit, scope, node, reporter)
    }
    return scope
  },
  fill: ({ node, attributes }, scope, { words, reporter }) => {
    const [of, path] = [attributes['of'] ?? '', parsePath(attributes['of'] ?? '') ?? []]
    const missing = missingItem(path, scope)
    if (missing) reporter.fault(node, 'item-absent', { path: of, ...missing })
    const [form, unit] = [attributes['as'] ?? '', lookUp(parsePath(attributes['unit'] ?? '') ?? [], scope)]
    return [text(isFormName(form) ? write(lookUp(path, scope), form, words, typeof unit === 'string' ? unit : '') : '')]
  },
}
