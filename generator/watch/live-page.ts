import { h } from 'hastscript'
import rehypeStringify from 'rehype-stringify'
import type { Element, Root } from 'hast'
import { unified } from 'unified'
import type { Fault } from '../faults/fault.ts'

/** Seconds after which a browser looks at the page again: without a script it can't be told. */
const lookAgain = 2

/**
 * The review as it is watched: it loads itself again, and says on top what is wrong that has no place in it.
 *
 * @param html - a whole review as rendered; an empty page where there is none yet
 */
export function livePage(html: string | null, faults: readonly Fault[]): string {
  const refresh = markup(h('meta', { httpEquiv: 'refresh', content: String(lookAgain) }))
  const panel = faults.length === 0 ? '' : markup(h('pre', { role: 'alert' }, faults.map(({ message, mend }) => `${message}\n${mend}`).join('\n\n')))
  const page = html ?? `<!doctype html>\n<html lang="en"><head>${markup(h('meta', { charSet: 'utf-8' }))}<title>Review</title></head>\n<body></body></html>\n`
  return page.replace('<head>', () => `<head>${refresh}`).replace('<body>', () => `<body>${panel}`)
}

function markup(element: Element): string {
  const root: Root = { type: 'root', children: [element] }
  return unified().use(rehypeStringify).stringify(root)
}
