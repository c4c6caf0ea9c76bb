/**
 * Make a drawing small and safe to stand beside others in one page: ids of its own, coordinates to a tenth of a px, no attributes for single marks
 * (the picture has one text alternative as a whole), no invisible labels.
 *
 * @param svg - as vega writes it
 * @param prefix - unique in the page; put before every id
 * @returns an `<svg>` that scales with its box; whoever puts it into a page gives it its role and text alternative
 */
export function cleanSvg(svg: string, prefix: string): string {
  const [, width, height] = /<svg[^>]*? width="([\d.]+)" height="([\d.]+)"/.exec(svg) ?? []
  if (width === undefined || height === undefined) throw new Error('Unexpected drawing without size, expected an svg of vega')
  const inner = svg
    .replace(/^[\s\S]*?<svg[^>]*>/, '')
    .replace(/<\/svg>\s*$/, '')
    .replace(/<text[^>]*\sopacity="0"[^>]*>[\s\S]*?<\/text>/g, '')
    .replace(/\s(?:aria-[a-z]+|role|pointer-events|xlink:[a-z]+)="[^"]*"/g, '')
    .replace(/\sclass="[^"]*"/g, '')
    .replace(/\sid="([^"]+)"/g, ` id="${prefix}-$1"`)
    .replace(/url\(#([^)]+)\)/g, `url(#${prefix}-$1)`)
    .replace(/\b(d|transform|x|y|x1|x2|y1|y2|width|height|r|cx|cy|points|dy|dx)="([^"]*)"/g, (_whole, name: string, value: string) => `${name}="${rounded(value)}"`)
    .replace(/<path[^>]*\sd="M0,0h0v0h0Z"[^>]*>(?:<\/path>)?/g, '')
    .replace(/<g>\s*<\/g>/g, '')
  return `<svg viewBox="0 0 ${rounded(width)} ${rounded(height)}" width="${rounded(width)}" height="${rounded(height)}" focusable="false">${inner}</svg>`
}

function rounded(numbers: string): string {
  return numbers.replace(/-?\d+\.\d+(?:e-?\d+)?/g, (number) => String(Math.round(Number(number) * 10) / 10 + 0))
}
