/**
 * One coordinate of the proposal: a split normal with sinh-arcsinh tails.
 *
 * Two half-normals of different width joined at the mode carry the skewness (Geweke 1989, Econometrica 57:1317, split
 * densities for importance sampling; Wallis 2014 on the split normal's moments); the map g(x) = delta sinh(asinh(x) / delta)
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
/** A split normal's skewness stays below 0.995; nearer to that one side vanishes. */
const mostSkewness = 0.9

function varianceOfTail(): number {
  let sum = 0
  const width = 1e-3
  for (let x = -12 + width / 2; x < 12; x += width) sum += stretch(x) ** 2 * Math.exp(-0.5 * x * x) * width
  return sum / Math.sqrt(2 * Math.PI)
}

function stretch(x: number): number {
  return tail * Math.sinh(Math.asinh(x) / tail)
}

/** The split normal with mean 0, variance 1 and, as far as it can, this skewness. */
export function matchSkewness(skewness: number): SplitMarginal {
  const target = Math.max(-mostSkewness, Math.min(mostSkewness, skewness))
  // skewness = sqrt(2/pi) r (1 + (6/pi - 2) r^2), r = right - left, increasing over the range in question: bisection
  let low = -1.65
  let high = 1.65
  for (let i = 0; i < 60; i++) {
    const r = 0.5 * (low + high)
    if (Math.sqrt(2 / Math.PI) * r * (1 + (6 / Math.PI - 2) * r * r) < target) low = r
    else high = r
  }
  const r = 0.5 * (low + high)
  const product = 1 - (1 - 2 / Math.PI) * r * r
  const sum = Math.sqrt(r * r + 4 * product)
  const shrink = 1 / Math.sqrt(tailVariance)
  return { mode: -Math.sqrt(2 / Math.PI) * r, left: 0.5 * (sum - r) * shrink, right: 0.5 * (sum + r) * shrink }
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
