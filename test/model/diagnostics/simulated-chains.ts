import { createGenerator } from '../../../model/random/generator.ts'

/** Chains of a first-order autoregression with standard normal margins: its effective size is known, draws (1 - phi) / (1 + phi). */
export function autoregression(phi: number, chains: number, draws: number, seed: number): Float64Array[] {
  return Array.from({ length: chains }, (_, stream) => {
    const generator = createGenerator(seed, stream)
    let value = generator.normal()
    return Float64Array.from({ length: draws }, () => {
      const kept = value
      value = phi * value + Math.sqrt(1 - phi * phi) * generator.normal()
      return kept
    })
  })
}
