import { z } from 'zod'
import type { IntakeFacts } from './flatten-intake.ts'

const text = z.string()
const number = z.number()
const index = z.int().min(-1)
const count = z.int().min(0)
const period = z.strictObject({ name: text, start: text, end: text })
const variation = z.array(z.strictObject({ authors: number, mentions: number, squaredSizes: number, betweenSquares: number, withinSquares: number }).nullable())
const level = z.strictObject({ name: text, label: text, anchor: z.boolean().exactOptional(), costPerAuthor: number.exactOptional() })

/** `intake/facts.json` of a draft or a seal, as `flattenIntake` made it. */
const factsSchema = z.strictObject({
  factors: z.array(z.strictObject({ name: text, levels: z.array(level) })).min(1),
  variation,
  hindsight: z.strictObject({
    before: index, variation,
    settling: z.array(z.strictObject({ venue: index, from: index, to: index, settled: index })),
  }).nullable(),
  noLabels: z.enum(['ranges', 'labels-differ', 'ready-made']).nullable(),
  timeline: z.strictObject({
    grid: z.enum(['day', 'week', 'month']), stepDays: number, steps: z.array(text), lastDays: z.array(text), lastMention: text, quietDays: number,
    periods: z.array(period), periodOf: z.array(index), inBase: z.array(z.literal([0, 1])), base: z.strictObject({ from: text, to: text }), current: index, review: period,
  }),
  accounting: z.strictObject({
    received: count, rejected: count, duplicates: count, outOfScope: count, modelled: count, reasons: z.record(text, count),
    unread: z.array(z.strictObject({ column: z.enum(['posted_at', 'score']), value: text, rows: count })),
    unmapped: z.array(z.strictObject({ factor: text, value: text, mentions: count })),
    inputs: z.array(z.strictObject({ path: text, sha256: text, rows: count })), withAuthor: z.array(number), readyMade: z.boolean(),
  }),
  labels: z.strictObject({ names: z.array(text), scores: z.array(number) }).nullable(),
  segments: z.strictObject({ margins: z.array(text), levels: z.array(z.array(text)) }).nullable(),
  authors: z.strictObject({ exact: z.boolean(), byPeriod: z.array(number), byPeriodLevel: z.array(z.array(number)) }),
}) satisfies z.ZodType<IntakeFacts>

/**
 * The facts in a text of JSON.
 *
 * @throws {Error} where it holds anything else
 */
export function readFacts(text: string): IntakeFacts {
  const facts: unknown = JSON.parse(text)
  factsSchema.parse(facts)
  // as it was written: the schema's own copy has its keys in another order, and findings keep to the order
  return facts as IntakeFacts
}
