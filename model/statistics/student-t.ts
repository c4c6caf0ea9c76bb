import { ModelError } from '../model-error.ts'

/** Up to here from the centre outwards, from here on the tail itself. */
const seam = 2

/**
 * Distribution function of Student's t, relative error below 3e-14 in the lower tail too, down to 1e-100: for an upper tail ask for
 * `studentCdf(-t, freedom)` rather than `1 - studentCdf(t, freedom)`. The work does not grow with the freedom.
 *
 * @param t - any number, infinities included
 * @param freedom - degrees of freedom, finite, at least 1; need not be whole
 * @returns probability, in [0, 1]
 * @throws {ModelError} `number-missing` for NaN, `freedom-invalid`
 * @see Student (1908), Biometrika 6:1-25; Abramowitz and Stegun (1964), 26.7.1, as an incomplete beta function; DLMF 8.17.8
 *   (series about 0); DiDonato and Morris (1992), ACM TOMS 18:360-373 (continued fraction in the tails)
 * @example studentCdf(0, 5) // => 0.5
 */
export function studentCdf(t: number, freedom: number): number {
  if (Number.isNaN(t)) throw new ModelError('number-missing', 'Unexpected NaN, expected a number')
  if (!(freedom >= 1 && freedom < Infinity)) throw new ModelError('freedom-invalid', `Unexpected degrees of freedom ${freedom}, expected a finite number of at least 1`)
  if (t < -seam) return upperTail(-t, freedom)
  return t > seam ? 1 - upperTail(t, freedom) : 0.5 + fromCentre(t, freedom)
}

/**
 * The density times t. With tan a = t / sqrt(freedom) it is sin a (cos a)^freedom / B(freedom / 2, 1 / 2), in which no square
 * of a large t runs out of range.
 */
function densityTimesT(t: number, freedom: number): number {
  const slope = t / Math.sqrt(freedom)
  const secant = Math.hypot(1, slope)
  const logCosine = Math.abs(slope) < 1 ? -0.5 * Math.log1p(slope * slope) : -Math.log(secant)
  return (slope / secant) * Math.exp(freedom * logCosine) * (gammaRatio(freedom) / Math.sqrt(Math.PI))
}

/** Probability between 0 and t; with growing freedom this becomes the normal's x + x^3 / 3 + x^5 / (3 x 5) + ... */
function fromCentre(t: number, freedom: number): number {
  const squaredSine = (t * t) / (freedom + t * t)
  let term = 1
  let sum = 1
  for (let k = 0; term > Number.EPSILON * 0.1 * sum; k += 1) {
    term *= (((freedom + 1) / 2 + k) / (1.5 + k)) * squaredSine
    sum += term
  }
  return densityTimesT(t, freedom) * sum
}

/**
 * Half the incomplete beta function I_x(a, 1 / 2), a = freedom / 2, x = freedom / (freedom + t^2). The fraction is the even part of
 * the usual one: of that the first terms cancel where x is near 1.
 */
function upperTail(t: number, freedom: number): number {
  const front = t === Infinity ? 0 : densityTimesT(t, freedom)
  if (front === 0) return 0
  const a = freedom / 2
  const x = 1 / (1 + (t / freedom) * t)
  const rest = 1 / (1 + freedom / t / t)
  const first = a * rest - 0.5 * x + 1
  // Lentz's method: value of the fraction as a product of ratios of convergents.
  let [value, above, below] = [(a / (a + 1)) * first, (a / (a + 1)) * first, 0]
  for (let n = 1; n < 500; n += 1) {
    const odd = a + 2 * n - 1
    const numerator = (((a + n - 1) * (a + n - 0.5)) / (odd * odd)) * n * (0.5 - n) * x * x
    const denominator = n + (n * (0.5 - n) * x) / odd + ((a + n) / (odd + 2)) * (first + n * (1 + rest))
    below = 1 / (denominator + numerator * below)
    above = denominator + numerator / above
    value *= above * below
    if (Math.abs(above * below - 1) <= Number.EPSILON) break
  }
  return (0.5 * front) / value
}

/**
 * Gamma((v + 1) / 2) / Gamma(v / 2): up to v >= 30 by its recurrence, there by Stirling's series of the two logarithms,
 * whose next term is below 4e-16.
 */
function gammaRatio(v: number): number {
  let factor = 1
  let w = v
  for (; w < 30; w += 2) factor *= w / (w + 1)
  const inverse = 1 / (w * w)
  const correction = (-1 / 4 + inverse * (1 / 24 + inverse * (-1 / 20 + inverse * (17 / 112 - inverse * (31 / 36))))) / w
  return factor * Math.sqrt(w / 2) * Math.exp(correction)
}
