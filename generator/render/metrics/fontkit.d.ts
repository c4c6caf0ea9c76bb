/** What the program that makes advances.json asks of fontkit, which ships no types. */
declare module 'fontkit' {
  export interface Font {
    readonly unitsPerEm: number
    hasGlyphForCodePoint(codePoint: number): boolean
    glyphForCodePoint(codePoint: number): { readonly advanceWidth: number }
  }
  export function openSync(path: string): Font | { readonly fonts: readonly Font[] }
}
