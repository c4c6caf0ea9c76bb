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
import { slipsIn } from './check-slips.ts'
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
import type { Source, Template, Unread } from './template.ts'

/** What a document is made from. */
export interface Composition {
  readonly template: Template
  readonly findings: Findings
  readonly tables: readonly Table[]
  /** Names of the charts that can be drawn. */
  readonly charts: readonly string[]
  /** Those of them that are files of the account, each with its file: the review must call them. */
  readonly ownCharts?: ReadonlyMap<string, string>
  readonly words: Words
}

/**
 * Make the document: choose, order, format and word what the findings hold. No figure is computed here.
 *
 *     template ──parse──▶ trees ──check──▶ faults, or ──fill──▶ Markdown tree ──▶ HTML tree ──contents──▶ ──sanitise──▶ document
 *
 * Pure: the same in, the same out. Of the analyst's notes those of the period under review are checked and put in.
 *
 * @throws {InputFault} with everything that is wrong in the template, each fault at its file, line and column; and figures that pick an item which the findings do not hold
 */
export function compose(composition: Composition): Document {
  const { words, findings, template } = composition
  const parsed = parse(template, words)
  const notes = parsed.notes.get(findings.period.name)
  const faults = check(parsed, notes === undefined ? [] : [notes], composition)
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
  const faults = check(parsed, [...parsed.notes.values()], composition)
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
  const read = (source: Source) => {
    const tree = parseMarkdown(source)
    faults.push(...slipsIn(source, tree))
    return tree
  }
  return {
    review: read(template.review),
    house: parseMarkdown(template.house),
    sections: new Map(Object.entries(template.sections).map(([name, source]) => [name, read(source)])),
    included: new Map(Object.entries(template.included).map(([path, file]) => [path, isRead(file) ? { place: file.place, tree: read(file) } : file])),
    notes: new Map(Object.entries(template.notes).map(([period, source]) => [period, readNotes(source, parseMarkdown(source))])),
    sentences: new Map([...sentences, ...ownSentences]), ownSentences,
    faults,
  }
}

function check(parsed: Parsed, notes: readonly Notes[], { template, tables, charts, ownCharts = new Map(), words }: Composition): readonly Fault[] {
  const { sentences, included } = parsed
  const [sections, house] = [[...parsed.sections.keys()], parsed.house.children]
  const trees = [parsed.review, ...parsed.sections.values(), ...[...included.values()].flatMap((file) => 'tree' in file ? [file.tree] : [])]
  const anchors = new Set([...sections, ...trees.flatMap(anchorsOf)])
  const shared = { words, sentences, charts, tables, sections, house, included, anchors, within: [], inNote: false, check: checkNodes }
  const called = sectionsCalled(parsed.review, { ...shared, leftOut: new Set(), inSection: null })
  const present = new Set([...called, ...trees.filter((tree) => ![...parsed.sections].some(([name, section]) => section === tree && !called.has(name))).flatMap(anchorsOf)])
  const leftOut = new Set([...anchors].filter((anchor) => !present.has(anchor)))
  const calls = noCalls()
  const context: CheckContext = { ...shared, anchors: present, leftOut, calls, inSection: null }
  const faults: Fault[] = []
  const ofSentences = createReporter(template.sentences.place, faults)
  checkSentences(new Map([...sentences].filter(([message]) => !parsed.ownSentences.has(message))), words, ofSentences)
  if (words.own) checkSentences(parsed.ownSentences, words, createReporter(words.own.place, faults))
  checkMessage('document-title', findingsScope, context, undefined, ofSentences)
  faults.push(...checkTree(parsed.review, template.review.place, findingsScope, context))
  const places = new Map(Object.entries(template.sections).map(([name, { place }]) => [name, place]))
  for (const [name, tree] of parsed.sections) {
    // what the house says of a section that is left out falls away with it
    const reach = template.ownSections.includes(name) ? {} : { anchors, leftOut: new Set<string>() }
    faults.push(...checkTree(tree, places.get(name) ?? name, findingsScope, { ...context, ...reach, inSection: name, ...(!calls.sections.has(name) && { calls: noCalls() }) }))
  }
  for (const [name, place] of ownCharts) if (!calls.charts.has(name)) faults.push(faultOf('chart-unused', place, { name }))
  for (const name of template.ownSections.filter((name) => !calls.sections.has(name))) {
    faults.push(faultOf('section-unused', places.get(name) ?? name, { name, nearest: closest(name, sections.filter((other) => !template.ownSections.includes(other))) }))
  }
  return onceEach(withoutSequels([...parsed.faults, ...faults, ...notes.flatMap((file) => checkNotes(file, context))]))
}

function noCalls(): Calls {
  return { sections: new Set(), charts: new Set(), notes: [], inclusions: 0 }
}

/** Which sections a review calls, found before links are looked at: they may lead to one that is called further down. */
function sectionsCalled(review: Root, context: Omit<CheckContext, 'calls'>): ReadonlySet<string> {
  const calls = noCalls()
  checkTree(review, '', findingsScope, { ...context, calls })
  return calls.sections
}

/** A directive that was mistaken for text has no other faults at its place. */
function withoutSequels(faults: readonly Fault[]): readonly Fault[] {
  const slips = new Set(faults.filter(({ code }) => code === 'directive-slip').map(({ place }) => place))
  return faults.filter(({ code, place }) => code === 'directive-slip' || !slips.has(place))
}

/** A file that is put in at two places has its faults but once. */
function onceEach(faults: readonly Fault[]): readonly Fault[] {
  return [...new Map(faults.map((fault) => [`${fault.place} ${fault.message}`, fault])).values()]
}

function fill(parsed: Parsed, notes: Notes | undefined, { template, findings, tables, words }: Composition): Root {
  const scope = { findings, names: {} }
  const faults: Fault[] = []
  const inFile = (place: string): FillContext => ({ ...context, reporter: createReporter(place, faults) })
  const context: FillContext = {
    words, tables, sentences: parsed.sentences, house: parsed.house.children, included: parsed.included,
    section: (name) => fillNodes(parsed.sections.get(name)?.children ?? [], scope, inFile(template.sections[name]?.place ?? name)),
    note: (section) => noteBlock(notes === undefined ? [] : fillNodes(noteFor(notes, section), scope, inFile(notes.place)), words),
    reporter: createReporter(template.review.place, faults),
    fill: (nodes, inner, reporter) => fillNodes(nodes, inner, { ...context, reporter }),
  }
  const tree = fillTree(parsed.review, scope, context)
  // findings without a venue are blank ones, that a template is only checked with
  if (faults.length > 0 && findings.venues.length > 0) throw new InputFault(onceEach(faults))
  return tree
}

function toHtml(tree: Root): Document['tree'] {
  const pipeline = unified().use(remarkRehype).use(rehypeSlug).use(rehypeUniqueIds).use(rehypeContents).use(rehypeNoDanglingLinks)
  return sanitise(pipeline.runSync(tree))
}
