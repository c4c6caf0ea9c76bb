import { paretoSmooth, type SmoothedWeights } from '../diagnostics/pareto-k.ts'
import type { Generator } from '../random/generator.ts'
import { latinHypercube } from '../random/latin-hypercube.ts'
import { kishEffectiveSize } from '../statistics/kish.ts'
import type { FitExecutor } from './executor.ts'
import { findMode } from './mode.ts'
import { sigmaOf } from './prior-scale.ts'
import type { FitProblem } from './problem.ts'
import { fitProposal, normalProposal, placePoints, proposalLogDensity, type Proposal } from './proposal.ts'

/*
 * The posterior over the standard deviations, by adaptive importance sampling with every state integrated out:
 *
 *   mode in z ──▶ normal proposal ──▶ round ──▶ proposal fitted to all rounds ──▶ round ──▶ ... ──▶ all rounds, weighted
 *
 * z makes the prior standard normal (prior-scale.ts). All rounds count: every point is weighed against the mixture of all
 * proposals (Cornuet, Marin, Mira and Robert 2012, Scand. J. Statist. 39:798). The proposals' tails outlast a normal's, so
 * weights are bounded whatever the data (the evidence is). Independent draws need no burn-in, and the Pareto k of the
 * weights says whether they can be trusted (Vehtari, Simpson, Gelman, Yao and Gabry 2024).
 */

/** Proposals of the standard deviations, weighted. */
export interface WeightedSigmas {
  readonly count: number
  /** Shape (count, scales), on the score's own scale. */
  readonly values: Float64Array
  /** Shape (count), summing to 1. */
  readonly weights: Float64Array
}

export interface SampledScales {
  readonly sigmas: WeightedSigmas
  /** Of the largest weights; 0 where they all agree, null where so few outweigh the rest that there is no tail to fit. */
  readonly paretoK: number | null
  /** Kish's effective number of the weighted proposals. */
  readonly effective: number
}

export interface ScaleOptions {
  /** Weighted proposals, all rounds together. */
  readonly proposals: number
  /** Effective draws below which another round is made, as large as all before it together. */
  readonly leastEffective: number
  /** Called as the work goes on: 0 to 1. */
  readonly progress?: (share: number) => void
}

/** Shares of the proposals in each round: small ones first, to learn where to look. */
const roundShares = [0.1, 0.25, 0.65] as const
/** Variance of the first round's proposal over the curvature's: too wide costs draws, too narrow hides what lies outside. */
const firstWidening = 1.3
/** Effective draws that a proposal is fitted to, at least: with fewer the weights are tempered. */
const leastFitted = 40
const mostRounds = 5
/** Pareto k above which another round is made too, though weights are relied on up to 0.7. */
const goodK = 0.6

/** @param generator - the random stream of the proposals */
export async function sampleScales(problem: FitProblem, executor: FitExecutor, generator: Generator, options: ScaleOptions): Promise<SampledScales> {
  const progress = options.progress ?? (() => undefined)
  const goodEnough = ({ effectiveSize, paretoK }: SmoothedWeights) => effectiveSize >= options.leastEffective && (paretoK.value ?? 0) <= goodK
  let pool = emptyPool
  let weighted: SmoothedWeights | null = null
  const sizes = roundShares.map((share) => Math.round(share * options.proposals))
  while (sizes.length > 0 || (weighted !== null && !goodEnough(weighted) && pool.rounds.length < mostRounds)) {
    const proposal = pool.rounds.length === 0 ? await firstProposal(problem, executor) : nextProposal(pool, generator)
    progress(pool.logWeights.length / options.proposals)
    pool = await addRound(problem, executor, pool, proposal, sizes.shift() ?? pool.logWeights.length, generator)
    if (sizes.length === 0) weighted = paretoSmooth(pool.logWeights)
  }
  if (weighted === null) throw new Error('there is at least one round')
  const { value: k, ...undecided } = weighted.paretoK
  return {
    sigmas: { count: weighted.weights.length, values: toSigmas(problem, pool.points), weights: weighted.weights },
    paretoK: k ?? ('reason' in undecided && undecided.reason === 'flat-tail' ? 0 : null),
    effective: weighted.effectiveSize,
  }
}

/** Fitted to all points so far; the last one again where they are too poor to fit. */
function nextProposal({ rounds, points, logWeights }: Pool, generator: Generator): Proposal {
  const { proposal } = rounds[rounds.length - 1]
  return fitProposal(points, temper(logWeights), proposal.dimension, generator) ?? proposal
}

/** The normal at the mode. */
async function firstProposal(problem: FitProblem, executor: FitExecutor): Promise<Proposal> {
  const mode = await findMode((points) => logTarget(problem, executor, points), new Float64Array(problem.scales.length))
  const proposal = normalProposal(mode.point, mode.covariance.map((x) => firstWidening * x))
  if (proposal === null) throw new Error('the curvature was made positive definite, so its inverse has a factor')
  return proposal
}

/** All points so far, weighed against the mixture of the proposals they came from. */
interface Pool {
  readonly rounds: readonly { readonly proposal: Proposal; readonly count: number }[]
  /** Shape (n, d), in z. */
  readonly points: Float64Array
  /** Shape (n): log of evidence times prior. */
  readonly target: Float64Array
  readonly logWeights: Float64Array
}

const emptyPool: Pool = { rounds: [], points: new Float64Array(0), target: new Float64Array(0), logWeights: new Float64Array(0) }

async function addRound(problem: FitProblem, executor: FitExecutor, pool: Pool, proposal: Proposal, count: number, generator: Generator): Promise<Pool> {
  const fresh = latinHypercube(count, proposal.dimension, generator)
  placePoints(proposal, fresh)
  const rounds = [...pool.rounds, { proposal, count }]
  const points = join(pool.points, fresh)
  const target = join(pool.target, await logTarget(problem, executor, fresh))
  const mixture = mixtureLogDensity(rounds, points)
  return { rounds, points, target, logWeights: target.map((x, i) => x - mixture[i]) }
}

/** Log of sum_r (n_r / n) q_r at every point. */
function mixtureLogDensity(rounds: Pool['rounds'], points: Float64Array): Float64Array {
  const all = rounds.reduce((total, { count }) => total + count, 0)
  const each = rounds.map(({ proposal, count }) => proposalLogDensity(proposal, points).map((x) => x + Math.log(count / all)))
  return each[0].map((_, i) => logSumExp(each.map((density) => density[i])))
}

function logSumExp(values: readonly number[]): number {
  const top = Math.max(...values)
  return top + Math.log(values.reduce((sum, x) => sum + Math.exp(x - top), 0))
}

function join(a: Float64Array, b: Float64Array): Float64Array {
  const out = new Float64Array(a.length + b.length)
  out.set(a)
  out.set(b, a.length)
  return out
}

/** Log of evidence times prior, as a density over z: shape (n, d) in, (n) out. */
async function logTarget(problem: FitProblem, executor: FitExecutor, points: Float64Array): Promise<Float64Array> {
  const d = problem.scales.length
  const target = await executor.evidence(toSigmas(problem, points))
  for (let i = 0; i < target.length; i++) {
    for (let j = 0; j < d; j++) target[i] -= 0.5 * (points[i * d + j] ** 2 + Math.log(2 * Math.PI))
  }
  return target
}

function toSigmas(problem: FitProblem, points: Float64Array): Float64Array {
  return points.map((z, i) => sigmaOf(z, problem.scales[i % problem.scales.length].prior))
}

/** Weights for matching moments: raised to a power below 1 where a few would decide everything. */
function temper(logWeights: Float64Array): Float64Array {
  const least = Math.min(leastFitted, 0.25 * logWeights.length)
  for (let power = 1; ; power *= 0.8) {
    const weights = normalise(logWeights.map((x) => power * x))
    if (kishEffectiveSize(weights) >= least || power < 0.01) return weights
  }
}

function normalise(logWeights: Float64Array): Float64Array {
  const top = logWeights.reduce((a, b) => Math.max(a, b), -Infinity)
  const weights = logWeights.map((x) => Math.exp(x - top))
  const sum = weights.reduce((a, b) => a + b, 0)
  return weights.map((w) => w / sum)
}
