import type { Root } from 'mdast'
import remarkDirective from 'remark-directive'
import remarkGfm from 'remark-gfm'
import remarkParse from 'remark-parse'
import { unified } from 'unified'
import { VFile } from 'vfile'
import type { Source } from './template.ts'
import { remarkProse } from './remark-prose.ts'

/** A template file as a tree, in which every text directive left is meant as one. */
export function parseMarkdown(source: Source): Root {
  const tree = unified().use(remarkParse).use(remarkGfm, { singleTilde: false }).use(remarkDirective).parse(source.text)
  remarkProse()(tree, new VFile(source.text))
  return tree
}
