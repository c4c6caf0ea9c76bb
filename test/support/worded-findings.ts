import { tablesOf } from '../../generator/tables/tables-of.ts'
import { compose } from '../../generator/compose/compose.ts'
import type { Document } from '../../generator/compose/document.ts'
import { wordAdvice } from '../../generator/words/advice.ts'
import { wordCaveat } from '../../generator/words/caveats.ts'
import type { Words } from '../../generator/words/words.ts'
import type { Findings } from '../../model/findings/schema.ts'
import { houseCharts, houseTemplate } from './house-composition.ts'

/** The findings with caveats and advice in other words, as a build with those words has them. */
function reworded(findings: Findings, words: Words): Findings {
  return {
    ...findings,
    caveats: findings.caveats.map((caveat) => ({ ...caveat, ...wordCaveat(words, caveat.code, caveat.figures) })),
    advice: findings.advice.map((piece) => ({ ...piece, ...wordAdvice(words, piece.code, piece.figures) })),
  }
}

/** The house review in other words. */
export function composeIn(words: Words, findings: Findings): Document {
  const worded = reworded(findings, words)
  return compose({ template: houseTemplate, words, findings: worded, tables: tablesOf(worded), charts: houseCharts })
}
