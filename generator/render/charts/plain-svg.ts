/** All that a drawing may be made of: shapes and text, nothing that leads or loads anywhere. */
const elements = new Set(['svg', 'g', 'path', 'line', 'rect', 'circle', 'text', 'tspan', 'defs', 'clipPath', 'linearGradient', 'radialGradient', 'stop'])
const attributes = new Set([
  'xmlns', 'version', 'class', 'id', 'viewBox', 'width', 'height', 'x', 'y', 'x1', 'x2', 'y1', 'y2', 'dx', 'dy', 'r', 'cx', 'cy', 'fx', 'fy', 'fr', 'd', 'transform', 'display',
  'fill', 'fill-opacity', 'stroke', 'stroke-width', 'stroke-opacity', 'stroke-linejoin', 'stroke-linecap', 'stroke-miterlimit', 'stroke-dasharray', 'stroke-dashoffset', 'opacity',
  'text-anchor', 'font-family', 'font-size', 'font-weight', 'font-style', 'font-variant', 'clip-path', 'gradientUnits', 'offset', 'stop-color', 'stop-opacity', 'pointer-events', 'role',
])

/**
 * The drawing itself, if it holds nothing but plain shapes and text.
 *
 * @param svg - as vega writes it: well-formed, texts and attributes escaped
 * @throws {Error} naming the element, the attribute or the address that it may not hold
 */
export function requirePlain(svg: string): string {
  for (const [tag, element = ''] of svg.matchAll(/<([^\s/>]+)[^>]*>/g)) {
    if (!elements.has(element)) throw new Error(`Unexpected element ${element} in a drawing, expected shapes and text`)
    for (const [, name = '', value = ''] of tag.matchAll(/\s([^\s=]+)="([^"]*)"/g)) {
      if (!attributes.has(name) && !/^(aria-[a-z]+|xmlns:xlink)$/.test(name)) throw new Error(`Unexpected attribute ${name} in a drawing, expected shapes and text`)
      if (name !== 'aria-label' && /url\(\s*(?!#)/i.test(value)) throw new Error(`Unexpected address ${value} in a drawing, expected none`)
    }
  }
  return svg
}
