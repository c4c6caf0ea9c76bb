import type { FormName } from '../words/forms.ts'
import { forms, formsFor, needsUnit, takesUnit } from '../words/forms.ts'
import type { Clause, Condition } from './condition.ts'
import type { Placed, Reporter } from './faults.ts'
import type { Path } from './path.ts'
import { isOfKind, kindOf, typeAt, unitOf, withoutNull } from './path-types.ts'
import type { TypeNode, TypeScope } from './path-types.ts'
import { kindWords, unitWords } from './unit-words.ts'
import type { Selection } from './selection.ts'

type At = Placed | undefined

/** Check that the findings have a path; its type, or undefined after a report. */
export function checkPath(path: Path, scope: TypeScope, at: At, reporter: Reporter): TypeNode | undefined {
  const found = typeAt(path, scope)
  if (found.known) return found.type
  reporter.report(at, 'path-unknown', `name "${found.unknown}" in path "${written(path)}"`, 'a path of the findings', found.mend)
  return undefined
}

/** Check a condition's paths, and that what a choice is compared with is one of its values. */
export function checkCondition(condition: Condition, scope: TypeScope, at: At, reporter: Reporter): void {
  for (const clause of condition.clauses) {
    const item = clause.over && checkList(clause.over.list, scope, at, reporter)
    if (clause.over && !item) continue
    checkClause(clause, item ? { ...scope, item } : scope, at, reporter)
  }
}

function checkClause(clause: Clause, scope: TypeScope, at: At, reporter: Reporter): void {
  const type = checkPath(clause.path, scope, at, reporter)
  if ('path' in clause.operand) {
    checkPath(clause.operand.path, scope, at, reporter)
    return
  }
  const choices = type && withoutNull(type).enum
  const { literal } = clause.operand
  if (!choices || literal === null || choices.includes(literal)) return
  reporter.report(at, 'condition-value-unknown', `value "${literal}" for "${written(clause.path)}"`, choices.join(', '), 'Compare with one of these.')
}

/** Check the paths of a selection; the type of one item, or undefined after a report. */
export function checkSelection(selection: Selection, scope: TypeScope, at: At, reporter: Reporter): TypeNode | undefined {
  const item = checkList(selection.of, scope, at, reporter)
  if (!item) return undefined
  if (selection.where) checkCondition(selection.where, { ...scope, item }, at, reporter)
  if (selection.against) checkKind(selection.against, 'number', { ...scope, item }, at, reporter)
  if (selection.by) checkKind(selection.by, 'number', { ...scope, item }, at, reporter)
  return item
}

function checkList(path: Path, scope: TypeScope, at: At, reporter: Reporter): TypeNode | undefined {
  const type = checkPath(path, scope, at, reporter)
  if (!type) return undefined
  const { items } = withoutNull(type)
  if (!items) reporter.report(at, 'path-not-a-list', `path "${written(path)}"`, 'a list of the findings', 'Name a list, such as venues or topics.')
  return items && withoutNull(items)
}

/** Check that a value can be written in a form. */
export function checkForm(path: Path, form: FormName, scope: TypeScope, at: At, reporter: Reporter): void {
  const type = checkKind(path, forms[form].from, scope, at, reporter)
  if (type) checkCounted(type, written(path), form, at, reporter)
}

/** Check that an item of a list can itself be written in a form. */
export function checkItem(item: TypeNode, form: FormName, at: At, reporter: Reporter): void {
  if (isOfKind(item, forms[form].from)) checkCounted(item, 'of the list', form, at, reporter)
  else reporter.report(at, 'form-unfit', `${kindWords(kindOf(item))} of the list`, `${kindWords(forms[form].from)} for this form`, 'Pick a part of it, or name another form.')
}

/** Check that a form of a list can be made from what is picked of each item, such as the sum of counts. */
export function checkPicked(pick: Path, form: FormName, scope: TypeScope, at: At, reporter: Reporter): void {
  const found = typeAt(pick, scope)
  if (found.known) checkCounted(found.type, written(pick), form, at, reporter)
}

/** A figure in points is no share, and so on: a form that would print something wrong is refused. */
function checkCounted(type: TypeNode, figure: string, form: FormName, at: At, reporter: Reporter): void {
  const unit = unitOf(type)
  if (unit === undefined || takesUnit(form, unit)) return
  const fitting = formsFor(forms[form].from, unit)
  reporter.fault(at, 'form-unit', { form, figure, unit: unitWords(unit), fitting, unitNeeded: fitting.some(needsUnit) })
}

/** Check that a form which asks what its figure is counted in is told, by a path that there is. */
export function checkUnit(named: readonly FormName[], unit: Path | undefined, scope: TypeScope, at: At, reporter: Reporter): void {
  if (unit) checkKind(unit, 'string', scope, at, reporter)
  const asking = named.find(needsUnit)
  if (asking && !unit) reporter.report(at, 'unit-missing', `form "${asking}" without a unit`, 'the path to what it is counted in', 'Add unit with the path to it: that to the kind of the metric, such as survey.kind, or grid.')
}

/** The type at a path that leads to something of a kind; undefined after a report. */
function checkKind(path: Path, kind: string, scope: TypeScope, at: At, reporter: Reporter): TypeNode | undefined {
  const type = checkPath(path, scope, at, reporter)
  if (!type || kind === 'any' || isOfKind(type, kind)) return type
  reporter.report(at, 'form-unfit', `${kindWords(kindOf(type))} "${written(path)}"`, `${kindWords(kind)} for this form`, 'Name another path, or another form.')
  return undefined
}

function written(path: Path): string {
  return path.map((step) => step.all ? `${step.key}[all]` : step.end ? `${step.key}[${step.end}]` : step.pick ? `${step.key}[${step.pick.field}=...]` : step.key).join('.')
}
