import 'vega'

/** Exported by vega and missing from its types: how it measures text, and where it takes random numbers from. */
declare module 'vega' {
  export const textMetrics: { width: (item: { readonly fontSize?: number, readonly fontWeight?: string | number, readonly limit?: number }, text: unknown) => number }
  export function setRandom(source: () => number): void
  export function randomLCG(seed: number): () => number
}
