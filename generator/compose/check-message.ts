import { checkForm, checkItem, checkPicked, checkSelection, checkUnit } from './check-paths.ts'
import type { CheckContext } from './directives/directive.ts'
import { nearest } from './faults.ts'
import type { Placed, Reporter } from './faults.ts'
import type { TypeScope } from './path-types.ts'
import { kindOf } from './path-types.ts'
import type { Argument } from './sentences.ts'
import { forms } from '../words/forms.ts'

/** Check a message where it is used: the catalogue has it, and its sentence's figures exist in that scope. */
export function checkMessage(message: string, scope: TypeScope, context: Pick<CheckContext, 'words' | 'sentences'>, at: Placed | undefined, reporter: Reporter): void {
  if (!context.words.has(message)) {
    reporter.report(at, 'message-unknown', `message "${message}"`, `a message of the catalogue ${context.words.language}`, nearest(message, context.words.keys))
    return
  }
  const sentence = context.sentences.get(message)
  if (!sentence && context.words.argumentsOf(message).length > 0) {
    reporter.report(at, 'sentence-missing', `message "${message}" without a sentence`, `its arguments ${context.words.argumentsOf(message).join(', ')}`, 'Declare them in sentences.yaml.')
  }
  for (const argument of Object.values(sentence?.arguments ?? {})) {
    // an account's own sentence is mended where it is declared, the house's can only be used elsewhere
    if (sentence?.place === undefined) checkArgument(argument, scope, at, reporter)
    else checkArgument(argument, scope, argument, reporter.of(sentence.place))
  }
}

function checkArgument(argument: Argument, scope: TypeScope, at: Placed | undefined, reporter: Reporter): void {
  if (!argument.selection) {
    checkUnit([argument.as], argument.unit, scope, at, reporter)
    checkForm(argument.of, argument.as, scope, at, reporter)
    return
  }
  const item = checkSelection(argument.selection, scope, at, reporter)
  if (!item) return
  checkUnit([argument.as, argument.write ?? argument.as], argument.unit, { ...scope, item }, at, reporter)
  if (argument.pick) checkForm(argument.pick, argument.write ?? 'code', { ...scope, item }, at, reporter)
  else if (argument.write) checkItem(item, argument.write, at, reporter)
  if (argument.pick && !argument.write) checkPicked(argument.pick, argument.as, { ...scope, item }, at, reporter)
  if (forms[argument.as].from !== 'list') {
    reporter.report(at, 'form-unfit', `form "${argument.as}" of a selection`, 'list or length', `Write as: list, or name one ${kindOf(item)} by its path.`)
  }
}
