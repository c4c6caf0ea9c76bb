import { z } from 'zod'
import { count, effectiveCount, estimate, movement, percent, plain, plainEstimate, points, share } from './parts-schema.ts'

/*
 * Who is speaking, how far they stand for customers, what the coder adds, and what to do to hear more kinds of people. A figure that
 * would rest on fewer authors than the smallest group shown is null wherever it stands.
 */

const concentration = z.strictObject({
  /** Known authors and their mentions. */
  authors: count, mentions: count,
  /** Share of mentions by the most prolific 1 % of authors (at least one author). */
  top_share: share,
  gini: plain.min(0).max(1),
  /** Inverse Simpson: how many equally active authors would be as concentrated. */
  effective_authors: effectiveCount,
})

const stances = ['negative', 'middle', 'positive'] as const
/** Of the authors with that stance (the third of [-1, 1] that holds their mean score) in one period, how many posted in the next one too. */
const staying = z.strictObject({
  from: z.string(), to: z.string(), stance: z.enum(stances),
  authors: count, stayed: count.nullable(),
  /** Wilson interval. */
  share: share.nullable(), low: share.nullable(), high: share.nullable(),
})

const movedShare = z.strictObject({ difference: percent, low: percent, high: percent, movement })

const spreadOfVenue = z.strictObject({
  venue: z.string(), label: z.string(),
  /** Standard deviation of scores inside the venue, in points: the period under review, the base, and their difference. */
  now: points.nullable(), base: points.nullable(), change: estimate.nullable(), movement: movement.nullable(),
  series: z.array(z.strictObject({
    period: z.string(), mentions: count, spread: points.nullable(),
    /** Share of scores at either end of the scale; null where they are not known (ready-made cells). */
    extremes: share.nullable(),
  })),
})

const pull = z.strictObject({
  venue: z.string(), label: z.string(),
  /** null for all classes together. */
  poster: z.string().nullable(), poster_label: z.string().nullable(),
  replies: count, authors: count,
  /** Points of a reply per point of the thread before it, both less what their venue, topic and period would lead one to expect. */
  slope: plainEstimate, movement,
})

export const speaking = z.strictObject({
  concentration: z.strictObject({ period: concentration.nullable(), previous: concentration.nullable() }),
  venues: z.array(z.strictObject({ venue: z.string(), concentration: concentration.nullable() })),
  /** Share of each level among the mentions of each period, for every factor. */
  mix: z.array(z.strictObject({ factor: z.string(), level: z.string(), label: z.string(), period: z.string(), mentions: count, share })),
  /** null where no author is known, or there is one period only. */
  staying: z.strictObject({
    periods: z.array(staying),
    /** Latest three transitions together, percentage points: the share of middling authors that stayed less that of the others. */
    middle_gap: movedShare.nullable(),
    /** The same gap less that of the base. */
    middle_gap_change: movedShare.nullable(),
  }).nullable(),
  spread: z.array(spreadOfVenue),
  /** Empty where no thread is known. */
  pull: z.array(pull),
})

const benchmarkLevel = z.strictObject({
  level: z.string(),
  /** Share of customers; share of the period's authors who are known to belong to a level of the margin. */
  customers: share, heard: share.nullable(),
  authors: count.nullable(),
  /** heard less customers, in percentage points. */
  gap: percent.nullable(),
  /** Percentage points by which its share of the authors stays below that of customers, 0 if it does not; a level too small to show counts as unheard. Null where too few authors of the margin are known. */
  shortfall: percent.min(0).nullable(),
  /** Authors of this level that would be needed besides, for its share to be that of customers: if it alone were heard more, and if all levels were brought to their shares at once (null where that can't be done). */
  needed: count, needed_jointly: count.nullable(),
  /** Authors to plan for: those needed jointly where several levels of the margin are heard too little, since more are then asked of all of them; else those needed. */
  planned: count,
})

export const benchmark = z.strictObject({
  margins: z.array(z.strictObject({
    margin: z.string(),
    /** Index of dissimilarity (Duncan and Duncan 1955): the share of authors that would have to belong to another level. */
    dissimilarity: share.nullable(),
    /** Authors whose level is known, and all. */
    authors: count, all_authors: count,
    /** Authors needed besides, over all levels, for every share to be that of customers; null where customers' shares leave out a level that was heard. */
    needed_jointly: count.nullable(),
    levels: z.array(benchmarkLevel),
  })),
  /** Weights that bring the authors to the margins (Deming and Stephan 1940); null where it can't be done at all. */
  raking: z.strictObject({
    converged: z.boolean(), cycles: count, lowest: plain, highest: plain,
    /** Authors whose weight was held at the bounds. */
    bounded: count,
    design_effect: plain.min(1), authors: count, effective_authors: effectiveCount,
  }).nullable(),
  /** Levels with customers of whom no author was heard: no weight can bring them in. */
  unreachable: z.array(z.strictObject({ margin: z.string(), level: z.string(), customers: share })),
  /** Mean over authors of their mean score, in points: as heard, and weighted to the customers. */
  as_heard: points.nullable(), weighted: estimate.nullable(),
})

export const volume = z.strictObject({
  wave: z.string(), metric: z.string(), label: z.string(),
  /** Percent: content voices by the raw average, a neutral one counted half; and what the survey found. */
  posts: percent, survey: percent, gap: percent,
  authors: count,
  /** From the account; null where it does not say. */
  customers: count.nullable(),
  /** Correlation between posting and being favourable that the gap implies (Meng 2018, eq. 1.2); null without the number of customers. */
  defect_correlation: plain.nullable(),
  /** Interviews of a simple random sample whose expected error is as large as the gap; null where the survey's own error is as large. */
  equal_sample: effectiveCount.nullable(),
})

export const tipping = z.strictObject({
  /** How many times likelier to post, against before, the `who` must have become for the reported change of opinion to vanish. */
  ratio: plainEstimate, who: z.enum(['content', 'unhappy']),
  /** Change of opinion that would be left, in points, if the `who` had become so many times likelier to post; one row stands at the mean of `ratio`. */
  curve: z.array(z.strictObject({ ratio: plain, change: estimate })),
})

export const coder = z.strictObject({
  status: z.enum(['absent', 'applied', 'refused']),
  /** Why it was refused: too few codings in a venue, too poor to invert, scores from a range, labels that differ between sources, ready-made cells. */
  reason: z.enum(['too-few', 'too-poor', 'ranges', 'labels-differ', 'ready-made']).nullable(),
  venues: z.array(z.strictObject({
    venue: z.string(), label: z.string(), codings: count,
    /** Share of the hand-coded posts that the coder labelled alike. */
    agreement: share,
    smallest_singular_value: plain.min(0),
    /** Why the venue's scores stay as coded; null where they are corrected. */
    refused: z.enum(['too-few', 'too-poor', 'ranges', 'ready-made', 'no-audit']).nullable(),
    /** What correcting does to the venue's mean score in the period, in points. */
    correction: estimate.nullable(),
  })),
  /** What correcting does to the period's mean of all mentions, in points. */
  correction: estimate.nullable(), movement: movement.nullable(),
  /** Codings a venue that would bring the audit's own part of a level's interval to `width` points, if the coder were right as often as `accuracy`. */
  audit_size: z.strictObject({ width: points, accuracy: share, codings_per_venue: count, codings: count }).nullable(),
})

export const importance = z.strictObject({
  source: z.enum(['stated', 'relative-weights']),
  respondents: count.nullable(),
  /** Share of the variance of overall opinion that the topics explain together; for relative weights. */
  explained: share.nullable(),
  topics: z.array(z.strictObject({
    topic: z.string(), label: z.string(), importance: share,
    /** Share of the period's mentions of topics with an importance; authors; null where too few to show. */
    talk: share.nullable(), authors: count.nullable(), gap: percent.nullable(),
  })),
  /** Half the sum of the absolute gaps: the share of talk that would have to be about something else. */
  dissimilarity: share,
  /** Mix-adjusted opinion at topics weighted by importance, in points. */
  level: estimate, change: estimate.nullable(),
})

export const sensitivity = z.strictObject({
  /** Prior of each standard deviation raised to the power 0.5 and 2 by re-weighting: how far the change of opinion moves, in its posterior sd. */
  scales: z.array(z.strictObject({ scale: z.string(), shift: plain.min(0) })),
  /** The largest. */
  shift: plain.min(0),
  /** Whether the weights can be relied on: Pareto k at most 0.7 in all. */
  reliable: z.boolean(),
})

/** What more authors of one venue, heard in the next period, would do to the interval of its change of opinion. */
export const hearing = z.strictObject({
  /** Width of that interval if as many are heard as now, in points. */
  width: points.min(0),
  venues: z.array(z.strictObject({
    venue: z.string(), label: z.string(), cost_per_author: z.number(), cost_given: z.boolean(),
    curve: z.array(z.strictObject({ authors: count, width: points.min(0) })),
  })),
})

export const advice = z.strictObject({
  /** Names the messages of the catalogue that word it. */
  code: z.string(),
  /** Which venue, segment or topic; empty where it concerns all. */
  where: z.string(), where_kind: z.enum(['venue', 'segment', 'topic', 'survey', 'coder', 'all']),
  how_many: count,
  /** Whether it is worth doing, since it narrows its interval by enough or lets a group be heard that is among the least heard (`clearly`), or not (`hardly`), where a gain can be computed. */
  helps: z.enum(['clearly', 'hardly', 'not-computed']),
  /** The part of the interval's width that it takes away. */
  gain_share: share.nullable(),
  /** Fall of the standard deviation that the advice is ranked by, in points; of what is said in `gain_of`. */
  gain: estimate.nullable(), gain_of: z.enum(['next-change', 'importance-level', 'customer-mean', 'none']),
  cost: z.number().min(0).nullable(),
  /** Whether the account gave the cost of an author; 1 each if not. */
  cost_given: z.boolean(),
  /** Gain per unit of cost, by which it is ranked; null for advice that no gain can be computed for. First what clearly helps, by this; then what no gain can be computed for; last what hardly helps, by this. */
  gain_per_cost: z.number().nullable(),
  action: z.string(), evidence: z.string(), success: z.string(),
  /** The figures in the wording. */
  figures: z.record(z.string(), z.union([z.number(), z.string()])),
})
