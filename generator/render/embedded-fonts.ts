import type { Face, Theme } from '../theme/theme.ts'

/** RFC 8081. */
const mediaTypes = { woff2: 'woff2', truetype: 'ttf', opentype: 'otf' } as const satisfies Readonly<Record<Face['form'], string>>

/** `@font-face` rules with the faces inside, only those that the text needs. */
export function fontFaces(text: string, theme: Theme): string {
  const characters = new Set(Array.from(new Set(text), (character) => character.codePointAt(0) ?? 0))
  return theme.faces.filter((face) => needed(face, characters)).map((face) => (
    `@font-face{font-family:"${theme.chart.font}";font-style:normal;font-weight:${face.weight};font-display:block;` +
    `src:url(data:font/${mediaTypes[face.form]};base64,${Buffer.from(face.bytes).toString('base64')}) format("${face.form}");unicode-range:${face.range}}`
  )).join('\n')
}

function needed(face: Face, characters: ReadonlySet<number>): boolean {
  const ranges = face.range.split(',').map((range) => {
    const [first, last] = range.replace('U+', '').split('-').map((hexadecimal) => Number.parseInt(hexadecimal, 16))
    return { first, last: last ?? first }
  })
  // Combining marks stand in both subsets: they alone call for no second face.
  return [...characters].some((character) => character > 0x1f && ranges.some(({ first, last }) => last - first > 1 && character >= first && character <= last))
}
