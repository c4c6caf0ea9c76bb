import type { Root, RootContent, Text } from 'mdast'
import type { Fault } from '../faults/fault.ts'
import { allNames } from './directives/all.ts'
import type { ContainerDirective } from './directives/directive.ts'
import { createReporter, nearOnes } from './faults.ts'
import type { Reporter } from './faults.ts'
import type { Source } from './template.ts'

/**
 * What Markdown takes for text though a directive was meant, and blocks that do not end where they were meant to: `::: note`, `:figure {of="..."}`,
 * a `:::` that closes nothing. It is told from the source, in which `\::` is still seen to be meant as text.
 */
export function slipsIn({ place, text }: Source, tree: Root): readonly Fault[] {
  const faults: Fault[] = []
  const look: Look = { source: text, reporter: createReporter(place, faults), explained: false }
  lookAt(tree.children, [], look)
  return faults
}

interface Look {
  readonly source: string
  readonly reporter: Reporter
  /** Whether a block is known not to stand as it was meant, so that a `:::` left over after it is no fault of its own. */
  explained: boolean
}

interface Open { readonly name: string, readonly colons: number, readonly line: number }

function lookAt(nodes: readonly RootContent[], around: readonly Open[], look: Look): void {
  for (const [at, node] of nodes.entries()) {
    if (node.type === 'text') lookAtText(node, at === 0, look)
    const next = nodes[at + 1]
    if (node.type === 'textDirective' && next?.type === 'text' && /^\s*\{/.test(next.value)) {
      look.reporter.fault(node, 'directive-slip', { text: `:${node.name}${next.value}`, name: node.name, colons: ':' })
    }
    const inside = node.type === 'containerDirective' ? [...around, lookAtBlock(node, around, look)] : around
    if ('children' in node) lookAt(node.children, inside, look)
  }
}

/** Tell a block that is not closed; blocks inside one another are parted by their colons alone. */
function lookAtBlock(node: ContainerDirective, around: readonly Open[], look: Look): Open {
  const lines = sliceOf(node, look).split('\n')
  const colons = /^:*/.exec(lines[0] ?? '')?.[0].length ?? 0
  const last = lines.length > 1 ? (lines.at(-1) ?? '').replace(/^[\s>]*/, '').trim() : ''
  const block = { name: node.name, colons, line: node.position?.start.line ?? 0 }
  if (/^:+$/.test(last) && last.length >= colons) return block
  const outer = around.find((open) => open.colons <= colons)
  if (outer) look.reporter.fault(node, 'block-colons', { inner: block, outer })
  else look.reporter.fault(node, 'block-open', block)
  look.explained = true
  return block
}

function lookAtText(node: Text, first: boolean, look: Look): void {
  const lines = sliceOf(node, look).split('\n')
  for (const [at, line] of lines.entries()) {
    const start = { line: (node.position?.start.line ?? 1) + at, column: at === 0 ? node.position?.start.column ?? 1 : line.search(/[^\s>]/) + 1 }
    if (first || at > 0) lookAtLine(line.replace(/^[\s>]*/, '').trim(), { position: { start } }, look)
    for (const slip of line.matchAll(/(?<!:):\s+([a-z]+)\s*\{/g)) {
      const column = start.column + slip.index - (at === 0 ? 0 : start.column - 1)
      const [, name = ''] = slip
      if (allNames.includes(name)) look.reporter.fault({ position: { start: { line: start.line, column } } }, 'directive-slip', { text: line.slice(slip.index), name, colons: ':' })
    }
  }
}

function lookAtLine(line: string, at: { readonly position: { readonly start: { readonly line: number, readonly column: number } } }, look: Look): void {
  const [, colons, name] = /^(:{2,})\s*([\w-]*)/.exec(line) ?? []
  if (colons === undefined) return
  if (/^:{3,}$/.test(line)) {
    if (!look.explained) look.reporter.fault(at, 'fence-stray', { line })
    return
  }
  if (colons.length > 2) look.explained = true
  look.reporter.fault(at, 'directive-slip', { text: line, name: nearOnes(name ?? '', allNames)[0] ?? null, colons })
}

function sliceOf(node: Text | ContainerDirective, { source }: Look): string {
  return source.slice(node.position?.start.offset, node.position?.end.offset)
}
