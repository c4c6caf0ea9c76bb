import { h } from 'hastscript'
import { argumentsFor } from '../sentences.ts'
import { checkMessage } from '../check-message.ts'
import { nearest } from '../faults.ts'
import type { Directive } from './directive.ts'
import { standing } from './elements.ts'
import { checkMade, madeLink } from './made-link.ts'

/**
 * `::chart{name="opinion" made="made-opinion"}`: the place of a chart. Its title states the finding, its text alternative is
 * computed; `made` leads to the paragraph that says how it is made.
 */
export const chart: Directive = {
  type: 'leafDirective', name: 'chart', needs: ['name'], may: ['made'],
  check: ({ node, attributes }, scope, context, reporter) => {
    const name = attributes['name'] ?? ''
    if (!context.charts.includes(name)) reporter.report(node, 'chart-unknown', `chart "${name}"`, 'a chart of templates/charts', nearest(name, context.charts))
    else for (const part of ['title', 'note', 'alt']) checkMessage(`chart-${name}-${part}`, scope, context, node, reporter)
    checkMade(attributes['made'], node, context, reporter)
    return scope
  },
  fill: ({ attributes }, scope, { words, sentences }) => {
    const name = attributes['name'] ?? ''
    const say = (message: string) => words.say(message, argumentsFor(sentences.get(message), scope, words))
    return [standing(h('figure.chart', { role: 'group', dataChart: name, dataAlt: say(`chart-${name}-alt`) }, [
      h('figcaption', [
        h('strong.finding', say(`chart-${name}-title`)), ' ',
        h('span.reading', say(`chart-${name}-note`)), ...madeLink(attributes['made'], words),
      ]),
    ]))]
  },
}
