import { ModelError } from '../model-error.ts'

const rootTwoPi = 2.5066282746310002

/** Standard normal density. The square is split in two (Cody 1969), so that its rounding does not grow in the exponential. */
export function normalDensity(x: number): number {
  const rounded = Math.trunc(x * 16) / 16
  return Math.abs(x) > 39 ? 0 : (Math.exp(-0.5 * rounded * rounded) * Math.exp(-0.5 * (x - rounded) * (x + rounded))) / rootTwoPi
}

/**
 * Standard normal distribution function, relative error below 3e-15 in the lower tail too: for an upper tail ask for
 * `normalCdf(-x)` rather than `1 - normalCdf(x)`.
 *
 * @param x - any number, infinities included
 * @returns probability, in [0, 1]
 * @throws {ModelError} `number-missing` for NaN
 * @see Marsaglia (2004), Evaluating the normal distribution, J. Statistical Software 11(4): series about 0;
 *   Abramowitz and Stegun (1964), 26.2.14: continued fraction in the tails
 * @example normalCdf(0) // => 0.5
 */
export function normalCdf(x: number): number {
  if (Number.isNaN(x)) throw new ModelError('number-missing', 'Unexpected NaN, expected a number')
  if (x < -1.5) return lowerTail(-x)
  return x > 1.5 ? 1 - lowerTail(x) : 0.5 + normalDensity(x) * series(x)
}

/** x + x^3 / 3 + x^5 / (3 x 5) + ... */
function series(x: number): number {
  const square = x * x
  let term = x
  let sum = x
  for (let odd = 3; Math.abs(term) > Number.EPSILON * 0.1 * Math.abs(sum); odd += 2) {
    term *= square / odd
    sum += term
  }
  return sum
}

/** density(x) / (x + 1 / (x + 2 / (x + 3 / ...))), from the far end; 200 terms are enough from x = 1.5 on. */
function lowerTail(x: number): number {
  if (x > 39) return 0
  let fraction = x
  for (let k = 200; k >= 1; k -= 1) fraction = x + k / fraction
  return normalDensity(x) / fraction
}

/** Ratio of two polynomials of degree 7, coefficients from the constant up. */
function ratio(above: readonly number[], below: readonly number[], r: number): number {
  let numerator = above[7]
  let denominator = below[7]
  for (let power = 6; power >= 0; power -= 1) {
    numerator = numerator * r + above[power]
    denominator = denominator * r + below[power]
  }
  return numerator / denominator
}

// Coefficients of PPND16, rounded to double precision; recalled from memory: the tests hold them against the distribution function over the whole range.
const middle = {
  above: [3.3871328727963665, 133.14166789178438, 1971.5909503065513, 13731.69376550946, 45921.95393154987,
    67265.7709270087, 33430.57558358813, 2509.0809287301227],
  below: [1, 42.31333070160091, 687.1870074920579, 5394.196021424751, 21213.794301586597, 39307.89580009271,
    28729.085735721943, 5226.495278852854],
}
const side = {
  above: [1.4234371107496835, 4.630337846156546, 5.769497221460691, 3.6478483247632045, 1.2704582524523684,
    0.2417807251774506, 0.022723844989269184, 0.0007745450142783414],
  below: [1, 2.053191626637759, 1.6763848301838038, 0.6897673349851, 0.14810397642748008, 0.015198666563616457,
    0.0005475938084995345, 1.0507500716444169e-9],
}
const far = {
  above: [6.657904643501103, 5.463784911164114, 1.7848265399172913, 0.29656057182850487, 0.026532189526576124,
    0.0012426609473880784, 0.000027115555687434876, 2.0103343992922881e-7],
  below: [1, 0.599832206555888, 0.1369298809227358, 0.014875361290850615, 0.0007868691311456133,
    0.000018463183175100548, 1.421511758316446e-7, 2.0442631033899397e-15],
}

/**
 * Standard normal quantile, relative error below 1e-15.
 *
 * @param p - probability in [0, 1]; 0 and 1 give the infinities
 * @throws {ModelError} `probability-range`
 * @see Wichura (1988), Algorithm AS 241, Applied Statistics 37:477-484
 * @example normalQuantile(0.5) // => 0
 */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) throw new ModelError('probability-range', `Unexpected probability ${p}, expected one in [0, 1]`)
  const q = p - 0.5
  if (Math.abs(q) <= 0.425) return q * ratio(middle.above, middle.below, 0.180625 - q * q)
  if (p === 0 || p === 1) return q < 0 ? -Infinity : Infinity
  const r = Math.sqrt(-Math.log(q < 0 ? p : 1 - p))
  const size = r <= 5 ? ratio(side.above, side.below, r - 1.6) : ratio(far.above, far.below, r - 5)
  return q < 0 ? -size : size
}
