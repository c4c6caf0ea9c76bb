import type { Findings } from '../findings/schema.ts'
import { caveat, type CaveatRule, type RuledCaveat } from './rule.ts'

// The thresholds are ours: no standard names them.
/** A share of authors that would have to be others from which who is heard differs from who buys, and from which it differs gravely. */
const mismatch = 0.1
const graveMismatch = 0.25
/** Customers of whom nobody is heard weigh this much or more: no weighting can make up for them. */
const graveUnreached = 0.05
/** Points of a reply per point of the thread before it from which the conversation is said to pull. */
const pulls = 0.1
/** Points by which the coder moves the average from which it is told. */
const coderBias = 1
/** Share of talk that would have to be of something else for talk to be like importance. */
const talkUnlike = 0.15
/** Posterior standard deviations that the change of opinion moves with another prior. */
const priorMatters = 0.3

type Speaking = Findings['speaking']

/** Caveats that rest on who is speaking, how far they stand for customers, and what the coder adds. */
export const listeningRules: readonly CaveatRule[] = [
  ({ findings: { speaking } }) => {
    const [gap, change] = [speaking.staying?.middle_gap, speaking.staying?.middle_gap_change]
    return gap && change?.movement === 'down' ? [caveat('caution', 'moderates-leaving', { gap: gap.difference, change: change.difference })] : []
  },
  ({ findings: { speaking } }) => speaking.spread.flatMap(widened),
  ({ findings: { speaking } }) => speaking.pull.filter(({ poster, movement, slope }) => poster === null && movement !== 'not-established' && Math.abs(slope.mean) >= pulls)
    .map(({ venue: _name, label, slope }) => caveat('note', 'conversation-pull', { venue: label, lean: slope.mean > 0 ? 'towards' : 'away', slope: slope.mean })),
  ({ findings: { benchmark } }) => (benchmark === null ? [] : benchmark.margins.flatMap((margin) => mismatchOf(margin, benchmark.unreachable.filter((of) => of.margin === margin.margin)))),
  ({ findings: { coder } }) => {
    if (coder.status === 'refused' && coder.reason !== null) return [caveat('caution', 'audit-refused', { scope: 'all', venue: '', reason: coder.reason })]
    const left = coder.status === 'applied' ? coder.venues : []
    return left.flatMap(({ label, refused }) => (refused === null ? [] : [caveat('note', 'audit-refused', { scope: 'venue', venue: label, reason: refused })]))
  },
  ({ findings: { coder } }) => {
    const { correction, movement } = coder
    return correction !== null && movement !== null && movement !== 'not-established' && Math.abs(correction.mean) >= coderBias
      ? [caveat('caution', 'coder-biased', { correction: correction.mean })] : []
  },
  ({ findings: { importance } }) => (importance !== null && importance.dissimilarity >= talkUnlike ? [caveat('caution', 'talk-unlike-importance', { share: importance.dissimilarity })] : []),
  ({ findings: { sensitivity } }) => (sensitivity.reliable && sensitivity.shift >= priorMatters ? [caveat('note', 'prior-matters', { shift: sensitivity.shift })] : []),
]

function widened({ label, movement, now, base }: Speaking['spread'][number]): RuledCaveat[] {
  return movement === 'up' && now !== null && base !== null ? [caveat('caution', 'spread-widening', { venue: label, base, now })] : []
}

type Benchmark = NonNullable<Findings['benchmark']>

/** One caveat a margin; `known` tells whether the share can be told, `names` the levels of whom nobody was heard. */
function mismatchOf({ margin, dissimilarity }: Benchmark['margins'][number], unreached: Benchmark['unreachable']): RuledCaveat[] {
  const share = dissimilarity ?? 0
  const grave = share >= graveMismatch || unreached.some(({ customers }) => customers >= graveUnreached)
  if (!grave && share < mismatch) return []
  const figures = { margin, known: dissimilarity === null ? 'no' : 'yes', share, unreached: unreached.length, names: unreached.map(({ level }) => level).join(', ') }
  return [caveat(grave ? 'serious' : 'caution', 'benchmark-mismatch', figures)]
}
