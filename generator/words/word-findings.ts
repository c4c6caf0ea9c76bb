import { wordAdvice } from './advice.ts'
import { wordCaveat } from './caveats.ts'
import type { Words } from './words.ts'

interface Figured { readonly code: string; readonly figures: Readonly<Record<string, number | string>> }

/** Word the caveats and the advice of findings, or word them anew: all that findings hold in words comes from their codes and figures. */
export function wordFindings<F extends { readonly caveats: readonly Figured[]; readonly advice: readonly Figured[] }>(found: F, words: Words) {
  return {
    ...found,
    caveats: found.caveats.map((caveat: F['caveats'][number]) => ({ ...caveat, ...wordCaveat(words, caveat.code, caveat.figures) })),
    advice: found.advice.map((piece: F['advice'][number]) => ({ ...piece, ...wordAdvice(words, piece.code, piece.figures) })),
  }
}
