import { ModelError } from '../model-error.ts'

// Kronrod's 15 nodes on [-1, 1], the upper half and 0, and their weights; every other node is one of Gauss's seven. From
// Piessens and others (1983), QUADPACK, routine QK15, recalled from memory: the tests hold them to the powers they must integrate.
const nodes = [0.9914553711208126, 0.9491079123427585, 0.8648644233597691, 0.7415311855993945, 0.5860872354676911, 0.4058451513773972, 0.2077849550078985, 0]
const kronrod = [0.022935322010529224, 0.06309209262997856, 0.10479001032225019, 0.14065325971552592, 0.1690047266392679, 0.19035057806478542, 0.20443294007529889, 0.20948214108472782]
const gauss = [0, 0.1294849661688697, 0, 0.27970539148927664, 0, 0.3818300505051189, 0, 0.4179591836734694]

const deepest = 50

/**
 * Integral of a function over an interval, halved wherever Gauss's rule and Kronrod's differ by more than the tolerance.
 * Kronrod's, which is returned, is much the better one: where the function is smooth, its error is orders below the tolerance.
 *
 * @param f - smooth but for narrow places, finite inside the interval; the ends are never evaluated
 * @param from - finite
 * @param to - finite
 * @param tolerance - > 0, allowed difference of the two rules in each part
 * @throws {ModelError} `integral-invalid`
 * @see Piessens and others (1983), QUADPACK
 * @example adaptiveIntegral((x) => 3 * x * x, 0, 0, 1e-9) // => 0
 */
export function adaptiveIntegral(f: (x: number) => number, from: number, to: number, tolerance: number): number {
  if (!(Number.isFinite(from + to) && tolerance > 0)) {
    throw new ModelError('integral-invalid', `Unexpected integral from ${from} to ${to} to ${tolerance}, expected finite ends and a tolerance above 0`)
  }
  return from === to ? 0 : part(f, from, to, tolerance, 0)
}

function part(f: (x: number) => number, from: number, to: number, tolerance: number, depth: number): number {
  const [middle, half] = [(from + to) / 2, (to - from) / 2]
  let [coarse, fine] = [0, 0]
  for (const [i, node] of nodes.entries()) {
    const value = node === 0 ? f(middle) : f(middle - half * node) + f(middle + half * node)
    coarse += gauss[i] * value
    fine += kronrod[i] * value
  }
  if (Math.abs((fine - coarse) * half) <= tolerance || depth >= deepest) return fine * half
  return part(f, from, middle, tolerance, depth + 1) + part(f, middle, to, tolerance, depth + 1)
}
