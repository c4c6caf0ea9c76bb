import { paretoSmooth } from '../diagnostics/pareto-k.ts'
import { createGenerator, type Generator } from '../random/generator.ts'
import { latinHypercube } from '../random/latin-hypercube.ts'
import type { FitExecutor } from './executor.ts'
import { findMode } from './mode.ts'
import { sigmaOf } from './prior-scale.ts'
import type { FitProblem } from './problem.ts'
import { kishEffectiveSize } from '../statistics/kish.ts'
import { fitProposal, normalProposal, placePoints, proposalLogDensity, type Proposal } from './proposal.ts'
import { resample } from './resample.ts'

/*
 * The posterior over the standard deviations, by importance sampling with every state integrated out:
 *
 *   mode in z ──▶ normal proposal ──▶ pilot draws ──▶ matched proposal ──▶ ... ──▶ proposals, weighted
 *                                                                                      │ resampled
 *                                                                                      ▼
 *                                                              one exact draw of all states for each
 *
 * z makes the prior standard normal (prior-scale.ts). The proposal's tails outlast every normal's, so weights are
 * bounded whatever the data (the evidence is). Independent draws need no burn-in, and the Pareto k of the weights says
 * whether they can be trusted (Vehtari, Simpson, Gelman, Yao and Gabry 2024).
 */
export interface Posterior {
  readonly problem: FitProblem
  /** All proposals, weighted: what is said about the standard deviations comes from these. */
  readonly sigmas: WeightedSigmas
  /** Equally weighted joint draws: what is said about states comes from these. */
  readonly draws: StateDraws
  /** Of the largest weights; 0 where they all agree, null where so few outweigh the rest that there is no tail to fit. */
  readonly paretoK: number | null
  /** Kish's effective number of the weighted proposals. */
  readonly effective: number
  /** Log evidence of the model, all standard deviations integrated out. */
  readonly logEvidence: number
}

export interface WeightedSigmas {
  readonly count: number
  /** Shape (count, scales), on the score's own scale. */
  readonly values: Float64Array
  /** Shape (count), summing to 1. */
  readonly weights: Float64Array
}

export interface StateDraws {
  readonly count: number
  /** Shape (count, stateWidth). */
  readonly states: Float64Array
  /** Shape (count, scales): the standard deviations each draw was made with. */
  readonly sigmas: Float64Array
}

export interface PosteriorOptions {
  readonly seed: number
  /** Weighted proposals in the last round. */
  readonly proposals: number
  /** Joint draws of the states. */
  readonly draws: number
  /** Called as the work goes on: 0 to 1. */
  readonly progress?: (share: number) => void
}

/** Streams of the seed: one per purpose, the draws of the states from the last one on. */
const streams = { rounds: 0, resampling: 1, states: 16 } as const
const pilotRounds = [400, 800, 1600] as const
/** Effective share of a pilot that is good enough to stop adapting. */
const goodEnough = 0.3
/** Effective draws below which the last round is made again, with a proposal matched to it. */
const leastEffective = 1000
const mostLastRounds = 3

export async function samplePosterior(problem: FitProblem, executor: FitExecutor, options: PosteriorOptions): Promise<Posterior> {
  const generator = createGenerator(options.seed, streams.rounds)
  const progress = options.progress ?? (() => undefined)
  let proposal = await firstProposal(problem, executor)
  progress(0.1)
  for (const n of pilotRounds) {
    const round = await weigh(problem, executor, proposal, n, generator)
    proposal = matchProposal(round, proposal)
    if (round.effective > goodEnough * n) break
  }
  progress(0.2)
  let last = await weigh(problem, executor, proposal, options.proposals, generator)
  for (let extra = 1; extra < mostLastRounds && last.effective < leastEffective; extra++) {
    proposal = matchProposal(last, proposal)
    const again = await weigh(problem, executor, proposal, options.proposals * 2 ** extra, generator)
    if (again.effective > last.effective) last = again
  }
  progress(0.6)
  const sigmas = toSigmas(problem, last.points)
  const draws = await drawJointly(problem, executor, sigmas, last.weights, options)
  progress(1)
  return {
    problem, draws,
    sigmas: { count: last.weights.length, values: sigmas, weights: last.weights },
    paretoK: last.paretoK, effective: last.effective, logEvidence: last.logEvidence,
  }
}

interface Round {
  /** Shape (n, d), in z. */
  readonly points: Float64Array
  readonly logWeights: Float64Array
  /** Smoothed, summing to 1. */
  readonly weights: Float64Array
  /** Of the largest weights; 0 where they all agree and there is no tail to fit. */
  readonly paretoK: number | null
  readonly effective: number
  readonly logEvidence: number
}

/** The normal at the mode. */
async function firstProposal(problem: FitProblem, executor: FitExecutor): Promise<Proposal> {
  const mode = await findMode((points) => logTarget(problem, executor, points), new Float64Array(problem.scales.length))
  // a little wider than the curvature says: too wide costs draws, too narrow hides what lies outside
  const proposal = normalProposal(mode.point, mode.covariance.map((x) => 1.3 * x))
  if (proposal === null) throw new Error('the curvature was made positive definite, so its inverse has a factor')
  return proposal
}

/** The proposal matched to a weighted round; the one before where the round is too poor to match. */
function matchProposal(round: Round, before: Proposal): Proposal {
  return fitProposal(round.points, temper(round.logWeights), before.dimension) ?? before
}

async function weigh(problem: FitProblem, executor: FitExecutor, proposal: Proposal, n: number, generator: Generator): Promise<Round> {
  const points = latinHypercube(n, proposal.dimension, generator)
  placePoints(proposal, points)
  const target = await logTarget(problem, executor, points)
  const density = proposalLogDensity(proposal, points)
  const logWeights = target.map((x, i) => x - density[i])
  const { weights, paretoK, effectiveSize } = paretoSmooth(logWeights)
  return { points, logWeights, weights, paretoK: paretoK.value ?? (paretoK.reason === 'flat-tail' ? 0 : null), effective: effectiveSize, logEvidence: logMeanExp(logWeights) }
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

/** Equally weighted rows, and one exact draw of all states for each. */
async function drawJointly(problem: FitProblem, executor: FitExecutor, from: Float64Array, weights: Float64Array, options: PosteriorOptions): Promise<StateDraws> {
  const d = problem.scales.length
  const chosen = resample(weights, options.draws, createGenerator(options.seed, streams.resampling))
  const sigmas = new Float64Array(options.draws * d)
  chosen.forEach((row, i) => { sigmas.set(from.subarray(row * d, (row + 1) * d), i * d) })
  return { count: options.draws, sigmas, states: await executor.states(sigmas, options.seed, streams.states) }
}

/** Weights for matching moments: raised to a power below 1 where a few would decide everything. */
function temper(logWeights: Float64Array): Float64Array {
  const least = Math.min(200, 0.25 * logWeights.length)
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

function logMeanExp(values: Float64Array): number {
  const top = values.reduce((a, b) => Math.max(a, b), -Infinity)
  return top + Math.log(values.reduce((sum, x) => sum + Math.exp(x - top), 0) / values.length)
}
