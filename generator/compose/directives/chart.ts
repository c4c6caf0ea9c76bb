import { h } from 'hastscript'
import { argumentsFor } from '../sentences.ts'
import { checkMessage } from '../check-message.ts'
import { nearest } from '../faults.ts'
import type { Reporter } from '../faults.ts'
import type { Directive, Use } from './directive.ts'
import { standing } from './elements.ts'
import { checkMade, madeLink } from './made-link.ts'

const parts = ['title', 'note', 'alt'] as const
type Part = (typeof parts)[number]

/**
 * `::chart{name="opinion" made="made-opinion"}`: the place of a chart. Its title states the finding, its text alternative is computed; `made`
 * leads to the paragraph that says how it is made. A chart of the account has no messages, unless its words have them: then `title`, `alt` and,
 * if it needs one, `note` (how to read it) are given here.
 */
export const chart: Directive = {
  type: 'leafDirective', name: 'chart', needs: ['name'], may: ['made', ...parts],
  check: (use, scope, context, reporter) => {
    const { node, attributes } = use
    const name = attributes['name'] ?? ''
    context.calls.charts.add(name)
    if (!context.charts.includes(name)) reporter.report(node, 'chart-unknown', `chart "${name}"`, 'a chart of the house or of the account', nearest(name, context.charts))
    else {
      for (const part of parts) {
        const given = attributes[part]
        if (given === undefined && context.words.has(messageOf(use, part))) checkMessage(messageOf(use, part), scope, context, node, reporter)
        else if (given?.trim() === '' || (given === undefined && part !== 'note')) missing(use, part, reporter)
      }
    }
    checkMade(attributes['made'], node, context, reporter)
    return scope
  },
  fill: (use, scope, { words, sentences }) => {
    const say = (part: Part) => {
      const message = messageOf(use, part)
      return use.attributes[part] ?? (words.has(message) ? words.say(message, argumentsFor(sentences.get(message), scope, words)) : undefined)
    }
    const note = say('note')
    return [standing(h('figure.chart', { role: 'group', dataChart: use.attributes['name'] ?? '', dataAlt: say('alt') ?? '' }, [
      h('figcaption', [
        h('strong.finding', say('title') ?? ''),
        ...(note === undefined ? [] : [' ', h('span.reading', note)]), ...madeLink(use.attributes['made'], words),
      ]),
    ]))]
  },
}

function messageOf({ attributes }: Use, part: Part): string {
  return `chart-${attributes['name'] ?? ''}-${part}`
}

function missing(use: Use, part: Part, reporter: Reporter): void {
  reporter.report(use.node, 'attribute-missing', `"chart" without "${part}"`, part === 'alt' ? 'what the picture shows, for those who do not see it' : 'words beside the picture',
    `Add ${part}="...", or the message ${messageOf(use, part)} to the words of the account.`)
}
