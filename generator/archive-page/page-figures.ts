import { z } from 'zod'

const estimate = z.object({ mean: z.number(), low: z.number(), high: z.number(), sd: z.number() })
const isoDate = z.iso.date()

/** What the page reads of sealed findings: keys that later versions add, or earlier ones did not have, do not matter. */
const sealedFindings = z.object({
  period: z.object({ start: isoDate, end: isoDate }),
  grid: z.enum(['day', 'week', 'month']),
  interval: z.number(),
  opinion: z.object({
    series: z.array(z.object({ step: isoDate, adjusted: estimate })),
    period: estimate, change: estimate.nullable(), probability_up: z.number().nullable(),
  }),
  caveats: z.array(z.object({ code: z.string(), severity: z.string(), evidence: z.string(), figures: z.record(z.string(), z.union([z.number(), z.string()])) })),
}).refine(({ period, opinion }) => opinion.series.some(({ step }) => step <= period.end))

/** The figures of one sealed review, in points but for the probability. */
export type PageFigures = z.infer<typeof sealedFindings>
export type PageEstimate = z.infer<typeof estimate>

/** @returns null for a text that is no JSON, or holds no such figures */
export function pageFigures(text: string): PageFigures | null {
  try {
    return sealedFindings.safeParse(JSON.parse(text)).data ?? null
  } catch {
    return null
  }
}
