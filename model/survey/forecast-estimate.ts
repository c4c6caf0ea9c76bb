import type { Estimate } from '../findings/schema.ts'
import { mixtureMean, mixtureQuantile, mixtureSd, type MixtureComponent } from '../statistics/mixture-forecast.ts'

/** A forecast as an estimate; at least five pairs stand behind every part of it, so that its mean and spread exist. */
export function forecastEstimate(components: readonly MixtureComponent[], interval: number): Estimate {
  const [mean, sd] = [mixtureMean(components).value, mixtureSd(components).value]
  if (mean === null || sd === null) throw new Error('a regression on five pairs has four degrees of freedom')
  return { mean, low: mixtureQuantile((1 - interval) / 2, components), high: mixtureQuantile((1 + interval) / 2, components), sd }
}
