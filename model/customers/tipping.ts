import type { Estimate, Findings } from '../findings/schema.ts'
import { average } from '../reading/draw-columns.ts'
import type { Reading } from '../reading/context.ts'
import { points } from '../reading/summarise.ts'
import { estimateOf } from '../statistics/estimate.ts'
import { changeUnderRatio, tippingRatio } from '../statistics/selection-odds.ts'

type Tipping = NonNullable<Findings['tipping']>

/** How many times likelier one side might have become, for the curve: as far as the tipping point's interval asks for, which is above 1 by definition but may reach below. */
const ratios = [
  [0.9, 0.95, 1, 1.05, 1.1, 1.15, 1.2, 1.25],
  [0.7, 0.8, 0.9, 1, 1.1, 1.2, 1.4, 1.6, 1.8, 2],
  [0.5, 0.7, 1, 1.4, 2, 3, 4, 6, 8],
] as const

/**
 * How strong selective posting would have to be to make the reported change of opinion out of nothing, draw by draw.
 *
 * @returns null where there is no period before, or a draw lies beyond the scale
 */
export function readTipping({ adjusted, periodSteps, previousSteps }: Reading, interval: number): Tipping | null {
  if (previousSteps === null) return null
  const [now, before] = [periodSteps, previousSteps].map((steps) => average(steps.map((t) => adjusted[t])))
  if ([...now, ...before].some((level) => Math.abs(level) >= 1)) return null
  const ratio = now.map((after, i) => tippingRatio(before[i], after).value ?? 1)
  // a rise is undone by the content, a fall by the unhappy having become likelier to post
  const fell = ratio.reduce((sum, value) => sum + Math.log(value), 0) > 0
  const tips = estimateOf(fell ? ratio : ratio.map((value) => 1 / value), interval)
  return {
    who: fell ? 'unhappy' : 'content', ratio: tips,
    curve: along(tips).map((times) => ({
      ratio: times,
      // that the content are so many times likelier to post is the same as the unhappy so many times less
      change: estimateOf(now.map((after, i) => points * (changeUnderRatio(before[i], after, fell ? times : 1 / times).value ?? 0)), interval),
    })),
  }
}

/** The narrowest of the scales that holds the tipping point with its interval, and the tipping point itself. */
function along({ mean, high }: Estimate): readonly number[] {
  const scale = ratios.find((candidate) => Math.max(mean, high) <= candidate[candidate.length - 1]) ?? ratios[ratios.length - 1]
  return [...new Set([...scale, mean])].sort((a, b) => a - b)
}
