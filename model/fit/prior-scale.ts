import { normalCdf, normalQuantile } from '../statistics/normal.ts'

/**
 * A standard deviation and the standard normal z that stands for it: F(sigma / scale) = Phi(z), F the half-normal prior's
 * distribution function. In z the prior is a standard normal whatever its scale, a likelihood that is flat near
 * sigma = 0 leaves a normal left tail instead of an edge, and one that is sharp is nearly normal: a space in which
 * importance sampling works. All of it is a change of variable: the posterior is the same.
 */

/**
 * Standard deviations below this multiple of the scale are the same model to any working precision, yet their
 * precision 1/sigma^2 would drown the data's in rounding. A half-normal puts 8e-5 below it.
 */
const floor = 1e-4

/**
 * sigma = scale F^-1(Phi(z)) with F^-1(p) = Phi^-1((1 + p) / 2), computed through whichever tail keeps its digits.
 *
 * @param z - any finite number
 * @param scale - sd of the underlying normal, > 0
 * @returns sigma, at least 1e-4 scale
 */
export function sigmaOf(z: number, scale: number): number {
  const ratio = z > 0 ? -normalQuantile(0.5 * normalCdf(-z)) : normalQuantile(0.5 + 0.5 * normalCdf(z))
  return scale * Math.max(ratio, floor)
}
