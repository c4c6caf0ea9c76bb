import type { Estimate } from '../findings/schema.ts'
import { mixtureMean, mixtureQuantile, mixtureSd, type MixtureComponent } from '../statistics/mixture-forecast.ts'

/** A metric's least and greatest value: a share's in percent; a mean has none. */
export type Limits = readonly [least: number, most: number]

export function limitsOf(kind: 'share' | 'mean'): Limits {
  return kind === 'share' ? [0, 100] : [-Infinity, Infinity]
}

/** A forecast as an estimate, cut to what the metric can be; at least five pairs stand behind every part of it, so that its mean and spread exist. */
export function forecastEstimate(components: readonly MixtureComponent[], interval: number, [least, most]: Limits): Estimate {
  const [mean, sd] = [mixtureMean(components).value, mixtureSd(components).value]
  if (mean === null || sd === null) throw new Error('a regression on five pairs has four degrees of freedom')
  const within = (value: number) => Math.max(least, Math.min(most, value))
  return { mean: within(mean), low: within(mixtureQuantile((1 - interval) / 2, components)), high: within(mixtureQuantile((1 + interval) / 2, components)), sd }
}
