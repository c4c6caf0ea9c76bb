/** Value and slope of a function at one place. */
export interface ValueAndSlope {
  readonly value: number
  readonly slope: number
}

const steps = 200
const rounding = 2e-16

/**
 * Root of an ascending function by Newton's steps, halving where one would leave the bracket. Exact to rounding after few
 * steps where the function is made of straight pieces.
 *
 * @param f - continuous, ascending (flat stretches allowed), below 0 or 0 at `from`, above 0 or 0 at `to`
 * @param start - first guess, in [from, to]
 * @see Press and others (2007), Numerical Recipes, 3rd ed., section 9.4 (from memory): Newton's method made safe
 * @example ascendingRoot((x) => ({ value: Math.max(0, x) - 2, slope: x > 0 ? 1 : 0 }), -8, 8, -4) // => 2
 */
export function ascendingRoot(f: (x: number) => ValueAndSlope, from: number, to: number, start: number): number {
  const smallest = rounding * Math.max(Math.abs(from), Math.abs(to))
  let [below, above, x] = [from, to, start]
  for (let step = 0; step < steps; step += 1) {
    const { value, slope } = f(x)
    if (value === 0) return x
    if (value < 0) below = x
    else above = x
    const newton = x - value / slope
    const next = newton >= below && newton <= above ? newton : (below + above) / 2
    if (Math.abs(next - x) <= smallest) return next
    x = next
  }
  return x
}
