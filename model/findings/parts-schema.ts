import { z } from 'zod'

/** The small parts that findings are made of. */

/** A posterior summary: mean, bounds of the central interval (the account's `interval`), standard deviation. */
export const estimate = z.strictObject({ mean: z.number(), low: z.number(), high: z.number(), sd: z.number().min(0) })
export type Estimate = z.infer<typeof estimate>

export const share = z.number().min(0).max(1)
export const count = z.number().int().min(0)
export const isoDate = z.string().regex(/^\d{4}-\d{2}-\d{2}$/)

/** Whether an interval supports saying that something moved: it lies wholly above or below zero, or it does not. */
export const movement = z.enum(['up', 'down', 'not-established'])
export type Movement = z.infer<typeof movement>
