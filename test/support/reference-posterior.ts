import { readFileSync } from 'node:fs'

/**
 * Exact and sampled posteriors of `mix-model-cells.csv`, made by independent programs (R 4.2.2 by dense algebra; JAGS 4.3.1; a slice
 * sampler on CHOLMOD): what each figure is and with what it was made stands in the file itself.
 */
export interface ReferencePosterior {
  readonly intake: {
    readonly target_mix: Readonly<Record<string, Readonly<Record<string, number>>>>
    readonly sampling_variance_sum: number
    readonly s2: Readonly<Record<string, number>>
  }
  readonly conditional: readonly {
    readonly name: string
    readonly sigmas: { readonly venue_drift: Readonly<Record<string, number>> } & Readonly<Record<'mu' | 'venue' | 'topic' | 'poster' | 'tau', number>>
    readonly log_marginal_likelihood: number
    /** quantity -> [mean, sd] */
    readonly quantities: Readonly<Record<string, readonly [number, number]>>
  }[]
  /** quantity -> [mean, sd, q5, q95] */
  readonly posterior: Readonly<Record<'jags' | 'marginal', Readonly<Record<string, readonly [number, number, number, number]>>>>
}

export const referencePosterior = JSON.parse(readFileSync(new URL('../reference/mix-model.json', import.meta.url), 'utf8')) as ReferencePosterior

/** A setting's standard deviations in the order of the problem's scales. */
export function sigmasOf(setting: ReferencePosterior['conditional'][number], scales: readonly { readonly name: string }[]): Float64Array {
  const { venue_drift: drift, ...others } = setting.sigmas
  return Float64Array.from(scales, ({ name }) => {
    const [, venue] = /^venue_drift\.(.*)$/.exec(name) ?? []
    return venue === undefined ? others[name as keyof typeof others] : drift[venue]
  })
}
