import { z } from 'zod'
import { estimate } from '../../model/findings/parts-schema.ts'
import { auditOf, type SealedFigures } from '../../model/past/past.ts'

const figure = z.union([z.number(), z.string()])

/** What is read of sealed findings: keys that later versions add, or earlier ones did not have, do not matter. */
const sealedFindings = z.object({
  interval: z.number(),
  opinion: z.object({ period: estimate, change: estimate.nullable() }),
  coder: z.object({ status: z.string(), venues: z.array(z.object({ venue: z.string(), codings: z.number(), agreement: z.number() })) }),
  advice: z.array(z.object({
    code: z.string(), where: z.string(), where_kind: z.enum(['venue', 'segment', 'topic', 'survey', 'coder', 'all']), how_many: z.number(),
    helps: z.enum(['clearly', 'hardly', 'not-computed']), figures: z.record(z.string(), figure), action: z.string(), success: z.string(),
  })),
})

/** The figures of sealed findings that later reviews speak of. @throws {z.ZodError} where it holds none */
export function sealedFigures(text: string): SealedFigures {
  const { interval, opinion, coder, advice } = sealedFindings.parse(JSON.parse(text))
  return { level: opinion.period, change: opinion.change, interval, audit: auditOf(coder), advice }
}
