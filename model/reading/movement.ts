import type { Estimate, Movement } from '../findings/schema.ts'

/** The one rule by which a movement may be announced: its whole interval lies on one side of zero. */
export function movementOf(estimate: Estimate): Movement {
  if (estimate.low > 0) return 'up'
  return estimate.high < 0 ? 'down' : 'not-established'
}
