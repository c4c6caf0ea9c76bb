import remarkRehype from 'remark-rehype'
import rehypeSlug from 'rehype-slug'
import type { Root } from 'mdast'
import { unified } from 'unified'
import type { Findings } from '../../model/findings/schema.ts'
import { InputFault } from '../faults/fault.ts'
import type { Fault } from '../faults/fault.ts'
import type { Table } from '../tables/table.ts'
import type { Words } from '../words/words.ts'
import { checkMessage } from './check-message.ts'
import { checkSentences } from './check-sentences.ts'
import { checkTree } from './check-template.ts'
import type { Document } from './document.ts'
import { createReporter } from './faults.ts'
import { fillNodes, fillTree } from './fill-template.ts'
import { anchorsOf, headingsOf, rehypeContents, rehypeNoDanglingLinks, rehypeUniqueIds } from './headings.ts'
import { parseMarkdown } from './parse-markdown.ts'
import { findingsScope } from './path-types.ts'
import { sanitise } from './sanitise.ts'
import { argumentsFor, parseSentences } from './sentences.ts'
import type { Sentences } from './sentences.ts'
import type { Template } from './template.ts'

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
 * Pure: the same in, the same out.
 *
 * @throws {InputFault} with everything that is wrong in the template, each fault at its file, line and column
 */
export function compose(composition: Composition): Document {
  const parsed = parse(composition.template)
  const faults = [...parsed.faults, ...check(parsed, composition)]
  if (faults.length > 0) throw new InputFault(faults)
  const tree = toHtml(fill(parsed, composition))
  const { words, findings } = composition
  return {
    tree, lang: words.locale, headings: headingsOf(tree),
    title: words.say('document-title', argumentsFor(parsed.sentences.get('document-title'), { findings, names: {} }, words)),
  }
}

interface Parsed {
  readonly review: Root
  readonly sections: ReadonlyMap<string, Root>
  readonly sentences: Sentences
  readonly faults: readonly Fault[]
}

function parse(template: Template): Parsed {
  const faults: Fault[] = []
  return {
    review: parseMarkdown(template.review),
    sections: new Map(Object.entries(template.sections).map(([name, source]) => [name, parseMarkdown(source)])),
    sentences: parseSentences(template.sentences.text, createReporter(template.sentences.place, faults)),
    faults,
  }
}

function check(parsed: Parsed, { template, tables, charts, words }: Composition): readonly Fault[] {
  const sections = [...parsed.sections.keys()]
  const anchors = new Set([...sections, ...[parsed.review, ...parsed.sections.values()].flatMap(anchorsOf)])
  const context = { words, sentences: parsed.sentences, charts, tables, sections, anchors }
  const faults: Fault[] = []
  const ofSentences = createReporter(template.sentences.place, faults)
  checkSentences(parsed.sentences, words, ofSentences)
  checkMessage('document-title', findingsScope, context, undefined, ofSentences)
  const ofSections = [...parsed.sections].flatMap(([name, tree]) => checkTree(tree, template.sections[name]?.place ?? name, findingsScope, context))
  return [...faults, ...checkTree(parsed.review, template.review.place, findingsScope, context), ...ofSections]
}

function fill(parsed: Parsed, { findings, tables, words }: Composition): Root {
  const scope = { findings, names: {} }
  const context = {
    words, tables, sentences: parsed.sentences,
    section: (name: string) => fillNodes(parsed.sections.get(name)?.children ?? [], scope, context),
  }
  return fillTree(parsed.review, scope, context)
}

function toHtml(tree: Root): Document['tree'] {
  const pipeline = unified().use(remarkRehype).use(rehypeSlug).use(rehypeUniqueIds).use(rehypeContents).use(rehypeNoDanglingLinks)
  return sanitise(pipeline.runSync(tree))
}
