import remarkRehype from 'remark-rehype'
import rehypeSlug from 'rehype-slug'
import { closest } from 'fastest-levenshtein'
import type { Root } from 'mdast'
import { unified } from 'unified'
import type { Findings } from '../../model/findings/schema.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import type { Fault } from '../faults/fault.ts'
import type { Table } from '../tables/table.ts'
import type { Words } from '../words/words.ts'
import { checkMessage } from './check-message.ts'
import { checkSentences } from './check-sentences.ts'
import { checkNodes, checkTree } from './check-template.ts'
import type { Calls, CheckContext, FillContext, Included } from './directives/directive.ts'
import type { Document } from './document.ts'
import { createReporter } from './faults.ts'
import { fillNodes, fillTree } from './fill-template.ts'
import { anchorsOf, headingsOf, rehypeContents, rehypeNoDanglingLinks, rehypeUniqueIds } from './headings.ts'
import { checkNotes, noteBlock, noteFor, readNotes } from './notes.ts'
import type { Notes } from './notes.ts'
import { isRead } from './own-file.ts'
import { parseMarkdown } from './parse-markdown.ts'
import { findingsScope } from './path-types.ts'
import { sanitise } from './sanitise.ts'
import { argumentsFor, parseOwnSentences, parseSentences } from './sentences.ts'
import type { Sentences } from './sentences.ts'
import type { Template, Unread } from './template.ts'

/** What a document is made from. */
export interface Composition {
  readonly template: Template
  readonly findings: Findings
  readonly tables: readonly Table[]
  /** Names of the charts that can be drawn. */
  readonly charts: readonly string[]
  readonly words: Words
}

/**
 * Make the document: choose, order, format and word what the findings hold. No figure is computed here.
 *
 *     template ──parse──▶ trees ──check──▶ faults, or ──fill──▶ Markdown tree ──▶ HTML tree ──contents──▶ ──sanitise──▶ document
 *
 * Pure: the same in, the same out. Of the analyst's notes those of the period under review are checked and put in.
 *
 * @throws {InputFault} with everything that is wrong in the template, each fault at its file, line and column
 */
export function compose(composition: Composition): Document {
  const { words, findings, template } = composition
  const parsed = parse(template, words)
  const notes = parsed.notes.get(findings.period.name)
  const faults = [...parsed.faults, ...check(parsed, notes === undefined ? [] : [notes], composition)]
  if (faults.length > 0) throw new InputFault(faults)
  const tree = toHtml(fill(parsed, notes, composition))
  return {
    tree, lang: words.locale, headings: headingsOf(tree),
    title: words.say('document-title', argumentsFor(parsed.sentences.get('document-title'), { findings, names: {} }, words)),
  }
}

/**
 * What compose would find wrong, and in the notes of every period.
 *
 * @throws {InputFault} with all of it
 */
export function requireSound(composition: Composition): void {
  const parsed = parse(composition.template, composition.words)
  const faults = [...parsed.faults, ...check(parsed, [...parsed.notes.values()], composition)]
  if (faults.length > 0) throw new InputFault(faults)
}

interface Parsed {
  readonly review: Root
  readonly house: Root
  readonly sections: ReadonlyMap<string, Root>
  readonly included: ReadonlyMap<string, Included | Unread>
  readonly notes: ReadonlyMap<string, Notes>
  readonly sentences: Sentences
  /** Those of the account's own words among them. */
  readonly ownSentences: Sentences
  readonly faults: readonly Fault[]
}

function parse(template: Template, { own }: Words): Parsed {
  const faults: Fault[] = []
  const sentences = parseSentences(template.sentences.text, createReporter(template.sentences.place, faults))
  const ownSentences: Sentences = own === undefined ? new Map() : parseOwnSentences(own, createReporter(own.place, faults))
  const included = Object.entries(template.included).map(([path, file]) => [path, isRead(file) ? { place: file.place, tree: parseMarkdown(file) } : file] as const)
  return {
    review: parseMarkdown(template.review),
    house: parseMarkdown(template.house),
    sections: new Map(Object.entries(template.sections).map(([name, source]) => [name, parseMarkdown(source)])),
    included: new Map(included),
    notes: new Map(Object.entries(template.notes).map(([period, source]) => [period, readNotes(source.place, parseMarkdown(source))])),
    sentences: new Map([...sentences, ...ownSentences]), ownSentences,
    faults,
  }
}

function check(parsed: Parsed, notes: readonly Notes[], { template, tables, charts, words }: Composition): readonly Fault[] {
  const { sentences, included } = parsed
  const [sections, house] = [[...parsed.sections.keys()], parsed.house.children]
  const trees = [parsed.review, ...parsed.sections.values(), ...[...included.values()].flatMap((file) => 'tree' in file ? [file.tree] : [])]
  const anchors = new Set([...sections, ...trees.flatMap(anchorsOf)])
  const calls: Calls = { sections: new Set(), notes: [], inclusions: 0 }
  const context: CheckContext = { words, sentences, charts, tables, sections, house, included, anchors, calls, inSection: null, within: [], inNote: false, check: checkNodes }
  const faults: Fault[] = []
  const ofSentences = createReporter(template.sentences.place, faults)
  checkSentences(new Map([...sentences].filter(([message]) => !parsed.ownSentences.has(message))), words, ofSentences)
  if (words.own) checkSentences(parsed.ownSentences, words, createReporter(words.own.place, faults))
  checkMessage('document-title', findingsScope, context, undefined, ofSentences)
  faults.push(...checkTree(parsed.review, template.review.place, findingsScope, context))
  const places = new Map(Object.entries(template.sections).map(([name, { place }]) => [name, place]))
  for (const [name, tree] of parsed.sections) faults.push(...checkTree(tree, places.get(name) ?? name, findingsScope, { ...context, inSection: name }))
  for (const name of template.ownSections.filter((name) => !calls.sections.has(name))) {
    faults.push(faultOf('section-unused', places.get(name) ?? name, { name, nearest: closest(name, sections.filter((other) => !template.ownSections.includes(other))) }))
  }
  return onceEach([...faults, ...notes.flatMap((file) => checkNotes(file, context))])
}

/** A file that is put in at two places has its faults but once. */
function onceEach(faults: readonly Fault[]): readonly Fault[] {
  return [...new Map(faults.map((fault) => [`${fault.place} ${fault.message}`, fault])).values()]
}

function fill(parsed: Parsed, notes: Notes | undefined, { findings, tables, words }: Composition): Root {
  const scope = { findings, names: {} }
  const context: FillContext = {
    words, tables, sentences: parsed.sentences, house: parsed.house.children, included: parsed.included,
    section: (name) => fillNodes(parsed.sections.get(name)?.children ?? [], scope, context),
    note: (section) => noteBlock(notes === undefined ? [] : fillNodes(noteFor(notes, section), scope, context), words),
    fill: (nodes, inner) => fillNodes(nodes, inner, context),
  }
  return fillTree(parsed.review, scope, context)
}

function toHtml(tree: Root): Document['tree'] {
  const pipeline = unified().use(remarkRehype).use(rehypeSlug).use(rehypeUniqueIds).use(rehypeContents).use(rehypeNoDanglingLinks)
  return sanitise(pipeline.runSync(tree))
}
