import { unreadFault } from '../own-file.ts'
import type { Directive } from './directive.ts'

/** How many files may stand inside one another, and how many times a review may put one in. */
const deepest = 8
const most = 200

/** `::include{file="texts/approach.md"}`: Markdown of the account, with its directives, in its place; the path is one of the account folder. */
export const include: Directive = {
  type: 'leafDirective', name: 'include', needs: ['file'], may: [],
  check: ({ node, attributes }, scope, context, reporter) => {
    const path = attributes['file'] ?? ''
    const found = context.included.get(path) ?? { place: path, unread: 'absent' as const }
    context.calls.inclusions += 1
    if ('unread' in found) reporter.add(unreadFault(found, reporter.placeOf(node)))
    else if (context.within.includes(found.place)) reporter.fault(node, 'include-circular', { path })
    else if (context.within.length >= deepest) reporter.fault(node, 'include-deep', { path, most: deepest })
    else if (context.calls.inclusions > most) {
      if (context.calls.inclusions === most + 1) reporter.fault(node, 'include-many', { most })
    } else context.check(found.tree.children, scope, { ...context, within: [...context.within, found.place] }, reporter.of(found.place))
    return scope
  },
  fill: ({ attributes }, scope, context) => {
    const found = context.included.get(attributes['file'] ?? '')
    return found === undefined || 'unread' in found ? [] : context.fill(found.tree.children, scope, context.reporter.of(found.place))
  },
}
