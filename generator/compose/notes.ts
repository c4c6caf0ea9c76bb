import type { Heading, Root, RootContent } from 'mdast'
import { h } from 'hastscript'
import type { Fault } from '../faults/fault.ts'
import type { Words } from '../words/words.ts'
import { slipsIn } from './check-slips.ts'
import { checkNodes } from './check-template.ts'
import type { CheckContext } from './directives/directive.ts'
import { standing, wrapped } from './directives/elements.ts'
import { createReporter, nearest } from './faults.ts'
import { plainText } from './headings.ts'
import { findingsScope } from './path-types.ts'
import type { Source } from './template.ts'

/** The analyst's words for one period. */
export interface Notes {
  readonly place: string
  /** What was taken for text in it and was not meant so. */
  readonly slips: readonly Fault[]
  /** What stands before the first heading of the first level. */
  readonly general: readonly RootContent[]
  /** Each heading of the first level names a section; what follows it stands at the end of that one. */
  readonly beside: readonly { readonly heading: Heading, readonly section: string, readonly content: readonly RootContent[] }[]
}

/** Cut a file of notes at its headings of the first level. */
export function readNotes(source: Source, tree: Root): Notes {
  const cuts = tree.children.flatMap((node, at) => (node.type === 'heading' && node.depth === 1 ? [{ heading: node, at }] : []))
  return {
    place: source.place, slips: slipsIn(source, tree), general: tree.children.slice(0, cuts[0]?.at),
    beside: cuts.map(({ heading, at }, index) => ({ heading, section: plainText(heading).trim(), content: tree.children.slice(at + 1, cuts[index + 1]?.at) })),
  }
}

/** Everything that is wrong in a file of notes, once it is known which sections the review calls. */
export function checkNotes({ place, slips, general, beside }: Notes, context: CheckContext): readonly Fault[] {
  const faults: Fault[] = []
  const [reporter, { calls }] = [createReporter(place, faults), context]
  const placed = calls.notes.some((section) => section === null || calls.sections.has(section))
  if (general[0] && !placed) reporter.fault(general[0], 'note-unplaced', {})
  for (const { heading, section } of beside.filter(({ section }) => !calls.sections.has(section))) {
    reporter.fault(heading, 'note-section-unknown', { name: section, nearest: nearest(section, [...calls.sections]) })
  }
  checkNodes([...general, ...beside.flatMap(({ content }) => content)], findingsScope, { ...context, inNote: true }, reporter)
  return [...slips, ...faults]
}

/** The note beside a section, or the general one (null). */
export function noteFor({ general, beside }: Notes, section: string | null): readonly RootContent[] {
  return (section === null ? general : beside.filter((note) => note.section === section).flatMap(({ content }) => content)).map(lowered)
}

/** A heading of a note stands below that of its section. */
function lowered(node: RootContent): RootContent {
  return node.type === 'heading' ? { ...node, depth: Math.min(node.depth + 1, 4) as Heading['depth'] } : node
}

/** A note as it stands in the review: told apart from what the program says. */
export function noteBlock(content: readonly RootContent[], words: Words): readonly RootContent[] {
  if (content.length === 0) return []
  const overline = words.say('note-overline')
  return [wrapped('div', { className: ['analyst-note'], role: 'note', ariaLabel: overline }, [standing(h('p.note-overline', overline)), ...content])]
}
