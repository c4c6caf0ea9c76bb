import type { RootContent } from 'mdast'

/** Lists that follow each other become one: items that `each` repeats, or that `when` lets through, make one list, not many of one item. */
export function joinLists(nodes: readonly RootContent[]): readonly RootContent[] {
  return nodes.reduce<readonly RootContent[]>((joined, node) => {
    const last = joined.at(-1)
    if (last?.type !== 'list' || node.type !== 'list' || last.ordered !== node.ordered) return [...joined, node]
    return [...joined.slice(0, -1), { ...last, children: [...last.children, ...node.children] }]
  }, [])
}
