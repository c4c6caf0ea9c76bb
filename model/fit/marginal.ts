/**
 * One coordinate of the proposal: two half-normals joined at the mode, each with a width and a tail of its own.
 *
 * Widths that differ carry the skewness (Geweke 1989, Econometrica 57:1317, split densities for importance sampling); the
 * map g(x) = delta sinh(asinh(x) / delta) with delta < 1 stretches a tail (Jones and Pewsey 2009, Biometrika 96:761), so that
 * it outlasts every normal one and importance weights stay bounded.
 */
export interface SplitMarginal {
  readonly mode: number
  readonly left: Half
  readonly right: Half
}

/** One side of the mode. */
export interface Half {
  readonly width: number
  /** delta, in [0.6, 0.9]: the smaller, the heavier the tail. */
  readonly tail: number
}

const heaviest = 0.6
const lightest = 0.9
const usual = 0.8

/** g(x), odd, with g'(0) = 1. */
function stretch(x: number, tail: number): number {
  return tail * Math.sinh(Math.asinh(x) / tail)
}

/** A symmetric one, mean 0 and variance a little above 1. */
export function standardMarginal(): SplitMarginal {
  return { mode: 0, left: { width: 1, tail: usual }, right: { width: 1, tail: usual } }
}

/** Strides of the pattern search: widths to 2 percent are good enough for a proposal. */
const firstStride = 0.2
const lastStride = 0.02

/**
 * The marginal of greatest likelihood, by pattern search (Hooke and Jeeves 1961, J. ACM 8:212). Likelihood rather
 * than moments, because it punishes a density that is too thin where the sample is: what importance weights suffer from.
 *
 * @param values - shape (n), of mean about 0 and variance about 1
 */
export function fitMarginal(values: Float64Array): SplitMarginal {
  // mode, log widths, tails
  const at = [0, 0, 0, usual, usual]
  const marginal = (): SplitMarginal => ({ mode: at[0], left: { width: Math.exp(at[1]), tail: at[3] }, right: { width: Math.exp(at[2]), tail: at[4] } })
  let best = logLikelihood(marginal(), values)
  for (let stride = firstStride; stride > lastStride;) {
    let rose = false
    for (let k = 0; k < at.length; k++) {
      for (const move of [stride, -stride]) {
        const before = at[k]
        at[k] = k < 3 ? before + move : Math.max(heaviest, Math.min(lightest, before + 0.5 * move))
        const found = logLikelihood(marginal(), values)
        if (found > best) {
          best = found
          rose = true
          break
        }
        at[k] = before
      }
    }
    if (!rose) stride /= 2
  }
  return marginal()
}

function logLikelihood(m: SplitMarginal, values: Float64Array): number {
  let total = 0
  for (const value of values) total += marginalLogDensity(m, value)
  return total
}

/**
 * @param u - in (0, 1)
 * @param quantile - standard normal quantile function
 * @returns the value at probability u
 */
export function marginalQuantile({ mode, left, right }: SplitMarginal, u: number, quantile: (p: number) => number): number {
  const onLeft = left.width / (left.width + right.width)
  if (u < onLeft) return mode + left.width * stretch(quantile(0.5 * u / onLeft), left.tail)
  return mode - right.width * stretch(quantile(0.5 * (1 - u) / (1 - onLeft)), right.tail)
}

/** Log density at s. */
export function marginalLogDensity({ mode, left, right }: SplitMarginal, s: number): number {
  const { width, tail } = s < mode ? left : right
  // s = mode + width g(x): x = sinh(a), and dx/dg = cosh(a) / sqrt(1 + y^2) at g = tail y
  const y = (s - mode) / width / tail
  const a = tail * Math.asinh(y)
  const x = Math.sinh(a)
  return Math.log(2 / (left.width + right.width)) - 0.5 * Math.log(2 * Math.PI) - 0.5 * x * x + Math.log(Math.cosh(a)) - 0.5 * Math.log1p(y * y)
}
