/**
 * One coordinate of the proposal: a split normal with sinh-arcsinh tails.
 *
 * Two half-normals of different width joined at the mode carry the skewness (Geweke 1989, Econometrica 57:1317, split
 * densities for importance sampling); the map g(x) = delta sinh(asinh(x) / delta)
 * with delta < 1 stretches the tails (Jones and Pewsey 2009, Biometrika 96:761), so that they outlast every normal tail and
 * importance weights stay bounded.
 */
export interface SplitMarginal {
  readonly mode: number
  readonly left: number
  readonly right: number
}

const tail = 0.8
/** Variance of g(x) for standard normal x at this `tail`, by quadrature below: the scales are shrunk by its root. */
const tailVariance = varianceOfTail()

function varianceOfTail(): number {
  let sum = 0
  const width = 1e-3
  for (let x = -12 + width / 2; x < 12; x += width) sum += stretch(x) ** 2 * Math.exp(-0.5 * x * x) * width
  return sum / Math.sqrt(2 * Math.PI)
}

function stretch(x: number): number {
  return tail * Math.sinh(Math.asinh(x) / tail)
}

/** The symmetric one with mean 0 and variance 1. */
export function standardMarginal(): SplitMarginal {
  const width = 1 / Math.sqrt(tailVariance)
  return { mode: 0, left: width, right: width }
}

const firstStride = 0.2
const lastStride = 0.01

/**
 * The marginal of greatest weighted likelihood, by pattern search (Hooke and Jeeves 1961, J. ACM 8:212) over the mode and
 * the logarithms of the two widths. Likelihood rather than moments, because it punishes a density that is too thin
 * where the sample is: what importance weights suffer from.
 *
 * @param values - shape (n), of mean about 0 and variance about 1
 * @param weights - shape (n), >= 0, summing to 1
 */
export function fitMarginal(values: Float64Array, weights: Float64Array): SplitMarginal {
  const start = standardMarginal()
  const at = [start.mode, Math.log(start.left), Math.log(start.right)]
  const score = () => weightedLogLikelihood({ mode: at[0], left: Math.exp(at[1]), right: Math.exp(at[2]) }, values, weights)
  let best = score()
  for (let stride = firstStride; stride > lastStride;) {
    let rose = false
    for (let k = 0; k < at.length; k++) {
      for (const move of [stride, -stride]) {
        const before = at[k]
        at[k] = before + move
        const found = score()
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
  return { mode: at[0], left: Math.exp(at[1]), right: Math.exp(at[2]) }
}

function weightedLogLikelihood(m: SplitMarginal, values: Float64Array, weights: Float64Array): number {
  let total = 0
  for (let i = 0; i < values.length; i++) if (weights[i] > 0) total += weights[i] * marginalLogDensity(m, values[i])
  return total
}

/**
 * @param u - in (0, 1)
 * @param quantile - standard normal quantile function
 * @returns the value at probability u
 */
export function marginalQuantile(m: SplitMarginal, u: number, quantile: (p: number) => number): number {
  const onLeft = m.left / (m.left + m.right)
  if (u < onLeft) return m.mode + m.left * stretch(quantile(0.5 * u / onLeft))
  return m.mode - m.right * stretch(quantile(0.5 * (1 - u) / (1 - onLeft)))
}

/** Log density at s. */
export function marginalLogDensity(m: SplitMarginal, s: number): number {
  const y = (s - m.mode) / (s < m.mode ? m.left : m.right) / tail
  const a = tail * Math.asinh(y)
  const x = Math.sinh(a)
  // dx/dg at g = tail y
  const slope = Math.cosh(a) / Math.sqrt(1 + y * y)
  return Math.log(2 / (m.left + m.right)) - 0.5 * Math.log(2 * Math.PI) - 0.5 * x * x + Math.log(slope)
}
