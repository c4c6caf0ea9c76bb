import { z } from 'zod'

/** The small parts that findings are made of. */

/**
 * What figures are counted in; it stands in the JSON Schema as the annotation `unit`, and a form of the template language says which it can write.
 * `points`: score x 100; `percent`: of 100, and percentage points; `share`: of 1; `metric`: what a survey's metric is counted in, see its `kind`;
 * `number`: a plain number, such as a ratio or a correlation; `steps`: of the grid.
 */
export type Unit = 'points' | 'percent' | 'share' | 'probability' | 'p' | 'count' | 'number' | 'steps' | 'days' | 'metric'

const inUnit = (unit: Unit) => z.number().meta({ unit })
export const points = inUnit('points')
export const percent = inUnit('percent')
export const plain = inUnit('number')
export const metricValue = inUnit('metric')
export const days = z.number().min(0).meta({ unit: 'days' satisfies Unit })
export const share = z.number().min(0).max(1).meta({ unit: 'share' satisfies Unit })
export const probability = z.number().min(0).max(1).meta({ unit: 'probability' satisfies Unit })
export const pValue = z.number().min(0).max(1).meta({ unit: 'p' satisfies Unit })
export const count = z.number().int().min(0).meta({ unit: 'count' satisfies Unit })
/** How many there would be: no whole number. */
export const effectiveCount = z.number().min(0).meta({ unit: 'count' satisfies Unit })
export const steps = z.number().int().meta({ unit: 'steps' satisfies Unit })

/** A posterior summary: mean, bounds of the central interval (the account's `interval`), standard deviation. */
const estimateOf = (figure: z.ZodNumber) => z.strictObject({ mean: figure, low: figure, high: figure, sd: figure.min(0) })
export const estimate = estimateOf(points)
export const percentEstimate = estimateOf(percent)
export const plainEstimate = estimateOf(plain)
export const metricEstimate = estimateOf(metricValue)
/** Of something that has no unit of its own: what the other figures beside it are counted in. */
export const bareEstimate = estimateOf(z.number())
export type Estimate = z.infer<typeof estimate>

export const isoDate = z.string().regex(/^\d{4}-\d{2}-\d{2}$/)

/** Whether an interval supports saying that something moved: it lies wholly above or below zero, or it does not. */
export const movement = z.enum(['up', 'down', 'not-established'])
export type Movement = z.infer<typeof movement>
