import 'vega'

/** Exported by vega and missing from its types: how it measures text. */
declare module 'vega' {
  export const textMetrics: { width: (item: { readonly fontSize?: number, readonly fontWeight?: string | number, readonly limit?: number }, text: unknown) => number }
}
