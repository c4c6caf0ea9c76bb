import { existsSync, readFileSync, readdirSync, writeFileSync } from 'node:fs'
import rehypeStringify from 'rehype-stringify'
import { unified } from 'unified'
import { expect, test } from 'vitest'
import { compose } from '../../../generator/compose/compose.ts'
import { hostileFindings, smallComposition } from '../../support/small-template.ts'

// Each folder holds input.md and the expected.html that becomes of it. To write the expected files anew, after looking at the
// difference: REWRITE_FIXTURES=yes npx vitest run test/generator/compose/fixtures.test.ts
const folder = new URL('fixtures/', import.meta.url)
const rewrite = process.env['REWRITE_FIXTURES'] === 'yes'

/** One line per block, so that a difference can be read. */
function composed(name: string, input: string): string {
  const { tree } = compose(smallComposition(input, name === 'untrusted' ? { findings: hostileFindings() } : {}))
  const html = unified().use(rehypeStringify).stringify(tree)
  return `${html.replace(/(<\/(?:p|li|h\d|tr|caption|figcaption|dd|div)>|<(?:tbody|thead|ol|ul|div|figure|nav|dl)[^>]*>)\n*/g, '$1\n').trimEnd()}\n`
}

test.each(readdirSync(folder))('fixture %s', (name) => {
  const [input, expected] = [new URL(`${name}/input.md`, folder), new URL(`${name}/expected.html`, folder)]
  const html = composed(name, readFileSync(input, 'utf8'))
  if (rewrite) writeFileSync(expected, html)
  expect(existsSync(expected), `${name}/expected.html is missing`).toBe(true)
  expect(html).toBe(readFileSync(expected, 'utf8'))
})

test('it can fail: another figure in the template gives another document', () => {
  expect(composed('figures', 'Opinion :figure{of="opinion.period.low" as="points"}')).not.toBe(composed('figures', 'Opinion :figure{of="opinion.period.high" as="points"}'))
})
