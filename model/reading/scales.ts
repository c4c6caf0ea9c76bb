import type { Estimate, Findings } from '../findings/schema.ts'
import type { Posterior } from '../fit/posterior.ts'
import { weightedEstimate } from '../statistics/weighted-estimate.ts'
import { inPoints } from './summarise.ts'

const drift = 'venue_drift.'

/** Posterior of every standard deviation of the model, in points, from all weighted proposals. */
export function readScales({ problem, sigmas }: Posterior, interval: number): Findings['scales'] {
  const d = problem.scales.length
  const byName = new Map(problem.scales.map(({ name }, j): [string, Estimate] => {
    const values = Float64Array.from({ length: sigmas.count }, (_, i) => sigmas.values[i * d + j])
    return [name, inPoints(weightedEstimate(values, sigmas.weights, interval))]
  }))
  const of = (name: string) => byName.get(name) ?? null
  const required = (name: string): Estimate => {
    const found = byName.get(name)
    if (found === undefined) throw new Error(`the model always has ${name}`)
    return found
  }
  const entries = [...byName]
  return {
    mu: required('mu'), tau: required('tau'),
    venue_drift: Object.fromEntries(entries.flatMap(([name, value]) => (name.startsWith(drift) ? [[name.slice(drift.length), value]] : []))),
    venue: of('venue'), topic: of('topic'), poster: of('poster'),
    factors: Object.fromEntries(problem.groups.flatMap(({ name }) => (['venue', 'topic', 'poster'].includes(name) ? [] : [[name, required(name)]]))),
  }
}
