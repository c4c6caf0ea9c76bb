import type { Estimate, Findings } from '../../model/findings/schema.ts'
import { inOrder, levelOrder } from './level-order.ts'
import { makeTable } from './make-table.ts'
import type { Table } from './table.ts'

/** What became of every row received: received = rejected + duplicates + out_of_scope + modelled. */
export function accountingTable({ accounting }: Findings): Table {
  return makeTable('accounting', { stage: 'text', rows: 'count' },
    (['received', 'rejected', 'duplicates', 'out_of_scope', 'modelled'] as const).map((stage) => ({ stage, rows: accounting[stage] })))
}

/** Posterior of the model's standard deviations, in points; one that the model does not have is left out. */
export function scalesTable({ scales, ...findings }: Findings): Table {
  const drifts = inOrder(Object.entries(scales.venue_drift), 'venue', levelOrder(findings), ([venue]) => venue)
  const named: readonly (readonly [string, Estimate | null])[] = [
    ['mu', scales.mu], ['tau', scales.tau],
    ...drifts.map(([venue, of]) => [`venue_drift.${venue}`, of] as const),
    ['venue', scales.venue], ['topic', scales.topic], ['poster', scales.poster],
    ...Object.entries(scales.factors),
  ]
  return makeTable('scales', { scale: 'text', mean: 'points', low: 'points', high: 'points' },
    named.flatMap(([scale, of]) => (of === null ? [] : [{ scale, mean: of.mean, low: of.low, high: of.high }])))
}

/** The fixed mix, at which opinion is stated. */
export function targetMixTable({ method, ...findings }: Findings): Table {
  const order = levelOrder(findings)
  const factors = [...new Set(method.target_mix.map(({ factor }) => factor))]
  const rows = factors.flatMap((factor) => inOrder(method.target_mix.filter((of) => of.factor === factor), factor, order, ({ level }) => level))
  return makeTable('target-mix', { factor: 'text', level: 'text', label: 'text', target_share: 'share' },
    rows.map(({ factor, level, label, share }) => ({ factor, level, label, target_share: share })))
}

/** Posterior predictive checks. */
export function checksTable({ diagnostics, ...findings }: Findings): Table {
  const checks = inOrder(diagnostics.checks, 'venue', levelOrder(findings), ({ venue }) => venue ?? '')
  return makeTable('checks', {
    name: 'text', venue: 'text', observed: 'number', predicted: 'number', low: 'number', high: 'number', p: 'probability', passed: 'text',
  }, checks.map(({ name, venue, observed, predicted, p, passed }) => (
    { name, venue, observed, predicted: predicted.mean, low: predicted.low, high: predicted.high, p, passed }
  )))
}

/** The input files, so that a reader can tell whether two reviews rest on the same ones. */
export function inputsTable({ inputs }: Findings): Table {
  return makeTable('inputs', { path: 'text', sha256: 'text', rows: 'count' }, inputs.map(({ path, sha256, rows }) => ({ path, sha256, rows })))
}
