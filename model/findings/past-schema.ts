import { z } from 'zod'
import { definitionParts } from '../past/definition.ts'
import { count, estimate, isoDate, points, share } from './parts-schema.ts'

/* What the archive of the account says of earlier periods, and how the present review sees them now. */

/** Why a figure of a past period is another today. `late_posts`: posts of steps that were over and whole when it was sealed; `account`: the account file, or the coding audit; `program`: the program; `later_posts`: what came after. */
const movedParts = z.strictObject({
  /** null where it can't be told apart from `account`. */
  late_posts: points.nullable(), account: points, program: points, later_posts: points,
})

const revisedPeriod = z.strictObject({
  period: z.string(),
  /** As it was first sealed. */
  sealed_on: isoDate, level: estimate, change: estimate.nullable(),
  /** As it was sealed last, where it was revised. */
  revised: z.strictObject({ review: z.string(), revision: count, sealed_on: isoDate, reason: z.string(), level: estimate }).nullable(),
  /** As it stands now; null where the period is no part of the history any more. */
  level_now: estimate.nullable(), change_now: estimate.nullable(),
  /** Now less first sealed, and its parts, which sum to it. */
  moved: points.nullable(), moved_change: points.nullable(), parts: movedParts.nullable(),
  /** Whether the figure of now lies outside the interval that was told. */
  outside: z.boolean(),
  /** Mentions of the period's whole steps that were not there when it was sealed, and those that are gone since. */
  late: count, gone: count,
  /** What the figures mean has changed since, in these; and whether the tables of then could be read by the definition of now. */
  redefined: z.array(z.enum(definitionParts)), bridged: z.boolean(),
  /** Whether the model's code is another than then. */
  program_changed: z.boolean(),
})

export const revisions = z.strictObject({
  /** Past periods that were sealed, oldest first; the one under review among them where it was sealed before. */
  periods: z.array(revisedPeriod),
  /** Over the past periods that still stand: medians of what they moved, without sign, and of half their intervals as told. */
  typical: z.strictObject({ periods: count, level: points, half_width: points, change: points.nullable(), change_half_width: points.nullable(), outside: count }).nullable(),
  late: count, gone: count,
  /** Where what the figures mean changed between one sealed period and the next review, oldest first. */
  breaks: z.array(z.strictObject({
    /** The last period by the earlier definition, and the first by the later. */
    after: z.string(), before: z.string(), parts: z.array(z.enum(definitionParts)), bridged: z.boolean(),
  })),
})

const progress = (figure: z.ZodNumber) => z.strictObject({ before: figure, sought: figure.nullable(), now: figure.nullable() })

const followedAdvice = z.strictObject({
  code: z.string(), where: z.string(), where_kind: z.enum(['venue', 'segment', 'topic', 'survey', 'coder', 'all']),
  /** In the words of the sealed review. */
  action: z.string(), success: z.string(),
  /** What it is measured by, in counts or in shares; null where it is measured by the other. */
  counts: progress(count).nullable(), shares: progress(share).nullable(),
  /** Width of the interval of the change of opinion: expected then, and seen now. */
  width: z.strictObject({ expected: points, now: points.nullable() }).nullable(),
  outcome: z.enum(['met', 'partly', 'not-met', 'unknown']),
})

export const followUp = z.strictObject({
  /** The sealed review that gave the advice. */
  period: z.string(), review: z.string(), sealed_on: isoDate,
  met: count, partly: count, not_met: count, unknown: count,
  advice: z.array(followedAdvice),
})
