import type { MixtureComponent } from '../statistics/mixture-forecast.ts'

/*
 * The survey as opinion some steps before, and a part of its own that lasts for a while:
 *
 *   y_w = a + b x_w + u_w,   u_w = rho u_(w-1) + e_w,   e_w ~ Normal(0, s2)
 *
 * for every lag and every rho of a grid, all equally likely before. Without rho the intervals are too narrow wherever the survey, or the error
 * of the path of opinion, wanders. Given rho the waves are whitened (Prais and Winsten 1954: the first times sqrt(1 - rho^2), every other less rho
 * times the one before) and the rest is closed: flat on a and log s2, Zellner's g-prior on the slope, b | s2 ~ Normal(0, g s2 / |x'|^2) with x'
 * the whitened partners less their projection on the whitened constant, and g = n, one pair's worth of information. Its marginal likelihood is
 *
 *   sqrt(1 - rho^2) |1'|^-1 (1 + g)^(-1/2) (|y'|^2 (1 - R2 g / (1 + g)))^(-(n - 1) / 2)
 *
 * (Liang, Paulo, Molina, Clyde and Berger 2008, JASA 103:410, section 2.1, with one regressor and errors that are whitened), and the next wave is
 * Student's t with n - 1 degrees of freedom. Lags at which early waves have no partner have fewer pairs: each is set against no slope
 * on its own pairs.
 */

/** One lag and one rho. */
export interface LagModel {
  readonly lag: number
  readonly rho: number
  /** Posterior weight among all; they sum to 1. */
  readonly weight: number
  readonly pairs: number
  /** Intercept at slope 0 and its change per slope: a = constant - slope * constantPerSlope. */
  readonly constant: number
  readonly constantPerSlope: number
  /** Shrunk by g / (1 + g). */
  readonly slope: number
  /** s2. */
  readonly variance: number
  /** Squared lengths of the whitened constant and of the partners beside it. */
  readonly squaresOne: number
  readonly squaresX: number
  /** The last pair, which the next wave's own part goes on from. */
  readonly last: { readonly x: number; readonly y: number }
}

export interface LagPairs {
  readonly lag: number
  readonly x: Float64Array
  readonly y: Float64Array
}

/** Fewer pairs than this carry no regression. */
const leastPairs = 5
const rhos = Array.from({ length: 10 }, (_, i) => i / 10)
/** Models that weigh less than this part of the heaviest stay out of a forecast: they would cost time and move nothing that can be seen. */
const least = 1e-3

/** @returns the models of the lags with enough pairs that vary, weights summing to 1; empty where there are none */
export function fitLagModels(pairs: readonly LagPairs[]): readonly LagModel[] {
  const fitted = pairs.flatMap((lagged) => (lagged.x.length < leastPairs ? [] : fitLag(lagged)))
  const top = Math.max(...fitted.map(({ logWeight }) => logWeight))
  const total = fitted.reduce((sum, { logWeight }) => sum + Math.exp(logWeight - top), 0)
  return fitted.map(({ logWeight, ...model }) => ({ ...model, weight: Math.exp(logWeight - top) / total }))
}

type Fitted = Omit<LagModel, 'weight'> & { readonly logWeight: number }

/** Every rho of one lag; weights are over the marginal likelihood of no slope, which is averaged over rho too. */
function fitLag({ lag, x, y }: LagPairs): readonly Fitted[] {
  const n = x.length
  const shrink = n / (1 + n)
  const whitened = rhos.map((rho) => ({ rho, ...regress(whiten(new Float64Array(n).fill(1), rho), whiten(x, rho), whiten(y, rho)) }))
  if (whitened.some(({ squaresX, squaresY }) => !(squaresX > 0) || !(squaresY > 0))) return []
  const logNull = whitened.map(({ rho, squaresOne, squaresY }) => logNoSlope(rho, squaresOne, squaresY, n))
  const top = Math.max(...logNull)
  const noSlope = top + Math.log(logNull.reduce((sum, value) => sum + Math.exp(value - top), 0))
  return whitened.map(({ rho, squaresOne, squaresX, squaresY, products, constant, constantPerSlope }, i) => {
    const left = Math.max(Number.EPSILON, 1 - shrink * products ** 2 / (squaresX * squaresY))
    return {
      lag, rho, pairs: n, constant, constantPerSlope, squaresOne, squaresX,
      slope: shrink * products / squaresX, variance: squaresY * left / (n - 1),
      last: { x: x[n - 1], y: y[n - 1] },
      logWeight: logNull[i] - 0.5 * Math.log(1 + n) - (n - 1) / 2 * Math.log(left) - noSlope,
    }
  })
}

function whiten(values: Float64Array, rho: number): Float64Array {
  return values.map((value, w) => (w === 0 ? Math.sqrt(1 - rho * rho) * value : value - rho * values[w - 1]))
}

/** Log marginal likelihood without opinion, up to what all rho share. */
function logNoSlope(rho: number, squaresOne: number, squares: number, n: number): number {
  return 0.5 * Math.log((1 - rho * rho) / squaresOne) - (n - 1) / 2 * Math.log(squares)
}

/** Mean of whitened values against the whitened constant, and what they deviate from it by. */
function centred(one: Float64Array, values: Float64Array) {
  const squaresOne = dot(one, one)
  const mean = dot(one, values) / squaresOne
  const beside = values.map((value, i) => value - mean * one[i])
  return { squaresOne, mean, beside, squares: dot(beside, beside) }
}

/** Squares and products of x and y beside the constant. */
function regress(one: Float64Array, x: Float64Array, y: Float64Array) {
  const [ofX, ofY] = [centred(one, x), centred(one, y)]
  return { squaresOne: ofX.squaresOne, constantPerSlope: ofX.mean, constant: ofY.mean, squaresX: ofX.squares, squaresY: ofY.squares, products: dot(ofX.beside, ofY.beside) }
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i]
  return sum
}

/**
 * The next wave from its partners: a mixture over lags and rho. Lags whose partner is not known are left out and the rest weighed anew.
 *
 * @param partnerAt - the partner at a lag; null where there is none
 */
export function forecastFrom(models: readonly LagModel[], partnerAt: (lag: number) => number | null): readonly MixtureComponent[] {
  const components = models.flatMap((model) => {
    const x = partnerAt(model.lag)
    return x === null ? [] : [componentOf(model, x)]
  })
  const heaviest = Math.max(...components.map(({ weight }) => weight))
  const kept = components.filter(({ weight }) => weight >= least * heaviest)
  const total = kept.reduce((sum, { weight }) => sum + weight, 0)
  return kept.map((component) => ({ ...component, weight: component.weight / total }))
}

function componentOf({ rho, weight, pairs, constant, constantPerSlope, slope, variance, squaresOne, squaresX, last }: LagModel, x: number): MixtureComponent {
  const one = 1 - rho
  const besideX = x - rho * last.x - constantPerSlope * one
  const shrink = pairs / (1 + pairs)
  return {
    weight, freedom: pairs - 1,
    centre: rho * last.y + constant * one + slope * besideX,
    scale: Math.sqrt(variance * (1 + one * one / squaresOne + shrink * besideX * besideX / squaresX)),
  }
}

/**
 * The next wave from the waves alone: the same model without opinion, a mixture over rho.
 *
 * @param y - shape (waves), at least five that vary
 */
export function forecastAlone(y: Float64Array): readonly MixtureComponent[] {
  const n = y.length
  const fits = rhos.map((rho) => ({ rho, ...centred(whiten(new Float64Array(n).fill(1), rho), whiten(y, rho)) }))
  const logWeights = fits.map(({ rho, squaresOne, squares }) => logNoSlope(rho, squaresOne, squares, n))
  const top = Math.max(...logWeights)
  const total = logWeights.reduce((sum, value) => sum + Math.exp(value - top), 0)
  return fits.map(({ rho, squaresOne, mean, squares }, i) => {
    const one = 1 - rho
    return { weight: Math.exp(logWeights[i] - top) / total, freedom: n - 1, centre: rho * y[n - 1] + mean * one, scale: Math.sqrt(squares / (n - 1) * (1 + one * one / squaresOne)) }
  })
}

/** Weights of the lags, whatever rho; shape (lags that have a model), in order. */
export function lagWeightsOf(models: readonly LagModel[]): { lag: number; weight: number }[] {
  const weights = new Map<number, number>()
  for (const { lag, weight } of models) weights.set(lag, (weights.get(lag) ?? 0) + weight)
  return [...weights].map(([lag, weight]) => ({ lag, weight })).sort((a, b) => a.lag - b.lag)
}
