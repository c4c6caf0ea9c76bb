import type { Findings } from '../findings/schema.ts'
import { average } from '../reading/draw-columns.ts'
import type { Reading } from '../reading/context.ts'
import { points } from '../reading/summarise.ts'
import { estimateOf } from '../statistics/estimate.ts'
import { changeUnderRatio, tippingRatio } from '../statistics/selection-odds.ts'

type Tipping = NonNullable<Findings['tipping']>

/** How many times likelier the unhappy might have become, for the curve: near 1 where little would do, else far from it. */
const ratios = { near: [0.8, 0.85, 0.9, 0.95, 1, 1.05, 1.1, 1.15, 1.2, 1.25], far: [0.5, 0.6, 0.7, 0.8, 0.9, 1, 1.1, 1.25, 1.4, 1.6, 1.8, 2] } as const
const little = 1.2

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
    curve: (tips.mean < little ? ratios.near : ratios.far).map((times) => ({ ratio: times, change: estimateOf(now.map((after, i) => points * (changeUnderRatio(before[i], after, times).value ?? 0)), interval) })),
  }
}
