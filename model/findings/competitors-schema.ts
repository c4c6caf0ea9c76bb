import { z } from 'zod'
import { count, estimate, movement, percent, percentEstimate, probability, share } from './parts-schema.ts'

/* Other brands out of the same files, beside the account's own. */

/** A share of the mentions of all brands together, in percent. Its mean is what was counted, its interval how far chance alone may move that. */
const shareOverTime = z.strictObject({ now: percentEstimate, previous: percentEstimate.nullable(), base: percent.nullable(), change: percentEstimate.nullable(), movement: movement.nullable() })

const voice = {
  mentions: count, mentions_previous: count, mentions_base: count, authors: count,
  /** As counted, and at one mix of venues; null where mentions can't be counted alike for all brands, or there is none. */
  share: shareOverTime.nullable(), equal_share: shareOverTime.nullable(),
}

const moved = { movement: movement.nullable() }

const competitor = z.strictObject({
  brand: z.string(),
  /**
   * `unread`: no source tells brands apart; `absent`: no mention was found; `thin`: too few authors in the period; `apart`: no level of some factor is shared with the
   * brand. Only of `compared` is opinion told.
   */
  status: z.enum(['compared', 'thin', 'apart', 'absent', 'unread']),
  /** Readable rows that name it, copies and later ones among them. */
  rows: count,
  ...voice,
  /** Share of the brand's fixed mix that lies in levels which both have mentions in, the least over the factors; and the levels left out of it. */
  covered: share.nullable(), left_out: z.array(z.strictObject({ factor: z.string(), label: z.string() })),
  /** Whether its fit can be relied on; null where there is none. */
  converged: z.boolean().nullable(),
  /** Mix-adjusted opinion of the period at the shared mix: of the competitor, of the brand. */
  level: estimate.nullable(), own_level: estimate.nullable(),
  /** The brand's less the competitor's, and whether the brand stands above it; so with the others. */
  difference: z.strictObject({ level: estimate.nullable(), ...moved }), probability_above: probability.nullable(),
  change: z.strictObject({ own: estimate.nullable(), level: estimate.nullable(), ...moved, difference: estimate.nullable(), difference_movement: movement.nullable() }),
  since_base: z.strictObject({ own: estimate.nullable(), level: estimate.nullable(), ...moved, difference: estimate.nullable(), difference_movement: movement.nullable() }),
  /** In percentage points of the mentions. */
  share_difference: z.strictObject({ raw: percentEstimate.nullable(), raw_movement: movement.nullable(), equal: percentEstimate.nullable(), equal_movement: movement.nullable() }),
  /** Every period up to the one under review, oldest first; null where too few authors posted. */
  series: z.array(z.strictObject({ period: z.string(), own: estimate.nullable(), level: estimate.nullable() })),
})

export const competitors = z.strictObject({
  /** How many of the sources say which brand a row is about. */
  told: z.enum(['all', 'some', 'none']),
  own: z.strictObject(voice),
  /** In the order of the account. */
  brands: z.array(competitor),
  /** The venues of all brands: the weight of each in the shares at one mix, its part of all their mentions in the base; and the mentions of the period. */
  venues: z.array(z.strictObject({ venue: z.string(), label: z.string(), weight: share, own: count, brands: z.array(z.strictObject({ brand: z.string(), mentions: count })) })),
  /** Part of those weights that lies in venues with a mention of any brand in the period. */
  weight_heard: share.nullable(),
})
