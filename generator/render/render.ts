import { createHash } from 'node:crypto'
import type { Root } from 'hast'
import { h } from 'hastscript'
import rehypeStringify from 'rehype-stringify'
import { unified } from 'unified'
import type { Document } from '../compose/document.ts'
import type { Table } from '../tables/table.ts'
import type { Theme } from '../theme/theme.ts'
import type { Words } from '../words/words.ts'
import { drawChart } from './charts/draw-chart.ts'
import { type ChartSpec, layoutOf } from './charts/chart-spec.ts'
import { drawEach, type Drawings } from './drawings.ts'
import { fontFaces } from './embedded-fonts.ts'
import { frontOf, type Imprint } from './imprint.ts'
import { pageBoxes } from './page-boxes.ts'
import { type DrawingPlace, prepareTree } from './prepare-tree.ts'

export interface Rendering {
  readonly tables: readonly Table[]
  /** As `loadCharts` reads them. */
  readonly charts: ReadonlyMap<string, ChartSpec>
  readonly words: Words
  readonly theme: Theme
  readonly imprint: Imprint
  /** Where pictures may have been drawn before; default: each is drawn. */
  readonly drawings?: Drawings
  /** `wide` leaves out the pictures for a phone, and shows those for a page there too; default: both. */
  readonly pictures?: 'both' | 'wide'
  /** The message of the first link, which leads past what stands before the document; default: to a review. */
  readonly skip?: string
}

/**
 * Render a document as one self-contained HTML file:
 *
 *     tree ─prepared─▶ HTML ─charts drawn in─▶ page with its style, its fonts and a policy that forbids everything else
 *
 * No script and no request to anywhere; the same document gives the same bytes. Charts are drawn in after compose's sanitising, because they
 * are this program's own markup.
 *
 * @throws {Error} a chart that is not among `charts`, or that cannot be drawn as specified
 */
export async function render(document: Document, rendering: Rendering): Promise<string> {
  const { tree, places } = prepareTree(document.tree, rendering.theme)
  const drawings = new Map(await inTurn(places, async (place) => [place.id, await bothSizes(place, rendering)] as const))
  // from the tag's beginning: a text may say the rest of it
  const body = toHtml(tree).replace(/<div class="drawing" data-drawing="([^"]+)">/g, (_whole, id: string) => `<div class="drawing">${drawings.get(id) ?? ''}`)
  return page(document, body, rendering)
}

/**
 * Both sizes, of which the style sheet shows one. Each is a picture of its own to assistive technology (and so a Figure with its alternative in
 * a tagged PDF); the text alternative is written once, on the wide one, and the narrow one refers to it.
 */
async function bothSizes({ chart, id, alt }: DrawingPlace, { tables, charts, words, theme, drawings = drawEach, pictures = 'both' }: Rendering): Promise<string> {
  const spec = charts.get(chart)
  if (spec === undefined) throw new Error(`Unexpected chart "${chart}", expected one of ${[...charts.keys()].join(', ')}`)
  const wide = await drawChart({ ...spec, name: id }, tables, words, theme, 'wide', drawings)
  const named = (look: string) => wide.replace('<svg ', () => `<svg id="drawing-${id}" ${look}role="img" aria-label="${attributeText(alt)}" `)
  if (pictures === 'wide' || layoutOf(spec).width !== undefined) return named('')
  const narrow = await drawChart({ ...spec, name: id }, tables, words, theme, 'narrow', drawings)
  return named('class="for-wide" ')
    + narrow.replace('<svg ', () => `<svg class="for-narrow" role="img" aria-labelledby="drawing-${id}" `)
}

function attributeText(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('"', '&quot;').replaceAll('<', '&lt;').replaceAll('>', '&gt;')
}

/** One after the other: vega's counters and text metrics are shared by all drawings of a process. */
async function inTurn<T, R>(items: readonly T[], work: (item: T) => Promise<R>): Promise<readonly R[]> {
  const results: R[] = []
  for (const item of items) results.push(await work(item))
  return results
}

function page({ title, lang }: Document, body: string, { words, theme, imprint, skip: past = 'skip-to-review' }: Rendering): string {
  const front = frontOf(theme, imprint, words).map((element) => `${toHtml({ type: 'root', children: [element] })}\n`).join('')
  const boxes = pageBoxes(theme, words, title, imprint)
  const style = [fontFaces(title + JSON.stringify([imprint, theme.running]) + front + body, theme), theme.css, boxes].join('\n')
  const policy = [
    `default-src 'none'; style-src 'sha256-${createHash('sha256').update(style).digest('base64')}'; font-src data:;`,
    ...(theme.logo === null ? [] : ['img-src data:;']), "base-uri 'none'; form-action 'none'",
  ].join(' ')
  const head = toHtml({ type: 'root', children: [
    h('meta', { charSet: 'utf-8' }),
    h('meta', { httpEquiv: 'Content-Security-Policy', content: policy }),
    h('meta', { name: 'viewport', content: 'width=device-width, initial-scale=1' }),
    h('meta', { name: 'referrer', content: 'no-referrer' }),
    h('title', title),
  ] })
  const skip = toHtml({ type: 'root', children: [h('a.skip', { href: '#review' }, words.say(past))] })
  const [opening] = toHtml({ type: 'root', children: [h('html', { lang })] }).split('</html>')
  return `<!doctype html>\n${opening}<head>${head}<style>${style}</style></head>\n<body>${skip}\n<main id="review" tabindex="-1">\n${front}${body}\n</main></body></html>\n`
}

function toHtml(tree: Root): string {
  return unified().use(rehypeStringify, { quoteSmart: false }).stringify(tree)
}
