import { analyse, type Analysis, type AnalysisSpec } from '../../model/analyse.ts'
import { localExecutor } from '../../model/fit/executor.ts'
import { meanPath } from '../../model/fit/mean-path.ts'
import type { SmallInputs } from '../../model/inputs/small-inputs.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'

const plainSpec: AnalysisSpec = {
  interval: 0.9, seed: 1, targetMix: {}, past: null, competitors: null,
  facts: { smallestGroup: 10, labelScores: [-1, 0, 1], posterBounds: { occasional: 1, regular: 5 }, preparedBy: null, reviewedBy: null, timeZone: 'UTC', reporting: 'month' },
}

export const noInputs: SmallInputs = { survey: null, events: null, outcome: null, benchmark: null, audit: null, importance: null, customers: null }

/** The whole analysis in this thread. */
export function analyseHere(tables: IntakeTables, spec: Partial<AnalysisSpec> = {}, inputs: SmallInputs = noInputs): Promise<Analysis> {
  return analyse(tables, inputs, { ...plainSpec, ...spec }, { executorFor: localExecutor, refit: meanPath })
}
