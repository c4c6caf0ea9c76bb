import type { Root, RootContent } from 'mdast'
import { visit } from 'unist-util-visit'
import type { VFile } from 'vfile'
import { namesOf } from './directives/all.ts'

/**
 * Turn `note:important` in prose back into its source: a text directive of an unknown name, without attributes, is none.
 * One with attributes (`:figur{of="..."}`) is left, and is a fault when the template is checked.
 */
export function remarkProse() {
  return (tree: Root, file: VFile): undefined => {
    const source = String(file)
    visit(tree, 'textDirective', (node, index, parent) => {
      if (!parent || index === undefined || namesOf('textDirective').includes(node.name)) return
      if (Object.keys(node.attributes ?? {}).length > 0) return
      const { start, end } = node.position ?? {}
      const prose = start?.offset === undefined ? `:${node.name}` : source.slice(start.offset, end?.offset)
      parent.children[index] = { type: 'text', value: prose, ...(node.position && { position: node.position }) } satisfies RootContent
    })
  }
}
