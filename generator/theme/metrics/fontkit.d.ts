/** What is asked of fontkit, which ships no types. */
declare module 'fontkit' {
  export interface Font {
    readonly unitsPerEm: number
    /** Axes of a variable font; empty for a static one. */
    readonly variationAxes: Readonly<Record<string, unknown>>
    readonly 'OS/2'?: { readonly fsType?: { readonly noEmbedding?: boolean } }
    hasGlyphForCodePoint(codePoint: number): boolean
    glyphForCodePoint(codePoint: number): { readonly advanceWidth: number }
  }
  export function create(bytes: Uint8Array): Font | { readonly fonts: readonly Font[] }
  export function openSync(path: string): Font | { readonly fonts: readonly Font[] }
}
