import { describe, expect, test } from 'vitest'
import { cleanSvgLogo } from '../../../../generator/theme/logo/clean-svg-logo.ts'

const svg = (inner: string, attributes = '') => `<svg xmlns="http://www.w3.org/2000/svg" xmlns:xlink="http://www.w3.org/1999/xlink" viewBox="0 0 20 10"${attributes}>${inner}</svg>`
const cleaned = (text: string): string => {
  const result = cleanSvgLogo(text)
  if (typeof result !== 'string') throw new Error(JSON.stringify(result))
  return result
}
const refused = (text: string): string => {
  const result = cleanSvgLogo(text)
  if (typeof result === 'string') throw new Error(`passed: ${result}`)
  return result.map(({ found, line, column }) => `${line ?? '-'}:${column ?? '-'} ${found}`).join('\n')
}

describe('a plain drawing', () => {
  test('keeps its shapes, gradients and clip paths, and gets the size of its viewBox', () => {
    const out = cleaned(svg('<defs><linearGradient id="a"><stop offset="0" stop-color="red"/></linearGradient><radialGradient id="b" xlink:href="#a"/></defs><path d="M0,0 L1e1-2z" fill="url(#a)" style="stroke:#fff; stroke-width:2"/>'))
    expect(out).toBe('<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 20 10" width="20" height="10"><defs><linearGradient id="a"><stop offset="0" stop-color="red"></stop></linearGradient><radialGradient id="b" href="#a"></radialGradient></defs><path d="M0,0 L1e1-2z" fill="url(#a)" stroke="#fff" stroke-width="2"></path></svg>')
  })
  test('loses what editors leave behind, without a word', () => {
    const out = cleaned(svg('<!-- made by --><metadata>secret</metadata><title>T</title><x:view xmlns:x="http://x.example/" a="b"/><rect width="3" height="2" data-a="1" class="c" x:label="l" xmlns:x="http://x.example/"/>stray', ' version="1.1" xml:base="http://x.example/"'))
    expect(out).toBe('<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 20 10" width="20" height="10"><rect width="3" height="2"></rect></svg>')
  })
  test('may say its size by width and height', () => {
    expect(cleaned('<svg width="30px" height="12"><circle r="2"/></svg>')).toContain('viewBox="0 0 30 12"')
  })
})

describe('a hostile drawing is refused, at its line', () => {
  test.each([
    ['a script', svg('\n<script>alert(1)</script>'), '2:1 element `script`'],
    ['a script with a prefix', svg('<s:script xmlns:s="http://www.w3.org/2000/svg">alert(1)</s:script>').replaceAll('s:script', 'svg:script'), 'element `script`'],
    ['HTML inside', svg('<foreignObject><div xmlns="http://www.w3.org/1999/xhtml"/></foreignObject>'), 'element `foreignObject`'],
    ['an event handler', svg('<rect onload="alert(1)"/>'), 'attribute `onload` of `rect`'],
    ['an event handler on the root', svg('', ' onload="alert(1)"'), 'attribute `onload` of `svg`'],
    ['a picture from elsewhere', svg('<image href="https://x.example/a.png"/>'), 'element `image`'],
    ['a link', svg('<a href="javascript:alert(1)"><rect/></a>'), 'element `a`'],
    ['a copy', svg('<use href="#a"/>'), 'element `use`'],
    ['a gradient from elsewhere', svg('<linearGradient xlink:href="https://x.example/a.svg#g"/>'), 'reference `https://x.example/a.svg#g`'],
    ['a gradient from a file', svg('<linearGradient href="file:///etc/passwd"/>'), 'reference `file:///etc/passwd`'],
    ['a fill from elsewhere', svg('<rect fill="url(https://x.example/#a)"/>'), 'value `url(https://x.example/#a)` of `fill`'],
    ['a fill from elsewhere in a style', svg('<rect style="fill:url(//x.example/a)"/>'), 'of `fill`'],
    ['a property from elsewhere', svg('<rect style="background-image:url(http://x.example/a)"/>'), 'of `background-image`'],
    ['a mask from elsewhere', svg('<rect mask="url(http://x.example/a#m)"/>'), 'of `mask`'],
    ['an escaped address', svg('<rect fill="\\75rl(http://x.example/)"/>'), 'of `fill`'],
    ['an address spelled in references', svg('<rect fill="&#117;rl(https:&#47;&#47;x.example/)"/>'), 'of `fill`'],
    ['a style sheet', svg('<style>@import "https://x.example/a.css";</style>'), 'element `style`'],
    ['an animation', svg('<animate attributeName="href" to="javascript:alert(1)"/>'), 'element `animate`'],
    ['a filter', svg('<filter id="f"><feImage href="https://x.example/a.png"/></filter>'), 'element `filter`'],
    ['letters', svg('<text>Brand</text>'), 'element `text`'],
  ])('%s', (_what, text, found) => { expect(refused(text)).toContain(found) })

  test.each([
    ['a document type', `<!DOCTYPE svg SYSTEM "http://x.example/a.dtd">${svg('<rect/>')}`],
    ['an entity from a file', `<!DOCTYPE svg [<!ENTITY x SYSTEM "file:///etc/passwd">]>${svg('<rect id="&x;"/>')}`],
    ['entities of entities', `<!DOCTYPE svg [<!ENTITY a "aaaa"><!ENTITY b "&a;&a;">]>${svg('<rect id="&b;"/>')}`],
    ['a style sheet by instruction', `<?xml-stylesheet href="https://x.example/a.css"?>${svg('<rect/>')}`],
    ['no XML', '<svg viewBox="0 0 1 1"><rect></svg>'],
    ['HTML', '<html><script>alert(1)</script></html>'],
    ['no size', '<svg><rect/></svg>'],
    ['no height', '<svg viewBox="0 0 10 0"><rect/></svg>'],
    ['very many shapes', svg('<rect/>'.repeat(6000))],
    ['very deep groups', svg('<g>'.repeat(60) + '</g>'.repeat(60))],
    ['groups so deep that a reader would fall', svg('<g>'.repeat(20_000) + '</g>'.repeat(20_000))],
  ])('%s', (_what, text) => { expect(refused(text)).not.toBe('') })
})
