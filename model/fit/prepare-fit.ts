import { samplingVariance, type SamplingVariance } from '../cells/sampling-variance.ts'
import { readAudit, type CoderCorrection } from '../coder/audit.ts'
import { rescoredTables } from '../coder/rescore.ts'
import type { AuditCount } from '../inputs/small-inputs.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'
import { buildProblem } from './build-problem.ts'
import type { FitProblem } from './problem.ts'

/** A brand's tables made ready for the fit. */
export interface PreparedFit {
  /** null without an audit, or without labels. */
  readonly audited: CoderCorrection | null
  /** The tables as the fit takes them: the coder's errors undone, where an audit allows it. */
  readonly fitted: IntakeTables
  readonly sampling: SamplingVariance
  readonly problem: FitProblem
}

/** @param audit - of the coder; null where there is none */
export function prepareFit(tables: IntakeTables, audit: readonly AuditCount[] | null): PreparedFit {
  const audited = audit === null ? null : readAudit(tables, audit)
  // an audit that is refused everywhere changes nothing, and costs nothing
  const applied = audited !== null && audited.weights.some((weights) => weights !== null) ? audited : null
  const fitted = applied === null ? tables : rescoredTables(tables, applied)
  const sampling = samplingVariance(fitted)
  return { audited, fitted, sampling, problem: buildProblem(fitted, sampling.variance, applied) }
}
