import { normalCdf } from '../../model/statistics/normal.ts'

/**
 * P(X >= x) for chi-square with an odd or even number of degrees of freedom, by the recurrence Q(x; k + 2) = Q(x; k) + (x/2)^(k/2) e^(-x/2) / Gamma(k/2 + 1)
 * (Abramowitz and Stegun 1964, 26.4.8).
 */
export function chiSquareTail(x: number, freedom: number): number {
  let k = freedom % 2 === 0 ? 2 : 1
  let tail = k === 2 ? Math.exp(-x / 2) : 2 * normalCdf(-Math.sqrt(x))
  // (x/2)^(k/2) e^(-x/2) / Gamma(k/2 + 1)
  let term = k === 2 ? (x / 2) * Math.exp(-x / 2) : Math.sqrt(x / 2) * Math.exp(-x / 2) / (Math.sqrt(Math.PI) / 2)
  for (; k < freedom; k += 2) {
    tail += term
    term *= (x / 2) / (k / 2 + 1)
  }
  return Math.min(1, tail)
}
